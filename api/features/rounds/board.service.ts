import type { DataSource } from 'typeorm';
import type { BoardAlert, BoardAnswer, BoardPerson } from '../../../shared/schemas/round.ts';
import type { Viewer } from '../../http/route.ts';
import type { Now } from '../../lib/clock.ts';
import { sha256 } from '../../lib/secrets.ts';
import { findAlerts } from './board-alerts.ts';
import { listWork, type WorkRow } from './board-work.ts';
import { getStaffRound } from './round-access.ts';
import { toRoundAnswer } from './round-answer.ts';
import { FEWEST_STEPS, listRoundPeople, type RoundPerson } from './round-people.ts';
import type { Round } from './rounds.entity.ts';
import { findStageEnd } from './stage-order.ts';

/** Somebody who was at work lately, and added no line for this long, is stuck. */
const STUCK_MS = 15 * 60_000;
const AT_WORK_MS = 60 * 60_000;

export interface BoardDeps {
  readonly db: DataSource;
  readonly now: Now;
}
export type BoardService = ReturnType<typeof createBoardService>;

/** How a round stands, for the teacher and, without names unless allowed, for assistants. */
export function createBoardService({ db, now }: BoardDeps) {
  return {
    async getBoard(viewer: Viewer, roundId: string): Promise<BoardAnswer> {
      const { manager } = db;
      const staff = await getStaffRound(manager, viewer, roundId);
      const { round, seesNames } = staff;
      const people = await listRoundPeople(manager, round);
      const work = await listWork(manager, round);
      const board = people.map((person) => toBoardPerson(round, person, work.get(person.userId), now()));
      const [open]: { count: number }[] = await manager.query(
        'select count(*)::int as count from dispute where round_id = $1 and closed_at is null',
        [roundId],
      );
      const disputesOpen = open?.count ?? 0;
      const alerts: BoardAlert[] = findAlerts({ round, people, board, work, disputesOpen, now: now() });
      return {
        round: await toRoundAnswer(manager, staff),
        now: now().toISOString(),
        stageEndsAt: (await findStageEnd(manager, round))?.toISOString() ?? null,
        seesNames,
        decimal: round.frozen?.settings.decimal ?? 'point',
        people: seesNames ? board : hideNames(board, roundId),
        alerts,
        disputesOpen,
      };
    },
  };
}

/**
 * Numbers instead of names, in an order that stays the same. It hangs on ids that assistants are not sent: from one
 * that hung on the round alone, whoever knows the class list could reckon back to the names.
 */
function hideNames(board: readonly BoardPerson[], roundId: string): BoardPerson[] {
  const mixed = board
    .map((person) => ({ person, key: sha256(`board ${roundId} ${person.userId}`) }))
    .sort((a, b) => (a.key < b.key ? -1 : 1))
    .map(({ person }) => person);
  return mixed.map((person, i) => ({ ...person, userId: null, derivationId: null, name: `Student ${i + 1}` }));
}

function toBoardPerson(round: Round, person: RoundPerson, work: WorkRow | undefined, now: Date): BoardPerson {
  const handedIn = person.derivation?.handedIn ?? null;
  return {
    userId: person.userId,
    name: person.name,
    state: toState(round, person, work, now),
    derivationId: handedIn ? (person.derivation?.id ?? null) : null,
    lines: handedIn ? handedIn.steps : (work?.lines ?? 0),
    hasOpened: Boolean(person.derivation?.openedAt),
    savedAt: work?.saved_at?.toISOString() ?? null,
    lineAddedAt: work?.line_added_at?.toISOString() ?? null,
    handedInAt: handedIn?.at.toISOString() ?? null,
    late: handedIn?.late ?? false,
    tooShort: handedIn !== null && handedIn.steps < FEWEST_STEPS,
    ownWritingEndsAt: person.extension?.writingEndsAt?.toISOString() ?? null,
    ownReviewingEndsAt: person.extension?.reviewingEndsAt?.toISOString() ?? null,
    reviews: { dealt: work?.dealt ?? 0, begun: work?.begun ?? 0, done: work?.done ?? 0 },
    findings: {
      received: work?.received ?? 0,
      accepted: work?.accepted ?? 0,
      contested: work?.contested ?? 0,
    },
  };
}

function toState(round: Round, person: RoundPerson, work: WorkRow | undefined, now: Date): BoardPerson['state'] {
  if (person.excused) return 'excused';
  if (person.derivation?.handedIn) return 'handed-in';
  if (!work?.saved_at || work.lines === 0) return 'not-begun';
  const sinceSave = now.getTime() - work.saved_at.getTime();
  const sinceLine = now.getTime() - (work.line_added_at ?? work.saved_at).getTime();
  const isStuck = round.stage === 'writing' && sinceLine >= STUCK_MS && sinceSave <= AT_WORK_MS;
  return isStuck ? 'stuck' : 'writing';
}
