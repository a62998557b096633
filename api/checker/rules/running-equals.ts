import type { Expr } from '../../../shared/maths/expression.ts';
import type { CheckContext } from '../context.ts';
import { compareExpressions } from '../compare/compare-expressions.ts';
import { judgeLinks } from './expression-step.ts';
import type { StepResult } from './step-result.ts';

/**
 * A running equals sign, `=7+2=9` after `3+4`: the first member begins with what the line above is worth and works on.
 * Null where the line is no such thing.
 */
export function judgeRunningEquals(above: Expr, members: readonly Expr[], context: CheckContext): StepResult | null {
  const [first, ...rest] = members;
  if (!first || !beginningsOf(first).some((start) => compareExpressions(above, start, context).kind === 'equal'))
    return null;
  if (rest.length === 0) return { ruling: 'holds', reached: 'proved', notes: ['presentation'], evidence: {} };
  const found = judgeLinks(first, rest, context);
  return found.ruling === 'holds' ? { ...found, notes: [...found.notes, 'presentation'] } : null;
}

function beginningsOf(expr: Expr): Expr[] {
  if (expr.kind === 'sum') {
    return expr.terms.slice(0, -1).map((_, k): Expr => ({ ...expr, terms: expr.terms.slice(0, k + 1) }));
  }
  if (expr.kind === 'product') {
    return expr.factors.slice(0, -1).map((_, k): Expr => {
      return { ...expr, factors: expr.factors.slice(0, k + 1), joins: expr.joins.slice(0, k) };
    });
  }
  return expr.kind === 'quotient' ? [expr.numerator] : [];
}
