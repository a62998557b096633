import type { Expr, Line } from '../../../shared/maths/expression.ts';
import { lettersOf } from '../../../shared/maths/letters.ts';
import { mapChildren, mapExpr } from '../../../shared/maths/walk.ts';
import { fails, holds, undecided, type StepResult } from '../rules/step-result.ts';
import { compareExpressions } from '../compare/compare-expressions.ts';
import type { CheckContext } from '../context.ts';
import { Unsettled } from '../solving/unsettled.ts';
import { letterOf, mulExprs, oneExpr } from './build.ts';
import { differentiate } from './differentiate.ts';

/** A line such as du = 2x dx after u was introduced: a remark that has to be true; null for any other line. */
export function judgeDifferentials(line: Line, context: CheckContext): StepResult | null {
  if (line.kind !== 'relation' || line.sign !== '=' || context.definitions.letters.size === 0) return null;
  const names = [...differentialsIn(line.left), ...differentialsIn(line.right)];
  const defined = names.filter((name) => context.definitions.letters.has(name));
  const [first] = defined;
  if (first === undefined || names.length < 2) return null;
  const base = baseLetters(first, context);
  const [variable] = base;
  if (variable === undefined || base.length > 1) return null;
  try {
    const [left, right] = [line.left, line.right].map((side) => written(side, variable, context)) as [Expr, Expr];
    const found = compareExpressions(left, right, context);
    if (found.kind === 'equal') return holds(found.reached, ['remark']);
    if (found.kind !== 'different') return undecided('not-settled');
    const { atTex, above, below } = found.witness;
    return fails('proved', { witness: { at: { ...atTex }, above, below } });
  } catch (cause) {
    if (cause instanceof Unsettled) return undecided(cause.reason);
    throw cause;
  }
}

/** The letters u of which there is a du, written as a product of d and u. */
export function differentialsIn(expr: Expr): string[] {
  const found: string[] = [];
  mapExpr(expr, (node) => {
    if (node.kind === 'product')
      for (const [k, factor] of node.factors.entries())
        if (isDifferential(node.factors, k)) found.push(factor.kind === 'letter' ? factor.name : '');
    return node;
  });
  return found;
}

export function isDifferential(factors: readonly Expr[], k: number): boolean {
  const before = factors[k - 1];
  return factors[k]?.kind === 'letter' && before?.kind === 'letter' && before.name === 'd';
}

function baseLetters(name: string, context: CheckContext, depth = 0): string[] {
  const definition = depth < 8 ? context.definitions.letters.get(name) : undefined;
  if (!definition) return [name];
  return [...new Set(lettersOf(definition).flatMap((inner) => baseLetters(inner, context, depth + 1)))];
}

/** du as its derivative times a letter for dx. */
function written(expr: Expr, variable: string, context: CheckContext): Expr {
  return mapExpr(expr, (node) => {
    if (node.kind !== 'product') return node;
    const factors: Expr[] = [];
    node.factors.forEach((factor, k) => {
      if (factor.kind === 'letter' && isDifferential(node.factors, k)) {
        factors.pop();
        factors.push(mulExprs(differentiate(factor, variable, context), letterOf(`d${variable}`)));
      } else factors.push(factor);
    });
    return mulExprs(...factors);
  });
}

/** An expression with 1 for the differentials of the letters, or `first` for that of the first one. */
export function withoutDifferentials(expr: Expr, names: readonly string[], first: Expr = oneExpr): Expr {
  if (expr.kind !== 'product') return mapChildren(expr, (part) => withoutDifferentials(part, names, first));
  const factors: Expr[] = [];
  for (const [k, factor] of expr.factors.entries()) {
    const next = expr.factors[k + 1];
    if (next?.kind === 'letter' && names.includes(next.name) && isDifferential(expr.factors, k + 1)) continue;
    if (factor.kind !== 'letter' || !names.includes(factor.name) || !isDifferential(expr.factors, k))
      factors.push(withoutDifferentials(factor, names, first));
    else factors.push({ ...(factor.name === names[0] ? first : oneExpr), span: factor.span });
  }
  const [only] = factors;
  return factors.length === 1 && only ? only : { ...expr, factors, joins: expr.joins.slice(0, factors.length - 1) };
}
