import type { RealNumber } from './real-number.ts';
import { compareNumbers } from './real-number.ts';

export type Reached = 'proved' | 'sampled';

/**
 * Something that is constant between neighbouring points of the real line: `between[k]` holds from points[k-1] to
 * points[k], the ends excluded, `at[k]` at points[k] itself. `between` has one entry more than `points`.
 */
export interface Piecewise<T> {
  readonly points: readonly RealNumber[];
  readonly at: readonly T[];
  readonly between: readonly T[];
  readonly reached: Reached;
  /** There may be further points: what is said between the known ones was looked at in places only. */
  readonly open?: boolean;
}

/** A set of real numbers: finitely many points and intervals. */
export type RealSet = Piecewise<boolean>;

export function weaker(a: Reached, b: Reached): Reached {
  return a === 'proved' ? b : a;
}

export function everywhere<T>(value: T): Piecewise<T> {
  return { points: [], at: [], between: [value], reached: 'proved' };
}

export const emptySet: RealSet = everywhere(false);
export const wholeLine: RealSet = everywhere(true);

export function setOfPoints(points: readonly RealNumber[]): RealSet {
  const sorted = sortNumbers(points);
  return {
    points: sorted.points,
    at: sorted.points.map(() => true),
    between: [...sorted.points.map(() => false), false],
    reached: sorted.reached,
  };
}

/** Sorted, each once. */
export function sortNumbers(points: readonly RealNumber[]): { points: RealNumber[]; reached: Reached } {
  const sorted: RealNumber[] = [];
  let reached: Reached = 'proved';
  for (const point of points) {
    let low = 0;
    let high = sorted.length;
    let known = false;
    while (low < high) {
      const middle = (low + high) >> 1;
      const { order, certain } = compareNumbers(point, sorted[middle] as RealNumber);
      if (order === 0) {
        known = true;
        if (!certain) reached = 'sampled';
        // An exact name of the same number is worth more than a computed one.
        if (!certain && point.kind !== 'computed') sorted[middle] = point;
        break;
      }
      if (order < 0) high = middle;
      else low = middle + 1;
    }
    if (!known) sorted.splice(low, 0, point);
  }
  return { points: sorted, reached };
}

/** Both read at the same points. */
export function combine<A, B, C>(a: Piecewise<A>, b: Piecewise<B>, join: (x: A, y: B) => C): Piecewise<C> {
  const points: RealNumber[] = [];
  const at: C[] = [];
  const between: C[] = [join(a.between[0] as A, b.between[0] as B)];
  let reached = weaker(a.reached, b.reached);
  let i = 0;
  let j = 0;
  while (i < a.points.length || j < b.points.length) {
    const p = a.points[i];
    const q = b.points[j];
    const found = p && q ? compareNumbers(p, q) : { order: p ? -1 : 1, certain: true };
    if (!found.certain) reached = 'sampled';
    const takeA = found.order <= 0;
    const takeB = found.order >= 0;
    points.push((takeA && !(takeB && p?.kind === 'computed') ? p : q) as RealNumber);
    at.push(join((takeA ? a.at[i] : a.between[i]) as A, (takeB ? b.at[j] : b.between[j]) as B));
    if (takeA) i += 1;
    if (takeB) j += 1;
    between.push(join(a.between[i] as A, b.between[j] as B));
  }
  return simplify({ points, at, between, reached, ...openIf(a, b) });
}

/** The mark of maps that may lack points, for what is made from them. */
export function openIf(...maps: readonly { readonly open?: boolean }[]): { readonly open?: true } {
  return maps.some((map) => map.open === true) ? { open: true } : {};
}

/** Drops points at which nothing changes. */
export function simplify<T>(map: Piecewise<T>): Piecewise<T> {
  const keep = map.points.map((_, k) => map.at[k] !== map.between[k] || map.at[k] !== map.between[k + 1]);
  if (keep.every(Boolean)) return map;
  return {
    points: map.points.filter((_, k) => keep[k]),
    at: map.at.filter((_, k) => keep[k]),
    between: map.between.filter((_, k) => k === 0 || keep[k - 1]),
    reached: map.reached,
    ...openIf(map),
  };
}

export function mapPieces<A, B>(map: Piecewise<A>, change: (value: A) => B): Piecewise<B> {
  return simplify({
    points: map.points,
    at: map.at.map(change),
    between: map.between.map(change),
    reached: map.reached,
    ...openIf(map),
  });
}

export function union(a: RealSet, b: RealSet): RealSet {
  return combine(a, b, (x, y) => x || y);
}

export function intersection(a: RealSet, b: RealSet): RealSet {
  return combine(a, b, (x, y) => x && y);
}

export function difference(a: RealSet, b: RealSet): RealSet {
  return combine(a, b, (x, y) => x && !y);
}

export function complement(a: RealSet): RealSet {
  return mapPieces(a, (x) => !x);
}

export function isEmptySet(set: RealSet): boolean {
  return !set.at.some(Boolean) && !set.between.some(Boolean);
}

export function isWholeLine(set: RealSet): boolean {
  return set.at.every(Boolean) && set.between.every(Boolean);
}

export function isFiniteSet(set: RealSet): boolean {
  return !set.between.some(Boolean);
}

/** The isolated points of a set. */
export function isolatedPoints(set: RealSet): RealNumber[] {
  return set.points.filter((_, k) => set.at[k] && !set.between[k] && !set.between[k + 1]);
}
