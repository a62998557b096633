import type { Expr } from '../../../shared/maths/expression.ts';
import { neg, product, quotient, sum } from './build.ts';
import { collect, monomialExpr, spread } from './monomials.ts';

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
