import type { EntityManager } from 'typeorm';
import type { Round } from './rounds.entity.ts';

/** What one person has written and reviewed so far. */
export interface WorkRow {
  readonly user_id: string;
  readonly saved_at: Date | null;
  readonly line_added_at: Date | null;
  readonly lines: number;
  readonly last_tex: string | null;
  readonly dealt: number;
  readonly begun: number;
  readonly done: number;
  readonly received: number;
  readonly accepted: number;
  readonly contested: number;
}

/** By student; findings are counted once their authors may see them. */
export async function listWork(manager: EntityManager, round: Round): Promise<Map<string, WorkRow>> {
  const showsFindings = round.stage === 'answering' || round.stage === 'settled';
  const rows: WorkRow[] = await manager.query(WORK_SQL, [round.id, round.classId, showsFindings]);
  return new Map(rows.map((row) => [row.user_id, row]));
}

const WORK_SQL = `
  with written as (
    select d.author_id, w.saved_at, w.line_added_at, s.lines, s.last_tex
      from derivation d
      join draft w on w.derivation_id = d.id and w.purpose = 'submission'
      cross join lateral (
        select count(*)::int as lines, (array_agg(b.node->'attrs'->>'tex' order by b.at desc))[1] as last_tex
          from jsonb_array_elements(w.document->'content') with ordinality as b(node, at)
         where b.node->>'type' = 'step' and btrim(coalesce(b.node->'attrs'->>'tex', '')) <> '') s
     where d.round_id = $1),
  reviewed as (
    select r.reviewer_id, count(*)::int as dealt,
           count(*) filter (where f.id is not null)::int as done,
           count(*) filter (where f.id is null and r.draft is not null)::int as begun
      from review r
      left join lateral (select id from finding where review_id = r.id and taken_back_at is null limit 1) f on true
     where r.round_id = $1 and r.set_aside is null
     group by r.reviewer_id),
  received as (
    select d.author_id, count(*) filter (where f.pick is not null)::int as received,
           count(*) filter (where a.kind = 'accept')::int as accepted,
           count(*) filter (where a.kind = 'contest')::int as contested
      from review r
      join derivation d on d.id = r.derivation_id
      join lateral (
        select id, pick from finding where review_id = r.id and taken_back_at is null
         order by handed_in_at desc, id limit 1) f on true
      left join answer a on a.finding_id = f.id and f.pick is not null
     where r.round_id = $1 and $3
     group by d.author_id)
  select m.user_id, w.saved_at, w.line_added_at, coalesce(w.lines, 0) as lines, w.last_tex,
         coalesce(v.dealt, 0) as dealt, coalesce(v.begun, 0) as begun, coalesce(v.done, 0) as done,
         coalesce(c.received, 0) as received, coalesce(c.accepted, 0) as accepted,
         coalesce(c.contested, 0) as contested
    from membership m
    left join written w on w.author_id = m.user_id
    left join reviewed v on v.reviewer_id = m.user_id
    left join received c on c.author_id = m.user_id
   where m.class_id = $2 and m.role = 'student' and m.removed_at is null`;
