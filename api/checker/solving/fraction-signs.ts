import type { Rational } from '../numbers/rational.ts';
import type { PolynomialFraction } from './fraction.ts';
import { dividePolynomials, gcdPolynomials, signAt, squareFreePart, type Polynomial } from './polynomial.ts';
import { between, realRoots, type RealNumber } from './real-number.ts';
import { everywhere, sortNumbers, type Piecewise } from './real-set.ts';

/** null: no value there. */
export type Sign = -1 | 0 | 1 | null;

export type SignMap = Piecewise<Sign>;

/** Where a rational function is negative, zero, positive or without a value: exact. */
export function signsOfFraction(f: PolynomialFraction): SignMap {
  const holes = f.holes.length > 1 ? squareFreePart(f.holes) : f.holes;
  if (f.num.length === 0) return signsOfZero(holes);
  const top = squareFreePart(f.num);
  const shared = holes.length > 1 ? gcdPolynomials(top, holes) : holes;
  const zeros = shared.length > 1 ? (dividePolynomials(top, shared) ?? top) : top;
  const zeroRoots = realRoots(zeros);
  const holeRoots = realRoots(holes);
  const { points } = sortNumbers([...zeroRoots, ...holeRoots]);
  const isHole = new Set<RealNumber>(holeRoots);
  const samples = betweenAll(points);
  return {
    points,
    at: points.map((p) => (isHole.has(p) ? null : 0)),
    between: samples.map((x) => (signAt(f.num, x) * signAt(f.den, x)) as Sign),
    reached: 'proved',
  };
}

function signsOfZero(holes: Polynomial): SignMap {
  if (holes.length <= 1) return everywhere<Sign>(0);
  const points = realRoots(holes);
  return { points, at: points.map(() => null), between: [0, ...points.map((): Sign => 0)], reached: 'proved' };
}

/** A fraction in each open interval between neighbouring points. */
export function betweenAll(points: readonly RealNumber[]): Rational[] {
  return Array.from({ length: points.length + 1 }, (_, k) => between(points[k - 1] ?? null, points[k] ?? null));
}
