import type { EntityManager } from 'typeorm';
import type { Reading, ReadSettings } from '../../../shared/maths/expression.ts';
import { CONTEST_MS, GRACE_MS, ownReviewingEnd, ownWritingEnd } from '../../../shared/lib/round-times.ts';
import type { LateRule, Stage } from '../../../shared/schemas/round.ts';
import type { AnswerThing, LookThing, ReviewThing, TodayThing, WriteThing } from '../../../shared/schemas/today.ts';

/** A round as one of its students meets it. */
export interface OwnRound {
  readonly roundId: string;
  readonly title: string;
  readonly className: string;
  readonly timeZone: string;
  readonly number: number;
  readonly stage: Stage;
  readonly opensAt: Date;
  readonly writingEndsAt: Date;
  readonly reviewingEndsAt: Date;
  readonly answeringEndsAt: Date;
  readonly settlesAt: Date;
  readonly settledAt: Date | null;
  readonly lateRule: LateRule;
  readonly lateDealtAt: Date | null;
  readonly settings: Partial<ReadSettings> | null;
  readonly excused: boolean;
  readonly own: { readonly writingEndsAt: Date | null; readonly reviewingEndsAt: Date | null };
  readonly derivation: { readonly id: string; readonly versionId: string | null } | null;
  /** Has reviews to do, so writing is over. */
  readonly dealt: boolean;
}

interface Tools {
  readonly at: Date;
  readonly readLine: (tex: string, settings: ReadSettings) => Reading;
}

/** Rounds of the classes in which this person is a student: those that run, and those settled since `settledSince`. */
export async function listOwnRounds(manager: EntityManager, userId: string, settledSince: Date): Promise<OwnRound[]> {
  const rows: (Omit<OwnRound, 'own' | 'derivation'> & FlatRow)[] = await manager.query(OWN_SQL, [userId, settledSince]);
  return rows.map(({ ownWritingEndsAt, ownReviewingEndsAt, derivationId, versionId, ...row }) => ({
    ...row,
    own: { writingEndsAt: ownWritingEndsAt, reviewingEndsAt: ownReviewingEndsAt },
    derivation: derivationId === null ? null : { id: derivationId, versionId },
  }));
}

interface FlatRow {
  readonly ownWritingEndsAt: Date | null;
  readonly ownReviewingEndsAt: Date | null;
  readonly derivationId: string | null;
  readonly versionId: string | null;
}

const OWN_SQL = `
  select r.id as "roundId", r.frozen->>'title' as title, c.name as "className", c.time_zone as "timeZone", r.number,
         r.stage, r.opens_at as "opensAt", r.writing_ends_at as "writingEndsAt",
         r.reviewing_ends_at as "reviewingEndsAt", r.answering_ends_at as "answeringEndsAt",
         r.settles_at as "settlesAt", r.settled_at as "settledAt", r.late_rule as "lateRule",
         r.late_dealt_at as "lateDealtAt", r.frozen->'settings' as settings, x.id is not null as excused,
         e.writing_ends_at as "ownWritingEndsAt", e.reviewing_ends_at as "ownReviewingEndsAt",
         d.id as "derivationId", d.current_version_id as "versionId",
         exists (select 1 from review v where v.round_id = r.id and v.reviewer_id = m.user_id) as dealt
    from membership m
    join class c on c.id = m.class_id and c.archived_at is null
    join round r on r.class_id = c.id and r.stage <> 'planned' and (r.stage <> 'settled' or r.settled_at >= $2)
    left join extension e on e.round_id = r.id and e.user_id = m.user_id
    left join excuse x on x.round_id = r.id and x.user_id = m.user_id
    left join derivation d on d.round_id = r.id and d.author_id = m.user_id
   where m.user_id = $1 and m.role = 'student' and m.removed_at is null
   order by r.settles_at, r.id`;

/** What this round asks of the person now; null when it asks nothing. */
export async function toThing(
  manager: EntityManager,
  userId: string,
  round: OwnRound,
  tools: Tools,
): Promise<TodayThing | null> {
  if (round.stage === 'settled') return await toLook(manager, userId, round);
  if (round.excused) return null;
  if (mayWrite(round, tools.at)) return await toWrite(manager, round, tools);
  if (round.stage === 'reviewing') return await toReview(manager, userId, round, tools.at);
  return round.stage === 'answering' ? await toAnswer(manager, round, tools.at) : null;
}

function base({ roundId, title, className, timeZone, number }: OwnRound) {
  return { roundId, title, className, timeZone, number };
}

function mayWrite(round: OwnRound, at: Date): boolean {
  if (round.derivation?.versionId || round.dealt) return false;
  const inTime = at.getTime() <= ownWritingEnd(round, round.own).getTime() + GRACE_MS;
  if (round.stage === 'writing') return inTime || round.lateRule !== 'closed';
  if (round.stage !== 'reviewing' || round.lateDealtAt) return false;
  return round.lateRule === 'late-batch' || (inTime && round.own.writingEndsAt !== null);
}

/** Characters of a sheet that are read for the first page; the sheet itself shows every line. */
const READ_AT_MOST = 20_000;

async function toWrite(manager: EntityManager, round: OwnRound, { readLine }: Tools): Promise<WriteThing> {
  const lines: { tex: string }[] = round.derivation ? await manager.query(LINES_SQL, [round.derivation.id]) : [];
  const decimal = round.settings?.decimal ?? 'point';
  const settings: ReadSettings = { numbers: round.settings?.numbers ?? 'real', decimal, functions: [] };
  let left = READ_AT_MOST;
  const readings = lines.map(({ tex }) => ((left -= tex.length) < 0 ? null : readLine(tex, settings)));
  const numbersOf = (test: (reading: Reading) => boolean) =>
    readings.flatMap((reading, i) => (reading && test(reading) ? [i + 1] : []));
  const last = lines.at(-1);
  return {
    kind: 'write',
    ...base(round),
    dueAt: ownWritingEnd(round, round.own).toISOString(),
    begun: lines.length > 0,
    last: last ? { number: lines.length, tex: last.tex, decimal } : null,
    unread: numbersOf((reading) => !reading.ok),
    twoWays: numbersOf((reading) => reading.ok && reading.alternatives.length > 0),
  };
}

const LINES_SQL = `
  select b.node->'attrs'->>'tex' as tex
    from draft w cross join lateral jsonb_array_elements(w.document->'content') with ordinality as b(node, at)
   where w.derivation_id = $1 and w.purpose = 'submission' and b.node->>'type' = 'step'
     and btrim(coalesce(b.node->'attrs'->>'tex', '')) <> ''
   order by b.at`;

async function toReview(
  manager: EntityManager,
  userId: string,
  round: OwnRound,
  at: Date,
): Promise<ReviewThing | null> {
  const reviews: ReviewThing['reviews'] = await manager.query(REVIEWS_SQL, [round.roundId, userId]);
  const dueAt = ownReviewingEnd(round, round.own);
  const isOver = at.getTime() > dueAt.getTime() + GRACE_MS;
  const isOpen = reviews.some(({ state }) => state === 'not-begun' || state === 'begun');
  return isOpen && !isOver ? { kind: 'review', ...base(round), dueAt: dueAt.toISOString(), reviews } : null;
}

const REVIEWS_SQL = `
  select r.id as "reviewId", jsonb_array_length(v.lines) - 1 as steps,
         case when r.set_aside is not null then 'set-aside'
              when exists (select 1 from finding f where f.review_id = r.id and f.taken_back_at is null)
              then 'handed-in'
              when r.draft is not null then 'begun' else 'not-begun' end as state
    from review r join derivation_version v on v.id = r.version_id
   where r.round_id = $1 and r.reviewer_id = $2 order by r.position`;

async function toAnswer(manager: EntityManager, round: OwnRound, at: Date): Promise<AnswerThing | null> {
  const { derivation, answeringEndsAt } = round;
  if (!derivation || at.getTime() > answeringEndsAt.getTime() + GRACE_MS) return null;
  const open: NonNullable<AnswerThing['first']>[] = await manager.query(FINDINGS_SQL, [derivation.id]);
  if (open.length === 0) return null;
  const dueAt = answeringEndsAt.toISOString();
  const first = open[0] ?? null;
  return { kind: 'answer', ...base(round), dueAt, derivationId: derivation.id, count: open.length, first };
}

/** Findings that pick a step and have no answer; in the order of their random keys, which says nothing. */
const FINDINGS_SQL = `
  select f.pick as step, f.why
    from review r
    join lateral (
      select * from finding where review_id = r.id and taken_back_at is null
       order by handed_in_at desc, id limit 1) f on f.pick is not null
   where r.derivation_id = $1 and not exists (select 1 from answer a where a.finding_id = f.id)
   order by f.author_key`;

interface VerdictRow {
  readonly steps: number;
  readonly outcome: 'sound' | 'faulty' | 'undecided' | null;
  readonly first_fault: number | null;
  readonly mend: 'none' | 'begun' | 'handed-in';
}

async function toLook(manager: EntityManager, userId: string, round: OwnRound): Promise<LookThing | null> {
  const { derivation, settledAt } = round;
  const reviews: LookThing['reviews'] = await manager.query(OUTCOMES_SQL, [round.roundId, userId]);
  const [verdict]: VerdictRow[] = derivation?.versionId ? await manager.query(VERDICT_SQL, [derivation.id]) : [];
  if (!settledAt || (!verdict && reviews.length === 0)) return null;
  return {
    kind: 'look',
    ...base(round),
    settledAt: settledAt.toISOString(),
    contestUntil: new Date(settledAt.getTime() + CONTEST_MS).toISOString(),
    own:
      derivation && verdict
        ? {
            derivationId: derivation.id,
            steps: verdict.steps,
            outcome: verdict.outcome ?? 'undecided',
            firstFault: verdict.first_fault,
            mend: verdict.mend,
          }
        : null,
    reviews,
  };
}

const OUTCOMES_SQL = `
  select r.id as "reviewId",
         (select s.outcome from score s where s.review_id = r.id order by s.created_at desc, s.id limit 1) as outcome
    from review r where r.round_id = $1 and r.reviewer_id = $2 order by r.position`;

/** The verdict in force: the latest ruling, else the checker's latest. */
const VERDICT_SQL = `
  select jsonb_array_length(v.lines) - 1 as steps, c.outcome, c.first_fault,
         case when exists (select 1 from derivation_version n where n.derivation_id = d.id and n.purpose = 'mend')
              then 'handed-in'
              when exists (select 1 from draft w where w.derivation_id = d.id and w.purpose = 'mend')
              then 'begun' else 'none' end as mend
    from derivation d
    join derivation_version v on v.id = d.current_version_id
    left join lateral (
      select outcome, first_fault from verdict where version_id = v.id
       order by source = 'ruling' desc, created_at desc, id limit 1) c on true
   where d.id = $1`;
