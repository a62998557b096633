import { zodResolver } from '@hookform/resolvers/zod';
import { useEffect } from 'react';
import {
  Controller,
  useFieldArray,
  useForm,
  useWatch,
  type Control,
  type FieldErrors,
  type Resolver,
} from 'react-hook-form';
import { z } from 'zod';
import { filledTexSchema, taskFormSchema, type TaskForm as Values } from '../../../shared/schemas/task.ts';
import { showProblem } from '../../lib/form.ts';
import { Button } from '../../ui/button.tsx';
import { Checkbox, RadioGroup } from '../../ui/choice.tsx';
import { Select, TextArea, TextField } from '../../ui/text-field.tsx';
import { MathsInput } from './maths-input.tsx';
import { GOALS, type GoalKind } from './task-words.ts';
import './tasks.css';

/** The form keeps every goal's own field, so that changing one's mind loses nothing. */
const fieldsSchema = taskFormSchema.omit({ goal: true, assumptions: true }).extend({
  goalKind: z.enum(['free', 'expanded', 'factored', 'simplified', 'solved', 'target']),
  letter: z.string().trim().max(20, 'A letter holds at most 20 characters.'),
  target: z.string().trim().max(4000, 'A line holds at most 4000 characters.'),
  assumptions: z.array(z.object({ tex: filledTexSchema })).max(12, 'At most 12 assumptions.'),
});
type Fields = z.infer<typeof fieldsSchema>;

const checkedSchema = fieldsSchema.superRefine(({ goalKind, letter, target }, context) => {
  if (goalKind === 'solved' && letter === '') {
    context.addIssue({ code: 'custom', path: ['letter'], message: 'Name the letter.' });
  }
  if (goalKind === 'target' && target === '') {
    context.addIssue({ code: 'custom', path: ['target'], message: 'Write this line.' });
  }
});

function toFields({ goal, assumptions, ...rest }: Values): Fields {
  return {
    ...rest,
    goalKind: goal.kind,
    letter: goal.kind === 'solved' ? goal.letter : 'x',
    target: goal.kind === 'target' ? goal.target : '',
    assumptions: assumptions.map((tex) => ({ tex })),
  };
}

function toGoal({ goalKind, letter, target }: Pick<Fields, 'goalKind' | 'letter' | 'target'>): Values['goal'] {
  if (goalKind === 'solved') return { kind: 'solved', letter };
  return goalKind === 'target' ? { kind: 'target', target } : { kind: goalKind };
}

function toValues({ goalKind, letter, target, assumptions, ...rest }: Fields): Values {
  return { ...rest, goal: toGoal({ goalKind, letter, target }), assumptions: assumptions.map(({ tex }) => tex) };
}

// The schema's defaults make its input looser than the fields, which are always all there.
const resolver = zodResolver(checkedSchema) as unknown as Resolver<Fields>;

/** Where the server's pointers stand in this form. */
const PLACES: readonly (readonly [RegExp, string])[] = [
  [/^goal\.target$/, 'target'],
  [/^goal\.letter$/, 'letter'],
  [/^(assumptions\.\d+)$/, '$1.tex'],
];

export interface TaskFormProps {
  readonly initial: Values;
  readonly submitLabel: string;
  readonly onSubmit: (values: Values) => Promise<void>;
  /** Told of every change, so that what stands beside the form can follow. */
  readonly onTerms?: (values: Values) => void;
  readonly acts?: React.ReactNode;
}

/** A task: what is given, what is to be reached, and how strictly steps are judged. */
export function TaskForm({ initial, submitLabel, onSubmit, onTerms, acts }: TaskFormProps) {
  const form = useForm<Fields>({ resolver, defaultValues: toFields(initial) });
  const { control, register, formState, setError, handleSubmit } = form;
  const { errors, isSubmitting } = formState;
  const watched = useWatch({ control });
  useEffect(() => {
    onTerms?.(toValues({ ...toFields(initial), ...watched } as Fields));
  }, [watched, initial, onTerms]);
  const settings = { numbers: watched.settings?.numbers ?? 'real', decimal: watched.settings?.decimal ?? 'point' };
  const place = (name: string, options: { type: string; message: string }) => {
    const found = PLACES.find(([pattern]) => pattern.test(name));
    setError((found ? name.replace(found[0], found[1]) : name) as 'title', options);
  };
  const submit = handleSubmit(async (fields) => {
    try {
      await onSubmit(toValues(fields));
    } catch (error) {
      if (!showProblem(error, place as never, [...Object.keys(fields), 'goal'])) throw error;
    }
  });
  return (
    <form onSubmit={(event) => void submit(event)} noValidate className="stack">
      <TextField label="Title" error={errors.title?.message} maxLength={120} {...register('title')} />
      <Controller
        control={control}
        name="given"
        render={({ field, fieldState }) => (
          <MathsInput
            label="Given line"
            hint="Line 0 of every derivation; it stays as it is."
            value={field.value}
            onChange={field.onChange}
            settings={settings}
            error={fieldState.error?.message}
          />
        )}
      />
      <Goal control={control} kind={watched.goalKind ?? 'free'} settings={settings} errors={errors} />
      <Assumptions control={control} settings={settings} />
      <TextArea
        label="Notes for the class"
        hint="Stand above the sheet; plain words."
        error={errors.instructions?.message}
        {...register('instructions')}
      />
      <fieldset>
        <legend className="flabel">How steps are judged</legend>
        <Checkbox
          label={
            <>
              Every step must be reversible
              <span className="msg">
                A step that gains a solution is then a fault where it happens, not where the solution is kept.
              </span>
            </>
          }
          {...register('settings.reversible')}
        />
        <Checkbox
          label={
            <>
              Faults of presentation count
              <span className="msg">A running equals sign or lost brackets are then faults, not notes.</span>
            </>
          }
          {...register('settings.presentationCounts')}
        />
        <Checkbox label="A constant of integration is needed" {...register('settings.constantNeeded')} />
      </fieldset>
      <div className="pair">
        <Controller
          control={control}
          name="settings.numbers"
          render={({ field }) => (
            <RadioGroup
              label="Numbers"
              value={field.value}
              onChange={field.onChange}
              options={[
                { value: 'real', label: 'Real' },
                { value: 'complex', label: 'Complex' },
              ]}
            />
          )}
        />
        <Controller
          control={control}
          name="settings.decimal"
          render={({ field }) => (
            <RadioGroup
              label="Decimals"
              value={field.value}
              onChange={field.onChange}
              options={[
                { value: 'point', label: 'With a point, 2.5' },
                { value: 'comma', label: 'With a comma, 2,5' },
              ]}
            />
          )}
        />
      </div>
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

interface PartProps {
  readonly control: Control<Fields>;
  readonly settings: { readonly numbers: 'real' | 'complex'; readonly decimal: 'point' | 'comma' };
}

function Goal({
  control,
  kind,
  settings,
  errors,
}: PartProps & { readonly kind: GoalKind; readonly errors: FieldErrors<Fields> }) {
  return (
    <div className="stack">
      <Select label="Goal" options={GOALS} {...control.register('goalKind')} />
      {kind === 'solved' ? (
        <TextField
          label="The letter to solve for"
          className="num"
          maxLength={20}
          error={errors.letter?.message}
          {...control.register('letter')}
        />
      ) : null}
      {kind === 'target' ? (
        <Controller
          control={control}
          name="target"
          render={({ field, fieldState }) => (
            <MathsInput
              label="The line to arrive at"
              value={field.value}
              onChange={field.onChange}
              settings={settings}
              error={fieldState.error?.message}
            />
          )}
        />
      ) : null}
    </div>
  );
}

function Assumptions({ control, settings }: PartProps) {
  const { fields, append, remove } = useFieldArray({ control, name: 'assumptions' });
  return (
    <fieldset>
      <legend className="flabel">What may be assumed</legend>
      {fields.map((item, i) => (
        <div key={item.id} className="assumption">
          <Controller
            control={control}
            name={`assumptions.${i}.tex`}
            render={({ field, fieldState }) => (
              <MathsInput
                label={`Assumption ${i + 1}`}
                isLabelHidden
                value={field.value}
                onChange={field.onChange}
                settings={settings}
                error={fieldState.error?.message}
              />
            )}
          />
          <Button kind="quiet" small aria-label={`Remove assumption ${i + 1}`} onClick={() => remove(i)}>
            Remove
          </Button>
        </div>
      ))}
      {fields.length < 12 ? (
        <Button kind="quiet" small onClick={() => append({ tex: '' })}>
          {fields.length === 0 ? 'Add an assumption, such as x > 0' : 'Add another'}
        </Button>
      ) : null}
    </fieldset>
  );
}
