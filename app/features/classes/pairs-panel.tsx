import { useState, type FormEvent } from 'react';
import type { ClassAnswer } from '../../../shared/schemas/class.ts';
import { Button } from '../../ui/button.tsx';
import { EmptyState } from '../../ui/states.tsx';
import { Select, TextField } from '../../ui/text-field.tsx';
import { classActs } from './classes.queries.ts';
import { useClassAct } from './use-class-act.ts';

/** Pairs who are never dealt to each other. */
export function PairsPanel({ found }: { readonly found: ClassAnswer }) {
  const acts = classActs(found.id);
  const [firstId, setFirstId] = useState('');
  const [secondId, setSecondId] = useState('');
  const [note, setNote] = useState('');
  const add = useClassAct(
    () => acts.addPair(firstId, secondId, note),
    'Listed. It takes effect with the next dealing.',
  );
  const remove = useClassAct(acts.removePair, 'Taken off the list.');
  const students = found.members
    .filter((member) => member.role === 'student')
    .map((member) => ({ value: member.userId, label: member.name }));
  const nameOf = (userId: string) =>
    found.members.find((member) => member.userId === userId)?.name ?? 'somebody who left';
  const onSubmit = (event: FormEvent) => {
    event.preventDefault();
    add.mutate(undefined, { onSuccess: () => setNote('') });
  };
  return (
    <div className="grid max-w-[36rem] gap-8">
      <p className="small muted">These people are never dealt to each other. Only teachers see the list.</p>
      {found.pairs.length === 0 ? <EmptyState title="No pairs listed" /> : null}
      <ul>
        {found.pairs.map((pair) => (
          <li key={pair.id} className="flex flex-wrap items-baseline gap-x-4 border-b border-rule py-2">
            {nameOf(pair.firstId)} and {nameOf(pair.secondId)} <span className="small muted">{pair.note}</span>
            <Button kind="quiet" small className="ml-auto" onClick={() => remove.mutate(pair.id)}>
              Take off<span className="sr-only"> the list</span>
            </Button>
          </li>
        ))}
      </ul>
      <form onSubmit={onSubmit}>
        <Select
          label="One"
          placeholder="Choose"
          options={students}
          value={firstId}
          onChange={(event) => setFirstId(event.target.value)}
        />
        <Select
          label="The other"
          placeholder="Choose"
          options={students}
          value={secondId}
          onChange={(event) => setSecondId(event.target.value)}
        />
        <TextField
          label="Note for teachers"
          value={note}
          maxLength={300}
          onChange={(event) => setNote(event.target.value)}
        />
        <div className="acts mt-4">
          <Button type="submit" busy={add.isPending} disabled={!firstId || !secondId}>
            Keep apart
          </Button>
        </div>
      </form>
    </div>
  );
}
