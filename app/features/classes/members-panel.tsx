import { useState } from 'react';
import type { ClassAnswer, MemberAnswer } from '../../../shared/schemas/class.ts';
import { Button } from '../../ui/button.tsx';
import { CopyField } from '../../ui/copy-field.tsx';
import { ConfirmDialog, Dialog } from '../../ui/dialog.tsx';
import { EmptyState } from '../../ui/states.tsx';
import { Table } from '../../ui/table.tsx';
import { Select } from '../../ui/text-field.tsx';
import { Time } from '../../ui/time.tsx';
import { classActs } from './classes.queries.ts';
import { useClassAct } from './use-class-act.ts';

/** Who asks to join, and who is in. */
export function MembersPanel({ found }: { readonly found: ClassAnswer }) {
  const [removing, setRemoving] = useState<MemberAnswer | null>(null);
  const acts = classActs(found.id);
  const remove = useClassAct((membershipId: string) => acts.remove(membershipId), 'Removed from the class.');
  return (
    <div className="grid gap-10">
      <Requests found={found} />
      <section>
        <h2 className="sr-only">People</h2>
        <Table
          caption="People of the class"
          rows={found.members}
          rowKey={(member) => member.membershipId}
          empty={<EmptyState title="Nobody yet">Hand out the class code, or invite people.</EmptyState>}
          columns={[
            { id: 'name', head: 'Name', cell: (member) => member.name },
            {
              id: 'signin',
              head: 'Signs in with',
              foldHead: '',
              cell: (member) => member.email ?? member.userName ?? '',
            },
            { id: 'alias', head: 'Alias', cell: (member) => member.alias ?? '' },
            { id: 'role', head: 'Role', cell: (member) => <RoleChoice found={found} member={member} /> },
            {
              id: 'acts',
              head: <span className="sr-only">Acts</span>,
              cell: (member) => <MemberActs found={found} member={member} onRemove={setRemoving} />,
            },
          ]}
        />
      </section>
      <ConfirmDialog
        isOpen={removing !== null}
        onClose={() => setRemoving(null)}
        title={`Remove ${removing?.name ?? ''} from the class?`}
        effects={[
          'They no longer see the class or its rounds.',
          'Their derivations and findings stay, and so do the points of others.',
          'You can invite them again at any time.',
        ]}
        confirm="Remove"
        grave
        busy={remove.isPending}
        onConfirm={() => removing && remove.mutate(removing.membershipId, { onSettled: () => setRemoving(null) })}
      />
    </div>
  );
}

function Requests({ found }: { readonly found: ClassAnswer }) {
  const acts = classActs(found.id);
  const decide = useClassAct(({ id, accept }: { id: string; accept: boolean }) => acts.decide(id, accept));
  if (found.requests.length === 0) return null;
  return (
    <section>
      <h2>Asking to join</h2>
      <ul className="mt-2">
        {found.requests.map((request) => (
          <li key={request.id} className="flex flex-wrap items-baseline gap-x-6 gap-y-2 border-b border-rule py-3">
            <b>{request.name}</b>
            <span className="small muted">
              asked <Time iso={request.createdAt} style="date-time" zone={found.timeZone} />
            </span>
            <span className="acts ml-auto">
              <Button onClick={() => decide.mutate({ id: request.id, accept: true })}>
                Let in<span className="sr-only"> {request.name}</span>
              </Button>
              <Button kind="quiet" small onClick={() => decide.mutate({ id: request.id, accept: false })}>
                Decline<span className="sr-only"> {request.name}</span>
              </Button>
            </span>
          </li>
        ))}
      </ul>
    </section>
  );
}

function RoleChoice({ found, member }: { readonly found: ClassAnswer; readonly member: MemberAnswer }) {
  const change = useClassAct(
    (role: MemberAnswer['role']) => classActs(found.id).changeRole(member.membershipId, role),
    'Role changed.',
  );
  return (
    <Select
      label={<span className="sr-only">Role of {member.name}</span>}
      value={member.role}
      options={[
        { value: 'student', label: 'student' },
        { value: 'assistant', label: 'assistant' },
        { value: 'teacher', label: 'teacher' },
      ]}
      onChange={(event) => change.mutate(event.target.value as MemberAnswer['role'])}
    />
  );
}

function MemberActs({
  found,
  member,
  onRemove,
}: {
  readonly found: ClassAnswer;
  readonly member: MemberAnswer;
  readonly onRemove: (member: MemberAnswer) => void;
}) {
  const issue = useClassAct(() => classActs(found.id).issueCode(member.membershipId));
  return (
    <span className="acts justify-end">
      {member.role === 'student' ? (
        <Button kind="quiet" small busy={issue.isPending} onClick={() => issue.mutate()}>
          Sign-in code<span className="sr-only"> for {member.name}</span>
        </Button>
      ) : null}
      <Button kind="quiet" small onClick={() => onRemove(member)}>
        Remove<span className="sr-only"> {member.name}</span>
      </Button>
      <Dialog isOpen={issue.data !== undefined} onClose={issue.reset} title={`Sign-in code for ${member.name}`}>
        <p className="small">
          {member.name} opens “I cannot sign in”, types this code with {member.email ?? member.userName} and chooses a
          new password. It works once, until{' '}
          {issue.data ? <Time iso={issue.data.expiresAt} style="date-time" zone={found.timeZone} /> : null}. It is shown
          only now.
        </p>
        <CopyField label="Code" value={issue.data?.code ?? ''} />
      </Dialog>
    </span>
  );
}
