import type { Expr } from '../../../shared/maths/expression.ts';
import { readLine } from '../../../shared/maths/read.ts';
import { compareExpressions } from '../compare/compare-expressions.ts';
import type { CheckContext } from '../context.ts';
import * as Q from '../numbers/rational.ts';
import { constantFactor } from './antiderivative.ts';
import {
  addExprs,
  callOf,
  divExprs,
  infinityExpr,
  isZeroExpr,
  mulExprs,
  negateExpr,
  numberOf,
  piExpr,
  powExprs,
  rationalExpr,
  sqrtExpr,
} from './build.ts';
import { factorise, isFree, linearIn, polynomialIn, type Factor } from './integrand.ts';
import { infinitySign } from './limit.ts';
import { signOfCoefficient } from './series-ring.ts';
import { substitute } from './substitute.ts';

type IntegralExpr = Extract<Expr, { kind: 'integral' }>;

/** Improper integrals without an elementary antiderivative whose values are known; null for all others. */
export function knownIntegral(node: IntegralExpr, context: CheckContext): Expr | null {
  const { integrand, variable, from, to } = node;
  if (!from || !to) return null;
  const [low, high] = [from, to].map((end) => (isZeroExpr(end) ? 0 : infinitySign(end)));
  if (low !== null && low !== undefined && high !== null && high !== undefined && low < high) {
    const { coef, factors } = factorise(integrand, variable);
    const found =
      bell(factors, variable, low, high, context) ??
      (low === 0 ? gammaIntegral(factors, variable, context) : null) ??
      (high === 1 ? waves(factors, variable, low === 0 ? 1 : 2, context) : null);
    if (found) return mulExprs(coef, found);
  }
  return fromTable(node, context);
}

/** x^n exp(-a x^2 + b x + c), with b = 0 but over the whole line: DLMF 7.7.1, 5.9.1. */
function bell(
  factors: readonly Factor[],
  letter: string,
  low: number,
  high: number,
  context: CheckContext,
): Expr | null {
  const call = factors.find(({ base }) => base.kind === 'call' && base.name === 'exp');
  const power = factors.find(({ base }) => base.kind === 'letter');
  if (call?.base.kind !== 'call' || factors.length > (power ? 2 : 1)) return null;
  const times = power?.times ?? Q.zero;
  const coefs = call.base.args[0] && polynomialIn(call.base.args[0], letter);
  const [constant, linear, square] = coefs ?? [];
  if (coefs?.length !== 3 || !constant || !linear || !square || times.den !== 1n || times.num < 0n || times.num > 40n)
    return null;
  if (times.num % 2n !== 0n && high - low === 2 && isZeroExpr(linear)) return numberOf(0);
  if (times.num % 2n !== 0n || signOfCoefficient(square, context) >= 0) return null;
  const rate = negateExpr(square);
  const isWhole = high - low === 2;
  if (!isZeroExpr(linear) && (!isWhole || times.num > 0n)) return null;
  let moment = Q.one;
  for (let j = 1n; j < times.num; j += 2n) moment = Q.mul(moment, Q.rational(j, 2n));
  const shift = divExprs(mulExprs(linear, linear), mulExprs(numberOf(4), rate));
  return mulExprs(
    numberOf(1, isWhole ? 1 : 2),
    rationalExpr(moment),
    powExprs(rate, rationalExpr(Q.rational(-times.num, 2n))),
    sqrtExpr(divExprs(piExpr, rate)),
    callOf('exp', addExprs(constant, shift)),
  );
}

/** x^(n - 1/2) exp(-a x) from 0 on, by the gamma function: DLMF 5.2.1, 5.4.6. */
function gammaIntegral(factors: readonly Factor[], letter: string, context: CheckContext): Expr | null {
  const call = factors.find(({ base }) => base.kind === 'call' && base.name === 'exp');
  const power = factors.find(({ base }) => base.kind === 'letter');
  if (call?.base.kind !== 'call' || !power || factors.length !== 2 || power.times.den !== 2n) return null;
  const linear = call.base.args[0] ? linearIn(call.base.args[0], letter) : null;
  if (!linear || !isZeroExpr(linear.constant) || power.times.num < -1n || power.times.num > 40n) return null;
  if (signOfCoefficient(linear.slope, context) >= 0) return null;
  let value = Q.one;
  for (let j = 1n; j <= power.times.num; j += 2n) value = Q.mul(value, Q.rational(j, 2n));
  const exponent = rationalExpr(Q.negate(Q.add(power.times, Q.one)));
  return mulExprs(rationalExpr(value), sqrtExpr(piExpr), powExprs(negateExpr(linear.slope), exponent));
}

/** sin(a x)/x, (sin(a x)/x)^2 (DLMF 6.2.14, 3.741.3 of Gradshteyn and Ryzhik), sin(a x^2) and cos(a x^2) (DLMF 7.2.9). */
function waves(factors: readonly Factor[], letter: string, halves: number, context: CheckContext): Expr | null {
  const call = factors.find(({ base }) => base.kind === 'call' && (base.name === 'sin' || base.name === 'cos'));
  const power = factors.find(({ base }) => base.kind === 'letter');
  if (call?.base.kind !== 'call' || !call.base.args[0] || factors.length > (power ? 2 : 1)) return null;
  const coefs = polynomialIn(call.base.args[0], letter);
  const rate = coefs?.[coefs.length - 1];
  if (!coefs || !rate || !coefs.slice(0, -1).every(isZeroExpr)) return null;
  const sign = signOfCoefficient(rate, context);
  const size = sign < 0 ? negateExpr(rate) : rate;
  const side = numberOf(halves, 2);
  const isSine = call.base.name === 'sin';
  if (coefs.length === 2 && isSine && power && Q.equals(power.times, Q.negate(call.times))) {
    if (Q.equals(call.times, Q.one)) return mulExprs(numberOf(sign), side, piExpr);
    return Q.equals(call.times, Q.rational(2)) ? mulExprs(size, side, piExpr) : null;
  }
  if (coefs.length !== 3 || power || !Q.equals(call.times, Q.one)) return null;
  return mulExprs(numberOf(isSine ? sign : 1), side, sqrtExpr(divExprs(piExpr, mulExprs(numberOf(2), size))));
}

/** Integrand in x, ends, value: DLMF 25.5.1, 25.5.3, 25.12.2 and 4.10.7, numbers from memory; the logarithms of sines are Euler's. */
const table: readonly (readonly [string, string, string, string])[] = [
  ['\\frac{x}{e^x-1}', '0', '\\infty', '\\frac{\\pi^2}{6}'],
  ['\\frac{x^3}{e^x-1}', '0', '\\infty', '\\frac{\\pi^4}{15}'],
  ['\\frac{x}{e^x+1}', '0', '\\infty', '\\frac{\\pi^2}{12}'],
  ['\\frac{\\ln x}{1+x^2}', '0', '\\infty', '0'],
  ['\\frac{\\ln x}{1-x}', '0', '1', '-\\frac{\\pi^2}{6}'],
  ['\\frac{\\ln x}{1+x}', '0', '1', '-\\frac{\\pi^2}{12}'],
  ['\\frac{\\ln(1+x)}{x}', '0', '1', '\\frac{\\pi^2}{12}'],
  ['\\frac{\\ln(1-x)}{x}', '0', '1', '-\\frac{\\pi^2}{6}'],
  ['\\frac{1-\\cos x}{x^2}', '0', '\\infty', '\\frac{\\pi}{2}'],
  ['\\ln(\\sin x)', '0', '\\frac{\\pi}{2}', '-\\frac{\\pi}{2}\\ln2'],
  ['\\ln(\\cos x)', '0', '\\frac{\\pi}{2}', '-\\frac{\\pi}{2}\\ln2'],
  ['\\ln(\\sin x)', '0', '\\pi', '-\\pi\\ln2'],
];

function fromTable({ integrand, variable, from, to }: IntegralExpr, context: CheckContext): Expr | null {
  if (!from || !to || !isFree(from, variable) || !isFree(to, variable)) return null;
  for (const [pattern, low, high, value] of table) {
    if (!isEnd(from, low, context) || !isEnd(to, high, context)) continue;
    const known = substitute(written(pattern), 'x', { kind: 'letter', name: variable, span: integrand.span });
    const factor = constantFactor(integrand, known, variable, context);
    if (factor) return mulExprs(factor, written(value));
  }
  return null;
}

function isEnd(end: Expr, tex: string, context: CheckContext): boolean {
  const known = written(tex);
  if (infinitySign(known) !== null || infinitySign(end) !== null) return infinitySign(known) === infinitySign(end);
  return compareExpressions(end, known, context).kind === 'equal';
}

function written(tex: string): Expr {
  const reading = readLine(tex, { numbers: 'real', decimal: 'point', functions: [] });
  return reading.ok && reading.line.kind === 'expression' ? reading.line.expr : infinityExpr;
}
