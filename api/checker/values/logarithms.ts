import { addBalls, ballBetween, ballSign, mulBalls, negateBall } from '../numbers/ball.ts';
import type { Ball } from '../numbers/ball.ts';
import { arctanBall, expBall, lnBall, piBall, sinCosBall } from '../numbers/elementary.ts';
import { divBalls } from '../numbers/ball.ts';
import {
  addKnown,
  fromBall,
  fromPi,
  isExactZero,
  isKnown,
  mulKnown,
  oneValue,
  toBall,
  undefinedValue,
  unknown,
  zeroValue,
} from './arithmetic.ts';
import * as Q from '../numbers/rational.ts';
import type { Field } from './field.ts';
import type { BallValue, KnownValue, Value } from './value.ts';

export const imaginaryUnit: KnownValue = { kind: 'gaussian', re: Q.zero, im: Q.one };

export function expOf(a: KnownValue, field: Field): Value {
  if (isExactZero(a)) return oneValue;
  const ball = toBall(a, field.bits);
  const size = expBall(ball.re, field.bits);
  if (size === null) return unknown(ball.re.rad > 1n << BigInt(field.bits) ? 'precision' : 'limit');
  if (ball.im === null) return fromBall(size);
  const circle = sinCosBall(ball.im, field.bits);
  if (circle === null) return unknown('limit');
  return fromBall(mulBalls(size, circle.cos, field.bits), mulBalls(size, circle.sin, field.bits));
}

/** The principal logarithm over the complex numbers; over the reals only positive numbers have one. */
export function logOf(a: KnownValue, field: Field): Value {
  if (isExactZero(a)) return undefinedValue;
  if (a.kind === 'rational' && Q.equals(a.value, Q.one)) return zeroValue;
  const ball = toBall(a, field.bits);
  if (ball.im !== null) return complexLog(ball, field);
  const known = ballSign(ball.re);
  if (known === 0) return unknown('precision');
  if (known > 0) return fromReal(lnBall(ball.re, field.bits));
  if (!field.complex) return undefinedValue;
  const size = lnBall(negateBall(ball.re), field.bits);
  return size === null ? unknown('precision') : fromBall(size, piBall(field.bits));
}

function fromReal(ball: Ball | null): Value {
  return ball === null ? unknown('precision') : fromBall(ball);
}

function complexLog(a: BallValue, field: Field): Value {
  const angle = argumentBall(a, field.bits);
  if (angle === null || a.im === null) return unknown('precision');
  const norm = addBalls(mulBalls(a.re, a.re, field.bits), mulBalls(a.im, a.im, field.bits));
  const size = lnBall(norm, field.bits);
  if (size === null) return unknown('precision');
  return fromBall({ mid: size.mid >> 1n, rad: (size.rad >> 1n) + 1n }, angle);
}

/** The angle from the positive real axis in (-pi, pi]; null where the ball touches the cut. */
function argumentBall(a: BallValue, bits: number): Ball | null {
  if (a.im === null) return null;
  const up = ballSign(a.im);
  const right = ballSign(a.re);
  if (right > 0) {
    const slope = divBalls(a.im, a.re, bits);
    return slope && arctanBall(slope, bits);
  }
  if (up === 0) return null;
  const slope = divBalls(a.re, a.im, bits);
  const turned = slope && arctanBall(slope, bits);
  if (turned === null) return null;
  const half = piBall(bits);
  const quarter = ballBetween((half.mid >> 1n) - 1n, (half.mid >> 1n) + 1n);
  return addBalls(up > 0 ? quarter : negateBall(quarter), negateBall(turned));
}

export function argOf(a: KnownValue, field: Field): Value {
  if (isExactZero(a)) return undefinedValue;
  if (a.kind === 'gaussian') {
    const special = specialAngle(a.re, a.im);
    if (special !== null) return fromPi(special);
  }
  const ball = toBall(a, field.bits);
  if (ball.im !== null) {
    const angle = argumentBall(ball, field.bits);
    return angle === null ? unknown('precision') : fromBall(angle);
  }
  const known = ballSign(ball.re);
  if (known === 0) return unknown('precision');
  return known > 0 ? zeroValue : fromPi(Q.one);
}

/** The multiple of pi for directions along the axes and diagonals. */
function specialAngle(re: Q.Rational, im: Q.Rational): Q.Rational | null {
  const up = im.num > 0n ? 1 : -1;
  if (re.num === 0n) return Q.rational(up, 2);
  if (!Q.equals(Q.absolute(re), Q.absolute(im))) return null;
  return Q.rational(re.num > 0n ? up : 3 * up, 4);
}

/** (e^a + s e^-a) / 2 for s = 1 or -1. */
export function halfSum(a: KnownValue, s: 1 | -1, field: Field): Value {
  if (isExactZero(a)) return s === 1 ? oneValue : zeroValue;
  const up = expOf(a, field);
  const down = expOf(mulKnown(a, { kind: 'rational', value: Q.minusOne }, field.bits), field);
  if (!isKnown(up)) return up;
  if (!isKnown(down)) return down;
  const signed = mulKnown(down, { kind: 'rational', value: Q.rational(s) }, field.bits);
  return mulKnown(addKnown(up, signed, field.bits), { kind: 'rational', value: Q.rational(1, 2) }, field.bits);
}
