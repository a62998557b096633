import { zodResolver } from '@hookform/resolvers/zod';
import { useState, type ReactNode } from 'react';
import { Controller, useForm, useWatch, type Control, type Resolver } from 'react-hook-form';
import {
  INSTANTS,
  roundFormSchema,
  type InstantName,
  type LateRule,
  type RoundChoices,
  type RoundForm as Values,
  type Stage,
} from '../../../shared/schemas/round.ts';
import { showProblem } from '../../lib/form.ts';
import { paths } from '../../lib/paths.ts';
import { Button, LinkButton } from '../../ui/button.tsx';
import { RadioGroup } from '../../ui/choice.tsx';
import { DateTimeField } from '../../ui/date-time-field.tsx';
import { Notice } from '../../ui/notice.tsx';
import { Select } from '../../ui/text-field.tsx';
import { proposeInstants, RHYTHMS, type Rhythm } from './round-rhythms.ts';
import { RoundTimes } from './round-times.tsx';
import { people } from './round-words.ts';
import './rounds.css';

export interface RoundFormProps {
  readonly choices: RoundChoices;
  readonly initial: Values;
  /** planned: everything can change. */
  readonly stage: Stage;
  readonly isNew?: boolean;
  readonly submitLabel: string;
  readonly onSubmit: (values: Values) => Promise<void>;
  readonly acts?: ReactNode;
}

// The schema's defaults make its input looser than the fields, which are always all there.
const resolver = zodResolver(roundFormSchema) as unknown as Resolver<Values>;

const LABELS: Record<InstantName, string> = {
  opensAt: 'Opens',
  writingEndsAt: 'Writing ends',
  reviewingEndsAt: 'Reviewing ends',
  answeringEndsAt: 'Answering ends',
  settlesAt: 'Settles',
};

const LATE: readonly { readonly value: LateRule; readonly label: string; readonly hint: string }[] = [
  { value: 'closed', label: 'Closed', hint: 'Nothing is taken after writing ends.' },
  {
    value: 'until-reviewing',
    label: 'Until reviewing opens',
    hint: 'Taken and marked late, as long as nothing is dealt.',
  },
  { value: 'late-batch', label: 'In a late batch', hint: 'Dealt together half way through reviewing.' },
];

const PASSED: Record<Stage, number> = { planned: 0, writing: 1, reviewing: 2, answering: 3, settled: 5 };

/** Plans a round, or changes one as far as it has not happened yet. */
export function RoundForm({ choices, initial, stage, isNew, submitLabel, onSubmit, acts }: RoundFormProps) {
  const form = useForm<Values>({ resolver, defaultValues: initial });
  const { control, formState, register, setError, handleSubmit } = form;
  const { errors, isSubmitting } = formState;
  const classId = useWatch({ control, name: 'classId' });
  const chosen = choices.classes.find(({ id }) => id === classId);
  const zone = chosen?.timeZone ?? 'UTC';
  const passed = PASSED[stage];
  const submit = handleSubmit(async (values) => {
    try {
      await onSubmit(values);
    } catch (error) {
      if (!showProblem(error, setError, Object.keys(values))) throw error;
    }
  });
  return (
    <form onSubmit={(event) => void submit(event)} noValidate className="stack">
      <div className="plan-grid">
        <Select
          label="Class"
          disabled={!isNew}
          options={choices.classes.map(({ id, name }) => ({ value: id, label: name }))}
          error={errors.classId?.message}
          {...register('classId')}
        />
        <Select
          label="Task"
          disabled={stage !== 'planned'}
          placeholder={initial.taskId ? undefined : 'Choose a task'}
          options={choices.tasks.map(({ id, title }) => ({ value: id, label: title }))}
          error={errors.taskId?.message}
          {...register('taskId')}
        />
      </div>
      {chosen && chosen.students < 5 ? (
        <Notice
          title="Names can be guessed."
          acts={
            <LinkButton to={paths.class(chosen.id)} small>
              Invite more
            </LinkButton>
          }
        >
          There {chosen.students === 1 ? 'is' : 'are'} only {people(chosen.students)} in this class. With fewer than
          five, readers can guess whose work they see.
        </Notice>
      ) : null}
      {isNew ? (
        <Rhythms
          onChoose={(rhythm) => {
            const proposed = proposeInstants(rhythm, zone, new Date());
            for (const name of INSTANTS) form.setValue(name, proposed[name], { shouldValidate: formState.isSubmitted });
          }}
        />
      ) : null}
      <div className="plan-grid">
        {INSTANTS.map((name, i) => (
          <Controller
            key={name}
            control={control}
            name={name}
            render={({ field, fieldState }) => (
              <DateTimeField
                label={LABELS[name]}
                zone={zone}
                value={field.value || null}
                onChange={(iso) => field.onChange(iso ?? '')}
                onBlur={field.onBlur}
                disabled={i < passed}
                hint={i < passed ? 'has happened' : i === passed ? `All times are ${cityOf(zone)} time.` : ''}
                error={fieldState.error?.message}
              />
            )}
          />
        ))}
        <Controller
          control={control}
          name="reviewsPerDerivation"
          render={({ field, fieldState }) => (
            <Select
              label="Reviews of each derivation"
              hint="Everyone reviews as many as they receive."
              disabled={passed >= 2}
              options={[1, 2, 3, 4].map((count) => ({ value: String(count), label: String(count) }))}
              value={String(field.value)}
              onChange={(event) => field.onChange(Number(event.currentTarget.value))}
              error={fieldState.error?.message}
            />
          )}
        />
      </div>
      <Plan control={control} zone={zone} />
      <Controller
        control={control}
        name="lateRule"
        render={({ field }) => (
          <RadioGroup label="Late derivations" options={LATE} value={field.value} onChange={field.onChange} />
        )}
      />
      {errors.root ? (
        <p className="msg err" role="alert">
          {errors.root.message}
        </p>
      ) : null}
      <div className="acts">
        <Button kind="primary" type="submit" busy={isSubmitting}>
          {submitLabel}
        </Button>
        {acts}
      </div>
    </form>
  );
}

function cityOf(zone: string): string {
  return zone.split('/').at(-1)?.replaceAll('_', ' ') ?? zone;
}

function Rhythms({ onChoose }: { readonly onChoose: (rhythm: Rhythm) => void }) {
  const [rhythm, setRhythm] = useState<Rhythm>('week');
  return (
    <div className="rhythms">
      <RadioGroup
        label="How fast it runs"
        options={RHYTHMS}
        value={rhythm}
        onChange={(value) => {
          setRhythm(value);
          onChoose(value);
        }}
      />
    </div>
  );
}

/** The chosen times as the class will meet them. */
function Plan({ control, zone }: { readonly control: Control<Values>; readonly zone: string }) {
  const values = useWatch({ control });
  const [opened] = useState(() => new Date().toISOString());
  const instants = Object.fromEntries(INSTANTS.map((name) => [name, values[name] ?? ''])) as Record<
    InstantName,
    string
  >;
  if (INSTANTS.some((name) => Number.isNaN(Date.parse(instants[name])))) return null;
  return <RoundTimes instants={instants} zone={zone} now={opened} />;
}
