import { ballSign, magnitude } from '../numbers/ball.ts';
import { arcsinBall, arctanBall, sinCosBall } from '../numbers/elementary.ts';
import * as Q from '../numbers/rational.ts';
import type { Rational } from '../numbers/rational.ts';
import {
  addKnown,
  divKnown,
  fromBall,
  fromPi,
  fromRational,
  isExactZero,
  isKnown,
  isReal,
  mulKnown,
  negateKnown,
  oneValue,
  subKnown,
  toBall,
  undefinedValue,
  unknown,
  zeroValue,
} from './arithmetic.ts';
import type { Field } from './field.ts';
import { halfSum, imaginaryUnit, logOf } from './logarithms.ts';
import { sqrtOf } from './powers.ts';
import type { KnownValue, Value } from './value.ts';

const half = Q.rational(1, 2);

/** Cosine at the multiples of pi where it is rational (Niven 1956), for 0 <= turn <= 1. */
function exactCosine(turn: Rational): Rational | null {
  const sixths = Q.mul(turn, Q.rational(6));
  if (sixths.den !== 1n) return null;
  switch (sixths.num) {
    case 0n:
      return Q.one;
    case 2n:
      return half;
    case 3n:
      return Q.zero;
    case 4n:
      return Q.negate(half);
    case 6n:
      return Q.minusOne;
    default:
      return null;
  }
}

/** Into [0, 1] by period 2 and evenness. */
function foldTurn(turn: Rational): Rational {
  const two = Q.rational(2);
  const rest = Q.sub(turn, Q.mul(two, { num: Q.floor(Q.div(turn, two)), den: 1n }));
  return Q.compare(rest, Q.one) > 0 ? Q.sub(two, rest) : rest;
}

export function cosOf(a: KnownValue, field: Field): Value {
  if (isExactZero(a)) return oneValue;
  if (a.kind === 'pi') {
    const turn = foldTurn(a.value);
    const exact = exactCosine(turn);
    if (exact !== null) return fromRational(exact);
    const circle = sinCosBall(toBall(fromPi(turn), field.bits).re, field.bits);
    return circle === null ? unknown('limit') : fromBall(circle.cos);
  }
  if (!isReal(a)) return halfSum(mulKnown(a, imaginaryUnit, field.bits), 1, field);
  const circle = sinCosBall(toBall(a, field.bits).re, field.bits);
  return circle === null ? unknown('limit') : fromBall(circle.cos);
}

export function sinOf(a: KnownValue, field: Field): Value {
  if (isExactZero(a)) return zeroValue;
  // sin t = cos(t - pi/2)
  if (a.kind === 'pi') return cosOf(fromPi(Q.sub(a.value, half)), field);
  if (!isReal(a)) {
    const turned = halfSum(mulKnown(a, imaginaryUnit, field.bits), -1, field);
    return isKnown(turned) ? mulKnown(turned, negateKnown(imaginaryUnit), field.bits) : turned;
  }
  const circle = sinCosBall(toBall(a, field.bits).re, field.bits);
  return circle === null ? unknown('limit') : fromBall(circle.sin);
}

/** top/bottom of two functions of one argument. */
export function ratioOf(top: Value, bottom: Value, field: Field): Value {
  if (!isKnown(top)) return top;
  return isKnown(bottom) ? divKnown(top, bottom, field.bits) : bottom;
}

const exactArcsines: readonly (readonly [Rational, Rational])[] = [
  [Q.zero, Q.zero],
  [half, Q.rational(1, 6)],
  [Q.one, half],
  [Q.negate(half), Q.rational(-1, 6)],
  [Q.minusOne, Q.negate(half)],
];

/** Principal value in [-pi/2, pi/2]; over the complex numbers -i ln(iz + sqrt(1-z^2)), DLMF 4.23.19. */
export function arcsinOf(a: KnownValue, field: Field): Value {
  if (a.kind === 'rational') {
    const exact = exactArcsines.find(([sine]) => Q.equals(sine, a.value));
    if (exact !== undefined) return fromPi(exact[1]);
  }
  const size = isReal(a) ? comparedToOne(a, field) : 'beyond';
  if (size === null) return unknown('precision');
  if (size === 'within') {
    const ball = arcsinBall(toBall(a, field.bits).re, field.bits);
    return ball === null ? unknown('precision') : fromBall(ball);
  }
  if (!field.complex && isReal(a)) return undefinedValue;
  const root = sqrtOf(subKnown(oneValue, mulKnown(a, a, field.bits), field.bits), field);
  if (!isKnown(root)) return root;
  const log = logOf(addKnown(mulKnown(imaginaryUnit, a, field.bits), root, field.bits), field);
  return isKnown(log) ? mulKnown(negateKnown(imaginaryUnit), log, field.bits) : log;
}

/** Whether |a| is certainly below or above 1. */
export function comparedToOne(a: KnownValue, field: Field): 'within' | 'beyond' | null {
  if (a.kind === 'rational') return Q.compare(Q.absolute(a.value), Q.one) < 0 ? 'within' : 'beyond';
  const ball = toBall(a, field.bits).re;
  const unit = 1n << BigInt(field.bits);
  if (magnitude(ball.mid) + ball.rad < unit) return 'within';
  return magnitude(ball.mid) - ball.rad > unit ? 'beyond' : null;
}

export function arccosOf(a: KnownValue, field: Field): Value {
  const arcsin = arcsinOf(a, field);
  return isKnown(arcsin) ? subKnown(fromPi(half), arcsin, field.bits) : arcsin;
}

export function arctanOf(a: KnownValue, field: Field): Value {
  if (isExactZero(a)) return zeroValue;
  if (a.kind === 'rational' && Q.equals(Q.absolute(a.value), Q.one)) return fromPi(Q.rational(Q.sign(a.value), 4));
  if (isReal(a)) {
    const ball = arctanBall(toBall(a, field.bits).re, field.bits);
    return ball === null ? unknown('precision') : fromBall(ball);
  }
  // (i/2) (ln(1-iz) - ln(1+iz)), DLMF 4.23.26
  const turned = mulKnown(imaginaryUnit, a, field.bits);
  const minus = logOf(subKnown(oneValue, turned, field.bits), field);
  const plus = logOf(addKnown(oneValue, turned, field.bits), field);
  if (!isKnown(minus)) return minus;
  if (!isKnown(plus)) return plus;
  return mulKnown({ kind: 'gaussian', re: Q.zero, im: half }, subKnown(minus, plus, field.bits), field.bits);
}

/** Positive arguments only: for negative ones two ranges are in use, (-pi/2, 0) and (pi/2, pi). */
export function arccotOf(a: KnownValue, field: Field): Value {
  if (isExactZero(a)) return fromPi(half);
  const positive = isReal(a)
    ? a.kind === 'ball'
      ? ballSign(a.re)
      : Q.sign(a.kind === 'gaussian' ? Q.zero : a.value)
    : -1;
  if (positive === 0) return unknown('precision');
  if (positive < 0) return unknown('no-agreed-meaning');
  const arctan = arctanOf(a, field);
  return isKnown(arctan) ? subKnown(fromPi(half), arctan, field.bits) : arctan;
}

/** arccsc and arcsec by the inverse argument, DLMF 4.23.7 and 4.23.8. */
export function ofInverse(a: KnownValue, of: (inverse: KnownValue, field: Field) => Value, field: Field): Value {
  const inverse = divKnown(oneValue, a, field.bits);
  return isKnown(inverse) ? of(inverse, field) : inverse;
}
