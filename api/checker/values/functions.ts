import { absBall, addBalls, ballBetween, mulBalls, negateBall, sqrtBall } from '../numbers/ball.ts';
import * as Q from '../numbers/rational.ts';
import {
  addKnown,
  divKnown,
  fromBall,
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
import { arccosOf, arccotOf, arcsinOf, arctanOf, comparedToOne, cosOf, ofInverse, ratioOf, sinOf } from './circular.ts';
import type { Field } from './field.ts';
import type { CallName } from './graph.ts';
import { argOf, expOf, halfSum, logOf } from './logarithms.ts';
import { logToBase, signOf, sqrtOf } from './powers.ts';
import type { KnownValue, Value } from './value.ts';
import { binomialOf, divisorOf, factorialOf, floorOf, signValueOf } from './whole-numbers.ts';

/** The value of a named function; every argument has a value. */
export function callFunction(name: CallName, args: readonly KnownValue[], field: Field): Value {
  const [a, b] = args;
  if (a === undefined) return unknown('not-covered');
  switch (name) {
    case 'log':
      return b === undefined ? unknown('not-covered') : logToBase(a, b, field);
    case 'binomial':
      return b === undefined ? unknown('not-covered') : binomialOf(a, b, field);
    case 'gcd':
    case 'lcm':
      return divisorOf(args, name === 'lcm', field);
    case 'min':
    case 'max':
      return extremeOf(args, name === 'max', field);
    default:
      return b === undefined ? callOne(name, a, field) : unknown('not-covered');
  }
}

type OneArgument = Exclude<CallName, 'log' | 'binomial' | 'gcd' | 'lcm' | 'min' | 'max'>;

function callOne(name: OneArgument, a: KnownValue, field: Field): Value {
  switch (name) {
    case 'sin':
      return sinOf(a, field);
    case 'cos':
      return cosOf(a, field);
    case 'tan':
      return ratioOf(sinOf(a, field), cosOf(a, field), field);
    case 'cot':
      return ratioOf(cosOf(a, field), sinOf(a, field), field);
    case 'sec':
      return ratioOf(oneValue, cosOf(a, field), field);
    case 'csc':
      return ratioOf(oneValue, sinOf(a, field), field);
    case 'arcsin':
      return arcsinOf(a, field);
    case 'arccos':
      return arccosOf(a, field);
    case 'arctan':
      return arctanOf(a, field);
    case 'arccot':
      return arccotOf(a, field);
    case 'arcsec':
      return ofInverse(a, arccosOf, field);
    case 'arccsc':
      return ofInverse(a, arcsinOf, field);
    case 'ln':
      return logOf(a, field);
    case 'exp':
      return expOf(a, field);
    case 'sinh':
      return halfSum(a, -1, field);
    case 'cosh':
      return halfSum(a, 1, field);
    case 'tanh':
      return ratioOf(halfSum(a, -1, field), halfSum(a, 1, field), field);
    case 'coth':
      return ratioOf(halfSum(a, 1, field), halfSum(a, -1, field), field);
    case 'sech':
      return ratioOf(oneValue, halfSum(a, 1, field), field);
    case 'csch':
      return ratioOf(oneValue, halfSum(a, -1, field), field);
    case 'arsinh':
    case 'arcosh':
    case 'artanh':
      return inverseHyperbolic(name, a, field);
    default:
      return callPart(name, a, field);
  }
}

type PartName = Exclude<
  OneArgument,
  | 'sin'
  | 'cos'
  | 'tan'
  | 'cot'
  | 'sec'
  | 'csc'
  | 'arcsin'
  | 'arccos'
  | 'arctan'
  | 'arccot'
  | 'arcsec'
  | 'arccsc'
  | 'ln'
  | 'exp'
  | 'sinh'
  | 'cosh'
  | 'tanh'
  | 'coth'
  | 'sech'
  | 'csch'
  | 'arsinh'
  | 'arcosh'
  | 'artanh'
>;

function callPart(name: PartName, a: KnownValue, field: Field): Value {
  switch (name) {
    case 'abs':
      return absOf(a, field);
    case 'sign':
      return signValueOf(a);
    case 'floor':
    case 'ceil':
      return floorOf(a, name === 'ceil', field);
    case 'factorial':
      return factorialOf(a, field);
    case 're':
      return a.kind === 'gaussian' ? fromRational(a.re) : a.kind === 'ball' ? fromBall(a.re) : a;
    case 'im':
      return imaginaryPart(a);
    case 'conj':
      return conjugate(a);
    case 'arg':
      return argOf(a, field);
  }
}

function imaginaryPart(a: KnownValue): Value {
  if (a.kind === 'gaussian') return fromRational(a.im);
  return a.kind === 'ball' && a.im !== null ? fromBall(a.im) : zeroValue;
}

function conjugate(a: KnownValue): Value {
  if (a.kind === 'gaussian') return { ...a, im: Q.negate(a.im) };
  return a.kind === 'ball' && a.im !== null ? fromBall(a.re, negateBall(a.im)) : a;
}

function absOf(a: KnownValue, field: Field): Value {
  if (a.kind === 'rational' || a.kind === 'pi') return a.value.num < 0n ? negateKnown(a) : a;
  if (a.kind === 'gaussian') return sqrtOf(fromRational(Q.add(Q.mul(a.re, a.re), Q.mul(a.im, a.im))), field);
  if (a.im === null) return fromBall(absBall(a.re));
  const norm = addBalls(mulBalls(a.re, a.re, field.bits), mulBalls(a.im, a.im, field.bits));
  const root = sqrtBall(norm, field.bits);
  return root === null ? unknown('precision') : fromBall(root);
}

function extremeOf(args: readonly KnownValue[], largest: boolean, field: Field): Value {
  let best: KnownValue | null = null;
  for (const arg of args) {
    if (!isReal(arg)) return undefinedValue;
    const order: -1 | 0 | 1 | null = best === null ? 1 : signOf(subKnown(arg, best, field.bits));
    if (order === null && best !== null) {
      const p = toBall(arg, field.bits).re;
      const q = toBall(best, field.bits).re;
      const pick = (x: bigint, y: bigint) => (x > y === largest ? x : y);
      best = fromBall(ballBetween(pick(p.mid - p.rad, q.mid - q.rad), pick(p.mid + p.rad, q.mid + q.rad)));
    } else if (best === null || order === (largest ? 1 : -1)) best = arg;
  }
  return best ?? undefinedValue;
}

/** By their logarithms, DLMF 4.37. */
function inverseHyperbolic(name: 'arsinh' | 'arcosh' | 'artanh', a: KnownValue, field: Field): Value {
  if (isExactZero(a) && name !== 'arcosh') return zeroValue;
  const square = mulKnown(a, a, field.bits);
  if (name === 'artanh') return artanhOf(a, field);
  if (name === 'arsinh') return lnOfSum(a, sqrtOf(addKnown(square, oneValue, field.bits), field), field);
  if (!field.complex) {
    const size = isReal(a) ? comparedToOne(a, field) : null;
    if (a.kind === 'rational' && Q.equals(a.value, Q.one)) return zeroValue;
    if (size === 'within' || (size === 'beyond' && signOf(a) === -1)) return undefinedValue;
    return lnOfSum(a, sqrtOf(subKnown(square, oneValue, field.bits), field), field);
  }
  const plus = sqrtOf(addKnown(a, oneValue, field.bits), field);
  const minus = sqrtOf(subKnown(a, oneValue, field.bits), field);
  if (!isKnown(plus)) return plus;
  return isKnown(minus) ? lnOfSum(a, mulKnown(plus, minus, field.bits), field) : minus;
}

function lnOfSum(a: KnownValue, root: Value, field: Field): Value {
  return isKnown(root) ? logOf(addKnown(a, root, field.bits), field) : root;
}

function artanhOf(a: KnownValue, field: Field): Value {
  const plus = logOf(addKnown(oneValue, a, field.bits), field);
  const minus = logOf(subKnown(oneValue, a, field.bits), field);
  if (!isKnown(plus)) return plus;
  if (!isKnown(minus)) return minus;
  const halved = divKnown(subKnown(plus, minus, field.bits), fromRational(Q.rational(2)), field.bits);
  return halved;
}
