import type { Expr, Line } from '../../../shared/maths/expression.ts';
import { lettersOf } from '../../../shared/maths/letters.ts';
import { childrenOf } from '../../../shared/maths/walk.ts';
import { relationLine } from '../values/truth.ts';

/** A sum with letters as bounds is meant to have a term: its upper bound is not below the lower one. */
export function boundsOfSeries(expr: Expr, bound: ReadonlySet<string> = new Set()): Line[] {
  const inner = expr.kind === 'series' ? new Set(bound).add(expr.index) : bound;
  const inside = childrenOf(expr).flatMap((part) => boundsOfSeries(part, inner));
  if (expr.kind !== 'series') return inside;
  const letters = [...lettersOf(expr.from), ...lettersOf(expr.to)];
  if (letters.length === 0 || letters.some((name) => bound.has(name))) return inside;
  if (expr.to.kind === 'constant') return inside;
  return [relationLine(expr.to, '>=', expr.from), ...inside];
}
