import type { TodayAnswer, WaitingRound } from '../../../shared/schemas/today.ts';
import { formatInstant, sayDay } from '../../lib/dates.ts';
import { EmptyState } from '../../ui/states.tsx';
import { OwnProgress } from './own-progress.tsx';
import { Thing } from './things.tsx';
import './today.css';

/** A student's things to do, by the time they are due, and their own progress in the margin. */
export function StudentToday({ today }: { readonly today: TodayAnswer }) {
  const isEmpty = today.things.length === 0;
  return (
    <>
      <div className="full todo">
        {today.things.map((thing, i) => (
          <Thing key={`${thing.kind} ${thing.roundId}`} thing={thing} isFirst={i === 0} />
        ))}
        {isEmpty && today.waiting.length === 0 && today.rounds.length === 0 ? (
          <div className="it">
            <div className="what">
              <EmptyState title="No round is running for you">
                When your teacher opens a round, what is due stands here, soonest first.
              </EmptyState>
            </div>
          </div>
        ) : null}
        {today.waiting.length > 0 ? <Waiting rounds={today.waiting} now={today.now} isAlone={isEmpty} /> : null}
      </div>
      {today.progress ? <OwnProgress progress={today.progress} /> : null}
    </>
  );
}

interface WaitingProps {
  readonly rounds: readonly WaitingRound[];
  readonly isAlone: boolean;
}

function sayWaiting({ stage, nextAt, timeZone, handedIn }: WaitingRound, now: string): string {
  const at = `${sayDay(nextAt, timeZone)} at ${formatInstant(nextAt, timeZone, 'time')}`;
  if (stage === 'writing') return `${handedIn ? 'Handed in. ' : ''}Reviewing opens ${at}.`;
  if (stage === 'reviewing') return `Nothing left to review. Findings can be read and answered from ${at}.`;
  if (nextAt <= now) return 'Nothing to answer. The round settles when your teacher has ruled on what is open.';
  return `Nothing to answer. The round settles ${at}.`;
}

function Waiting({ rounds, now, isAlone }: Pick<TodayAnswer, 'now'> & WaitingProps) {
  return (
    <section className="it" aria-label="Rounds that go on without you for now">
      <div className="what">
        <h3>{isAlone ? 'What comes next' : 'Going on without you for now'}</h3>
        <ul className="quiet-rounds">
          {rounds.map((round) => (
            <li key={round.roundId}>
              {round.title} · round {round.number}
              <br />
              <span className="small muted">{sayWaiting(round, now)}</span>
            </li>
          ))}
        </ul>
      </div>
    </section>
  );
}
