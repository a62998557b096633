import { useState } from 'react';
import { useNavigate } from 'react-router-dom';
import type { ClassAnswer } from '../../../shared/schemas/class.ts';
import { classSettingsSchema } from '../../../shared/schemas/class.ts';
import { paths } from '../../lib/paths.ts';
import { Button } from '../../ui/button.tsx';
import { Switch } from '../../ui/choice.tsx';
import { ConfirmDialog } from '../../ui/dialog.tsx';
import { Select, TextField } from '../../ui/text-field.tsx';
import { classActs, type ClassSettings } from './classes.queries.ts';
import { timeZoneOptions } from './time-zones.ts';
import { useClassAct } from './use-class-act.ts';

/** What the class's teacher sets. */
export function SettingsPanel({ found }: { readonly found: ClassAnswer }) {
  const acts = classActs(found.id);
  const change = useClassAct((form: ClassSettings) => acts.changeSettings(form), 'Saved.');
  const term = useClassAct(acts.startTerm, 'A new term: every student may choose a new alias once.');
  const archive = useClassAct(acts.archive);
  const navigate = useNavigate();
  const [asking, setAsking] = useState(false);
  return (
    <div className="grid max-w-[36rem] gap-10">
      <NameForm found={found} onSave={(form) => change.mutate(form)} isBusy={change.isPending} />
      <section className="grid gap-4">
        <h2>What people see</h2>
        <Switch
          label="Standings"
          checked={found.standingsOn}
          disabled={!found.standingsAllowed}
          onChange={(event) => change.mutate({ standingsOn: event.target.checked })}
          hint={
            found.standingsAllowed
              ? 'The upper third by alias, once a week, never below eight reviewers. A student may opt out and loses nothing. School rules and local law on pupils’ data stand above this setting.'
              : 'Your school does not allow standings.'
          }
        />
        <Switch
          label="Assistants see names"
          checked={found.assistantsSeeNames}
          onChange={(event) => change.mutate({ assistantsSeeNames: event.target.checked })}
          hint="Without it assistants rule on disputes without learning who wrote or reviewed."
        />
        <Switch
          label="Students have e-mail"
          checked={found.hasEmail}
          onChange={(event) => change.mutate({ hasEmail: event.target.checked })}
          hint="Without it they sign up with a user name, and you hand out sign-in codes."
        />
      </section>
      <section>
        <h2>Term</h2>
        <p className="small muted">When a term begins, every student may choose a new alias once.</p>
        <div className="acts mt-3">
          <Button busy={term.isPending} onClick={() => term.mutate()}>
            Start a new term
          </Button>
        </div>
      </section>
      <section>
        <h2>Put the class away</h2>
        <div className="acts mt-3">
          <Button kind="grave" onClick={() => setAsking(true)}>
            Put away…
          </Button>
        </div>
        <ConfirmDialog
          isOpen={asking}
          onClose={() => setAsking(false)}
          title={`Put ${found.name} away?`}
          effects={['Students no longer see it.', 'Nothing is deleted; you can bring it back.']}
          confirm="Put away"
          grave
          busy={archive.isPending}
          onConfirm={() => archive.mutate(undefined, { onSuccess: () => void navigate(paths.classes()) })}
        />
      </section>
    </div>
  );
}

function NameForm({
  found,
  onSave,
  isBusy,
}: {
  readonly found: ClassAnswer;
  readonly onSave: (form: ClassSettings) => void;
  readonly isBusy: boolean;
}) {
  const [name, setName] = useState(found.name);
  const [timeZone, setTimeZone] = useState(found.timeZone);
  const checked = classSettingsSchema.safeParse({ name, timeZone });
  const error = checked.success ? undefined : checked.error.issues[0]?.message;
  return (
    <form
      onSubmit={(event) => {
        event.preventDefault();
        if (checked.success) onSave({ name, timeZone });
      }}
    >
      <h2>Name and time</h2>
      <TextField label="Name" value={name} error={error} onChange={(event) => setName(event.target.value)} />
      <Select
        label="Time zone"
        value={timeZone}
        options={timeZoneOptions()}
        onChange={(event) => setTimeZone(event.target.value)}
      />
      <div className="acts mt-4">
        <Button type="submit" busy={isBusy}>
          Save
        </Button>
      </div>
    </form>
  );
}
