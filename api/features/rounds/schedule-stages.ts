import type { EntityManager } from 'typeorm';
import { lateBatchAt } from '../../../shared/lib/round-times.ts';
import type { Queue } from '../../lib/queue.ts';
import type { Round } from './rounds.entity.ts';
import { findStageEnd } from './stage-order.ts';

const REMIND_MS = 86_400_000;

/** Timed jobs for what comes next; a job that finds nothing due does nothing, so a moved instant needs no clearing. */
export async function scheduleStages(queue: Queue, manager: EntityManager, round: Round, now: Date): Promise<void> {
  const instants = [await findStageEnd(manager, round)];
  if (round.stage === 'reviewing') instants.push(lateBatchAt(round));
  for (const at of instants) {
    if (!at) continue;
    const options = { key: `${round.id}/${round.stage}/${at.getTime()}`, startAfter: at };
    await queue.enqueueInTransaction(manager, 'round-due', { roundId: round.id }, options);
  }
  const remindAt = new Date(round.reviewingEndsAt.getTime() - REMIND_MS);
  if (round.stage !== 'reviewing' || remindAt <= now) return;
  const data = { roundId: round.id, endsAt: round.reviewingEndsAt.toISOString() };
  const key = `${round.id}/${round.reviewingEndsAt.getTime()}`;
  await queue.enqueueInTransaction(manager, 'round-reminder', data, { key, startAfter: remindAt });
}
