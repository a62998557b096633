import type { DataSource, EntityManager } from 'typeorm';
import type { BoardAlert, BoardAnswer, BoardPerson } from '../../../shared/schemas/round.ts';
import { seededRandom, shuffled } from '../../../shared/lib/seeded-random.ts';
import type { Viewer } from '../../http/route.ts';
import type { Now } from '../../lib/clock.ts';
import { findAlerts } from './board-alerts.ts';
import { getStaffRound } from './round-access.ts';
import { toRoundAnswer } from './round-answer.ts';
import { FEWEST_STEPS, listRoundPeople, type RoundPerson } from './round-people.ts';
import type { Round } from './rounds.entity.ts';
import { findStageEnd } from './stage-order.ts';

/** Somebody who was at work lately, and added no line for this long, is stuck. */
const STUCK_MS = 15 * 60_000;
const AT_WORK_MS = 60 * 60_000;

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

export interface BoardDeps {
  readonly db: DataSource;
  readonly now: Now;
}
export type BoardService = ReturnType<typeof createBoardService>;

/** How a round stands, for the teacher and, without names unless allowed, for assistants. */
export function createBoardService({ db, now }: BoardDeps) {
  return {
    async getBoard(viewer: Viewer, roundId: string): Promise<BoardAnswer> {
      const { manager } = db;
      const staff = await getStaffRound(manager, viewer, roundId);
      const { round, seesNames } = staff;
      const people = await listRoundPeople(manager, round);
      const work = await listWork(manager, round);
      const board = people.map((person) => toBoardPerson(round, person, work.get(person.userId), now()));
      const [open]: { count: number }[] = await manager.query(
        'select count(*)::int as count from dispute where round_id = $1 and closed_at is null',
        [roundId],
      );
      const disputesOpen = open?.count ?? 0;
      const alerts: BoardAlert[] = findAlerts({ round, people, board, work, disputesOpen, now: now() });
      return {
        round: await toRoundAnswer(manager, staff),
        now: now().toISOString(),
        stageEndsAt: (await findStageEnd(manager, round))?.toISOString() ?? null,
        seesNames,
        decimal: round.frozen?.settings.decimal ?? 'point',
        people: seesNames ? board : hideNames(board, roundId),
        alerts,
        disputesOpen,
      };
    },
  };
}

/** Numbers instead of names, in an order that has nothing to do with the alphabet and stays the same. */
function hideNames(board: readonly BoardPerson[], roundId: string): BoardPerson[] {
  const mixed = shuffled(board, seededRandom(`board ${roundId}`));
  return mixed.map((person, i) => ({ ...person, userId: null, derivationId: null, name: `Student ${i + 1}` }));
}

function toBoardPerson(round: Round, person: RoundPerson, work: WorkRow | undefined, now: Date): BoardPerson {
  const handedIn = person.derivation?.handedIn ?? null;
  return {
    userId: person.userId,
    name: person.name,
    state: toState(round, person, work, now),
    derivationId: handedIn ? (person.derivation?.id ?? null) : null,
    lines: handedIn ? handedIn.steps : (work?.lines ?? 0),
    hasOpened: Boolean(person.derivation?.openedAt),
    savedAt: work?.saved_at?.toISOString() ?? null,
    lineAddedAt: work?.line_added_at?.toISOString() ?? null,
    handedInAt: handedIn?.at.toISOString() ?? null,
    late: handedIn?.late ?? false,
    tooShort: handedIn !== null && handedIn.steps < FEWEST_STEPS,
    ownWritingEndsAt: person.extension?.writingEndsAt?.toISOString() ?? null,
    ownReviewingEndsAt: person.extension?.reviewingEndsAt?.toISOString() ?? null,
    reviews: { dealt: work?.dealt ?? 0, begun: work?.begun ?? 0, done: work?.done ?? 0 },
    findings: {
      received: work?.received ?? 0,
      accepted: work?.accepted ?? 0,
      contested: work?.contested ?? 0,
    },
  };
}

function toState(round: Round, person: RoundPerson, work: WorkRow | undefined, now: Date): BoardPerson['state'] {
  if (person.excused) return 'excused';
  if (person.derivation?.handedIn) return 'handed-in';
  if (!work?.saved_at || work.lines === 0) return 'not-begun';
  const sinceSave = now.getTime() - work.saved_at.getTime();
  const sinceLine = now.getTime() - (work.line_added_at ?? work.saved_at).getTime();
  const isStuck = round.stage === 'writing' && sinceLine >= STUCK_MS && sinceSave <= AT_WORK_MS;
  return isStuck ? 'stuck' : 'writing';
}

async function listWork(manager: EntityManager, round: Round): Promise<Map<string, WorkRow>> {
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
