import type { Expr, Line } from '../../../shared/maths/expression.ts';
import { lettersOf } from '../../../shared/maths/letters.ts';
import { childrenOf } from '../../../shared/maths/walk.ts';
import { listOf } from '../slips/may-follow.ts';
import { choosePlaces } from './places.ts';
import { commonRatio, differenceAt } from './mend-question.ts';
import { keyOf, spread } from './monomials.ts';
import type { CheckContext } from '../context.ts';

/** What an author may have done from one line to the next. */
export type Operation =
  | 'evaluate'
  | 'collect'
  | 'expand'
  | 'factor'
  | 'cancel'
  | 'join-fractions'
  | 'divide-out'
  | 'use-identity'
  | 'in-parts'
  | 'both-sides'
  | 'solve';

/** The operations by which a step that holds can be explained; none for what is not known. */
export function operationsBetween(above: Line, below: Line, context: CheckContext): ReadonlySet<Operation> {
  if (above.kind === 'expression' && below.kind === 'expression') return new Set(onExpressions(above.expr, below.expr));
  const found = new Set<Operation>();
  if (listOf(below) && (above.kind === 'relation' || above.kind === 'any')) found.add('solve');
  if (above.kind === 'relation' && below.kind === 'relation') {
    const places = choosePlaces([above, below], 3, context);
    const ratio = commonRatio(
      places.map((place) => differenceAt(below, place)),
      places.map((place) => differenceAt(above, place)),
    );
    if (ratio) found.add('both-sides');
    const isOrder = above.sign !== '=' && below.sign !== '=';
    if (isOrder && below.left.kind === 'letter') found.add('solve');
  }
  if (
    above.kind === 'relation' &&
    below.kind === 'relation' &&
    below.left.kind === 'letter' &&
    !lettersOf(below.right).includes(below.left.name)
  )
    found.add('solve');
  return found;
}

function* onExpressions(above: Expr, below: Expr): Generator<Operation> {
  const [before, after] = [shapeOf(above), shapeOf(below)];
  if (lettersOf(above).length === 0 && lettersOf(below).length === 0) yield 'evaluate';
  if (after.isCollected && before.isSpread) yield 'collect';
  if (after.isSpread && !before.isSpread) yield 'expand';
  if (after.isProduct && !before.isProduct) yield 'factor';
  if (above.kind === 'quotient' && below.kind !== 'sum' && sizeOf(below) < sizeOf(above)) yield 'cancel';
  if (above.kind === 'sum' && below.kind === 'quotient') yield 'join-fractions';
  if (above.kind === 'quotient' && below.kind === 'sum' && hasQuotient(below)) yield 'divide-out';
  if (hasFunction(above) && (hasFunction(below) || after.isSpread)) yield 'use-identity';
  if (above.kind === 'quotient' && below.kind === 'quotient') yield 'in-parts';
}

interface Shape {
  /** A sum of monomials, brackets multiplied out. */
  readonly isSpread: boolean;
  readonly isCollected: boolean;
  readonly isProduct: boolean;
}

function shapeOf(expr: Expr): Shape {
  const terms = expr.kind === 'sum' ? expr.terms.map((term) => term.expr) : [expr];
  const parts = terms.map((term) => (hasBracketedSum(term) ? null : spread(term)));
  const isSpread = parts.every((part) => part !== null && part.length <= 1);
  const keys = parts.flatMap((part) => (part ?? []).map(keyOf));
  const isProduct =
    expr.kind === 'product' &&
    expr.factors.some((factor) => factor.kind === 'sum' || (factor.kind === 'power' && factor.base.kind === 'sum'));
  return { isSpread, isCollected: isSpread && new Set(keys).size === keys.length, isProduct };
}

function hasBracketedSum(expr: Expr): boolean {
  if (expr.kind === 'sum') return true;
  if (expr.kind === 'product') return expr.factors.some(hasBracketedSum);
  return expr.kind === 'power' && hasBracketedSum(expr.base);
}

function hasQuotient(expr: Expr): boolean {
  return expr.kind === 'sum' && expr.terms.some((term) => term.expr.kind === 'quotient');
}

function hasFunction(expr: Expr): boolean {
  return expr.kind === 'call' || expr.kind === 'log' || childrenOf(expr).some(hasFunction);
}

function sizeOf(expr: Expr): number {
  return childrenOf(expr).reduce((count, part) => count + sizeOf(part), 1);
}
