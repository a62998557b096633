import type { EntityManager } from 'typeorm';
import { notFound } from '../../http/problem-error.ts';
import type { Viewer } from '../../http/route.ts';
import { Round } from './rounds.entity.ts';

/** A round as one of its class's staff may touch it. */
export interface StaffRound {
  readonly round: Round;
  readonly className: string;
  readonly timeZone: string;
  /** The frozen task's title, else the task's. */
  readonly title: string;
  readonly role: 'teacher' | 'assistant';
  /** Teachers always; assistants where the class's teacher allows it. */
  readonly seesNames: boolean;
}

interface AccessRow {
  readonly role: 'teacher' | 'assistant';
  readonly class_name: string;
  readonly time_zone: string;
  readonly title: string;
  readonly sees_names: boolean;
}

const ACCESS_SQL = `
  select m.role, c.name as class_name, c.time_zone, coalesce(r.frozen->>'title', t.title) as title,
         (m.role = 'teacher' or c.assistants_see_names) as sees_names
    from round r
    join class c on c.id = r.class_id
    join task t on t.id = r.task_id
    join membership m on m.class_id = c.id and m.user_id = $2 and m.removed_at is null and m.role = any($3)
   where r.id = $1`;

/**
 * The round, for teachers of its class (and assistants unless `teacherOnly`); with `lock` its row is held until the
 * transaction ends.
 * @throws {ProblemError} not-found for everyone else.
 */
export async function getStaffRound(
  manager: EntityManager,
  viewer: Viewer,
  roundId: string,
  { teacherOnly = false, lock = false } = {},
): Promise<StaffRound> {
  const roles = teacherOnly ? ['teacher'] : ['teacher', 'assistant'];
  const [row]: AccessRow[] = await manager.query(ACCESS_SQL, [roundId, viewer.userId, roles]);
  const round = row && (lock ? await lockRound(manager, roundId) : await manager.findOneBy(Round, { id: roundId }));
  if (!row || !round) throw notFound();
  return {
    round,
    className: row.class_name,
    timeZone: row.time_zone,
    title: row.title,
    role: row.role,
    seesNames: row.sees_names,
  };
}

/** The round with its row locked until the transaction ends; every stage change goes through this. */
export async function lockRound(manager: EntityManager, roundId: string): Promise<Round | null> {
  return await manager.findOne(Round, { where: { id: roundId }, lock: { mode: 'pessimistic_write' } });
}
