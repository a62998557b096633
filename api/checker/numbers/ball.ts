import { bitLength, wholeRoot } from './rational.ts';
import type { Rational } from './rational.ts';
import { charge, chargeProduct } from './work.ts';

/**
 * A real number known to within a radius, in fixed point: (mid +- rad) / 2^bits, where `bits` is passed along by the
 * caller. Every operation returns a ball that contains the true result for all numbers in its operands.
 */
export interface Ball {
  readonly mid: bigint;
  readonly rad: bigint;
}

export function ballFromRational(value: Rational, bits: number): Ball {
  const scaled = value.num << BigInt(bits);
  if (value.den === 1n) return { mid: scaled, rad: 0n };
  chargeLength(scaled);
  return { mid: scaled / value.den, rad: 1n };
}

const longMiddle = 1n << 1_000n;

/** Counts work on a number that is much longer than balls are as a rule. */
function chargeLength(value: bigint): void {
  if (value > longMiddle || value < -longMiddle) chargeProduct(2 * bitLength(value));
}

export function addBalls(a: Ball, b: Ball): Ball {
  return { mid: a.mid + b.mid, rad: a.rad + b.rad };
}

export function negateBall(a: Ball): Ball {
  return { mid: -a.mid, rad: a.rad };
}

export function subBalls(a: Ball, b: Ball): Ball {
  return { mid: a.mid - b.mid, rad: a.rad + b.rad };
}

export function magnitude(value: bigint): bigint {
  return value < 0n ? -value : value;
}

/** A multiplication of two balls of size about 1. */
export function costOfStep(bits: number): number {
  const size = bits / 256;
  return 0.3 + (size * Math.sqrt(size)) / 4;
}

export function mulBalls(a: Ball, b: Ball, bits: number): Ball {
  const shift = BigInt(bits);
  charge(costOfStep(bits));
  const mid = (a.mid * b.mid) >> shift;
  chargeLength(mid);
  if (a.rad === 0n && b.rad === 0n) return { mid, rad: 1n };
  const spread = magnitude(a.mid) * b.rad + magnitude(b.mid) * a.rad + a.rad * b.rad;
  return { mid, rad: (spread >> shift) + 2n };
}

/** Null where the divisor may be zero. */
export function divBalls(a: Ball, b: Ball, bits: number): Ball | null {
  const size = magnitude(b.mid);
  const low = size - b.rad;
  if (low <= 0n) return null;
  const shift = BigInt(bits);
  charge(2 * costOfStep(bits));
  const mid = (a.mid << shift) / b.mid;
  chargeLength(mid);
  if (a.rad === 0n && b.rad === 0n) return { mid, rad: 1n };
  // |a/b - mid| <= (rad_a + |a/b| rad_b) / low
  const spread = (a.rad << shift) + magnitude(mid) * b.rad + b.rad;
  return { mid, rad: spread / low + 2n };
}

/** -1 or 1 where the sign is certain, 0 where the ball holds zero. */
export function ballSign(a: Ball): -1 | 0 | 1 {
  if (a.mid > a.rad) return 1;
  return a.mid < -a.rad ? -1 : 0;
}

export function isApart(a: Ball, b: Ball): boolean {
  return magnitude(a.mid - b.mid) > a.rad + b.rad;
}

/** A ball around everything from low to high. */
export function ballBetween(low: bigint, high: bigint): Ball {
  const mid = (low + high) >> 1n;
  return { mid, rad: high - mid + 1n };
}

/** Null where the radicand may be negative; the caller knows exact zeros. */
export function sqrtBall(a: Ball, bits: number): Ball | null {
  return rootBall(a, 2, bits);
}

/** The real root of a number that is certainly positive, else null. */
export function rootBall(a: Ball, degree: number, bits: number): Ball | null {
  const low = a.mid - a.rad;
  if (low <= 0n) return null;
  const shift = BigInt(bits) * BigInt(degree - 1);
  const root = wholeRoot(a.mid << shift, degree);
  if (a.rad === 0n) return { mid: root, rad: 1n };
  // d(a^(1/n)) <= rad * a^(1/n) / (n low): concave, so the slope is steepest at the lower end.
  const lowRoot = wholeRoot(low << shift, degree) + 1n;
  return { mid: root, rad: (a.rad * lowRoot) / (BigInt(degree) * low) + 2n };
}

export function powBall(a: Ball, exponent: number, bits: number): Ball | null {
  if (exponent < 0) {
    const positive = powBall(a, -exponent, bits);
    return positive && divBalls({ mid: 1n << BigInt(bits), rad: 0n }, positive, bits);
  }
  let result: Ball | null = null;
  let square = a;
  for (let rest = exponent; ;) {
    if (rest % 2 === 1) result = result === null ? square : mulBalls(result, square, bits);
    rest = Math.floor(rest / 2);
    if (rest === 0) break;
    square = mulBalls(square, square, bits);
  }
  return result ?? { mid: 1n << BigInt(bits), rad: 0n };
}

export function absBall(a: Ball): Ball {
  const known = ballSign(a);
  if (known > 0) return a;
  if (known < 0) return negateBall(a);
  return ballBetween(0n, magnitude(a.mid) + a.rad);
}

/** The same ball at another precision, a little wider where bits are dropped. */
export function rescale(a: Ball, from: number, to: number): Ball {
  if (to >= from) return { mid: a.mid << BigInt(to - from), rad: a.rad << BigInt(to - from) };
  const shift = BigInt(from - to);
  return { mid: a.mid >> shift, rad: (a.rad >> shift) + 2n };
}

/** The nearest double of the middle; good for guesses, never for a ruling. */
export function ballToNumber(a: Ball, bits: number): number {
  const length = bitLength(a.mid);
  if (length <= 64) return Number(a.mid) / 2 ** bits;
  const drop = length - 64;
  const exponent = drop - bits;
  const lead = Number(a.mid >> BigInt(drop));
  return exponent < -1000 ? lead * 2 ** -1000 * 2 ** (exponent + 1000) : lead * 2 ** exponent;
}

/** How many leading bits of the number are certain; large negative for a ball around zero. */
export function certainBits(a: Ball): number {
  return bitLength(a.mid) - bitLength(a.rad);
}
