import type { Expr } from '../../../shared/maths/expression.ts';
import { sameExpr } from '../../../shared/maths/same.ts';
import { childrenOf, mapExpr } from '../../../shared/maths/walk.ts';
import type { CheckContext } from '../context.ts';
import { isKnown, isReal } from '../values/arithmetic.ts';
import { evaluate } from '../values/evaluate.ts';
import { signOf } from '../values/powers.ts';
import { addExprs, mulExprs, negateExpr, numberOf } from './build.ts';
import { cutsAtZeros } from './continuity.ts';
import { isFree } from './integrand.ts';

type DefiniteExpr = Extract<Expr, { kind: 'integral' }>;

/** An integral with bars in it as integrals without, from zero to zero of what they hold; null where these are not known. */
export function withoutBars(node: DefiniteExpr, context: CheckContext): Expr[] | null {
  const { integrand, variable, from, to } = node;
  const bars = from && to ? barsIn(integrand, variable) : [];
  const [inner] = bars;
  if (!from || !to || !inner) return null;
  const cuts = cutsAtZeros(inner, variable, from, to, context);
  if (!cuts) return null;
  const pieces: Expr[] = [];
  for (let k = 0; k + 1 < cuts.length; k += 1) {
    const [low, high] = [cuts[k] as Expr, cuts[k + 1] as Expr];
    const middle = evaluate(mulExprs(numberOf(1, 2), addExprs(low, high)), new Map(), 96, context);
    const value = isKnown(middle) ? evaluate(inner, new Map([[variable, middle]]), 96, context) : null;
    const sign = value && isKnown(value) && isReal(value) ? signOf(value) : null;
    if (sign === null || sign === 0) return null;
    const opened = mapExpr(integrand, (part) =>
      isBar(part) && part.args[0] && sameExpr(part.args[0], inner) ? (sign > 0 ? inner : negateExpr(inner)) : part,
    );
    pieces.push({ ...node, integrand: opened, from: low, to: high });
  }
  return pieces;
}

function isBar(expr: Expr): expr is Extract<Expr, { kind: 'call' }> {
  return expr.kind === 'call' && expr.name === 'abs';
}

/** What the innermost bars hold. */
function barsIn(expr: Expr, letter: string): Expr[] {
  const inside = childrenOf(expr).flatMap((part) => barsIn(part, letter));
  if (!isBar(expr) || !expr.args[0] || isFree(expr.args[0], letter)) return inside;
  return [...inside, expr.args[0]];
}
