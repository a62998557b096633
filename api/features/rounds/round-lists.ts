import type { EntityManager } from 'typeorm';
import type { RoundChoices, RoundListItem, Stage } from '../../../shared/schemas/round.ts';

interface ListRow {
  readonly id: string;
  readonly class_id: string;
  readonly class_name: string;
  readonly time_zone: string;
  readonly number: number;
  readonly title: string;
  readonly stage: Stage;
  readonly opens_at: Date;
  readonly writing_ends_at: Date;
  readonly reviewing_ends_at: Date;
  readonly answering_ends_at: Date;
  readonly settles_at: Date;
  readonly waiting_for_rulings: boolean;
  readonly people: number;
  readonly handed_in: number;
  readonly reviews_dealt: number;
  readonly reviews_done: number;
  readonly disputes_open: number;
}

const LIST_SQL = `
  select r.id, r.class_id, c.name as class_name, c.time_zone, r.number,
         coalesce(r.frozen->>'title', t.title) as title, r.stage, r.opens_at, r.writing_ends_at,
         r.reviewing_ends_at, r.answering_ends_at, r.settles_at, r.waiting_for_rulings,
         (select count(*)::int from membership s join person p on p.id = s.user_id and p.disabled_at is null
           where s.class_id = c.id and s.role = 'student' and s.removed_at is null) as people,
         (select count(*)::int from derivation d
           where d.round_id = r.id and d.kind = 'own' and d.current_version_id is not null) as handed_in,
         (select count(*)::int from review v where v.round_id = r.id) as reviews_dealt,
         (select count(*)::int from review v where v.round_id = r.id and exists (
            select 1 from finding f where f.review_id = v.id and f.taken_back_at is null)) as reviews_done,
         (select count(*)::int from dispute u where u.round_id = r.id and u.closed_at is null) as disputes_open
    from round r
    join class c on c.id = r.class_id and c.archived_at is null
    join task t on t.id = r.task_id
    join membership m on m.class_id = c.id and m.user_id = $1 and m.removed_at is null
                     and m.role in ('teacher', 'assistant')
   where $2::uuid is null or r.class_id = $2
   order by r.stage = 'settled', case when r.stage = 'settled' then -extract(epoch from r.settles_at) else 0 end,
            r.opens_at, r.id
   limit 200`;

/** Rounds of the classes that this person teaches or assists: running ones first, then settled ones, newest first. */
export async function listRounds(
  manager: EntityManager,
  userId: string,
  classId: string | null,
): Promise<RoundListItem[]> {
  const rows: ListRow[] = await manager.query(LIST_SQL, [userId, classId]);
  return rows.map((row) => ({
    id: row.id,
    classId: row.class_id,
    className: row.class_name,
    timeZone: row.time_zone,
    number: row.number,
    title: row.title,
    stage: row.stage,
    instants: {
      opensAt: row.opens_at.toISOString(),
      writingEndsAt: row.writing_ends_at.toISOString(),
      reviewingEndsAt: row.reviewing_ends_at.toISOString(),
      answeringEndsAt: row.answering_ends_at.toISOString(),
      settlesAt: row.settles_at.toISOString(),
    },
    people: row.people,
    handedIn: row.handed_in,
    reviewsDealt: row.reviews_dealt,
    reviewsDone: row.reviews_done,
    disputesOpen: row.disputes_open,
    waitingForRulings: row.waiting_for_rulings,
  }));
}

/** Classes and tasks that this teacher can plan a round from. */
export async function listRoundChoices(manager: EntityManager, userId: string): Promise<RoundChoices> {
  const classes: { id: string; name: string; time_zone: string; students: number }[] = await manager.query(
    `select c.id, c.name, c.time_zone,
            (select count(*)::int from membership s join person p on p.id = s.user_id and p.disabled_at is null
              where s.class_id = c.id and s.role = 'student' and s.removed_at is null) as students
       from class c join membership m on m.class_id = c.id and m.user_id = $1
        and m.role = 'teacher' and m.removed_at is null
      where c.archived_at is null order by c.name, c.id`,
    [userId],
  );
  const tasks: { id: string; title: string; given: string }[] = await manager.query(
    'select id, title, given from task where owner_id = $1 and archived_at is null order by updated_at desc, id',
    [userId],
  );
  return {
    classes: classes.map(({ id, name, time_zone, students }) => ({ id, name, timeZone: time_zone, students })),
    tasks: tasks.map(({ id, title, given }) => ({ id, title, given })),
  };
}
