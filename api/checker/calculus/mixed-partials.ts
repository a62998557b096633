import type { Expr } from '../../../shared/maths/expression.ts';
import { childrenOf, mapExpr } from '../../../shared/maths/walk.ts';
import { compareExpressions } from '../compare/compare-expressions.ts';
import type { CheckContext } from '../context.ts';
import type { StatementQuestion } from '../rules/statement-question.ts';
import { fails, holds, undecided, type StepResult } from '../rules/step-result.ts';
import { exprsOfStatement, type Statement } from '../statements/statement.ts';
import { differentiateTimes } from './differentiate.ts';
import { isFree } from './integrand.ts';
import { rateNamed } from './rates.ts';
import { carriedOut } from './reduce.ts';
import { withDefinition } from './substitution-line.ts';

/**
 * An equation with partial derivatives by several letters, of a letter that an earlier line says to be an expression: both
 * sides are worked out and compared. Null for all other steps.
 */
export function judgeMixedPartials({ above, below, known, context }: StatementQuestion): StepResult | null {
  if (below.kind !== 'compare' || below.sign !== '=' || !exprsOfStatement(below).some(hasMixed)) return null;
  let { definitions } = context;
  for (const statement of [...known, above])
    for (const [name, value] of valuesIn(statement)) definitions = withDefinition(definitions, name, value);
  const within = { ...context, definitions };
  const [left, right] = [workedOut(below.left, within), workedOut(below.right, within)];
  const found = compareExpressions(left, right, within);
  if (found.kind === 'equal') return holds(found.reached);
  if (found.kind !== 'different') return undecided('not-covered');
  const { atTex, above: worthLeft, below: worthRight } = found.witness;
  return fails('proved', { witness: { at: { ...atTex }, above: worthLeft, below: worthRight } });
}

function hasMixed(expr: Expr): boolean {
  if (expr.kind === 'derivative' && expr.partial && (expr.operand.kind === 'derivative' || isRate(expr.operand)))
    return true;
  return childrenOf(expr).some(hasMixed);
}

function isRate(expr: Expr): boolean {
  return expr.kind === 'letter' && rateNamed(expr.name) !== null;
}

/** Letters that stand alone before an expression without them. */
function valuesIn(statement: Statement): (readonly [string, Expr])[] {
  if (statement.kind === 'all') return statement.parts.flatMap(valuesIn);
  if (statement.kind !== 'compare' || statement.sign !== '=') return [];
  const { left, right } = statement;
  return left.kind === 'letter' && rateNamed(left.name) === null && isFree(right, left.name)
    ? [[left.name, right]]
    : [];
}

function workedOut(expr: Expr, context: CheckContext): Expr {
  const plain = mapExpr(expr, (node) => {
    const rate = node.kind === 'letter' ? rateNamed(node.name) : null;
    const value = rate && context.definitions.letters.get(rate.of);
    return rate && value ? differentiateTimes(value, rate.by, rate.order, context, true) : node;
  });
  return carriedOut(plain, context);
}
