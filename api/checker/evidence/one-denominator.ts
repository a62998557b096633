import type { Expr } from '../../../shared/maths/expression.ts';
import { sameExpr } from '../../../shared/maths/same.ts';
import { neg, power, product, quotient, sum, whole } from './build.ts';
import { isWholeNumber } from './line-parts.ts';
import { collect, monomialExpr, negated, spread, sumExpr, wholeValue } from './monomials.ts';

/** Fractions added over the product of their denominators, the numerator multiplied out. */
export function overOneDenominator(above: Expr): Expr | null {
  if (above.kind !== 'sum' || above.terms.length > 4) return null;
  const parts = above.terms.map(({ sign, expr }) => {
    const [top, bottom] = expr.kind === 'quotient' ? [expr.numerator, expr.denominator] : [expr, null];
    return { top: sign === 'minus' ? neg(top) : top, bottom };
  });
  const denominators = parts.flatMap(({ bottom }) => (bottom ? [bottom] : []));
  if (denominators.length === 0) return null;
  const tops = parts.map(({ top, bottom }) => {
    const others = denominators.filter((other) => other !== bottom);
    return product(top, ...others);
  });
  const numerator = spread(sum(...tops));
  return numerator && quotient(sum(...collect(numerator).map(monomialExpr)), product(...denominators));
}

/** The same over the least product that has all denominators as factors, told by how they are written. */
export function overCommonDenominator(above: Expr): Expr | null {
  if (above.kind !== 'sum' || above.terms.length > 4) return null;
  const parts = above.terms.map(({ sign, expr }) => {
    const [top, bottom] = expr.kind === 'quotient' ? [expr.numerator, factorsBelow(expr.denominator)] : [expr, []];
    return { top: sign === 'minus' ? neg(top) : top, bottom };
  });
  const common: Expr[] = [];
  for (const { bottom } of parts) common.push(...without(bottom, common));
  if (common.length === 0) return null;
  const numerator = spread(sum(...parts.map(({ top, bottom }) => product(top, ...without(common, bottom)))));
  if (!numerator) return null;
  const terms = collect(numerator);
  const [only] = terms;
  const isNegative = terms.length === 1 && only !== undefined && only.coefficient.num < 0n;
  const found = quotient(sumExpr(isNegative ? terms.map(negated) : terms), joinedPowers(common));
  return isNegative ? neg(found) : found;
}

const mostRepeated = 6;

/** Factors one by one, also those of a power. */
function factorsBelow(expr: Expr): Expr[] {
  if (expr.kind === 'product') return expr.factors.flatMap(factorsBelow);
  const times = expr.kind === 'power' ? wholeValue(expr.exponent) : null;
  if (expr.kind !== 'power' || times === null || times < 1 || times > mostRepeated) return [expr];
  return Array.from({ length: times }, () => expr.base);
}

/** What is left of some factors when others are taken away, each as often as it is there. */
function without(factors: readonly Expr[], taken: readonly Expr[]): Expr[] {
  const left = [...taken];
  return factors.filter((factor) => {
    const place = left.findIndex((other) => sameExpr(other, factor));
    if (place >= 0) left.splice(place, 1);
    return place < 0;
  });
}

function joinedPowers(factors: readonly Expr[]): Expr {
  const numbers = factors.filter(isWholeNumber);
  const number = numbers.reduce((value, one) => value * one.numerator, 1n);
  const others = factors.filter((factor) => !isWholeNumber(factor));
  const different = others.filter((factor, k) => others.findIndex((other) => sameExpr(other, factor)) === k);
  return product(
    whole(number),
    ...different.map((factor) => power(factor, whole(factors.filter((other) => sameExpr(other, factor)).length))),
  );
}
