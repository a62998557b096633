import type { Expr, SeriesExpr } from '../../../shared/maths/expression.ts';
import { sameExpr } from '../../../shared/maths/same.ts';
import { compareExpressions } from '../compare/compare-expressions.ts';
import type { CheckContext } from '../context.ts';
import * as Q from '../numbers/rational.ts';
import { reduceFraction, toFraction } from '../solving/fraction.ts';
import { leading } from '../solving/polynomial.ts';
import { isKnown, toBall } from '../values/arithmetic.ts';
import { evaluate, prepare } from '../values/evaluate.ts';
import { ballToNumber } from '../numbers/ball.ts';
import {
  addExprs,
  callOf,
  divExprs,
  infinityExpr,
  isZeroExpr,
  mulExprs,
  negateExpr,
  noValueExpr,
  numberOf,
  oneExpr,
  powExprs,
  rationalExpr,
  subExprs,
  wherever,
  zeroExpr,
} from './build.ts';
import { isIndexed } from './indexed-letters.ts';
import { isFree, polynomialIn, termsIn } from './integrand.ts';
import { infinitySign } from './limit.ts';
import { divergentSum } from './divergent-sums.ts';
import { knownInfiniteProduct, knownInfiniteSum } from './known-sums.ts';
import { substitute } from './substitute.ts';
import { telescoped } from './telescope.ts';

/** A sum in closed form: polynomials, geometric terms, telescoping ones; null where there is none to be proved. */
export function closedSeries(node: SeriesExpr, context: CheckContext): Expr | null {
  const { index, from, to, body } = node;
  if (isIndexed(node)) return null;
  if (node.operation === 'product') return closedProduct(node, context);
  if (isZeroExpr(body) && infinitySign(to) !== null) return zeroExpr;
  const isInfinite = infinitySign(to) === 1;
  if (!isInfinite && infinitySign(to) !== null) return null;
  const known = isInfinite ? divergentFraction(body, index, context) : null;
  if (known) return known;
  const telescope = telescoped(body, index, context);
  if (telescope)
    return isInfinite
      ? telescope.atInfinity && subExprs(telescope.atInfinity, at(telescope.sum, index, from))
      : between(telescope.sum, index, from, to);
  const parts = termsIn(body, index).map((term) => closedTerm(term, node, isInfinite, context));
  if (parts.every((part) => part !== null)) return addExprs(...(parts as Expr[]));
  return isInfinite ? (sumOfKnown(body, index, from, context) ?? divergentSum(body, index, context)) : null;
}

/** By terms, each of which has to converge by itself. */
function sumOfKnown(body: Expr, index: string, from: Expr, context: CheckContext): Expr | null {
  const whole = knownInfiniteSum(body, index, from, context);
  if (whole) return whole;
  const terms = termsIn(body, index);
  if (terms.length < 2) return null;
  const parts = terms.map((term) => closedSeries(seriesOf(term, index, from), context));
  const isFinite = parts.every((part) => part !== null && infinitySign(part) === null && !sameExpr(part, noValueExpr));
  return isFinite ? addExprs(...(parts as Expr[])) : null;
}

function seriesOf(body: Expr, index: string, from: Expr): SeriesExpr {
  return { kind: 'series', operation: 'sum', index, from, to: infinityExpr, body, span: body.span };
}

/** Quotients of polynomials that do not fall faster than 1/k have no finite sum. */
function divergentFraction(body: Expr, index: string, context: CheckContext): Expr | null {
  const fraction = toFraction(prepare(body, context), index);
  if (!fraction) return null;
  const { num, den } = reduceFraction(fraction);
  if (num.length === 0 || num.length + 1 < den.length) return null;
  return leading(num) > 0n === leading(den) > 0n ? infinityExpr : negateExpr(infinityExpr);
}

function at(expr: Expr, index: string, value: Expr): Expr {
  return substitute(expr, index, value);
}

/** G(to + 1) - G(from). */
function between(sum: Expr, index: string, from: Expr, to: Expr): Expr {
  return subExprs(at(sum, index, addExprs(to, oneExpr)), at(sum, index, from));
}

function closedProduct({ index, from, to, body }: SeriesExpr, context: CheckContext): Expr | null {
  if (infinitySign(to) === 1) return knownInfiniteProduct(body, index, from, context);
  if (infinitySign(to) !== null || !isFree(body, index)) return null;
  return powExprs(body, addExprs(to, negateExpr(from), oneExpr));
}

/** A polynomial times r^k, summed as G(k+1) - G(k). */
function closedTerm(
  term: Expr,
  { index, from, to }: SeriesExpr,
  isInfinite: boolean,
  context: CheckContext,
): Expr | null {
  const geometric = splitGeometric(term, index);
  const coefs = geometric && polynomialIn(geometric.rest, index);
  if (!geometric || !coefs || coefs.length > 13) return null;
  const { ratio } = geometric;
  if (ratio === null || isOne(ratio, context)) {
    if (isInfinite) return null;
    return addExprs(
      ...coefs.map((coef, k) => mulExprs(coef, subExprs(powerSum(k, to), powerSum(k, subExprs(from, oneExpr))))),
    );
  }
  const quotient = geometricPart(coefs, ratio);
  const sum = (k: Expr): Expr =>
    mulExprs(
      addExprs(...quotient.map((coef, j) => mulExprs(coef, j === 0 ? oneExpr : powExprs(k, numberOf(j))))),
      powExprs(ratio, k),
    );
  if (!isInfinite) return subExprs(sum(addExprs(to, oneExpr)), sum(from));
  const converges = tendsToZero(ratio, context);
  if (converges === false || converges === null) return null;
  const total = negateExpr(sum(from));
  return converges === 'condition' ? wherever(callOf('ln', subExprs(oneExpr, mulExprs(ratio, ratio))), total) : total;
}

function isOne(ratio: Expr, context: CheckContext): boolean {
  return compareExpressions(ratio, oneExpr, context).kind === 'equal';
}

/** Whether |r| < 1; 'condition' where that depends on letters. */
function tendsToZero(ratio: Expr, context: CheckContext): boolean | 'condition' | null {
  const worth = evaluate(ratio, new Map(), 128, context);
  if (worth.kind === 'rational') return Q.compare(Q.absolute(worth.value), Q.one) < 0;
  if (!isKnown(worth)) return worth.kind === 'unknown' && context.numbers === 'real' ? 'condition' : null;
  const ball = toBall(worth, 128);
  if (ball.im !== null) return null;
  const size = Math.abs(ballToNumber(ball.re, 128));
  return Math.abs(size - 1) < 1e-9 ? null : size < 1;
}

/** Q with r Q(k+1) - Q(k) = P(k): from the highest coefficient down. */
function geometricPart(coefs: readonly Expr[], ratio: Expr): Expr[] {
  const result: Expr[] = coefs.map(() => zeroExpr);
  const bottom = subExprs(ratio, oneExpr);
  for (let m = coefs.length - 1; m >= 0; m -= 1) {
    const higher = result.slice(m + 1).map((coef, k) => mulExprs(numberOf(binomial(m + 1 + k, m)), coef));
    result[m] = divExprs(subExprs(coefs[m] as Expr, mulExprs(ratio, addExprs(...higher))), bottom);
  }
  return result;
}

function binomial(n: number, k: number): bigint {
  let result = 1n;
  for (let j = 1; j <= k; j += 1) result = (result * BigInt(n - j + 1)) / BigInt(j);
  return result;
}

/** 1^m + ... + n^m as a polynomial: (n+1)^(m+1) - 1 is the sum of the binomials times the lower sums. */
export function powerSum(m: number, n: Expr): Expr {
  const coefs = powerSumCoefficients(m);
  return addExprs(
    ...coefs.map((coef, k) => (Q.isZero(coef) ? zeroExpr : mulExprs(rationalExpr(coef), powExprs(n, numberOf(k))))),
  );
}

function powerSumCoefficients(m: number): Q.Rational[] {
  const sums: Q.Rational[][] = [];
  for (let order = 0; order <= m; order += 1) {
    let total = Array.from({ length: order + 2 }, (_, k) => Q.rational(k === 0 ? 0n : binomial(order + 1, k)));
    for (let j = 0; j < order; j += 1) {
      const times = Q.rational(binomial(order + 1, j));
      total = total.map((coef, k) => Q.sub(coef, Q.mul(times, sums[j]?.[k] ?? Q.zero)));
    }
    sums.push(total.map((coef) => Q.div(coef, Q.rational(order + 1))));
  }
  return sums[m] as Q.Rational[];
}

interface Geometric {
  readonly ratio: Expr | null;
  readonly rest: Expr;
}

/** Takes powers with the index in the exponent apart from the rest of a product. */
function splitGeometric(term: Expr, index: string): Geometric | null {
  const ratios: Expr[] = [];
  const rest: Expr[] = [];
  const visit = (node: Expr, times: 1 | -1): boolean => {
    if (node.kind === 'product') return node.factors.every((factor) => visit(factor, times));
    if (node.kind === 'quotient') return visit(node.numerator, times) && visit(node.denominator, times === 1 ? -1 : 1);
    if (node.kind === 'sum' && node.terms.length === 1 && node.terms[0]?.sign === 'minus') {
      rest.push(numberOf(-1));
      return visit(node.terms[0].expr, times);
    }
    const power = powerOf(node);
    if (power && !isFree(power.exponent, index)) {
      const linear = polynomialIn(power.exponent, index);
      if (!isFree(power.base, index) || linear?.length !== 2) return false;
      ratios.push(powExprs(power.base, mulExprs(numberOf(times), linear[1] as Expr)));
      rest.push(powExprs(power.base, mulExprs(numberOf(times), linear[0] as Expr)));
      return true;
    }
    if (times === -1 && !isFree(node, index)) return false;
    rest.push(times === 1 ? node : divExprs(oneExpr, node));
    return true;
  };
  if (!visit(term, 1)) return null;
  return { ratio: ratios.length === 0 ? null : mulExprs(...ratios), rest: mulExprs(...rest) };
}

function powerOf(node: Expr): { base: Expr; exponent: Expr } | null {
  if (node.kind === 'power') return node;
  if (node.kind === 'call' && node.name === 'exp' && node.args[0])
    return { base: { kind: 'constant', name: 'e', span: node.span }, exponent: node.args[0] };
  return null;
}
