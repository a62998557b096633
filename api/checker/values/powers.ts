import { ballSign, rootBall } from '../numbers/ball.ts';
import * as Q from '../numbers/rational.ts';
import {
  divKnown,
  fromBall,
  fromRational,
  isExactZero,
  isKnown,
  isReal,
  mulKnown,
  negateKnown,
  oneValue,
  powKnown,
  toBall,
  undefinedValue,
  unknown,
  zeroValue,
} from './arithmetic.ts';
import type { Field } from './field.ts';
import { expOf, logOf } from './logarithms.ts';
import type { KnownValue, Value } from './value.ts';

/** -1, 0 or 1 of a real number, null where the bits do not tell. */
export function signOf(value: KnownValue): -1 | 0 | 1 | null {
  if (value.kind === 'rational' || value.kind === 'pi') return Q.sign(value.value);
  if (value.kind === 'gaussian' || value.im !== null) return null;
  return ballSign(value.re) || null;
}

/**
 * The power times/degree: over the reals an odd root of a negative number is negative (rule 13); over the complex
 * numbers the principal branch.
 */
export function rootOf(a: KnownValue, degree: number, times: number, positive: boolean, field: Field): Value {
  if (isExactZero(a)) return times > 0 && !positive ? zeroValue : undefinedValue;
  if (!isReal(a)) return powerByLogarithm(a, fromRational(Q.rational(times, degree)), field);
  const known = signOf(a);
  if (known === null) return unknown('precision');
  if (known < 0) {
    if (field.complex) return powerByLogarithm(a, fromRational(Q.rational(times, degree)), field);
    if (degree % 2 === 0 || positive) return undefinedValue;
    const root = rootOf(negateKnown(a), degree, times, positive, field);
    return isKnown(root) && times % 2 !== 0 ? negateKnown(root) : root;
  }
  const root = positiveRoot(a, degree, field);
  return isKnown(root) ? powKnown(root, times, field.bits) : root;
}

function positiveRoot(a: KnownValue, degree: number, field: Field): Value {
  if (a.kind === 'rational') {
    const exact = Q.exactRoot(a.value, degree);
    if (exact !== null) return fromRational(exact);
  }
  if (degree > 40) {
    const log = logOf(a, field);
    return isKnown(log) ? expOf(mulKnown(log, fromRational(Q.rational(1, degree)), field.bits), field) : log;
  }
  const root = rootBall(toBall(a, field.bits).re, degree, field.bits);
  return root === null ? unknown('precision') : fromBall(root);
}

/** exp(b ln a), principal over the complex numbers. */
function powerByLogarithm(a: KnownValue, b: KnownValue, field: Field): Value {
  if (b.kind === 'rational' && b.value.num === 1n && b.value.den === 2n) return principalSquareRoot(a, field);
  const log = logOf(a, field);
  return isKnown(log) ? expOf(mulKnown(b, log, field.bits), field) : log;
}

function principalSquareRoot(a: KnownValue, field: Field): Value {
  if (isReal(a)) {
    const root = positiveRoot(negateKnown(a), 2, field);
    return isKnown(root) ? mulKnown(root, { kind: 'gaussian', re: Q.zero, im: Q.one }, field.bits) : root;
  }
  if (a.kind === 'gaussian') {
    const norm = Q.exactRoot(Q.add(Q.mul(a.re, a.re), Q.mul(a.im, a.im)), 2);
    const re = norm && Q.exactRoot(Q.mul(Q.add(norm, a.re), Q.rational(1, 2)), 2);
    const im = norm && Q.exactRoot(Q.mul(Q.sub(norm, a.re), Q.rational(1, 2)), 2);
    if (re !== null && im !== null) return { kind: 'gaussian', re, im: a.im.num < 0n ? Q.negate(im) : im };
  }
  const log = logOf(a, field);
  return isKnown(log) ? expOf(mulKnown(log, fromRational(Q.rational(1, 2)), field.bits), field) : log;
}

/** A power with an exponent that may vary: a negative base has one at whole exponents only, if at all. */
export function powOf(a: KnownValue, b: KnownValue, positive: boolean, field: Field): Value {
  if (positive && isReal(a) && signOf(a) !== 1) return signOf(a) === null ? unknown('precision') : undefinedValue;
  if (b.kind === 'rational' && Q.isWhole(b.value)) return wholePower(a, b.value.num, field);
  if (isExactZero(a)) return zeroToPower(b);
  if (!isReal(a) || !isReal(b)) {
    return a.kind === 'ball' && ballSign(a.re) === 0 && (a.im === null || ballSign(a.im) === 0)
      ? unknown('precision')
      : powerByLogarithm(a, b, field);
  }
  const known = signOf(a);
  if (known === null) return unknown('precision');
  if (known > 0) {
    if (b.kind === 'rational' && b.value.den <= 12n && Q.absolute(b.value).num < 200n) {
      return rootOf(a, Number(b.value.den), Number(b.value.num), false, field);
    }
    return powerByLogarithm(a, b, field);
  }
  if (field.complex) return powerByLogarithm(a, b, field);
  return b.kind === 'ball' && mayBeWhole(b, field) ? unknown('precision') : undefinedValue;
}

function mayBeWhole(b: KnownValue, field: Field): boolean {
  const ball = toBall(b, field.bits).re;
  const scale = BigInt(field.bits);
  return (ball.mid + ball.rad) >> scale !== (ball.mid - ball.rad - 1n) >> scale;
}

function zeroToPower(b: KnownValue): Value {
  const known = isReal(b) ? signOf(b) : null;
  if (known === null) return unknown(isReal(b) ? 'precision' : 'no-agreed-meaning');
  return known > 0 ? zeroValue : undefinedValue;
}

function wholePower(a: KnownValue, exponent: bigint, field: Field): Value {
  if (exponent > 1_000_000n || exponent < -1_000_000n) {
    if (
      a.kind === 'rational' &&
      Q.isWhole(Q.absolute(a.value)) &&
      Q.absolute(a.value).num <= 1n &&
      !Q.isZero(a.value)
    ) {
      return exponent % 2n === 0n ? oneValue : a;
    }
    return unknown('limit');
  }
  return powKnown(a, Number(exponent), field.bits);
}

export function sqrtOf(a: KnownValue, field: Field): Value {
  return rootOf(a, 2, 1, false, field);
}

/** log of a to a base, exact where both are powers of one fraction. */
export function logToBase(base: KnownValue, a: KnownValue, field: Field): Value {
  if (base.kind === 'rational' && a.kind === 'rational') {
    const exact = exactLog(base.value, a.value);
    if (exact !== null) return fromRational(exact);
  }
  const top = logOf(a, field);
  const bottom = logOf(base, field);
  if (bottom.kind === 'undefined') return bottom;
  if (!isKnown(top)) return top;
  return isKnown(bottom) ? divKnown(top, bottom, field.bits) : bottom;
}

function exactLog(base: Q.Rational, a: Q.Rational): Q.Rational | null {
  if (base.num <= 0n || a.num <= 0n || Q.equals(base, Q.one)) return null;
  const guess = Math.log(Q.toNumber(a)) / Math.log(Q.toNumber(base));
  for (let den = 1; den <= 6; den += 1) {
    const num = Math.round(guess * den);
    if (Math.abs(guess * den - num) > 1e-9 || Math.abs(num) > 500) continue;
    if (Q.equals(Q.pow(a, den), Q.pow(base, num))) return Q.rational(num, den);
  }
  return null;
}
