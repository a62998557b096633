import type { EntityManager } from 'typeorm';
import type { FrozenTask } from '../../../shared/schemas/task.ts';
import { notFound, ProblemError } from '../../http/problem-error.ts';
import { Class, Membership } from '../classes/classes.entity.ts';
import { Extension, Round } from '../rounds/rounds.entity.ts';

export interface OpenedRound {
  readonly round: Round;
  readonly frozen: FrozenTask;
  readonly of: Class;
  readonly extendedTo: Date | null;
}

/**
 * The round as one of its students may meet it. With `hold` no stage can change before the transaction ends, so
 * that dealing never misses or tears what is being handed in.
 * @throws {ProblemError} not-found for everyone who is not a student of the class; wrong-stage before it opens.
 */
export async function openRound(
  manager: EntityManager,
  roundId: string,
  studentId: string,
  hold = false,
): Promise<OpenedRound> {
  const query = manager
    .createQueryBuilder(Round, 'round')
    .innerJoin(
      Membership,
      'member',
      "member.classId = round.classId AND member.userId = :studentId AND member.role = 'student' AND member.removedAt IS NULL",
      { studentId },
    )
    .where('round.id = :roundId', { roundId });
  if (hold) query.setLock('pessimistic_read', undefined, ['round']);
  const round = await query.getOne();
  if (!round) throw notFound();
  if (round.stage === 'planned' || !round.frozen) {
    throw new ProblemError('wrong-stage', {
      detail: 'Writing has not begun yet.',
      extra: { opensAt: round.opensAt.toISOString() },
    });
  }
  const of = await manager.findOneByOrFail(Class, { id: round.classId });
  const extension = await manager.findOneBy(Extension, { roundId, userId: studentId });
  return { round, frozen: round.frozen, of, extendedTo: extension?.writingEndsAt ?? null };
}
