import type { DataSource, EntityManager, QueryDeepPartialEntity } from 'typeorm';
import { GRACE_MS, lateBatchAt } from '../../../shared/lib/round-times.ts';
import type { Stage } from '../../../shared/schemas/round.ts';
import type { FrozenTask } from '../../../shared/schemas/task.ts';
import { notFound, ProblemError } from '../../http/problem-error.ts';
import type { Now } from '../../lib/clock.ts';
import type { Queue } from '../../lib/queue.ts';
import { recordAudit } from '../audit/record.ts';
import { Task } from '../tasks/tasks.entity.ts';
import { deal, dealLater } from './dealing.ts';
import { lockRound } from './round-access.ts';
import type { RoundMail } from './round-mail.ts';
import { lateBatchInstant, listRoundPeople, mayStillHandIn } from './round-people.ts';
import { Round } from './rounds.entity.ts';

export type LaterStage = Exclude<Stage, 'planned'>;

/** Who moves the round, and whether open disputes may be voided by it. */
export interface MoveOrder {
  /** null: by itself, at its instant. */
  readonly by: string | null;
  readonly reason?: string;
  readonly force?: boolean;
}

export interface StagesDeps {
  readonly db: DataSource;
  readonly now: Now;
  readonly queue: Queue;
  readonly mail: RoundMail;
  /** Sends what answering needs to the teacher's desk. */
  readonly openAnswering: (manager: EntityManager, round: Round) => Promise<unknown>;
  /** Scores and publishes; `waiting` when disputes are open and were not forced. */
  readonly settle: (manager: EntityManager, round: Round, options: { force: boolean }) => Promise<{ waiting: boolean }>;
}
export type RoundStages = ReturnType<typeof createRoundStages>;

const AFTER: Record<Stage, LaterStage | null> = {
  planned: 'writing',
  writing: 'reviewing',
  reviewing: 'answering',
  answering: 'settled',
  settled: null,
};

/** The stage that follows; null after the last. */
export function nextStage(stage: Stage): LaterStage | null {
  return AFTER[stage];
}

/**
 * When the running stage ends by itself, with two minutes of grace for what people hand in. Answering opens for
 * everyone after the last person's longer time to review, so that no finding comes to an author alone.
 */
export async function findStageEnd(manager: EntityManager, round: Round): Promise<Date | null> {
  if (round.stage === 'planned') return round.opensAt;
  if (round.stage === 'answering') return round.settlesAt;
  if (round.stage === 'writing') return new Date(round.writingEndsAt.getTime() + GRACE_MS);
  if (round.stage === 'settled') return null;
  const [own]: { longest: Date | null }[] = await manager.query(
    'select max(reviewing_ends_at) as longest from extension where round_id = $1',
    [round.id],
  );
  const ends = Math.max(round.reviewingEndsAt.getTime(), own?.longest?.getTime() ?? 0);
  return new Date(ends + GRACE_MS);
}

const REMIND_MS = 86_400_000;

/** The stage machine: every change happens under the round's row lock, once. */
export function createRoundStages(deps: StagesDeps) {
  const { db, now, queue, mail } = deps;

  /** Timed jobs for what comes next; a job that finds nothing due does nothing, so a moved instant needs no clearing. */
  async function schedule(manager: EntityManager, round: Round): Promise<void> {
    const instants = [await findStageEnd(manager, round)];
    if (round.stage === 'reviewing') instants.push(lateBatchAt(round));
    for (const at of instants) {
      if (!at) continue;
      const options = { key: `${round.id}/${round.stage}/${at.getTime()}`, startAfter: at };
      await queue.enqueueInTransaction(manager, 'round-due', { roundId: round.id }, options);
    }
    const remindAt = new Date(round.reviewingEndsAt.getTime() - REMIND_MS);
    if (round.stage !== 'reviewing' || remindAt <= now()) return;
    const data = { roundId: round.id, endsAt: round.reviewingEndsAt.toISOString() };
    const key = `${round.id}/${round.reviewingEndsAt.getTime()}`;
    await queue.enqueueInTransaction(manager, 'round-reminder', data, { key, startAfter: remindAt });
  }

  async function enter(manager: EntityManager, round: Round, to: LaterStage, order: MoveOrder): Promise<void> {
    if (to === 'writing') await openWriting(manager, round, order);
    else if (to === 'reviewing') await openReviewing(manager, round, order);
    else if (to === 'answering') await openAnswering(manager, round, order);
    else await settle(manager, round, order);
  }

  async function openWriting(manager: EntityManager, round: Round, { by }: MoveOrder): Promise<void> {
    if (by && round.writingEndsAt <= now()) {
      throw new ProblemError('conflict', { detail: 'Writing would be over at once. Change the round’s times first.' });
    }
    round.frozen = await freezeTask(manager, round.taskId);
    if (round.opensAt > now()) round.opensAt = now();
    await keep(manager, round, 'writing', { frozen: round.frozen, opensAt: round.opensAt });
    await mail.writingOpened(manager, round);
  }

  async function openReviewing(manager: EntityManager, round: Round, { by }: MoveOrder): Promise<void> {
    if (by && round.reviewingEndsAt <= now()) {
      throw new ProblemError('conflict', {
        detail: 'Reviewing would be over at once. Change the round’s times first.',
      });
    }
    if (round.writingEndsAt > now()) round.writingEndsAt = now();
    await keep(manager, round, 'reviewing', { writingEndsAt: round.writingEndsAt });
    await deal(manager, round, now());
    await mail.reviewingOpened(manager, round);
  }

  async function openAnswering(manager: EntityManager, round: Round, { by }: MoveOrder): Promise<void> {
    if (by && round.answeringEndsAt <= now()) {
      throw new ProblemError('conflict', {
        detail: 'Answering would be over at once. Change the round’s times first.',
      });
    }
    if (round.reviewingEndsAt > now()) round.reviewingEndsAt = now();
    await keep(manager, round, 'answering', { reviewingEndsAt: round.reviewingEndsAt });
    await deps.openAnswering(manager, round);
    await mail.findingsToAnswer(manager, round);
  }

  async function settle(manager: EntityManager, round: Round, { by, force = false }: MoveOrder): Promise<void> {
    const { waiting } = await deps.settle(manager, round, { force });
    if (waiting) {
      if (by)
        throw new ProblemError('conflict', { detail: 'Disputes are open: rule on them, or settle all the same.' });
      if (!round.waitingForRulings) await manager.update(Round, { id: round.id }, { waitingForRulings: true });
      round.waitingForRulings = true;
      return;
    }
    for (const name of ['answeringEndsAt', 'settlesAt'] as const) if (round[name] > now()) round[name] = now();
    const { answeringEndsAt, settlesAt } = round;
    await keep(manager, round, 'settled', { answeringEndsAt, settlesAt, settledAt: now(), waitingForRulings: false });
    await mail.settled(manager, round);
  }

  async function keep(manager: EntityManager, round: Round, stage: LaterStage, values: Partial<Round>): Promise<void> {
    const changes: Partial<Round> = { ...values, stage, version: round.version + 1 };
    Object.assign(round, changes);
    await manager.update(Round, { id: round.id }, changes as QueryDeepPartialEntity<Round>);
  }

  async function moveLocked(manager: EntityManager, round: Round, to: LaterStage, order: MoveOrder): Promise<void> {
    const from = round.stage;
    if (nextStage(from) !== to) {
      throw new ProblemError('wrong-stage', { detail: `The round is ${from} already; look at it again.` });
    }
    await enter(manager, round, to, order);
    if (round.stage === from) return;
    await schedule(manager, round);
    await recordAudit(manager, {
      schoolId: round.schoolId,
      actorId: order.by,
      at: now(),
      action: 'round.stage-moved',
      objectKind: 'round',
      objectId: round.id,
      before: { stage: from },
      after: { stage: round.stage },
      reason: order.reason ?? '',
    });
  }

  /** The late batch, and reviews for people who had to wait for them, as far as they are due. */
  async function catchUp(manager: EntityManager, round: Round): Promise<void> {
    if (round.stage !== 'reviewing') return;
    const isLateDue = !round.lateDealtAt && lateBatchInstant(round, await listRoundPeople(manager, round)) <= now();
    const added = await dealLater(manager, round, now(), { lateDerivations: isLateDue });
    if (isLateDue) {
      round.lateDealtAt = now();
      await manager.update(Round, { id: round.id }, { lateDealtAt: now() });
    }
    if (added > 0) await mail.reviewingOpened(manager, round);
  }

  return {
    schedule,

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
      const added = await dealLater(manager, round, now(), { lateDerivations: true });
      const people = await listRoundPeople(manager, round);
      // Whoever still has time to write gets a batch of their own later.
      const isLast = !people.some((person) => mayStillHandIn(person, now(), false));
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

    /** Rounds whose stage is over, or that are in reviewing, where late work may wait. */
    async listDue(): Promise<string[]> {
      const graced = new Date(now().getTime() - GRACE_MS);
      const rows: { id: string }[] = await db.query(DUE_SQL, [now(), graced]);
      return rows.map(({ id }) => id);
    },
  };
}

const DUE_SQL = `
  select id from round
   where (stage = 'planned' and opens_at <= $1) or (stage = 'writing' and writing_ends_at <= $2)
      or stage = 'reviewing' or (stage = 'answering' and settles_at <= $1)
   order by settles_at, id`;

async function freezeTask(manager: EntityManager, taskId: string): Promise<FrozenTask> {
  const task = await manager.findOneByOrFail(Task, { id: taskId });
  const { title, instructions, given, goal, assumptions, settings } = task;
  return {
    ...{ title, instructions, given, goal, assumptions },
    settings: {
      numbers: settings.numbers ?? 'real',
      reversible: settings.reversible ?? false,
      presentationCounts: settings.presentationCounts ?? false,
      constantNeeded: settings.constantNeeded ?? false,
      decimal: settings.decimal ?? 'point',
    },
    taskId,
    taskVersion: task.version,
    pointsRule: 'quadratic-1',
  };
}
