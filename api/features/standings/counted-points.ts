import type { EntityManager } from 'typeorm';
import { STANDING_DAYS } from '../../../shared/lib/standing.ts';

/** A review whose points count, with the round it settled in. */
export interface CountedPoint {
  readonly userId: string;
  readonly roundId: string;
  readonly roundNumber: number;
  readonly settledAt: Date;
  readonly points: number;
  readonly outcome: string;
  readonly steps: number;
  readonly pick: number | null;
  readonly noFault: boolean;
  readonly sureness: number;
}

interface Row {
  user_id: string;
  round_id: string;
  round_number: number;
  settled_at: Date;
  points: string;
  outcome: string;
  steps: number;
  pick: number | null;
  no_fault: boolean | null;
  sureness: number | null;
}

/** The current score of each counted review of a class, of the 90 days before `at` by settling date. */
export async function findCountedPoints(manager: EntityManager, classId: string, at: Date): Promise<CountedPoint[]> {
  const from = new Date(at.getTime() - STANDING_DAYS * 86_400_000);
  const rows: Row[] = await manager.query(
    `select * from (
       select distinct on (s.review_id) v.reviewer_id as user_id, r.id as round_id, r.number as round_number,
              r.settled_at, s.points, s.counted, s.outcome, jsonb_array_length(dv.lines) - 1 as steps,
              f.pick, f.no_fault, f.sureness
         from score s
         join review v on v.id = s.review_id
         join round r on r.id = v.round_id
         join derivation_version dv on dv.id = v.version_id
         left join finding f on f.id = s.finding_id
        where r.class_id = $1 and r.stage = 'settled' and r.settled_at > $2 and r.settled_at <= $3 and s.created_at <= $3
        order by s.review_id, s.created_at desc, s.id desc
     ) latest
     where counted
     order by settled_at, round_id, user_id`,
    [classId, from, at],
  );
  return rows.map((row) => ({
    userId: row.user_id,
    roundId: row.round_id,
    roundNumber: row.round_number,
    settledAt: row.settled_at,
    points: Number(row.points),
    outcome: row.outcome,
    steps: row.steps,
    pick: row.pick,
    noFault: row.no_fault ?? false,
    sureness: row.sureness ?? 0,
  }));
}

/** Points by person. */
export function byPerson(points: readonly CountedPoint[]): { userId: string; points: number[] }[] {
  const people = new Map<string, number[]>();
  for (const { userId, points: value } of points) people.set(userId, [...(people.get(userId) ?? []), value]);
  return [...people].map(([userId, values]) => ({ userId, points: values }));
}
