import type { EntityManager } from 'typeorm';
import { allocate, type Allocation, type Couple, type DealtPair } from '../../../shared/lib/allocation.ts';
import { allocateLater } from '../../../shared/lib/later-allocation.ts';
import { seededRandom, shuffled } from '../../../shared/lib/seeded-random.ts';
import { Review } from '../reviews/reviews.entity.ts';
import { isDealable, listRoundPeople, mayStillHandIn, type RoundPerson } from './round-people.ts';
import { Round } from './rounds.entity.ts';

export interface DealPlan extends Allocation {
  readonly authors: readonly string[];
  readonly reviewers: readonly string[];
}

/** Who would be dealt what at `at`; changes nothing. */
export async function planDeal(
  manager: EntityManager,
  round: Round,
  people: readonly RoundPerson[],
  at: Date,
  seed: string,
): Promise<DealPlan> {
  const authors = people.filter(isDealable).map(({ userId }) => userId);
  const takesLate = round.lateRule === 'late-batch';
  const reviewers = people
    .filter((person) => !person.excused && !mayStillHandIn(person, at, takesLate))
    .map(({ userId }) => userId);
  const { banned, earlier } = await findBonds(manager, round);
  const plan = allocate({ seed, authors, reviewers, each: round.reviewsPerDerivation, banned, earlier });
  return { ...plan, authors, reviewers };
}

/** Deals when reviewing opens, in the caller's transaction and under the round's lock; the seed is kept. */
export async function deal(manager: EntityManager, round: Round, at: Date, seed: string): Promise<DealPlan> {
  const people = await listRoundPeople(manager, round);
  const plan = await planDeal(manager, round, people, at, seed);
  await insertReviews(manager, round, people, plan.pairs, 'main', seed, at);
  round.dealSeed = seed;
  round.dealtAt = at;
  await manager.update(Round, { id: round.id }, { dealSeed: seed, dealtAt: at });
  return plan;
}

interface DealtRow {
  readonly derivation_id: string;
  readonly author_id: string;
  readonly reviewer_id: string;
  /** Given back unread: does not count as a review, and is not dealt to the same person again. */
  readonly set_aside: boolean;
}

/** Reviews that people who had none before are waiting for. */
export interface LaterWish {
  /** true: derivations handed in since the dealing get their reviews too (the late batch). */
  readonly lateDerivations: boolean;
  /** true: nobody can hand in any more, so everybody may be dealt something. */
  readonly isLast?: boolean;
  /** Further reviews that single derivations want, such as after a reviewer fell away. */
  readonly lost?: ReadonlyMap<string, number>;
}

/**
 * Adds reviews to a running round without touching what was dealt: for people who have none yet or gave one back, and
 * as wished. Answers how many.
 */
export async function dealLater(manager: EntityManager, round: Round, at: Date, wish: LaterWish): Promise<number> {
  const { dealSeed, dealtAt } = round;
  if (!dealSeed || !dealtAt) return 0;
  const people = await listRoundPeople(manager, round);
  const rows: DealtRow[] = await manager.query(DEALT_SQL, [round.id]);
  const counted = rows.filter(({ set_aside }) => !set_aside);
  const authors = people.filter(isDealable);
  const each = Math.max(0, Math.min(round.reviewsPerDerivation, authors.length - 1));
  const isLate = ({ derivation }: RoundPerson) =>
    wish.lateDerivations && (derivation?.handedIn?.at ?? dealtAt) > dealtAt && !wasDealt(derivation?.id, rows);
  const takesLate = round.lateRule === 'late-batch' && !round.lateDealtAt && !wish.isLast;
  const derivations = authors
    .map((person) => ({ person, lost: wish.lost?.get(person.derivation?.id ?? '') ?? 0 }))
    .filter(({ person, lost }) => wish.lateDerivations || lost > 0 || wasDealt(person.derivation?.id, rows))
    .map(({ person, lost }) => ({
      author: person.userId,
      reviews: counted.filter(({ author_id }) => author_id === person.userId).length,
      wants: isLate(person) ? each : lost,
    }));
  const reviewers = people
    .filter((person) => !person.excused && !mayStillHandIn(person, at, takesLate))
    .map(({ userId }) => {
      const load = counted.filter(({ reviewer_id }) => reviewer_id === userId).length;
      const gaveBack = rows.filter(({ reviewer_id, set_aside }) => set_aside && reviewer_id === userId).length;
      // Each may give back as many as they owe: nobody leafs through the class until a friend's turns up.
      const owed = Math.max(0, each - Math.max(load, gaveBack - each + load));
      return { person: userId, load, wants: load === 0 || gaveBack > 0 ? owed : 0, room: each };
    });
  if (![...derivations, ...reviewers].some(({ wants }) => wants > 0)) return 0;
  const seed = `${dealSeed}/${rows.length}`;
  const dealt = rows.map(({ reviewer_id, author_id }) => ({ reviewer: reviewer_id, author: author_id }));
  const pairs = allocateLater({ seed, dealt, derivations, reviewers, ...(await findBonds(manager, round)) });
  await insertReviews(manager, round, people, pairs, 'late', seed, at);
  return pairs.length;
}

function wasDealt(derivationId: string | undefined, rows: readonly DealtRow[]): boolean {
  return rows.some((row) => row.derivation_id === derivationId);
}

const DEALT_SQL = `
  select r.derivation_id, d.author_id, r.reviewer_id, r.set_aside is not null as set_aside
    from review r join derivation d on d.id = r.derivation_id
   where r.round_id = $1 and d.author_id is not null
   order by d.author_id, r.reviewer_id`;

/**
 * Takes this person's reviews that were not begun and finds others for them; a finding already begun stays.
 * Answers how many were taken.
 */
export async function releaseReviews(manager: EntityManager, round: Round, userId: string, at: Date): Promise<number> {
  const taken: { derivation_id: string }[] = await manager.query(RELEASE_SQL, [round.id, userId]);
  if (taken.length === 0) return 0;
  const lost = new Map(taken.map(({ derivation_id }) => [derivation_id, 1]));
  await dealLater(manager, round, at, { lateDerivations: false, lost });
  return taken.length;
}

const RELEASE_SQL = `
  with gone as (
    delete from review r
     where r.round_id = $1 and r.reviewer_id = $2 and r.draft is null
       and not exists (select 1 from finding f where f.review_id = r.id)
    returning r.derivation_id)
  select derivation_id from gone`;

/** Finds others for the reviews, not begun, of people who have left the class or may no longer sign in. Answers how many. */
export async function releaseGone(manager: EntityManager, round: Round, at: Date): Promise<number> {
  const gone: { user_id: string }[] = await manager.query(GONE_SQL, [round.id, round.classId]);
  let taken = 0;
  for (const { user_id } of gone) taken += await releaseReviews(manager, round, user_id, at);
  return taken;
}

const GONE_SQL = `
  select distinct r.reviewer_id as user_id from review r
   where r.round_id = $1 and r.draft is null
     and not exists (select 1 from finding f where f.review_id = r.id)
     and not exists (
       select 1 from membership m join person p on p.id = m.user_id and p.disabled_at is null
        where m.class_id = $2 and m.user_id = r.reviewer_id and m.role = 'student' and m.removed_at is null)
   order by 1`;

async function insertReviews(
  manager: EntityManager,
  round: Round,
  people: readonly RoundPerson[],
  pairs: readonly DealtPair[],
  batch: Review['batch'],
  seed: string,
  at: Date,
): Promise<void> {
  if (pairs.length === 0) return;
  const derivations = new Map(people.map(({ userId, derivation }) => [userId, derivation]));
  // In random order, so that nothing about a row tells who sat beside whom.
  const rows = shuffled(pairs, seededRandom(`${seed}/rows`)).flatMap(({ reviewer, author }) => {
    const derivation = derivations.get(author);
    if (!derivation?.handedIn) return [];
    const { versionId } = derivation.handedIn;
    return [
      {
        roundId: round.id,
        derivationId: derivation.id,
        versionId,
        reviewerId: reviewer,
        position: 0,
        batch,
        createdAt: at,
      },
    ];
  });
  await manager.insert(Review, rows);
  for (const reviewer of new Set(pairs.map((pair) => pair.reviewer))) {
    await mixPositions(manager, round.id, reviewer, seed);
  }
}

/** What was begun keeps its place; the rest, old and new, is shuffled behind it, so that no place tells what came late. */
async function mixPositions(manager: EntityManager, roundId: string, reviewer: string, seed: string): Promise<void> {
  const rows: { id: string; begun: boolean }[] = await manager.query(
    `select r.id, (r.opened_at is not null or r.draft is not null) as begun from review r
      where r.round_id = $1 and r.reviewer_id = $2 order by r.position, r.derivation_id`,
    [roundId, reviewer],
  );
  const begun = rows.filter((row) => row.begun);
  const rest = shuffled(
    rows.filter((row) => !row.begun),
    seededRandom(`${seed}/${reviewer}`),
  );
  for (const [i, { id }] of [...begun, ...rest].entries()) await manager.update(Review, { id }, { position: i + 1 });
}

/** Couples who are never dealt to each other, and couples who met in an earlier round of this class. */
async function findBonds(manager: EntityManager, round: Round): Promise<{ banned: Couple[]; earlier: Couple[] }> {
  const banned: { one: string; other: string }[] = await manager.query(
    'select first_id as one, second_id as other from conflict_pair where class_id = $1',
    [round.classId],
  );
  const earlier: { one: string; other: string }[] = await manager.query(
    `select distinct r.reviewer_id as one, d.author_id as other
       from review r join derivation d on d.id = r.derivation_id join round o on o.id = r.round_id
      where o.class_id = $1 and o.id <> $2 and d.author_id is not null order by 1, 2`,
    [round.classId, round.id],
  );
  const toCouples = (rows: readonly { one: string; other: string }[]) =>
    rows.map(({ one, other }): Couple => [one, other]);
  return { banned: toCouples(banned), earlier: toCouples(earlier) };
}
