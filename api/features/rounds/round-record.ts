import type { EntityManager } from 'typeorm';
import type { Viewer } from '../../http/route.ts';
import type { Now } from '../../lib/clock.ts';
import { recordAudit } from '../audit/record.ts';
import type { Round } from './rounds.entity.ts';

export interface RoundFacts {
  readonly before: unknown;
  readonly after: unknown;
  readonly reason: string;
}

/** Adds what somebody did with a round to the trail, in the caller's transaction. */
export function createRoundRecord(now: Now) {
  return async (
    manager: EntityManager,
    viewer: Viewer,
    round: Round,
    action: string,
    { reason, ...rest }: RoundFacts,
  ): Promise<void> => {
    await recordAudit(manager, {
      schoolId: round.schoolId,
      actorId: viewer.userId,
      at: now(),
      action,
      objectKind: 'round',
      objectId: round.id,
      reason,
      ...rest,
    });
  };
}
