import type { Expr, Line } from '../../../shared/maths/expression.ts';
import { lettersOf } from '../../../shared/maths/letters.ts';
import { sameExpr } from '../../../shared/maths/same.ts';
import { childrenOf } from '../../../shared/maths/walk.ts';
import { listOf } from '../slips/may-follow.ts';
import { choosePlaces } from './places.ts';
import { commonRatio, differenceAt } from './mend-question.ts';
import { isZero } from './build.ts';
import { spread } from './monomials.ts';
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
  | 'rewrite-terms'
  | 'both-sides'
  | 'compare-exponents'
  | 'root'
  | 'combine'
  | 'solve'
  | `${'do' | 'within'}-${'limit' | 'integral' | 'derivative' | 'series' | 'evaluated' | 'matrix'}`;

/** The operations by which a step that holds can be explained; none for what is not known. */
export function operationsBetween(above: Line, below: Line, context: CheckContext): ReadonlySet<Operation> {
  if (above.kind === 'expression' && below.kind === 'expression') return new Set(onExpressions(above.expr, below.expr));
  const found = new Set<Operation>();
  if (listOf(below) && (above.kind === 'relation' || above.kind === 'any')) found.add('solve');
  if (above.kind === 'all' || below.kind === 'all') for (const one of onSystems(above, below)) found.add(one);
  if (above.kind === 'any' && below.kind === 'any' && above.parts.length === below.parts.length)
    for (const one of inEveryCase(above.parts, below.parts, context)) found.add(one);
  if (above.kind === 'chain' && below.kind === 'chain') found.add('both-sides');
  if (above.kind === 'relation' && below.kind === 'relation')
    for (const one of onRelations(above, below, context)) found.add(one);
  return found;
}

type Relation = Extract<Line, { kind: 'relation' }>;

function* onRelations(above: Relation, below: Relation, context: CheckContext): Generator<Operation> {
  const places = choosePlaces([above, below], 3, context);
  const ratio = commonRatio(
    places.map((place) => differenceAt(below, place)),
    places.map((place) => differenceAt(above, place)),
  );
  if (ratio) yield 'both-sides';
  const isOrder = above.sign !== '=' && below.sign !== '=';
  if (isOrder && below.left.kind === 'letter') yield 'solve';
  if (below.left.kind === 'letter' && !lettersOf(below.right).includes(below.left.name)) yield 'solve';
  if (sameExpr(above.left, below.left)) yield* onExpressions(above.right, below.right);
  if (sameExpr(above.right, below.right)) yield* onExpressions(above.left, below.left);
  const [base, other] = [above.left, above.right];
  if (base.kind === 'power' && other.kind === 'power' && sameExpr(base.base, other.base)) yield 'compare-exponents';
  if (base.kind === 'power' && hasTwoSigns(below.right)) yield 'root';
  if (hasTwoSigns(above.right) && hasTwoSigns(below.right)) yield 'both-sides';
}

function hasTwoSigns(expr: Expr): boolean {
  const isOwn = expr.kind === 'sum' && expr.terms.some(({ sign }) => sign === 'plusminus');
  return isOwn || childrenOf(expr).some(hasTwoSigns);
}

/** Several cases that are worked on side by side in one way. */
function inEveryCase(above: readonly Line[], below: readonly Line[], context: CheckContext): Operation[] {
  const [first, ...rest] = above.map((part, k) => operationsBetween(part, below[k] as Line, context));
  return first ? [...first].filter((one) => rest.every((other) => other.has(one))) : [];
}

function* onSystems(above: Line, below: Line): Generator<Operation> {
  if (above.kind === 'all' && below.kind === 'relation') yield 'combine';
  const isListed = below.kind === 'all' && below.parts.every((part) => listOf(part) !== null);
  if (isListed) yield 'solve';
}

function* onExpressions(above: Expr, below: Expr): Generator<Operation> {
  const [before, after] = [shapeOf(above), shapeOf(below)];
  if (lettersOf(above).length === 0 && lettersOf(below).length === 0) yield 'evaluate';
  if (before.isSpread && after.isSpread && after.terms < before.terms) yield 'collect';
  if (before.isSpread && after.isSpread && after.terms === before.terms) yield 'rewrite-terms';
  if (after.brackets < before.brackets) yield 'expand';
  if (after.brackets > before.brackets || (after.isProduct && !before.isProduct)) yield 'factor';
  if (above.kind === 'quotient' && below.kind !== 'sum' && sizeOf(below) < sizeOf(above)) yield 'cancel';
  if (above.kind === 'sum' && below.kind === 'quotient') yield 'join-fractions';
  if (above.kind === 'quotient' && below.kind === 'sum' && hasQuotient(below)) yield 'divide-out';
  if (hasFunction(above) && (hasFunction(below) || after.isSpread)) yield 'use-identity';
  if (above.kind === 'quotient' && below.kind === 'quotient') yield 'in-parts';
  for (const kind of ['limit', 'integral', 'derivative', 'series', 'evaluated', 'matrix'] as const)
    if (has(above, kind)) yield has(below, kind) ? `within-${kind}` : `do-${kind}`;
}

interface Shape {
  /** A sum of monomials, brackets multiplied out. */
  readonly isSpread: boolean;
  readonly terms: number;
  /** Sums that are multiplied or raised to a power, the power counted. */
  readonly brackets: number;
  readonly isProduct: boolean;
}

function shapeOf(expr: Expr): Shape {
  const terms = expr.kind === 'sum' ? expr.terms.map((term) => term.expr) : [expr];
  const parts = terms.map((term) => (bracketsIn(term) > 0 ? null : spread(term)));
  return {
    isSpread: parts.every((part) => part !== null && part.length <= 1),
    terms: isZero(expr) ? 0 : terms.length,
    brackets: bracketsIn(expr),
    isProduct: expr.kind === 'product',
  };
}

const mostCounted = 12;

function bracketsIn(expr: Expr): number {
  if (expr.kind === 'sum') return expr.terms.reduce((count, term) => count + bracketsIn(term.expr), 0);
  if (expr.kind === 'product')
    return expr.factors.reduce((count, factor) => count + bracketsIn(factor) + (isSum(factor) ? 1 : 0), 0);
  if (expr.kind !== 'power') return 0;
  const times = expr.exponent.kind === 'number' ? Number(expr.exponent.numerator) : 1;
  return isSum(expr.base) ? Math.min(times, mostCounted) : bracketsIn(expr.base);
}

function isSum(expr: Expr): boolean {
  return expr.kind === 'sum' && expr.terms.length > 1;
}

function hasQuotient(expr: Expr): boolean {
  return expr.kind === 'sum' && expr.terms.some((term) => term.expr.kind === 'quotient');
}

function has(expr: Expr, kind: Expr['kind']): boolean {
  return expr.kind === kind || childrenOf(expr).some((part) => has(part, kind));
}

function hasFunction(expr: Expr): boolean {
  return expr.kind === 'call' || expr.kind === 'log' || childrenOf(expr).some(hasFunction);
}

function sizeOf(expr: Expr): number {
  return childrenOf(expr).reduce((count, part) => count + sizeOf(part), 1);
}
