import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import { Link } from 'react-router-dom';
import type { RoundListItem } from '../../../shared/schemas/round.ts';
import type { TodayAnswer } from '../../../shared/schemas/today.ts';
import { paths } from '../../lib/paths.ts';
import { Button, LinkButton } from '../../ui/button.tsx';
import { EmptyState, ErrorState, Waiting } from '../../ui/states.tsx';
import { plural } from './today-words.ts';
import { allRoundsQuery } from './today.queries.ts';
import { When } from './when.tsx';
import './today.css';

/** The rounds of those who teach, by what happens next, and who asks to join in the margin. */
export function StaffToday({ today }: { readonly today: TodayAnswer }) {
  const open = today.rounds
    .filter(({ stage }) => stage !== 'settled')
    .sort((a, b) => nextOf(a).localeCompare(nextOf(b)));
  const settled = today.rounds.filter(({ stage }) => stage === 'settled');
  return (
    <>
      <div className="full todo">
        {open.map((round) => (
          <RoundEntry key={round.id} round={round} />
        ))}
        {open.length === 0 ? (
          <div className="it">
            <div className="what">
              <EmptyState title="Nothing is planned either">
                A round takes a task and five times; it then runs by itself.
              </EmptyState>
            </div>
          </div>
        ) : null}
        {open.length + settled.length > 0 ? <Settled rounds={settled} /> : null}
      </div>
      {today.joinRequests.length > 0 ? <JoinRequests requests={today.joinRequests} /> : null}
    </>
  );
}

function nextOf({ stage, instants }: RoundListItem): string {
  return {
    planned: instants.opensAt,
    writing: instants.writingEndsAt,
    reviewing: instants.reviewingEndsAt,
    answering: instants.settlesAt,
    settled: instants.settlesAt,
  }[stage];
}

function sayNow({ stage, people, handedIn, reviewsDealt, reviewsDone, waitingForRulings }: RoundListItem): string {
  if (stage === 'planned') return `${plural(people, 'person', 'people')} will be asked to write`;
  if (stage === 'writing') return `${handedIn} of ${people} handed in`;
  if (stage === 'reviewing') return `${reviewsDone} of ${plural(reviewsDealt, 'review')} handed in`;
  return waitingForRulings ? 'Waiting for rulings' : 'Authors answer their findings';
}

/** How the instant in the gutter belongs to the round. */
const NEXT = {
  planned: 'planned, opens then',
  writing: 'writing until then',
  reviewing: 'reviewing until then',
  answering: 'answering, settles then',
  settled: 'settled',
} as const;

function RoundEntry({ round }: { readonly round: RoundListItem }) {
  return (
    <article className="it">
      <When iso={nextOf(round)} zone={round.timeZone} />
      <div className="what">
        <h2>
          <Link to={paths.round(round.id)}>{round.title}</Link>
        </h2>
        <p className="ctx">
          {round.className} · round {round.number}, {NEXT[round.stage]}
        </p>
        <p className="mt-2">{sayNow(round)}.</p>
        {round.disputesOpen > 0 ? (
          <p className="mt-1">
            <b>{plural(round.disputesOpen, 'dispute')} to rule on.</b>{' '}
            <LinkButton to={paths.disputes()} small>
              To the desk
            </LinkButton>
          </p>
        ) : null}
      </div>
    </article>
  );
}

function Settled({ rounds }: { readonly rounds: readonly RoundListItem[] }) {
  const [showsAll, setShowsAll] = useState(false);
  return (
    <section className="it" aria-labelledby="settled-lately">
      <div className="what">
        <h2 id="settled-lately">{showsAll ? 'Settled rounds' : 'Settled lately'}</h2>
        {showsAll ? <AllSettled /> : <SettledList rounds={rounds} />}
        {showsAll ? null : (
          <p className="mt-3">
            <Button kind="quiet" small onClick={() => setShowsAll(true)}>
              Show all settled rounds
            </Button>
          </p>
        )}
      </div>
    </section>
  );
}

function SettledList({ rounds }: { readonly rounds: readonly RoundListItem[] }) {
  if (rounds.length === 0) return <p className="small muted mt-2">None in the last two weeks.</p>;
  return (
    <ul className="quiet-rounds">
      {rounds.map((round) => (
        <li key={round.id}>
          <Link to={paths.round(round.id)}>{round.title}</Link>
          <span className="small muted">
            {' · '}
            {round.className} · round {round.number} · {round.reviewsDone} of {plural(round.reviewsDealt, 'review')}{' '}
            handed in
          </span>
        </li>
      ))}
    </ul>
  );
}

/** All of them, class by class. */
function AllSettled() {
  const all = useQuery(allRoundsQuery);
  if (all.isError) return <ErrorState error={all.error} onRetry={() => void all.refetch()} />;
  if (!all.data) return <Waiting />;
  const settled = all.data.filter(({ stage }) => stage === 'settled');
  const classes = [...new Set(settled.map(({ className }) => className))].sort();
  return classes.map((name) => (
    <section key={name} className="mt-4">
      <h3>{name}</h3>
      <SettledList rounds={settled.filter(({ className }) => className === name)} />
    </section>
  ));
}

function JoinRequests({ requests }: { readonly requests: TodayAnswer['joinRequests'] }) {
  return (
    <aside className="side own-eye" aria-label="People who ask to join">
      <h2>Asking to join</h2>
      <ul className="quiet-rounds">
        {requests.map(({ classId, className, count }) => (
          <li key={classId}>
            {plural(count, 'person', 'people')} in {className}{' '}
            <LinkButton to={paths.class(classId)} small>
              Let them in
            </LinkButton>
          </li>
        ))}
      </ul>
    </aside>
  );
}
