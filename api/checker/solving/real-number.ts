import type { Expr } from '../../../shared/maths/expression.ts';
import { ballBetween, ballFromRational, ballToNumber, isApart, type Ball } from '../numbers/ball.ts';
import { compare, rational, toNumber, type Rational } from '../numbers/rational.ts';
import type { KnownValue } from '../values/value.ts';
import { degree, derivePolynomial, gcdPolynomials, scaledValueAt, signAt, type Polynomial } from './polynomial.ts';
import { isolateRealRoots, type RootInterval } from './real-roots.ts';

/** A point of the real line. */
export type RealNumber =
  | { readonly kind: 'rational'; readonly value: Rational }
  /** The only root of a square-free polynomial in an open interval whose ends are no roots; never a fraction. */
  | { readonly kind: 'algebraic'; readonly polynomial: Polynomial; readonly interval: RootInterval }
  | ComputedNumber;

/** A number known through a procedure; `expr` where the author wrote it or it was recognised. */
export interface ComputedNumber {
  readonly kind: 'computed';
  readonly expr: Expr | null;
  /** A multiple of pi, exact. */
  readonly exact?: KnownValue;
  /** A ball of radius well under 2^-(bits - 24), or wider where the procedure cannot do better. */
  readonly enclose: (bits: number) => Ball;
}

export function rationalNumber(value: Rational): RealNumber {
  return { kind: 'rational', value };
}

/** The real roots of a square-free polynomial, smallest first. */
export function realRoots(polynomial: Polynomial): RealNumber[] {
  return isolateRealRoots(polynomial).map((interval) =>
    interval.low === interval.high
      ? { kind: 'rational', value: interval.low }
      : { kind: 'algebraic', polynomial, interval },
  );
}

/** By the number of bits. */
const refined = new WeakMap<RealNumber, Map<number, Ball>>();

export function enclose(a: RealNumber, bits: number): Ball {
  if (a.kind === 'rational') return ballFromRational(a.value, bits);
  const balls = refined.get(a) ?? new Map<number, Ball>();
  const known = balls.get(bits);
  if (known) return known;
  const ball = a.kind === 'algebraic' ? encloseRoot(a, bits) : a.enclose(bits);
  refined.set(a, balls.set(bits, ball));
  return ball;
}

const startBits = 56;

/** Bisection to 56 bits, then Newton's steps, whose last is confirmed by the signs on both sides. */
function encloseRoot(root: Algebraic, bits: number): Ball {
  const { polynomial: p, interval } = root;
  if (bits <= startBits) return bisectRoot(p, interval, bits);
  const start = enclose(root, startBits);
  const slope = derivePolynomial(p);
  const den = 1n << BigInt(bits);
  let middle = start.mid << BigInt(bits - startBits);
  for (let known = startBits / 2; known < bits * 2; known *= 2) {
    const divisor = scaledValueAt(slope, { num: middle, den });
    if (divisor === 0n) break;
    middle -= scaledValueAt(p, { num: middle, den }) / divisor;
  }
  const [low, high] = [middle - 4n, middle + 4n].map((num) => ({ num, den })) as [Rational, Rational];
  const isInside = compare(low, interval.low) > 0 && compare(high, interval.high) < 0;
  if (isInside && signAt(p, low) * signAt(p, high) < 0) return { mid: middle, rad: 4n };
  return bisectRoot(p, interval, bits);
}

/** Bisection on a grid of 2^-bits: one sign of the polynomial a bit. */
function bisectRoot(p: Polynomial, interval: RootInterval, bits: number): Ball {
  let low = floorAt(interval.low, bits);
  let high = floorAt(interval.high, bits) + 1n;
  const den = 1n << BigInt(bits);
  const below = signAt(p, interval.low);
  while (high - low > 2n) {
    const middle = (low + high) >> 1n;
    const at = { num: middle, den };
    const inside = compare(at, interval.low) > 0 && compare(at, interval.high) < 0;
    if (!inside) {
      if (compare(at, interval.low) <= 0) low = middle;
      else high = middle;
    } else if (signAt(p, at) === below) low = middle;
    else high = middle;
  }
  return ballBetween(low, high);
}

function floorAt(a: Rational, bits: number): bigint {
  const scaled = a.num << BigInt(bits);
  const quotient = scaled / a.den;
  return scaled < 0n && quotient * a.den !== scaled ? quotient - 1n : quotient;
}

export interface Order {
  readonly order: -1 | 0 | 1;
  /** False where two computed numbers agree to all digits that were looked at. */
  readonly certain: boolean;
}

/** Bits to which two computed numbers are compared before they are called the same: 300 digits. */
const comparedBits = 1024;

export function compareNumbers(a: RealNumber, b: RealNumber): Order {
  if (a === b) return { order: 0, certain: true };
  if (a.kind === 'rational' && b.kind === 'rational') return { order: compare(a.value, b.value), certain: true };
  if (a.kind === 'rational' && b.kind === 'algebraic') return { order: compareToRoot(a.value, b), certain: true };
  if (a.kind === 'algebraic' && b.kind === 'rational')
    return { order: reverse(compareToRoot(b.value, a)), certain: true };
  if (a.kind === 'algebraic' && b.kind === 'algebraic') {
    if (sameRoot(a, b)) return { order: 0, certain: true };
    return compareByDigits(a, b, 1 << 14) ?? { order: 0, certain: false };
  }
  return compareByDigits(a, b, comparedBits) ?? { order: 0, certain: false };
}

function reverse(order: -1 | 0 | 1): -1 | 0 | 1 {
  return order === 0 ? 0 : order === 1 ? -1 : 1;
}

type Algebraic = Extract<RealNumber, { kind: 'algebraic' }>;

function compareToRoot(value: Rational, root: Algebraic): -1 | 1 {
  if (compare(value, root.interval.low) <= 0) return -1;
  if (compare(value, root.interval.high) >= 0) return 1;
  return signAt(root.polynomial, value) === signAt(root.polynomial, root.interval.low) ? -1 : 1;
}

function sameRoot(a: Algebraic, b: Algebraic): boolean {
  const low = compare(a.interval.low, b.interval.low) > 0 ? a.interval.low : b.interval.low;
  const high = compare(a.interval.high, b.interval.high) < 0 ? a.interval.high : b.interval.high;
  if (compare(low, high) >= 0) return false;
  const common = gcdPolynomials(a.polynomial, b.polynomial);
  if (degree(common) < 1) return false;
  // A root of the common divisor is a root of both, and each interval holds one root only.
  return signAt(common, low) * signAt(common, high) < 0;
}

function compareByDigits(a: RealNumber, b: RealNumber, most: number): Order | null {
  for (let bits = 64; bits <= most; bits = bits === 64 ? 160 : bits === 160 ? 288 : bits === 288 ? 512 : bits * 2) {
    const x = enclose(a, bits);
    const y = enclose(b, bits);
    if (isApart(x, y)) return { order: x.mid < y.mid ? -1 : 1, certain: true };
  }
  return null;
}

/** The nearest double: for guesses and for order of printing, never for a ruling. */
export function approximate(a: RealNumber): number {
  if (a.kind === 'rational') return toNumber(a.value);
  return ballToNumber(enclose(a, 96), 96);
}

/** A fraction strictly between two different numbers, short where there is one; null stands for minus or plus infinity. */
export function between(low: RealNumber | null, high: RealNumber | null): Rational {
  if (low === null && high === null) return { num: 0n, den: 1n };
  if (low === null) return { num: wholeBelow(high as RealNumber), den: 1n };
  if (high === null) return { num: -wholeBelow(mirrored(low)), den: 1n };
  for (let bits = 64; ; bits *= 2) {
    const a = enclose(low, bits);
    const b = enclose(high, bits);
    if (a.mid + a.rad < b.mid - b.rad) return simplestBetween(a.mid + a.rad, b.mid - b.rad, BigInt(bits));
  }
}

function mirrored(a: RealNumber): RealNumber {
  return {
    kind: 'computed',
    expr: null,
    enclose: (bits) => ({ mid: -enclose(a, bits).mid, rad: enclose(a, bits).rad }),
  };
}

function wholeBelow(a: RealNumber): bigint {
  const ball = enclose(a, 64);
  return ((ball.mid - ball.rad) >> 64n) - 1n;
}

/** The fraction of the smallest denominator strictly between low / 2^bits and high / 2^bits. */
function simplestBetween(low: bigint, high: bigint, bits: bigint): Rational {
  for (let den = 1n; den <= 12n; den += 1n) {
    const num = ((low * den) >> bits) + 1n;
    if (num << bits < high * den) {
      // Zero and small whole numbers are the easiest to try by hand.
      if (low < 0n && high > 0n) return { num: 0n, den: 1n };
      if (high <= 0n) return smallestSize(high, den, bits);
      return { num, den };
    }
  }
  return rational(low + high, 2n << bits);
}

function smallestSize(high: bigint, den: bigint, bits: bigint): Rational {
  const num = -((-high * den) >> bits) - 1n;
  return rational(num, den);
}
