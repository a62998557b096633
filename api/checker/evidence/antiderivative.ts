import type { Expr } from '../../../shared/maths/expression.ts';
import { compareExpressions } from '../compare/compare-expressions.ts';
import type { CheckContext } from '../context.ts';
import { suggestAntiderivative } from '../suggest/suggest-form.ts';
import { derive, integrate } from './derive.ts';

/** An antiderivative by the table, else one that was suggested from outside and whose derivative is the integrand. */
export function antiderivative(integrand: Expr, by: string, context: CheckContext): Expr | null {
  const found = integrate(integrand, by);
  if (found) return found;
  const guess = suggestAntiderivative(integrand, by);
  const derived = guess && derive(guess, by);
  return derived && compareExpressions(derived, integrand, context).kind === 'equal' ? guess : null;
}
