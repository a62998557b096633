import type { Expr } from '../../../shared/maths/expression.ts';
import { sameExpr } from '../../../shared/maths/same.ts';
import { collect, negated, spread } from './monomials.ts';
import { childrenOf, mapChildren } from '../../../shared/maths/walk.ts';

/** The one part in which two expressions of the same build differ, of each; null where they differ in more. */
export function onlyDifference(above: Expr, below: Expr): readonly [Expr, Expr] | null {
  const [before, after] = [childrenOf(above), childrenOf(below)];
  if (above.kind !== below.kind || before.length !== after.length) return null;
  const isSame = above.kind === 'matrix' ? sameEntry : sameExpr;
  const [place, ...more] = [...before.keys()].filter((k) => !isSame(before[k] as Expr, after[k] as Expr));
  if (place === undefined || more.length > 0) return null;
  const [inner, own] = [before[place] as Expr, after[place] as Expr];
  // How a product is joined and a fraction written changes nothing.
  const isSameBuild = ['matrix', 'product', 'quotient'].includes(above.kind);
  return isSameBuild || sameExpr(withChild(above, place, own), below) ? [inner, own] : null;
}

/** Entries are worked out one by one. */
function sameEntry(a: Expr, b: Expr): boolean {
  const [left, right] = [spread(a), spread(b)];
  return sameExpr(a, b) || (left !== null && right !== null && collect([...left, ...right.map(negated)]).length === 0);
}

/** The expression with the child at a place, in reading order, replaced. */
export function withChild(expr: Expr, place: number, changed: Expr): Expr {
  let at = -1;
  return mapChildren(expr, (part) => {
    at += 1;
    return at === place ? changed : part;
  });
}
