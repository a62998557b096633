import { useQuery } from '@tanstack/react-query';
import { Link } from 'react-router-dom';
import type { RoundListItem } from '../../../shared/schemas/round.ts';
import { paths } from '../../lib/paths.ts';
import { EmptyState, ErrorState, Waiting } from '../../ui/states.tsx';
import { Table } from '../../ui/table.tsx';
import { Time } from '../../ui/time.tsx';
import { classRoundsQuery } from './rounds.queries.ts';
import { nextInstantOf } from './round-words.ts';

/** Every round of one class, newest first. */
export function ClassRounds({ classId }: { readonly classId: string }) {
  const rounds = useQuery(classRoundsQuery(classId));
  if (rounds.isError) return <ErrorState error={rounds.error} onRetry={() => void rounds.refetch()} />;
  if (!rounds.data) return <Waiting />;
  return (
    <Table<RoundListItem>
      caption="Rounds of the class"
      rows={rounds.data}
      rowKey={(round) => round.id}
      empty={<EmptyState title="No round yet">Plan one: choose a task and four days.</EmptyState>}
      columns={[
        {
          id: 'title',
          head: 'Round',
          cell: (round) => (
            <Link to={paths.round(round.id)}>
              {round.number}. {round.title}
            </Link>
          ),
        },
        {
          id: 'stage',
          head: 'Stage',
          cell: (round) => (round.waitingForRulings ? 'waiting for rulings' : round.stage),
        },
        {
          id: 'next',
          head: 'Next',
          cell: (round) => {
            const next = nextInstantOf(round);
            return next ? <Time iso={next} zone={round.timeZone} /> : '';
          },
        },
        { id: 'handed', head: 'Handed in', isFigure: true, cell: (round) => `${round.handedIn} of ${round.people}` },
        { id: 'disputes', head: 'Disputes', isFigure: true, cell: (round) => round.disputesOpen || '' },
      ]}
    />
  );
}
