import { useState, type ChangeEvent, type FormEvent } from 'react';
import type { ClassAnswer, MemberAnswer, PersonLine } from '../../../shared/schemas/class.ts';
import { paths } from '../../lib/paths.ts';
import { Button } from '../../ui/button.tsx';
import { CopyField } from '../../ui/copy-field.tsx';
import { Notice } from '../../ui/notice.tsx';
import { problemWords } from '../../ui/states.tsx';
import { Select, TextArea, TextField } from '../../ui/text-field.tsx';
import { Time } from '../../ui/time.tsx';
import { classActs } from './classes.queries.ts';
import { useClassAct } from './use-class-act.ts';

/** The three ways in: code, link, list. */
export function InvitePanel({ found }: { readonly found: ClassAnswer }) {
  return (
    <div className="grid max-w-[36rem] gap-12">
      <CodePart found={found} />
      <LinkPart found={found} />
      <ListPart found={found} />
    </div>
  );
}

function CodePart({ found }: { readonly found: ClassAnswer }) {
  const acts = classActs(found.id);
  const renew = useClassAct(acts.renewCode, 'The class has a new code; the old one no longer works.');
  const setOpen = useClassAct((joinOpen: boolean) => acts.changeSettings({ joinOpen }));
  return (
    <section>
      <h2>By code</h2>
      <p className="small muted">
        Whoever has the code can ask to join; you let them in, unless the class list below names their address or user
        name.
      </p>
      <CopyField
        label="Class code"
        value={found.joinCode}
        hint={found.joinOpen ? undefined : 'Closed: nobody can ask to join now.'}
      />
      <div className="acts mt-3">
        <Button kind="quiet" small busy={renew.isPending} onClick={() => renew.mutate()}>
          Renew the code
        </Button>
        <Button kind="quiet" small busy={setOpen.isPending} onClick={() => setOpen.mutate(!found.joinOpen)}>
          {found.joinOpen ? 'Close it for now' : 'Open it again'}
        </Button>
      </div>
    </section>
  );
}

function readPeople(text: string): PersonLine[] {
  return text.split('\n').flatMap((line) => {
    const email = /[^\s,;<>]+@[^\s,;<>]+/.exec(line)?.[0];
    const name = line
      .replace(email ?? '', '')
      .replace(/[,;<>]/g, ' ')
      .replace(/\s+/g, ' ')
      .trim();
    return name ? [{ name, ...(email && { email }) }] : [];
  });
}

function LinkPart({ found }: { readonly found: ClassAnswer }) {
  const acts = classActs(found.id);
  const [text, setText] = useState('');
  const [role, setRole] = useState<MemberAnswer['role']>('student');
  const invite = useClassAct((people: PersonLine[]) => acts.invite(role, people));
  const revoke = useClassAct(acts.revoke, 'The link no longer works.');
  const people = readPeople(text);
  const onSubmit = (event: FormEvent) => {
    event.preventDefault();
    if (people.length > 0) invite.mutate(people, { onSuccess: () => setText('') });
  };
  return (
    <section>
      <h2>By link or e-mail</h2>
      <form onSubmit={onSubmit}>
        <TextArea
          label="One person a line: name, and e-mail where there is one"
          rows={4}
          value={text}
          onChange={(event) => setText(event.target.value)}
          hint="With an address the link is mailed; without one it is shown here for you to hand over."
        />
        <Select
          label="As"
          value={role}
          options={['student', 'assistant', 'teacher'].map((value) => ({ value, label: value }))}
          onChange={(event) => setRole(event.target.value as MemberAnswer['role'])}
        />
        <div className="acts mt-4">
          <Button type="submit" busy={invite.isPending} disabled={people.length === 0}>
            {people.length > 1 ? `Invite ${people.length} people` : 'Invite'}
          </Button>
        </div>
      </form>
      {invite.data ? (
        <Notice title="Invited." isLive>
          {invite.data.links.length > 0 ? 'These links are shown only now.' : 'The letters are on their way.'}
        </Notice>
      ) : null}
      {invite.data?.links.map((link) => (
        <CopyField key={link.token} label={link.name} value={`${window.location.origin}${paths.join(link.token)}`} />
      ))}
      {found.invitations.length > 0 ? (
        <ul className="small mt-4" aria-label="Open invitations">
          {found.invitations.map((open) => (
            <li key={open.id} className="flex flex-wrap items-baseline gap-x-4 border-b border-rule py-2">
              {open.name}{' '}
              <span className="muted">
                {open.email ?? 'by link'} · {open.role} · until{' '}
                <Time iso={open.expiresAt} style="date" zone={found.timeZone} />
              </span>
              <Button kind="quiet" small className="ml-auto" onClick={() => revoke.mutate(open.id)}>
                Withdraw<span className="sr-only"> the invitation of {open.name}</span>
              </Button>
            </li>
          ))}
        </ul>
      ) : null}
    </section>
  );
}

function ListPart({ found }: { readonly found: ClassAnswer }) {
  const load = useClassAct((csv: string) => classActs(found.id).importRoster(csv));
  const onFile = async (event: ChangeEvent<HTMLInputElement>) => {
    const file = event.target.files?.[0];
    event.target.value = '';
    if (file) load.mutate(await file.text());
  };
  return (
    <section>
      <h2>Class list</h2>
      <p className="small muted">
        A CSV file whose first line names the columns: name, and e-mail or user name. It replaces the list that was
        there. People on it who sign up with that address are in at once.
      </p>
      <TextField
        label="CSV file"
        type="file"
        accept=".csv,text/csv,text/plain"
        onChange={(event) => void onFile(event)}
      />
      {load.error ? (
        <Notice kind="grave" title="Not taken." isLive>
          {load.error instanceof Error ? problemWords(load.error).detail : null}
        </Notice>
      ) : null}
      {load.data ? (
        <Notice title={`${load.data.people.length} people are on the list.`} isLive>
          {load.data.problems.map((problem) => (
            <span key={problem.line} className="block">
              Line {problem.line}: {problem.detail}
            </span>
          ))}
        </Notice>
      ) : null}
      {found.roster.length > 0 ? (
        <details className="small mt-4">
          <summary>{found.roster.length} people on the list</summary>
          <ul>
            {found.roster.map((entry) => (
              <li key={entry.id}>
                {entry.name} <span className="muted">{entry.email ?? entry.userName ?? 'no address'}</span>
              </li>
            ))}
          </ul>
        </details>
      ) : null}
    </section>
  );
}
