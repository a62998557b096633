import { useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import { useState } from 'react';
import type { SchoolSettings } from '../../../shared/schemas/admin.ts';
import { Button } from '../../ui/button.tsx';
import { Switch } from '../../ui/choice.tsx';
import { ErrorState, problemWords, Waiting } from '../../ui/states.tsx';
import { TextField } from '../../ui/text-field.tsx';
import { Time } from '../../ui/time.tsx';
import { showToast } from '../../ui/toast-store.ts';
import { adminActs, mailStateQuery, schoolQuery } from './admin.queries.ts';

/** The school's own settings, and how its mail fares. */
export function SchoolPanel() {
  const school = useQuery(schoolQuery);
  if (school.isError) return <ErrorState error={school.error} onRetry={() => void school.refetch()} />;
  if (!school.data) return <Waiting />;
  return (
    <div className="grid max-w-[36rem] gap-12">
      <SettingsForm school={school.data} />
      <MailState zone={school.data.timeZone} />
    </div>
  );
}

function SettingsForm({ school }: { readonly school: SchoolSettings }) {
  const [form, setForm] = useState(school);
  const queryClient = useQueryClient();
  const save = useMutation({
    mutationFn: () => adminActs.changeSchool(form),
    onSuccess: async () => {
      await queryClient.invalidateQueries();
      showToast('Saved.');
    },
  });
  return (
    <form
      className="grid gap-4"
      onSubmit={(event) => {
        event.preventDefault();
        save.mutate();
      }}
    >
      <TextField
        label="Name of the school"
        value={form.name}
        onChange={(event) => setForm({ ...form, name: event.target.value })}
      />
      <TextField
        label="Time zone"
        value={form.timeZone}
        onChange={(event) => setForm({ ...form, timeZone: event.target.value })}
        error={save.error ? problemWords(save.error).detail : undefined}
      />
      <Switch
        label="Classes may show standings"
        checked={form.standingsAllowed}
        onChange={(event) => setForm({ ...form, standingsAllowed: event.target.checked })}
        hint="Off for all classes at once. School rules and local law on pupils’ data and marks stand above this setting; it is wise to leave standings off for pupils under 13."
      />
      <div className="acts">
        <Button kind="primary" type="submit" busy={save.isPending}>
          Save
        </Button>
      </div>
    </form>
  );
}

function MailState({ zone }: { readonly zone: string }) {
  const mail = useQuery(mailStateQuery);
  if (!mail.data) return null;
  return (
    <section>
      <h2>Mail</h2>
      <p>{mail.data.waiting === 0 ? 'Every letter has left.' : `${mail.data.waiting} letters wait to leave.`}</p>
      <ul className="small mt-2">
        {mail.data.failed.map((letter) => (
          <li key={letter.id} className="border-b border-rule py-2">
            {letter.kind} of <Time iso={letter.createdAt} style="date-time" zone={zone} />: tried {letter.attempts}{' '}
            times. <span className="muted">{letter.lastError}</span>
          </li>
        ))}
      </ul>
    </section>
  );
}
