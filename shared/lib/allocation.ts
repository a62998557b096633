import { pairEvenly } from './balanced-pairs.ts';
import { seededRandom, shuffled, type Random } from './seeded-random.ts';

/** Two people; the order does not matter. */
export type Couple = readonly [string, string];

export interface AllocationInput {
  /** Stored with the round: the same seed and people give the same allocation. */
  readonly seed: string;
  /** Everyone whose derivation is dealt, once each. */
  readonly authors: readonly string[];
  readonly reviewers: readonly string[];
  /** Reviews that each reviewer is to get, 1 to 4. */
  readonly each: number;
  /** Never dealt to one another, in either direction. */
  readonly banned?: readonly Couple[];
  /** Met in an earlier round: avoided where possible. */
  readonly earlier?: readonly Couple[];
}

export interface DealtPair {
  readonly reviewer: string;
  readonly author: string;
}

export interface Allocation {
  readonly pairs: readonly DealtPair[];
  /** Reviews a reviewer gets after the cut to what is possible; whoever has fewer by bans is filled up with planted ones. */
  readonly each: number;
}

/** What must not be and what should not be, looked up fast. */
export interface Bonds {
  readonly isAllowed: (reviewer: string, author: string) => boolean;
  readonly haveMet: (one: string, other: string) => boolean;
}

const MUTUAL = 400;
/** In a flow's costs: dearer than all couples that met together. */
const BACKWARD = 90_000;
const MET = 20;
const ATTEMPTS = 4;

/**
 * Deals derivations to reviewers: never one's own, never a banned couple, loads as even as can be on both sides,
 * no mutual pairs where avoidable (always when every author reviews, nobody is banned and there are at least
 * 2 * each + 1), and few couples that met before.
 */
export function allocate(input: AllocationInput): Allocation {
  const random = seededRandom(input.seed);
  const reviewing = new Set(input.reviewers);
  const most = input.authors.length - (input.authors.some((author) => reviewing.has(author)) ? 1 : 0);
  const each = Math.max(0, Math.min(input.each, most));
  const bonds = toBonds(input.banned, input.earlier);
  let best: readonly DealtPair[] = [];
  let least = Infinity;
  for (let attempt = 0; attempt < ATTEMPTS && least > 0; attempt += 1) {
    const authors = shuffled([...input.authors].sort(), random);
    const reviewers = shuffled([...input.reviewers].sort(), random);
    const pairs = improvePairs(dealByFlow(authors, reviewers, each, bonds, random), bonds, random);
    const cost = costOfAll(pairs, bonds);
    if (cost < least) [best, least] = [pairs, cost];
  }
  return { each, pairs: best };
}

/** Looks up bans and earlier couples, in either order. */
export function toBonds(banned: readonly Couple[] = [], earlier: readonly Couple[] = []): Bonds {
  const bans = new Set(banned.map(([one, other]) => coupleKey(one, other)));
  const met = new Set(earlier.map(([one, other]) => coupleKey(one, other)));
  return {
    isAllowed: (reviewer, author) => reviewer !== author && !bans.has(coupleKey(reviewer, author)),
    haveMet: (one, other) => met.has(coupleKey(one, other)),
  };
}

function coupleKey(one: string, other: string): string {
  return one < other ? `${one} ${other}` : `${other} ${one}`;
}

/**
 * The authors stand in a circle, and reviewing someone of the half before you is dear. Of two authors at most one has
 * the other before them, so pairs that go forward only are never mutual; with nobody banned, everybody reviewing the
 * next `each` people is such a dealing, and even, so the cheapest one has no mutual pairs.
 */
function dealByFlow(
  authors: readonly string[],
  reviewers: readonly string[],
  each: number,
  { isAllowed, haveMet }: Bonds,
  random: Random,
): DealtPair[] {
  const reviewing = new Set(reviewers);
  const circle = authors.filter((author) => reviewing.has(author));
  const placeOf = new Map(circle.map((author, place) => [author, place]));
  const isBackward = (reviewer: string, author: string) => {
    const from = placeOf.get(reviewer);
    const to = placeOf.get(author);
    return from !== undefined && to !== undefined && 2 * ((to - from + circle.length) % circle.length) >= circle.length;
  };
  const pairs = pairEvenly({
    reviewers: reviewers.map(() => ({ load: 0, most: each })),
    authors: authors.map(() => ({ load: 0, most: reviewers.length })),
    cost: (r, a) => {
      const reviewer = reviewers[r] as string;
      const author = authors[a] as string;
      if (!isAllowed(reviewer, author)) return null;
      const met = haveMet(reviewer, author) ? MET : 0;
      return Math.floor(random() * MET) + met + (isBackward(reviewer, author) ? BACKWARD : 0);
    },
  });
  return pairs.map(([r, a]) => ({ reviewer: reviewers[r] as string, author: authors[a] as string }));
}

/** Exchanges the authors of two pairs, loads untouched, as long as that leaves fewer mutual pairs and fewer couples that met. */
function improvePairs(start: readonly DealtPair[], bonds: Bonds, random: Random): DealtPair[] {
  const pairs = [...start];
  const present = new Set(pairs.map(pairKey));
  const exchange = (i: number, j: number, next: readonly [DealtPair, DealtPair]) => {
    for (const place of [i, j]) present.delete(pairKey(pairs[place] as DealtPair));
    for (const pair of next) present.add(pairKey(pair));
    [pairs[i], pairs[j]] = next;
  };
  let cost = costOfAll(pairs, bonds);
  for (let tries = 100 * pairs.length; tries > 0 && cost > 0; tries -= 1) {
    const i = Math.floor(random() * pairs.length);
    const j = Math.floor(random() * pairs.length);
    const [one, other] = [pairs[i] as DealtPair, pairs[j] as DealtPair];
    const next = [
      { reviewer: one.reviewer, author: other.author },
      { reviewer: other.reviewer, author: one.author },
    ] as const;
    if (next.some((pair) => present.has(pairKey(pair)) || !bonds.isAllowed(pair.reviewer, pair.author))) continue;
    const before = costOf(one, present, bonds) + costOf(other, present, bonds);
    exchange(i, j, next);
    const after = costOf(next[0], present, bonds) + costOf(next[1], present, bonds);
    if (after > before) exchange(i, j, [one, other]);
    else if (after < before) cost = costOfAll(pairs, bonds);
  }
  return pairs;
}

function costOfAll(pairs: readonly DealtPair[], bonds: Bonds): number {
  const present = new Set(pairs.map(pairKey));
  return pairs.reduce((sum, pair) => sum + costOf(pair, present, bonds), 0);
}

function costOf({ reviewer, author }: DealtPair, present: ReadonlySet<string>, { haveMet }: Bonds): number {
  return (
    (present.has(pairKey({ reviewer: author, author: reviewer })) ? MUTUAL : 0) + (haveMet(reviewer, author) ? 1 : 0)
  );
}

function pairKey({ reviewer, author }: DealtPair): string {
  return `${reviewer}>${author}`;
}
