import type { Expr } from '../../../shared/maths/expression.ts';
import { mapExpr } from '../../../shared/maths/walk.ts';

/** Puts an expression in for a letter, wherever it is free or not: for lines in which nothing binds it. */
export function substituteLetter(expr: Expr, name: string, value: Expr): Expr {
  return mapExpr(expr, (node) => (node.kind === 'letter' && node.name === name ? value : node));
}
