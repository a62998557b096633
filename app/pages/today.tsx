import { useQuery } from '@tanstack/react-query';
import { Navigate } from 'react-router-dom';
import { viewerQuery } from '../features/people/viewer.queries.ts';
import { StaffToday } from '../features/today/staff-today.tsx';
import { StudentToday } from '../features/today/student-today.tsx';
import { todayQuery } from '../features/today/today.queries.ts';
import { countWord } from '../features/today/today-words.ts';
import { formatInstant } from '../lib/dates.ts';
import { paths } from '../lib/paths.ts';
import { LinkButton } from '../ui/button.tsx';
import { Head, Page } from '../ui/page.tsx';
import { ErrorState, Waiting } from '../ui/states.tsx';
import { useZone } from '../ui/time.tsx';

/** What is due, for students; what runs, for those who teach. */
export function Component() {
  const today = useQuery(todayQuery);
  const viewer = useQuery(viewerQuery);
  const zone = useZone();
  const name = viewer.data?.user.name.split(' ')[0] ?? '';
  const isTeacher = viewer.data?.user.role !== 'student';
  // An admin runs the school, and no rounds.
  if (viewer.data?.user.role === 'admin') return <Navigate to={paths.admin()} replace />;
  const where = today.data ? formatInstant(today.data.now, zone, 'date') : null;
  if (!today.data || !viewer.data) {
    return (
      <Page>
        <Head h1="Today" both />
        {today.isError ? <ErrorState error={today.error} onRetry={() => void today.refetch()} /> : <Waiting />}
      </Page>
    );
  }
  const { things, rounds } = today.data;
  const running = rounds.filter(({ stage }) => stage !== 'planned' && stage !== 'settled').length;
  if (isTeacher) {
    return (
      <Page>
        <Head
          where={where}
          h1={`${countWord(running)} ${running < 2 ? 'round is' : 'rounds are'} running.`}
          title="Rounds"
          both
          acts={
            <LinkButton kind="primary" to={paths.newRound()}>
              Plan a round
            </LinkButton>
          }
        />
        <StaffToday today={today.data} />
      </Page>
    );
  }
  // Whoever only assists has no things of their own, and rounds to look after.
  const idle =
    running > 0 ? `${countWord(running)} ${running === 1 ? 'round' : 'rounds'} to look after` : 'Nothing to do';
  const asked =
    things.length === 0 ? idle : `${countWord(things.length)} ${things.length === 1 ? 'thing' : 'things'} to do`;
  return (
    <Page>
      <Head where={where} h1={`${asked}, ${name}.`} title="Today" both />
      <StudentToday today={today.data} />
      {rounds.length > 0 ? <StaffToday today={{ ...today.data, joinRequests: [] }} /> : null}
    </Page>
  );
}
