import type { Expr } from '../../../shared/maths/expression.ts';
import type { CheckContext } from '../context.ts';
import { compareExpressions } from '../compare/compare-expressions.ts';
import { judgeLinks } from './expression-step.ts';
import type { StepResult } from './step-result.ts';

/**
 * A running equals sign, `=7+2=9` after `3+4`: a member begins with what stands before it and works on. Null where the
 * line is no such thing.
 */
export function judgeRunningEquals(above: Expr, members: readonly Expr[], context: CheckContext): StepResult | null {
  let from = above;
  let isRunning = false;
  let reached: StepResult['reached'] = 'proved';
  for (const member of members) {
    const link = judgeLinks(from, [member], context);
    if (link.ruling === 'holds') reached = link.reached === 'proved' ? reached : link.reached;
    else if (!beginsWith(member, from, context)) return null;
    else isRunning = true;
    from = member;
  }
  return isRunning ? { ruling: 'holds', reached, notes: ['presentation'], evidence: {} } : null;
}

function beginsWith(member: Expr, value: Expr, context: CheckContext): boolean {
  return beginningsOf(member).some((start) => compareExpressions(value, start, context).kind === 'equal');
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
