import type { EntityManager } from 'typeorm';
import { Round } from '../features/rounds/rounds.entity.ts';

/** Locks the round's row: 'read' keeps its stage in place, 'write' also keeps others from ruling at once. */
export async function lockRound(manager: EntityManager, roundId: string, how: 'read' | 'write'): Promise<Round> {
  const mode = how === 'read' ? 'pessimistic_read' : 'pessimistic_write';
  return await manager.findOneOrFail(Round, { where: { id: roundId }, lock: { mode } });
}
