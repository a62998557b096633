import type { Expr } from '../../../shared/maths/expression.ts';
import { lettersOf } from '../../../shared/maths/letters.ts';
import { mapExpr } from '../../../shared/maths/walk.ts';
import { compareExpressions } from '../compare/compare-expressions.ts';
import type { CheckContext } from '../context.ts';
import { fails, holds, undecided, type StepResult } from '../rules/step-result.ts';
import type { CompareStatement } from '../statements/statement.ts';
import { isZeroExpr, mulExprs, subExprs } from './build.ts';
import { differentiateTimes } from './differentiate.ts';
import { linearIn } from './integrand.ts';
import { rateNamed, type Rate } from './rates.ts';
import { carriedOut } from './reduce.ts';
import { substitute } from './substitute.ts';

/**
 * y = g(x) as the general solution of an equation for derivatives of y: put in, it has to be an identity, and it needs as
 * many constants as the order. Null where the line below is no such solution.
 */
export function judgeSolutionCurve(
  above: CompareStatement,
  below: CompareStatement,
  context: CheckContext,
): StepResult | null {
  const rates = ratesOf(above);
  const [highest] = [...rates].sort((a, b) => b.order - a.order);
  const { left, right } = below;
  if (!highest || left.kind !== 'letter' || left.name !== highest.of || lettersOf(right).includes(highest.of))
    return null;
  if (rates.some(({ of, by }) => of !== highest.of || by !== highest.by) || ratesOf(below).length > 0) return null;
  const put = (expr: Expr): Expr => {
    const solved = mapExpr(carriedOut(expr, context), (node) => {
      const rate = node.kind === 'letter' ? rateNamed(node.name) : null;
      return rate ? differentiateTimes(right, rate.by, rate.order, context, true) : node;
    });
    return substitute(solved, highest.of, right);
  };
  const found = compareExpressions(put(above.left), put(above.right), context);
  if (found.kind === 'different') {
    const { atTex, above: a, below: b } = found.witness;
    return fails('proved', { witness: { at: { ...atTex }, above: a, below: b } });
  }
  if (found.kind !== 'equal') return undecided('not-settled');
  return isGeneral(right, highest, context) ? holds(found.reached) : undecided('not-settled');
}

function ratesOf({ left, right }: CompareStatement): Rate[] {
  return [...lettersOf(left), ...lettersOf(right)].flatMap((name) => rateNamed(name) ?? []);
}

/** One constant for each order, none of which another one could take up: Wronski's determinant is not zero. */
function isGeneral(solution: Expr, { by, order }: Rate, context: CheckContext): boolean {
  const constants = lettersOf(solution).filter((name) => context.calculus?.constants.has(name));
  if (constants.length !== order || order > 2) return false;
  const parts = constants.map((name) => linearIn(solution, name)?.slope);
  const [u, v] = parts;
  if (order === 1) return u !== undefined && !isZeroExpr(u);
  if (!u || !v || constants.some((name) => [u, v].some((part) => lettersOf(part).includes(name)))) return false;
  const [du, dv] = [u, v].map((part) => differentiateTimes(part, by, 1, context, true)) as [Expr, Expr];
  return (
    compareExpressions(mulExprs(u, dv), mulExprs(v, du), context).kind === 'different' && !isZeroExpr(subExprs(u, v))
  );
}
