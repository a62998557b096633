import { randomBytes } from 'node:crypto';
import type { EntityManager, QueryDeepPartialEntity } from 'typeorm';
import type { FrozenTask } from '../../../shared/schemas/task.ts';
import { ProblemError } from '../../http/problem-error.ts';
import type { Now } from '../../lib/clock.ts';
import { Task } from '../tasks/tasks.entity.ts';
import { deal } from './dealing.ts';
import type { RoundMail } from './round-mail.ts';
import { Round } from './rounds.entity.ts';
import type { LaterStage } from './stage-order.ts';

/** Who moves the round, and whether open disputes may be voided by it. */
export interface MoveOrder {
  /** null: by itself, at its instant. */
  readonly by: string | null;
  readonly reason?: string;
  readonly force?: boolean;
}

export interface EnterDeps {
  readonly now: Now;
  readonly mail: RoundMail;
  /** Names what a dealing is drawn from; absent: chance. */
  readonly drawSeed?: ((round: Round) => string) | undefined;
  /** Sends what answering needs to the teacher's desk. */
  readonly openAnswering: (manager: EntityManager, round: Round) => Promise<unknown>;
  /** Scores and publishes; `waiting` when disputes are open and were not forced. */
  readonly settle: (manager: EntityManager, round: Round, options: { force: boolean }) => Promise<{ waiting: boolean }>;
}

/** What happens when a round enters each of its stages; the caller holds the round's lock. */
export function createStageEntries(deps: EnterDeps) {
  const { now, mail } = deps;

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
    await deal(manager, round, now(), deps.drawSeed?.(round) ?? randomBytes(16).toString('hex'));
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

  return { writing: openWriting, reviewing: openReviewing, answering: openAnswering, settled: settle } satisfies Record<
    LaterStage,
    (manager: EntityManager, round: Round, order: MoveOrder) => Promise<void>
  >;
}

async function freezeTask(manager: EntityManager, taskId: string): Promise<FrozenTask> {
  const task = await manager.findOneByOrFail(Task, { id: taskId });
  const { title, instructions, given, goal, assumptions, settings } = task;
  return {
    title,
    instructions,
    given,
    goal,
    assumptions,
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
