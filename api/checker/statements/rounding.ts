import type { Expr } from '../../../shared/maths/expression.ts';
import { rational, type Rational } from '../numbers/rational.ts';

/**
 * Half a unit of the last digit that an approximate value was written with: 0.005 for 2.50, 1/2 for 7, 50 for 1400
 * (zeros at the end may be rounded ones). Null where the expression is not one written number.
 */
export function roundingHalf(expr: Expr): Rational | null {
  if (expr.kind === 'sum' && expr.terms.length === 1) return roundingHalf((expr.terms[0] as { expr: Expr }).expr);
  if (expr.kind !== 'number' || (expr.written !== 'integer' && expr.written !== 'decimal')) {
    return expr.kind === 'number' && expr.written === 'percent' ? percentHalf(expr.decimals) : null;
  }
  if (expr.written === 'decimal') return rational(1n, 2n * 10n ** BigInt(expr.decimals));
  let unit = 1n;
  while (expr.numerator !== 0n && expr.numerator % (unit * 10n) === 0n) unit *= 10n;
  return rational(unit, 2n);
}

function percentHalf(decimals: number): Rational {
  return rational(1n, 200n * 10n ** BigInt(decimals));
}
