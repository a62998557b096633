import type { EntityManager } from 'typeorm';
import { ProblemError } from '../../http/problem-error.ts';
import type { User } from '../people/people.entity.ts';
import type { Membership } from './classes.entity.ts';

/**
 * Whether a person may have a place of this role in a class. A teacher's account may have lines of its own ruled on,
 * so it is nobody's place as a student; and nobody assists a class in which they have worked as a student.
 * @throws {ProblemError} conflict, saying which.
 */
export async function refuseUnfitRole(
  manager: EntityManager,
  classId: string,
  user: Pick<User, 'id' | 'role'>,
  role: Membership['role'],
): Promise<void> {
  if (role === 'student' && user.role !== 'student')
    throw new ProblemError('conflict', { detail: 'Only somebody with a student account can be a student of a class.' });
  if (role === 'teacher' && user.role === 'student')
    throw new ProblemError('conflict', { detail: 'Only somebody with a teacher account can teach a class.' });
  if (role !== 'student' && (await hasWorked(manager, classId, user.id))) {
    throw new ProblemError('conflict', {
      detail: 'This person has worked in the class as a student. Nobody assists a class in which they are a student.',
    });
  }
}

async function hasWorked(manager: EntityManager, classId: string, userId: string): Promise<boolean> {
  const rows: unknown[] = await manager.query(
    `select 1 from round r where r.class_id = $1 and (
       exists (select 1 from derivation d where d.round_id = r.id and d.author_id = $2)
       or exists (select 1 from review v where v.round_id = r.id and v.reviewer_id = $2)) limit 1`,
    [classId, userId],
  );
  return rows.length > 0;
}
