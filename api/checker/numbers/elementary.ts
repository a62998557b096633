import {
  addBalls,
  ballToNumber,
  divBalls,
  magnitude,
  mulBalls,
  negateBall,
  rescale,
  sqrtBall,
  subBalls,
} from './ball.ts';
import type { Ball } from './ball.ts';
import { bitLength } from './rational.ts';
import { charge, costOfProduct } from './work.ts';

/** Exponentials, logarithms and circular functions of balls by their Taylor series after reduction of the argument. */

const constantBits = 9000;

/** Machin 1706: pi = 16 arctan(1/5) - 4 arctan(1/239). */
const pi = 16n * arctanOfInverse(5n) - 4n * arctanOfInverse(239n);
/** ln 2 = 18 artanh(1/26) - 2 artanh(1/4801) + 8 artanh(1/8749), Gourdon & Sebah. */
const ln2 = 18n * artanhOfInverse(26n) - 2n * artanhOfInverse(4801n) + 8n * artanhOfInverse(8749n);

function arctanOfInverse(n: bigint): bigint {
  return inverseSeries(n, -1n);
}

function artanhOfInverse(n: bigint): bigint {
  return inverseSeries(n, 1n);
}

function inverseSeries(n: bigint, sign: bigint): bigint {
  let power = (1n << BigInt(constantBits + 64)) / n;
  let total = 0n;
  let factor = 1n;
  for (let k = 1n; power !== 0n; k += 2n) {
    total += (factor * power) / k;
    power /= n * n;
    factor *= sign;
  }
  return total >> 64n;
}

/** The largest precision at which the constants are known. */
export const maximumBits = constantBits - 64;

export function piBall(bits: number): Ball {
  return { mid: pi >> BigInt(constantBits - bits), rad: 1n };
}

/** Null for results beyond 2^40000 or a radius above 1. */
export function expBall(a: Ball, bits: number): Ball | null {
  const unit = 1n << BigInt(bits);
  if (a.rad > unit) return null;
  const size = bitLength(a.mid) - bits;
  if (size > 15) return a.mid < 0n ? { mid: 0n, rad: 2n } : null;
  const guard = 24 + Math.max(0, size) * 2;
  const wide = bits + guard;
  const x = a.mid << BigInt(guard);
  const log2 = ln2 >> BigInt(constantBits - wide);
  const k = x / log2;
  const growth = k > 0n ? Number(k) : 0;
  // The reduced argument carries the error of k ln 2; a large result needs as many more bits.
  if (growth > 0) return expOfLarge(a, bits, growth);
  const whole = expReduced(x - k * log2, wide);
  const mid = shiftBy(whole, Number(k) - guard);
  const spread = (magnitude(mid) * a.rad * 2n) >> BigInt(bits);
  return { mid, rad: spread + 4n };
}

function expOfLarge(a: Ball, bits: number, growth: number): Ball | null {
  if (growth > 40_000) return null;
  const wide = bits + growth + 40;
  if (wide > constantBits) return expBySquares(a, bits);
  const x = a.mid << BigInt(wide - bits);
  const log2 = ln2 >> BigInt(constantBits - wide);
  const k = x / log2;
  const whole = expReduced(x - k * log2, wide);
  const mid = shiftBy(whole, Number(k) - (wide - bits));
  return { mid, rad: ((magnitude(mid) * a.rad * 2n) >> BigInt(bits)) + 4n };
}

function expBySquares(a: Ball, bits: number): Ball | null {
  const half = expBall({ mid: a.mid >> 1n, rad: (a.rad >> 1n) + 1n }, bits);
  return half && mulBalls(half, half, bits);
}

/** exp of a number below 1 in size, with an error of less than 2^10 units in the last place. */
function expReduced(x: bigint, bits: number): bigint {
  const halvings = 8 + (bits >> 6);
  const extra = halvings + 8;
  const scale = BigInt(bits + extra);
  chargeSteps(bits, 1.2 * (halvings + bits / (halvings + 4)));
  const small = (x << BigInt(extra)) >> BigInt(halvings);
  let term = small;
  let total = small;
  for (let n = 2n; term !== 0n && term !== -1n; n += 1n) {
    term = ((term * small) >> scale) / n;
    total += term;
  }
  // expm1 doubles without losing the small part: e^2x - 1 = (e^x - 1)^2 + 2 (e^x - 1).
  for (let k = 0; k < halvings; k += 1) total = ((total * total) >> scale) + 2n * total;
  return (total + (1n << scale)) >> BigInt(extra);
}

/** Counts so many steps of a series or of a doubling, of which each has one multiplication. */
function chargeSteps(bits: number, steps: number): void {
  charge(steps * (0.3 + 1.4 * costOfProduct(2 * bits)));
}

function shiftBy(value: bigint, places: number): bigint {
  return places >= 0 ? value << BigInt(places) : value >> BigInt(-places);
}

/** Null where the number may be zero or negative. */
export function lnBall(a: Ball, bits: number): Ball | null {
  if (a.mid - a.rad <= 0n) return null;
  const length = bitLength(a.mid);
  const k = length - bits;
  const wide = bits + 24;
  const mantissa = shiftBy(a.mid, wide - length);
  const guess =
    BigInt(Math.round(Math.log(Number(mantissa >> BigInt(wide - 52)) / 2 ** 52) * 2 ** 52)) << BigInt(wide - 52);
  const exp = expBall({ mid: -guess, rad: 0n }, wide);
  if (exp === null) return null;
  const unit = 1n << BigInt(wide);
  const small = ((mantissa * exp.mid) >> BigInt(wide)) - unit;
  const correction = log1p(small, wide);
  const whole = guess + correction + BigInt(k) * (ln2 >> BigInt(constantBits - wide));
  // a.rad / low bounds the change of ln; 2^-20 units cover the errors of the series and of k ln 2.
  return { mid: whole >> 24n, rad: (a.rad << BigInt(bits)) / (a.mid - a.rad) + 3n };
}

/** ln(1+x) by its series, for a small x. */
function log1p(x: bigint, bits: number): bigint {
  chargeSteps(bits, bits / 25);
  const scale = BigInt(bits);
  let power = x;
  let total = x;
  for (let n = 2n; power !== 0n && power !== -1n; n += 1n) {
    power = -((power * x) >> scale);
    total += power / n;
  }
  return total;
}

export interface SineCosine {
  readonly sin: Ball;
  readonly cos: Ball;
}

/** Null for arguments beyond 2^2000. */
export function sinCosBall(a: Ball, bits: number): SineCosine | null {
  const size = Math.max(0, bitLength(a.mid) - bits);
  const wide = bits + size + 24;
  if (wide > maximumBits || size > 2000) return null;
  if (a.rad >> BigInt(bits) > 0n)
    return { sin: { mid: 0n, rad: 1n << BigInt(bits) }, cos: { mid: 0n, rad: 1n << BigInt(bits) } };
  const half = pi >> BigInt(constantBits - wide + 1);
  const x = a.mid << BigInt(wide - bits);
  if (size > 500) chargeSteps(wide, 4);
  const turns = (2n * x + half) / (2n * half) - (2n * x + half < 0n ? 1n : 0n);
  const reduced = (x - turns * half) >> BigInt(size);
  const { sin, cos } = sinCosReduced(reduced, bits + 24);
  const error = a.rad + 2n;
  const s = { mid: sin >> 24n, rad: error };
  const c = { mid: cos >> 24n, rad: error };
  const quarter = ((turns % 4n) + 4n) % 4n;
  if (quarter === 0n) return { sin: s, cos: c };
  if (quarter === 1n) return { sin: c, cos: negateBall(s) };
  if (quarter === 2n) return { sin: negateBall(s), cos: negateBall(c) };
  return { sin: negateBall(c), cos: s };
}

function sinCosReduced(x: bigint, bits: number): { sin: bigint; cos: bigint } {
  const halvings = 6 + (bits >> 7);
  const extra = halvings + 8;
  const scale = BigInt(bits + extra);
  chargeSteps(bits, 2 * halvings + (1.4 * bits) / (halvings + 4));
  const small = (x << BigInt(extra)) >> BigInt(halvings);
  const square = (small * small) >> scale;
  let sin = small;
  let term = small;
  for (let n = 2n; term !== 0n && term !== -1n; n += 2n) {
    term = -((term * square) >> scale) / (n * (n + 1n));
    sin += term;
  }
  let versine = square >> 1n;
  term = versine;
  for (let n = 3n; term !== 0n && term !== -1n; n += 2n) {
    term = -((term * square) >> scale) / (n * (n + 1n));
    versine += term;
  }
  // sin 2x = 2 sin x (1 - v), 1 - cos 2x = 2 sin^2 x.
  for (let k = 0; k < halvings; k += 1) {
    const doubled = 2n * (sin - ((sin * versine) >> scale));
    versine = (2n * sin * sin) >> scale;
    sin = doubled;
  }
  return { sin: sin >> BigInt(extra), cos: ((1n << scale) - versine) >> BigInt(extra) };
}

export function arctanBall(a: Ball, bits: number): Ball | null {
  const unit = 1n << BigInt(bits);
  if (magnitude(a.mid) > unit && magnitude(a.mid) - a.rad > 0n) {
    const inverse = divBalls({ mid: unit, rad: 0n }, a, bits);
    const inner = inverse && arctanBall(inverse, bits);
    if (inner === null) return null;
    const half = piBall(bits);
    const quarterTurn = { mid: half.mid >> 1n, rad: 2n };
    return subBalls(a.mid > 0n ? quarterTurn : negateBall(quarterTurn), inner);
  }
  const wide = bits + 24;
  const x = { mid: a.mid << 24n, rad: 0n };
  const guess = BigInt(Math.round(Math.atan(ballToNumber(x, wide)) * 2 ** 52)) << BigInt(wide - 52);
  const circle = sinCosBall({ mid: guess, rad: 0n }, wide);
  if (circle === null) return null;
  // arctan x = g + arctan((x cos g - sin g) / (cos g + x sin g))
  const top = subBalls(mulBalls(x, circle.cos, wide), circle.sin);
  const small = divBalls(top, addBalls(circle.cos, mulBalls(x, circle.sin, wide)), wide);
  if (small === null) return null;
  const whole = guess + arctanSeries(small.mid, wide);
  return { mid: whole >> 24n, rad: a.rad + 3n };
}

function arctanSeries(x: bigint, bits: number): bigint {
  chargeSteps(bits, bits / 50);
  const scale = BigInt(bits);
  const square = (x * x) >> scale;
  let power = x;
  let total = x;
  for (let n = 3n; power !== 0n && power !== -1n; n += 2n) {
    power = -((power * square) >> scale);
    total += power / n;
  }
  return total;
}

/** Null unless the number is certainly between -1 and 1. */
export function arcsinBall(a: Ball, bits: number): Ball | null {
  const wide = bits * 2;
  const x = rescale(a, bits, wide);
  const unit = { mid: 1n << BigInt(wide), rad: 0n };
  const root = sqrtBall(subBalls(unit, mulBalls(x, x, wide)), wide);
  const tangent = root && divBalls(x, root, wide);
  const result = tangent && arctanBall(tangent, wide);
  return result && rescale(result, wide, bits);
}
