import {
  addBalls,
  ballFromRational,
  ballSign,
  divBalls,
  mulBalls,
  negateBall,
  powBall,
  subBalls,
} from '../numbers/ball.ts';
import type { Ball } from '../numbers/ball.ts';
import { piBall } from '../numbers/elementary.ts';
import * as Q from '../numbers/rational.ts';
import type { Rational } from '../numbers/rational.ts';
import type { BallValue, GaussianValue, KnownValue, UnknownValue, Value } from './value.ts';

/** Sums, products, quotients and whole powers: exact where both are exact, else balls of `bits` bits. */

const exactBits = 20_000;
const fractionBits = 800;
const largestPowerBits = 120_000;

export const undefinedValue: Value = { kind: 'undefined' };
export const zeroValue: KnownValue = { kind: 'rational', value: Q.zero };
export const oneValue: KnownValue = { kind: 'rational', value: Q.one };

export function unknown(reason: UnknownValue['reason']): UnknownValue {
  return { kind: 'unknown', reason };
}

export function fromRational(value: Rational): KnownValue {
  return { kind: 'rational', value };
}

export function fromPi(value: Rational): KnownValue {
  return Q.isZero(value) ? zeroValue : { kind: 'pi', value };
}

export function fromParts(re: Rational, im: Rational): KnownValue {
  return Q.isZero(im) ? fromRational(re) : { kind: 'gaussian', re, im };
}

export function fromBall(re: Ball, im: Ball | null = null): BallValue {
  return { kind: 'ball', re, im };
}

export function isKnown(value: Value): value is KnownValue {
  return value.kind !== 'undefined' && value.kind !== 'unknown';
}

export function isExactZero(value: Value): boolean {
  return value.kind === 'rational' && value.value.num === 0n;
}

/** Undefined wins over unknown: a part without a value leaves the whole without one. */
export function firstMissing(a: Value, b: Value): Value {
  if (a.kind === 'undefined') return a;
  if (b.kind === 'undefined') return b;
  return isKnown(a) ? b : a;
}

export function toBall(value: KnownValue, bits: number): BallValue {
  switch (value.kind) {
    case 'rational':
      return fromBall(ballFromRational(value.value, bits));
    case 'pi':
      return fromBall(mulBalls(ballFromRational(value.value, bits), piBall(bits), bits));
    case 'gaussian':
      return fromBall(ballFromRational(value.re, bits), ballFromRational(value.im, bits));
    case 'ball':
      return value;
  }
}

export function isReal(value: KnownValue): boolean {
  return value.kind === 'ball' ? value.im === null : value.kind !== 'gaussian';
}

function parts(value: KnownValue): { re: Rational; im: Rational } | null {
  if (value.kind === 'rational') return { re: value.value, im: Q.zero };
  return value.kind === 'gaussian' ? value : null;
}

/** Long fractions cost more than they tell; whole numbers may be longer. */
function isLarge(value: Rational): boolean {
  const size = Q.bitLength(value.num);
  return value.den === 1n ? size > exactBits : size > fractionBits || Q.bitLength(value.den) > fractionBits;
}

function bounded(value: Rational, bits: number): KnownValue {
  // The check costs more than small arithmetic, so it looks at the size only where it may matter.
  if (value.num < 1n << 64n && value.num > -(1n << 64n) && value.den < 1n << 64n) return fromRational(value);
  return isLarge(value) ? fromBall(ballFromRational(value, bits)) : fromRational(value);
}

export function addKnown(a: KnownValue, b: KnownValue, bits: number): KnownValue {
  if (a.kind === 'rational' && b.kind === 'rational') return bounded(Q.add(a.value, b.value), bits);
  if (a.kind === 'pi' && b.kind === 'pi') return fromPi(Q.add(a.value, b.value));
  if (isExactZero(a)) return b;
  if (isExactZero(b)) return a;
  const x = parts(a);
  const y = parts(b);
  if (x !== null && y !== null) return fromParts(Q.add(x.re, y.re), Q.add(x.im, y.im));
  const p = toBall(a, bits);
  const q = toBall(b, bits);
  const im = p.im === null ? q.im : q.im === null ? p.im : addBalls(p.im, q.im);
  return fromBall(addBalls(p.re, q.re), im);
}

export function negateKnown(a: KnownValue): KnownValue {
  switch (a.kind) {
    case 'rational':
    case 'pi':
      return { kind: a.kind, value: Q.negate(a.value) };
    case 'gaussian':
      return { kind: 'gaussian', re: Q.negate(a.re), im: Q.negate(a.im) };
    case 'ball':
      return fromBall(negateBall(a.re), a.im && negateBall(a.im));
  }
}

export function subKnown(a: KnownValue, b: KnownValue, bits: number): KnownValue {
  return addKnown(a, negateKnown(b), bits);
}

export function mulKnown(a: KnownValue, b: KnownValue, bits: number): KnownValue {
  if (a.kind === 'rational' && b.kind === 'rational') return bounded(Q.mul(a.value, b.value), bits);
  if (isExactZero(a) || isExactZero(b)) return zeroValue;
  if (a.kind === 'rational' && b.kind === 'pi') return fromPi(Q.mul(a.value, b.value));
  if (a.kind === 'pi' && b.kind === 'rational') return fromPi(Q.mul(a.value, b.value));
  const x = parts(a);
  const y = parts(b);
  if (x !== null && y !== null) {
    return fromParts(Q.sub(Q.mul(x.re, y.re), Q.mul(x.im, y.im)), Q.add(Q.mul(x.re, y.im), Q.mul(x.im, y.re)));
  }
  return mulComplex(toBall(a, bits), toBall(b, bits), bits);
}

function mulComplex(p: BallValue, q: BallValue, bits: number): BallValue {
  if (p.im === null && q.im === null) return fromBall(mulBalls(p.re, q.re, bits));
  if (p.im === null) return fromBall(mulBalls(p.re, q.re, bits), q.im && mulBalls(p.re, q.im, bits));
  if (q.im === null) return fromBall(mulBalls(p.re, q.re, bits), mulBalls(p.im, q.re, bits));
  return fromBall(
    subBalls(mulBalls(p.re, q.re, bits), mulBalls(p.im, q.im, bits)),
    addBalls(mulBalls(p.re, q.im, bits), mulBalls(p.im, q.re, bits)),
  );
}

export function divKnown(a: KnownValue, b: KnownValue, bits: number): Value {
  if (isExactZero(b)) return undefinedValue;
  if (b.kind === 'rational') return mulKnown(a, fromRational(Q.rational(b.value.den, b.value.num)), bits);
  if (a.kind === 'pi' && b.kind === 'pi') return fromRational(Q.div(a.value, b.value));
  if (b.kind === 'gaussian') {
    const norm = Q.add(Q.mul(b.re, b.re), Q.mul(b.im, b.im));
    return mulKnown(a, fromParts(Q.div(b.re, norm), Q.negate(Q.div(b.im, norm))), bits);
  }
  if (isExactZero(a)) return isNonZero(toBall(b, bits)) ? zeroValue : unknown('precision');
  return divComplex(toBall(a, bits), toBall(b, bits), bits);
}

export function isNonZero(value: BallValue): boolean {
  return ballSign(value.re) !== 0 || (value.im !== null && ballSign(value.im) !== 0);
}

function divComplex(p: BallValue, q: BallValue, bits: number): Value {
  if (q.im === null) {
    const re = divBalls(p.re, q.re, bits);
    const im = p.im && divBalls(p.im, q.re, bits);
    return re === null || (p.im !== null && im === null) ? unknown('precision') : fromBall(re, im);
  }
  const norm = addBalls(mulBalls(q.re, q.re, bits), mulBalls(q.im, q.im, bits));
  const top = mulComplex(p, fromBall(q.re, negateBall(q.im)), bits);
  const re = divBalls(top.re, norm, bits);
  const im = divBalls(top.im ?? { mid: 0n, rad: 0n }, norm, bits);
  return re === null || im === null ? unknown('precision') : fromBall(re, im);
}

/** The exponent 0 has no agreed meaning for a base of zero. */
export function powKnown(a: KnownValue, exponent: number, bits: number): Value {
  if (exponent === 0) {
    if (isExactZero(a)) return unknown('no-agreed-meaning');
    return a.kind !== 'ball' || isNonZero(a) ? oneValue : unknown('precision');
  }
  if (isExactZero(a)) return exponent > 0 ? zeroValue : undefinedValue;
  if (a.kind === 'rational') {
    const size = Q.bitLength(a.value.num) + Q.bitLength(a.value.den);
    if (size * Math.abs(exponent) <= exactBits || size === 2) return fromRational(Q.pow(a.value, exponent));
  }
  if (a.kind === 'gaussian' && (isUnit(a) || gaussianBits(a) * Math.abs(exponent) <= exactBits))
    return powBySquares(a, exponent, bits);
  const ball = toBall(a, bits);
  // A number beyond that is of no use to anybody and costs much to hold.
  const size = Math.max(Q.bitLength(ball.re.mid), ball.im ? Q.bitLength(ball.im.mid) : 0) - bits;
  if (Math.abs(size * exponent) > largestPowerBits) return unknown('limit');
  if (ball.im !== null) return powBySquares(ball, exponent, bits);
  const result = powBall(ball.re, exponent, bits);
  return result === null ? unknown('precision') : fromBall(result);
}

/** i or -i, whose powers stay small. */
function isUnit({ re, im }: GaussianValue): boolean {
  return Q.isZero(re) && im.den === 1n && (im.num === 1n || im.num === -1n);
}

function gaussianBits({ re, im }: GaussianValue): number {
  return Q.bitLength(re.num) + Q.bitLength(re.den) + Q.bitLength(im.num) + Q.bitLength(im.den);
}

function powBySquares(a: KnownValue, exponent: number, bits: number): Value {
  let result: KnownValue = oneValue;
  let square = a;
  for (let rest = Math.abs(exponent); rest > 0; rest = Math.floor(rest / 2)) {
    if (rest % 2 === 1) result = mulKnown(result, square, bits);
    if (rest > 1) square = mulKnown(square, square, bits);
  }
  return exponent < 0 ? divKnown(oneValue, result, bits) : result;
}
