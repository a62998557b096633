import { IsNull, type EntityManager } from 'typeorm';
import { notFound } from '../../http/problem-error.ts';
import type { Viewer } from '../../http/route.ts';
import { Class, Membership } from './classes.entity.ts';

export interface ClassAccess {
  readonly class: Class;
  readonly membership: Membership;
  /** Teachers always; assistants where the class's teacher allows it. */
  readonly seesNames: boolean;
}

/** @throws {ProblemError} not-found for everyone who is not in the class in one of these roles. */
export async function getAccess(
  manager: EntityManager,
  classId: string,
  viewer: Viewer,
  roles: readonly Membership['role'][],
): Promise<ClassAccess> {
  const membership = await manager.findOne(Membership, {
    where: { classId, userId: viewer.userId, removedAt: IsNull() },
    relations: { class: true },
  });
  if (!membership?.class || !roles.includes(membership.role)) throw notFound();
  const seesNames =
    membership.role === 'teacher' || (membership.role === 'assistant' && membership.class.assistantsSeeNames);
  return { class: membership.class, membership, seesNames };
}
