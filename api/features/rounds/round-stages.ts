import type { DataSource, EntityManager } from 'typeorm';
import { GRACE_MS } from '../../../shared/lib/round-times.ts';
import type { Stage } from '../../../shared/schemas/round.ts';
import { notFound, ProblemError } from '../../http/problem-error.ts';
import type { Queue } from '../../lib/queue.ts';
import { recordAudit } from '../audit/record.ts';
import { dealLater, releaseGone } from './dealing.ts';
import { createStageEntries, type EnterDeps, type MoveOrder } from './enter-stages.ts';
import { lockRound } from './round-access.ts';
import { lateBatchInstant, listRoundPeople, mayStillHandIn } from './round-people.ts';
import { Round } from './rounds.entity.ts';
import { scheduleStages } from './schedule-stages.ts';
import { findStageEnd, nextStage, type LaterStage } from './stage-order.ts';

export interface StagesDeps extends EnterDeps {
  readonly db: DataSource;
  readonly queue: Queue;
}
export type RoundStages = ReturnType<typeof createRoundStages>;

/** The stage machine: every change happens under the round's row lock, once. */
export function createRoundStages(deps: StagesDeps) {
  const { db, now, queue, mail } = deps;
  const entries = createStageEntries(deps);

  async function moveLocked(manager: EntityManager, round: Round, to: LaterStage, order: MoveOrder): Promise<void> {
    const from = round.stage;
    if (nextStage(from) !== to) {
      throw new ProblemError('wrong-stage', { detail: `The round is ${from} already; look at it again.` });
    }
    await entries[to](manager, round, order);
    if (round.stage === from) return;
    await scheduleStages(queue, manager, round, now());
    await recordAudit(manager, {
      schoolId: round.schoolId,
      actorId: order.by,
      at: now(),
      action: 'round.stage-moved',
      objectKind: 'round',
      objectId: round.id,
      before: { stage: from },
      after: { stage: round.stage, ...(order.force && { force: true }) },
      reason: order.reason ?? '',
    });
  }

  /** The late batch, and reviews for people who had to wait for them, as far as they are due. */
  async function catchUp(manager: EntityManager, round: Round): Promise<void> {
    if (round.stage !== 'reviewing') return;
    const released = await releaseGone(manager, round, now());
    const isLateDue = !round.lateDealtAt && lateBatchInstant(round, await listRoundPeople(manager, round)) <= now();
    const added = await dealLater(manager, round, now(), { lateDerivations: isLateDue, isLast: isLateDue });
    if (isLateDue) {
      round.lateDealtAt = now();
      await manager.update(Round, { id: round.id }, { lateDealtAt: now() });
    }
    if (added + released > 0) await mail.reviewingOpened(manager, round);
  }

  return {
    schedule: (manager: EntityManager, round: Round) => scheduleStages(queue, manager, round, now()),

    /** @throws {ProblemError} wrong-stage when `to` does not follow, conflict when something stands in the way. */
    async moveStage(roundId: string, to: LaterStage, order: MoveOrder): Promise<Stage> {
      return await db.transaction(async (manager) => {
        const round = await lockRound(manager, roundId);
        if (!round) throw notFound();
        await moveLocked(manager, round, to, order);
        return round.stage;
      });
    },

    /** Moves the round through every stage that is due, one transaction each; does nothing when run twice. */
    async advance(roundId: string): Promise<void> {
      for (;;) {
        const moved = await db.transaction(async (manager) => {
          const round = await lockRound(manager, roundId);
          const to = round && nextStage(round.stage);
          if (!round || !to) return false;
          await catchUp(manager, round);
          const due = await findStageEnd(manager, round);
          if (!due || due > now()) return false;
          const from = round.stage;
          await moveLocked(manager, round, to, { by: null });
          return round.stage !== from;
        });
        if (!moved) return;
      }
    },

    /** Deals late work now instead of at its instant. */
    async dealLateNow(manager: EntityManager, round: Round): Promise<number> {
      const people = await listRoundPeople(manager, round);
      // Whoever still has time to write gets a batch of their own later.
      const isLast = !people.some((person) => mayStillHandIn(person, now(), false));
      const added = await dealLater(manager, round, now(), { lateDerivations: true, isLast });
      if (isLast) await manager.update(Round, { id: round.id }, { lateDealtAt: now() });
      if (added > 0) await mail.reviewingOpened(manager, round);
      return added;
    },

    async remind(roundId: string, endsAt: Date): Promise<void> {
      await db.transaction(async (manager) => {
        const round = await lockRound(manager, roundId);
        // Moved in the meantime: the new instant has a reminder of its own.
        if (round?.stage !== 'reviewing' || round.reviewingEndsAt.getTime() !== endsAt.getTime()) return;
        await mail.reviewDue(manager, round);
      });
    },

    listDue: (): Promise<string[]> => listDue(db, now()),
  };
}

/** Rounds whose stage is over, or that are in reviewing, where late work may wait. */
async function listDue(db: DataSource, at: Date): Promise<string[]> {
  const rows: { id: string }[] = await db.query(DUE_SQL, [at, new Date(at.getTime() - GRACE_MS)]);
  return rows.map(({ id }) => id);
}

const DUE_SQL = `
  select id from round
   where (stage = 'planned' and opens_at <= $1) or (stage = 'writing' and writing_ends_at <= $2)
      or stage = 'reviewing' or (stage = 'answering' and settles_at <= $1)
   order by settles_at, id`;
