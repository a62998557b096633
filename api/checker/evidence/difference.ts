import type { Expr } from '../../../shared/maths/expression.ts';
import { printExpr } from '../../../shared/maths/print.ts';
import { compareExpressions } from '../compare/compare-expressions.ts';
import type { CheckContext } from '../context.ts';
import { suggestForm } from '../suggest/suggest-form.ts';
import { neg, sum } from './build.ts';
import { expanded, sumExpr, type Monomial } from './monomials.ts';

const mostTerms = 6;
const longest = 80;

/**
 * The line above minus this line, multiplied out, as TeX; null where that is long. Quotients that do not multiply out
 * are left to the suggestion of an outside library, which counts only when the checker finds it equal.
 */
export function shortDifference(above: Expr, below: Expr, context: CheckContext): string | null {
  const whole = sum(above, neg(below));
  const terms = expanded(whole);
  const own = terms && isPlain(terms) && terms.length <= mostTerms ? sumExpr(terms) : suggestForm(whole, 'factor');
  if (!own) return null;
  const tex = printExpr(own);
  return tex.length <= longest && compareExpressions(whole, own, context).kind === 'equal' ? tex : null;
}

function isPlain(terms: readonly Monomial[]): boolean {
  return terms.every(({ powers }) => [...powers.values()].every(({ base, exponent }) => exponent > 0 || base.kind !== 'sum'));
}
