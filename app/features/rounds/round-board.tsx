import { useState } from 'react';
import type { BoardAnswer, BoardPerson } from '../../../shared/schemas/round.ts';
import { paths } from '../../lib/paths.ts';
import { Button, LinkButton } from '../../ui/button.tsx';
import { BoardAlerts } from './board-alerts.tsx';
import { BoardPeople } from './board-people.tsx';
import { MoreTimeDialog } from './more-time-dialog.tsx';
import { PersonDialog } from './person-dialog.tsx';
import { RoundTimes } from './round-times.tsx';
import { MOVE_WORDS, people, shortInstant } from './round-words.ts';
import { StageDialog } from './stage-dialog.tsx';
import './rounds.css';

type Open = { readonly kind: 'time' | 'move' } | { readonly kind: 'person'; readonly person: BoardPerson } | null;

export interface RoundBoardProps {
  readonly board: BoardAnswer;
  readonly onSettings: () => void;
}

/** A round as its teacher watches it: where time stands, who does what, what needs an act. */
export function RoundBoard({ board, onSettings }: RoundBoardProps) {
  const { round, now } = board;
  const [open, setOpen] = useState<Open>(null);
  const close = () => setOpen(null);
  const isTeacher = round.role === 'teacher';
  const onMoreTime = () => setOpen({ kind: 'time' });
  const onMove = () => setOpen({ kind: 'move' });
  const person = open?.kind === 'person' ? open.person : null;
  return (
    <>
      <div className="round-head">
        <div>
          <p className="where">
            {round.className} · round {round.number}
          </p>
          <h1>{round.title}</h1>
        </div>
        {isTeacher ? <HeadActs board={board} onMoreTime={onMoreTime} onMove={onMove} onSettings={onSettings} /> : null}
      </div>
      <RoundTimes instants={round.instants} zone={round.timeZone} now={now} />
      <div className="board-grid">
        {round.stage === 'planned' ? (
          <Planned board={board} />
        ) : (
          <BoardPeople
            board={board}
            onChoose={isTeacher ? (chosen) => setOpen({ kind: 'person', person: chosen }) : undefined}
          />
        )}
        <BoardAlerts board={board} onMoreTime={onMoreTime} onMove={onMove} />
      </div>
      {open?.kind === 'time' ? <MoreTimeDialog round={round} now={now} onClose={close} /> : null}
      {open?.kind === 'move' ? <StageDialog round={round} onClose={close} /> : null}
      {person?.userId ? (
        <PersonDialog round={round} person={{ ...person, userId: person.userId }} now={now} onClose={close} />
      ) : null}
    </>
  );
}

function HeadActs({ board, onMoreTime, onMove, onSettings }: BoardAlertsActs & { readonly board: BoardAnswer }) {
  const { stage, waitingForRulings } = board.round;
  if (stage === 'settled') {
    return (
      <div className="acts">
        <LinkButton kind="second" to={paths.standings(board.round.classId)}>
          Standings
        </LinkButton>
      </div>
    );
  }
  const move = MOVE_WORDS[stage].act;
  return (
    <div className="acts">
      {stage === 'planned' ? (
        <Button kind="primary" onClick={onMove}>
          {move}
        </Button>
      ) : waitingForRulings ? (
        <LinkButton kind="primary" to={paths.disputes()}>
          Rule on disputes
        </LinkButton>
      ) : (
        <Button kind="primary" onClick={onMoreTime}>
          Give more time
        </Button>
      )}
      {stage === 'planned' ? null : (
        <Button kind="quiet" onClick={onMove}>
          {move}
        </Button>
      )}
      <Button kind="quiet" onClick={onSettings}>
        Round settings
      </Button>
    </div>
  );
}

interface BoardAlertsActs {
  readonly onMoreTime: () => void;
  readonly onMove: () => void;
  readonly onSettings: () => void;
}

function Planned({ board }: { readonly board: BoardAnswer }) {
  const { round, now } = board;
  const { reviewsPerDerivation: each } = round;
  return (
    <section aria-label="What will happen">
      <ul className="figures">
        <li>
          <b className="num">{board.people.length}</b> will be asked to write
        </li>
        <li>
          <b className="num">{each}</b> {each === 1 ? 'review' : 'reviews'} of each derivation
        </li>
      </ul>
      <p className="mt-4">
        Opens {shortInstant(round.instants.opensAt, round.timeZone, now)} by itself, for {people(board.people.length)}.
        Until then the task can still change; from then on it stays as it is.
      </p>
    </section>
  );
}
