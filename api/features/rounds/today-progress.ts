import type { EntityManager } from 'typeorm';
import type { OwnProgress } from '../../../shared/schemas/today.ts';

/** Tenths from which somebody is nearly certain. */
const NEARLY_CERTAIN = 6;
const ROUNDS = 10;

interface ProgressRow {
  readonly round_id: string;
  readonly number: number;
  readonly is_right: boolean;
  readonly sureness: number;
}

/** How this person's counted findings of settled rounds fared, by round; null where there are none yet. */
export async function findOwnProgress(manager: EntityManager, userId: string): Promise<OwnProgress | null> {
  const rows: ProgressRow[] = await manager.query(PROGRESS_SQL, [userId, ROUNDS]);
  if (rows.length === 0) return null;
  const rounds = new Map<string, { number: number; right: number; total: number }>();
  for (const row of rows) {
    const round = rounds.get(row.round_id) ?? { number: row.number, right: 0, total: 0 };
    rounds.set(row.round_id, { ...round, right: round.right + Number(row.is_right), total: round.total + 1 });
  }
  const certain = rows.filter(({ sureness }) => sureness >= NEARLY_CERTAIN);
  return {
    rounds: [...rounds.values()],
    nearlyCertain: { right: certain.filter((row) => row.is_right).length, total: certain.length },
  };
}

const PROGRESS_SQL = `
  with mine as (
    select o.id as round_id, o.number, o.settled_at, s.outcome = 'right' as is_right, f.sureness, r.position
      from review r
      join round o on o.id = r.round_id and o.stage = 'settled'
      join lateral (
        select * from score where review_id = r.id order by created_at desc, id limit 1) s on s.counted
      join finding f on f.id = s.finding_id
     where r.reviewer_id = $1)
  select m.* from mine m
   where m.round_id in (select round_id from mine group by round_id, settled_at order by settled_at desc limit $2)
   order by m.settled_at, m.number, m.position`;
