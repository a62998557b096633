import { useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import { useState } from 'react';
import type { PersonAnswer } from '../../../shared/schemas/admin.ts';
import { staffInvitationSchema } from '../../../shared/schemas/admin.ts';
import { Button } from '../../ui/button.tsx';
import { Dialog } from '../../ui/dialog.tsx';
import { EmptyState, ErrorState, problemWords } from '../../ui/states.tsx';
import { Table } from '../../ui/table.tsx';
import { Select, TextField } from '../../ui/text-field.tsx';
import { showToast } from '../../ui/toast-store.ts';
import { adminActs, peopleQuery } from './admin.queries.ts';

/** Everyone of the school; disabling ends their sessions and deletes nothing. */
export function PeoplePanel() {
  const [search, setSearch] = useState('');
  const [chosen, setChosen] = useState<PersonAnswer | null>(null);
  const people = useQuery(peopleQuery(search));
  return (
    <div className="grid gap-8">
      <div className="max-w-[26rem]">
        <TextField
          label="Find by name, e-mail or user name"
          type="search"
          value={search}
          onChange={(event) => setSearch(event.target.value)}
        />
      </div>
      {people.isError ? <ErrorState error={people.error} onRetry={() => void people.refetch()} /> : null}
      <Table
        caption="People of the school"
        rows={people.data ?? []}
        rowKey={(person) => person.id}
        rowState={(person) => (person.disabled ? 'left' : undefined)}
        empty={people.isPending ? null : <EmptyState title="Nobody found" />}
        columns={[
          { id: 'name', head: 'Name', cell: (person) => person.name },
          {
            id: 'signin',
            head: 'Signs in with',
            foldHead: '',
            cell: (person) => person.email ?? person.userName ?? '',
          },
          { id: 'role', head: 'Role', cell: (person) => person.role },
          { id: 'classes', head: 'Classes', cell: (person) => person.classes.join(', ') },
          {
            id: 'acts',
            head: <span className="sr-only">Acts</span>,
            cell: (person) => (
              <Button kind="quiet" small onClick={() => setChosen(person)}>
                {person.disabled ? 'Enable' : 'Disable'}
                <span className="sr-only"> {person.name}</span>
              </Button>
            ),
          },
        ]}
      />
      {chosen ? <StateDialog person={chosen} onClose={() => setChosen(null)} /> : null}
      <InviteStaff />
    </div>
  );
}

function StateDialog({ person, onClose }: { readonly person: PersonAnswer; readonly onClose: () => void }) {
  const [reason, setReason] = useState('');
  const queryClient = useQueryClient();
  const save = useMutation({
    mutationFn: () => adminActs.setDisabled(person.id, !person.disabled, reason),
    onSuccess: async () => {
      await queryClient.invalidateQueries({ queryKey: ['admin'] });
      onClose();
    },
  });
  return (
    <Dialog
      isOpen
      onClose={onClose}
      grave={!person.disabled}
      title={`${person.disabled ? 'Enable' : 'Disable'} the account of ${person.name}?`}
    >
      <p className="small">
        {person.disabled
          ? 'They can sign in again.'
          : 'They are signed out everywhere and cannot sign in. Nothing they made is deleted.'}{' '}
        The reason is kept in the trail.
      </p>
      <TextField
        label="Reason"
        value={reason}
        maxLength={300}
        onChange={(event) => setReason(event.target.value)}
        error={save.error ? problemWords(save.error).detail : undefined}
      />
      <div className="acts mt-4">
        <Button
          kind={person.disabled ? 'primary' : 'grave'}
          busy={save.isPending}
          disabled={reason.trim() === ''}
          onClick={() => save.mutate()}
        >
          {person.disabled ? 'Enable' : 'Disable'}
        </Button>
        <Button kind="quiet" small onClick={onClose}>
          Not now
        </Button>
      </div>
    </Dialog>
  );
}

function InviteStaff() {
  const [form, setForm] = useState({ name: '', email: '', role: 'teacher' as 'teacher' | 'admin' });
  const checked = staffInvitationSchema.safeParse(form);
  const invite = useMutation({
    mutationFn: adminActs.inviteStaff,
    onSuccess: () => {
      showToast(`Invited ${form.name}.`);
      setForm({ name: '', email: '', role: 'teacher' });
    },
  });
  return (
    <form
      className="max-w-[26rem]"
      onSubmit={(event) => {
        event.preventDefault();
        if (checked.success) invite.mutate(checked.data);
      }}
    >
      <h2>Invite a teacher or an admin</h2>
      <TextField label="Name" value={form.name} onChange={(event) => setForm({ ...form, name: event.target.value })} />
      <TextField
        label="E-mail"
        type="email"
        value={form.email}
        onChange={(event) => setForm({ ...form, email: event.target.value })}
        error={invite.error ? problemWords(invite.error).detail : undefined}
      />
      <Select
        label="As"
        value={form.role}
        options={[
          { value: 'teacher', label: 'teacher' },
          { value: 'admin', label: 'admin' },
        ]}
        onChange={(event) => setForm({ ...form, role: event.target.value === 'admin' ? 'admin' : 'teacher' })}
      />
      <div className="acts mt-4">
        <Button type="submit" busy={invite.isPending} disabled={!checked.success}>
          Send the invitation
        </Button>
      </div>
    </form>
  );
}
