import { useState } from 'react';
import type { BoardAlert, BoardAnswer } from '../../../shared/schemas/round.ts';
import { paths } from '../../lib/paths.ts';
import { Button, LinkButton } from '../../ui/button.tsx';
import { Dialog } from '../../ui/dialog.tsx';
import { Maths } from '../../ui/maths.tsx';
import { people, plural } from './round-words.ts';
import { roundActs } from './rounds.queries.ts';
import { useRoundAct } from './use-round-act.ts';

const SMALL = ['Nothing needs you', 'One thing needs you', 'Two things need you', 'Three things need you'];

/** What an assistant can do something about. */
const FOR_ASSISTANTS = new Set<BoardAlert['kind']>(['line-stops', 'disputes-open', 'waiting-for-rulings']);

export interface BoardAlertsProps {
  readonly board: BoardAnswer;
  readonly onMoreTime: () => void;
  readonly onMove: () => void;
}

/** What waits for the teacher; each entry ends in an act. */
export function BoardAlerts({ board, onMoreTime, onMove }: BoardAlertsProps) {
  const isTeacher = board.round.role === 'teacher';
  const alerts = isTeacher ? board.alerts : board.alerts.filter(({ kind }) => FOR_ASSISTANTS.has(kind));
  return (
    <aside className="alerts" aria-labelledby="alerts-head">
      <h2 id="alerts-head">{SMALL[alerts.length] ?? `${alerts.length} things need you`}</h2>
      {alerts.length === 0 ? (
        <p className="small muted">The round goes on by itself. This page keeps up to date.</p>
      ) : (
        <ol>
          {alerts.map((alert) => (
            <li key={alert.kind === 'line-stops' ? `line ${alert.line}` : alert.kind}>
              <Alert alert={alert} board={board} isTeacher={isTeacher} onMoreTime={onMoreTime} onMove={onMove} />
            </li>
          ))}
        </ol>
      )}
    </aside>
  );
}

function Alert(props: BoardAlertsProps & { readonly alert: BoardAlert; readonly isTeacher: boolean }) {
  const { alert, board, isTeacher, onMoreTime, onMove } = props;
  const moreTime = isTeacher ? (
    <Button kind="quiet" small onClick={onMoreTime}>
      Give more time
    </Button>
  ) : null;
  switch (alert.kind) {
    case 'line-stops':
      return <LineStops line={alert.line} texts={alert.texts} />;
    case 'not-begun':
      return (
        <>
          <b>{people(alert.count)} not begun.</b> Writing ends soon. {moreTime}
        </>
      );
    case 'too-short':
      return (
        <>
          <b>{plural(alert.count, 'derivation')} too short to review.</b> Fewer than two steps are not dealt; their
          authors can take them back. {moreTime}
        </>
      );
    case 'few-derivations':
      return (
        <>
          <b>Few derivations so far.</b> With {alert.count} handed in, readers can guess whose work they see. {moreTime}
        </>
      );
    case 'reviews-not-begun':
      return (
        <>
          <b>
            {people(alert.count)} {alert.count === 1 ? 'has' : 'have'} begun no review.
          </b>{' '}
          Reviewing ends soon. {moreTime}
        </>
      );
    case 'late-waiting':
      return <LateWaiting roundId={board.round.id} count={alert.count} isTeacher={isTeacher} />;
    case 'disputes-open':
      return (
        <>
          <b>{plural(alert.count, 'dispute')} to rule on.</b>{' '}
          {board.round.stage === 'settled'
            ? 'Every score follows a ruling at once.'
            : 'The round waits for them when it is to settle.'}{' '}
          <LinkButton to={paths.disputes()} small>
            To the desk
          </LinkButton>
        </>
      );
    case 'waiting-for-rulings':
      return (
        <>
          <b>Waiting for {plural(alert.count, 'ruling')}.</b> The round settles as soon as the last one is made.{' '}
          <LinkButton to={paths.disputes()} small>
            Rule on them
          </LinkButton>{' '}
          {isTeacher ? (
            <Button kind="quiet" small onClick={onMove}>
              Settle all the same
            </Button>
          ) : null}
        </>
      );
    case 'names-guessable':
      return (
        <>
          <b>Names can be guessed.</b> There {alert.count === 1 ? 'is' : 'are'} only {people(alert.count)} in the class.{' '}
          <LinkButton to={paths.class(board.round.classId)} small>
            Invite more
          </LinkButton>
        </>
      );
  }
}

function LineStops({ line, texts }: { readonly line: number; readonly texts: readonly string[] }) {
  const [isOpen, setOpen] = useState(false);
  return (
    <>
      <b>
        Line {line} stops {people(texts.length)}.
      </b>{' '}
      They wrote it and came no further.{' '}
      <Button kind="quiet" small onClick={() => setOpen(true)}>
        See the {texts.length} lines
      </Button>
      <Dialog isOpen={isOpen} onClose={() => setOpen(false)} title={`Line ${line}, as they wrote it`}>
        <ol className="effects">
          {texts.map((tex, i) => (
            <li key={`${i} ${tex}`}>
              <Maths tex={tex} size="line" />
            </li>
          ))}
        </ol>
        <div className="acts">
          <Button onClick={() => setOpen(false)}>Close</Button>
        </div>
      </Dialog>
    </>
  );
}

function LateWaiting({ roundId, count, isTeacher }: { roundId: string; count: number; isTeacher: boolean }) {
  const deal = useRoundAct(roundActs(roundId).dealLate, ({ reviews }) => `${plural(reviews, 'review')} dealt.`);
  return (
    <>
      <b>{plural(count, 'late derivation')} to deal.</b> They go out in one batch half way through reviewing.{' '}
      {isTeacher ? (
        <Button kind="quiet" small busy={deal.isPending} onClick={() => deal.mutate()}>
          Deal now
        </Button>
      ) : null}
    </>
  );
}
