import { roundedDivision, tenThousandths } from './scoring.ts';

/** Weight of the class mean in a standing. */
export const SHRINKAGE = 4;
/** Findings that a person needs to be listed. */
export const LEAST_FINDINGS = 4;
/** Reviewers that a class needs to have a list. */
export const LEAST_REVIEWERS = 8;
export const STANDING_DAYS = 90;

/** The counted points of one person within the window. */
export interface PersonPoints {
  readonly userId: string;
  readonly points: readonly number[];
}

export interface Placed {
  readonly userId: string;
  /** Shared by ties. */
  readonly place: number;
  readonly standing: number;
}

export type Listing =
  | { readonly withheld: 'too-few' | 'no-spread'; readonly listed: readonly []; readonly reviewers: number }
  | { readonly withheld: null; readonly listed: readonly Placed[]; readonly reviewers: number };

/** Mean over all counted findings of the class; 0 when there is none. */
export function classMeanOf(people: readonly PersonPoints[]): number {
  const all = people.flatMap((person) => person.points);
  return all.length === 0 ? 0 : sumOf(all) / all.length;
}

/** (sum of points + k * class mean) / (n + k): a mean drawn toward the class while there are few findings. */
export function standingOf(points: readonly number[], classMean: number): number {
  return (sumOf(points) + SHRINKAGE * classMean) / (points.length + SHRINKAGE);
}

/** A standing as people see it: whole, half away from zero. */
export function shownStanding(standing: number): number {
  return roundedDivision(tenThousandths(standing), 10_000);
}

/**
 * Whether people differ by more than chance: the spread between their means against what the spread of their own
 * findings would bring about alone (variance components by the method of moments, unequal numbers allowed: Searle,
 * Casella and McCulloch, Variance Components, 1992, section 3.6; with equal numbers of right-or-wrong answers it is
 * the sign of the denominator in the beta-binomial's moments, Kleinman 1973).
 */
export function hasSpread(people: readonly PersonPoints[]): boolean {
  const groups = people.filter((person) => person.points.length > 0);
  const all = groups.flatMap((person) => person.points);
  if (groups.length < 2 || all.length === groups.length) return false;
  const mean = sumOf(all) / all.length;
  let between = 0;
  let within = 0;
  for (const { points } of groups) {
    const own = sumOf(points) / points.length;
    between += points.length * (own - mean) ** 2;
    for (const value of points) within += (value - own) ** 2;
  }
  // Equal means give a `between` of rounding errors only.
  return between / (groups.length - 1) > within / (all.length - groups.length) + 1e-9;
}

/**
 * The upper third of those with enough findings, best first. People who opted out stay in the reckoning and are left
 * out of the list; places are counted among those shown. Ties that would cross the third are left out together.
 */
export function listUpperThird(people: readonly PersonPoints[], optedOut: ReadonlySet<string>): Listing {
  const eligible = people.filter((person) => person.points.length >= LEAST_FINDINGS);
  const reviewers = eligible.length;
  if (reviewers < LEAST_REVIEWERS) return { withheld: 'too-few', listed: [], reviewers };
  if (!hasSpread(eligible)) return { withheld: 'no-spread', listed: [], reviewers };
  const mean = classMeanOf(people);
  const ranked = eligible
    .map(({ userId, points }) => ({ userId, standing: standingOf(points, mean) }))
    .sort((a, b) => b.standing - a.standing || (a.userId < b.userId ? -1 : 1));
  const third = cutAtTie(ranked, Math.floor(reviewers / 3));
  return { withheld: null, listed: place(third.filter((person) => !optedOut.has(person.userId))), reviewers };
}

/** Counts places among those given (best first); whoever shows the same standing shares a place. */
export function place<T extends { readonly standing: number }>(ranked: readonly T[]): (T & { place: number })[] {
  const placed: (T & { place: number })[] = [];
  for (const person of ranked) {
    const before = placed.at(-1);
    const tied = before !== undefined && shownStanding(before.standing) === shownStanding(person.standing);
    placed.push({ ...person, place: tied ? before.place : placed.length + 1 });
  }
  return placed;
}

function cutAtTie<T extends { readonly standing: number }>(ranked: readonly T[], count: number): readonly T[] {
  const next = ranked[count];
  if (next === undefined) return ranked;
  return ranked.slice(0, count).filter((person) => person.standing - next.standing > 1e-9);
}

function sumOf(points: readonly number[]): number {
  return points.reduce((sum, value) => sum + tenThousandths(value), 0) / 10_000;
}
