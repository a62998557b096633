import type { EntityManager } from 'typeorm';
import type { RoundWarning, StageEffect, StagePreview } from '../../../shared/schemas/round.ts';
import { planDeal } from './dealing.ts';
import { isDealable, listRoundPeople, type RoundPerson } from './round-people.ts';
import type { Round } from './rounds.entity.ts';
import { findStageEnd, nextStage } from './stage-order.ts';

/** Below this many people a reader can guess whose work it is. */
export const FEWEST_PEOPLE = 5;

type Outlook = Pick<StagePreview, 'effects' | 'warnings'> & { readonly needsForce?: boolean };

/** What moving on will do and what speaks against it; changes nothing. */
export async function previewNext(manager: EntityManager, round: Round, at: Date): Promise<StagePreview> {
  const to = nextStage(round.stage);
  const people = await listRoundPeople(manager, round);
  const outlook = await look(manager, round, people, at);
  return {
    from: round.stage,
    to,
    at: (await findStageEnd(manager, round))?.toISOString() ?? null,
    needsForce: outlook.needsForce ?? false,
    effects: outlook.effects.filter(({ count }) => count > 0),
    warnings: outlook.warnings.filter(({ count }) => count > 0),
  };
}

async function look(manager: EntityManager, round: Round, people: readonly RoundPerson[], at: Date): Promise<Outlook> {
  if (round.stage === 'planned') return lookAtOpening(people);
  if (round.stage === 'writing') return await lookAtDealing(manager, round, people, at);
  const counts = await countWork(manager, round.id);
  if (round.stage === 'reviewing') return lookAtAnswering(counts);
  return round.stage === 'answering' ? lookAtSettling(counts) : { effects: [], warnings: [] };
}

/** Warnings that hold from planning on. */
export function warnOfSize(people: number): RoundWarning[] {
  return people < FEWEST_PEOPLE ? [{ kind: 'names-guessable', count: people }] : [];
}

function lookAtOpening(people: readonly RoundPerson[]): Outlook {
  const asked = people.filter(({ excused }) => !excused).length;
  const effects: StageEffect[] = [
    { kind: 'freezes-task', count: 1 },
    { kind: 'opens-writing', count: asked },
    { kind: 'mails', count: asked },
  ];
  return { effects, warnings: warnOfSize(people.length) };
}

async function lookAtDealing(
  manager: EntityManager,
  round: Round,
  people: readonly RoundPerson[],
  at: Date,
): Promise<Outlook> {
  const plan = await planDeal(manager, round, people, at, 'preview');
  const handedIn = people.filter(({ derivation }) => derivation?.handedIn);
  const writing = people.filter(({ excused, derivation }) => !excused && !derivation?.handedIn);
  const dealable = plan.authors.length;
  const effects: StageEffect[] = [
    { kind: 'closes-writing', count: writing.length },
    { kind: 'deals', count: plan.pairs.length === 0 ? 0 : dealable, each: plan.each },
    { kind: 'mails', count: new Set(plan.pairs.map(({ reviewer }) => reviewer)).size },
  ];
  const warnings: RoundWarning[] = [
    { kind: 'still-writing', count: writing.filter(({ derivation }) => derivation?.openedAt).length },
    { kind: 'not-dealt', count: handedIn.filter((person) => !isDealable(person)).length },
    { kind: 'nothing-to-review', count: plan.pairs.length === 0 ? 1 : 0 },
    { kind: 'few-derivations', count: dealable > 1 && dealable < FEWEST_PEOPLE ? dealable : 0 },
    { kind: 'reviews-cut', count: plan.each > 0 && plan.each < round.reviewsPerDerivation ? plan.each : 0 },
  ];
  return { effects, warnings };
}

interface WorkCounts {
  readonly derivations: number;
  readonly unchecked: number;
  readonly findings: number;
  readonly authors: number;
  readonly reviews_open: number;
  readonly answers_open: number;
  readonly disputes_open: number;
  readonly people: number;
}

function lookAtAnswering(counts: WorkCounts): Outlook {
  return {
    effects: [
      { kind: 'closes-reviewing', count: counts.reviews_open },
      { kind: 'shows-findings', count: counts.findings },
      { kind: 'mails', count: counts.authors },
    ],
    warnings: [
      { kind: 'reviews-open', count: counts.reviews_open },
      { kind: 'checks-waiting', count: counts.unchecked },
    ],
  };
}

function lookAtSettling(counts: WorkCounts): Outlook {
  return {
    needsForce: counts.disputes_open > 0,
    effects: [
      { kind: 'closes-answering', count: counts.answers_open },
      { kind: 'shows-verdicts', count: counts.derivations },
      { kind: 'voids', count: counts.disputes_open },
      { kind: 'mails', count: counts.people },
    ],
    warnings: [
      { kind: 'answers-open', count: counts.answers_open },
      { kind: 'disputes-open', count: counts.disputes_open },
      { kind: 'checks-waiting', count: counts.unchecked },
    ],
  };
}

async function countWork(manager: EntityManager, roundId: string): Promise<WorkCounts> {
  const [row]: WorkCounts[] = await manager.query(COUNT_SQL, [roundId]);
  if (!row) throw new Error('A count always answers one row');
  return row;
}

const COUNT_SQL = `
  with own as (select * from derivation where round_id = $1 and current_version_id is not null),
       dealt as (
         select r.id, r.reviewer_id, r.derivation_id, f.id as finding_id, f.pick
           from review r
           left join lateral (
             select id, pick from finding where review_id = r.id and taken_back_at is null
              order by handed_in_at desc, id limit 1) f on true
          where r.round_id = $1)
  select (select count(*)::int from own) as derivations,
         (select count(*)::int from own d where not exists (
            select 1 from verdict v where v.version_id = d.current_version_id)) as unchecked,
         (select count(finding_id)::int from dealt) as findings,
         (select count(distinct derivation_id)::int from dealt where pick is not null) as authors,
         (select count(*)::int from dealt where finding_id is null) as reviews_open,
         (select count(*)::int from dealt d where pick is not null
             and not exists (select 1 from answer a where a.finding_id = d.finding_id)) as answers_open,
         (select count(*)::int from dispute where round_id = $1 and closed_at is null) as disputes_open,
         (select count(*)::int from (
            select author_id from own where author_id is not null union select reviewer_id from dealt) p) as people`;
