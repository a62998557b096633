import type { Expr, Line } from '../../../shared/maths/expression.ts';
import { lettersOf } from '../../../shared/maths/letters.ts';
import { sameExpr, sameLine } from '../../../shared/maths/same.ts';
import { childrenOf, countNodes, exprsOf } from '../../../shared/maths/walk.ts';
import { compareExpressions } from '../compare/compare-expressions.ts';
import type { CheckContext } from '../context.ts';
import { sum } from '../evidence/build.ts';
import { isNear, type Complex } from '../evidence/complex-double.ts';
import { expanded, sumExpr } from '../evidence/monomials.ts';
import { estimate, estimateCost } from '../evidence/estimate.ts';
import { onlyDifference } from '../evidence/only-difference.ts';
import { choosePlaces, mayBeEqual } from '../evidence/places.ts';
import { allSlips } from './catalogue.ts';
import { listOf, mayFollow } from './may-follow.ts';
import { everywhere } from './rewrite.ts';
import type { Slip } from './slip.ts';
import { signedTerm } from './relations.ts';

/** How a candidate is confirmed: whether the line follows from the other by the rules on statements. */
export type Follows = (from: Line, to: Line) => boolean;

/**
 * The mistake that turns the line above into the line below: a wrong rule used once, at any place, whose result is worth
 * what the line below is worth. Null where none of the catalogue does, for none is better than a wrong one.
 */
export function nameSlip(above: Line, below: Line, context: CheckContext, follows: Follows): Slip | null {
  const pair = expressionsOf(above, below);
  return pair
    ? nameBetween(pair[0], pair[1], isWorkedOn(below), context)
    : nameBetweenStatements(above, below, context, follows);
}

/** What the two lines say of the same quantity; a line that goes on with an equals sign starts with it. */
function expressionsOf(above: Line, below: Line): readonly [Expr, Expr] | null {
  if (above.kind !== 'expression') return null;
  if (below.kind === 'expression') return [above.expr, below.expr];
  const first = isWorkedOn(below) || below.kind === 'continuation' ? exprsOf(below)[0] : null;
  return first ? [above.expr, first] : null;
}

function isWorkedOn(below: Line): boolean {
  return below.kind === 'relation' || below.kind === 'chain';
}

const mostConfirmed = 12;

/** `worksOn`: the line goes on after its first member, which is what tells a lost bracket from a lost sign. */
export function nameBetween(above: Expr, wholeBelow: Expr, worksOn: boolean, context: CheckContext): Slip | null {
  const below = withoutConstant(above, wholeBelow);
  const places = choosePlaces([above, below], 4, context);
  const values = places.map((place) => estimate(below, place));
  if (mayBeEqual(above, values, places)) return null;
  const confirm = createConfirmer(below, context);
  const cost = costOf(above);
  const walk = countNodes(above) >> 3;
  const order = inOrder(above, below, worksOn);
  // That all letters went is explained by much that only happens to come to the same.
  const isTelling = lettersOf(above).length === 0 || !isFixed(values);
  for (const slip of isTelling ? order : order.filter(({ rank }) => rank > tellingRank)) {
    context.budget.spend(walk);
    for (const candidate of candidatesOf(slip, above, below, context)) {
      context.budget.spend(cost);
      if (candidate === below || (mayBeEqual(candidate, values, places) && confirm(candidate))) return slip;
    }
  }
  const terms = above.kind === 'sum' ? null : expanded(above);
  const multiplied = terms && sumExpr(terms);
  for (const slip of multiplied ? allSlips.filter((one) => one.alsoExpanded) : []) {
    for (const candidate of candidatesOf(slip, multiplied as Expr, below, context)) {
      context.budget.spend(cost);
      if (mayBeEqual(candidate, values, places) && confirm(candidate)) return slip;
    }
  }
  const inner = onlyDifference(above, below);
  return inner && nameBetween(inner[0], inner[1], false, context);
}

/** Looking at a candidate at some places, in operations. */
function costOf(expr: Expr): number {
  return 4 + (estimateCost(expr) >> 1);
}

/** The checker's own answer, given a limited number of times. */
function createConfirmer(below: Expr, context: CheckContext): (candidate: Expr) => boolean {
  let confirmed = 0;
  return (candidate) => {
    confirmed += 1;
    return confirmed <= mostConfirmed && compareExpressions(candidate, below, context).kind === 'equal';
  };
}

/** Where the line below has done what the line above says is to be done, mistakes in doing it come first. */
function inOrder(above: Expr, below: Expr, worksOn: boolean): readonly Slip[] {
  const done = ['derivative', 'integral', 'limit'].some((kind) => has(above, kind) && !has(below, kind));
  if (done) return calculusFirst;
  return worksOn ? bracketsFirst : allSlips;
}

const calculusFirst = firstWhere(({ kind }) => kind === 'calculus');
const bracketsFirst = firstWhere(({ id }) => id.startsWith('brackets-were-lost'));

function firstWhere(isFirst: (slip: Slip) => boolean): readonly Slip[] {
  return [...allSlips.filter(isFirst), ...allSlips.filter((slip) => !isFirst(slip))];
}

function has(expr: Expr, kind: string): boolean {
  return expr.kind === kind || childrenOf(expr).some((part) => has(part, kind));
}

/** The same value at all places. */
function isFixed(values: readonly Complex[]): boolean {
  const [first] = values;
  return first !== undefined && values.every((value) => isNear(value, first));
}

function* candidatesOf(slip: Slip, above: Expr, below: Expr, context: CheckContext): Generator<Expr> {
  if (slip.whole) yield* slip.whole(above, below, context);
  for (const rewrite of slip.rewrites ?? []) yield* everywhere(above, rewrite);
}

/** The free constant of an antiderivative is left out of the comparison. */
function withoutConstant(above: Expr, below: Expr): Expr {
  if (above.kind !== 'integral' || above.from || below.kind !== 'sum') return below;
  const known = lettersOf(above);
  const kept = below.terms.filter(
    ({ expr }) => !(expr.kind === 'letter' && /^[cCkK]$/.test(expr.name) && !known.includes(expr.name)),
  );
  return kept.length === below.terms.length || kept.length === 0 ? below : sum(...kept.map(signedTerm));
}

/** What explains nearly anything is named only where nothing else is found. */
const tellingRank = 4;

function nameBetweenStatements(above: Line, below: Line, context: CheckContext, follows: Follows): Slip | null {
  const part = onlyPart(above, below);
  if (part) return nameSlip(part[0], part[1], context, follows);
  const onSide = nameOnOneSide(above, below, context);
  return onSide && onSide.rank >= tellingRank ? onSide : (nameByStatement(above, below, context, follows) ?? onSide);
}

/** The one equation of several that was worked on. */
function onlyPart(above: Line, below: Line): readonly [Line, Line] | null {
  if (above.kind !== 'all' || below.kind !== 'all' || above.parts.length !== below.parts.length) return null;
  const [place, ...more] = [...above.parts.keys()].filter(
    (k) => !sameLine(above.parts[k] as Line, below.parts[k] as Line),
  );
  return place === undefined || more.length > 0 ? null : [above.parts[place] as Line, below.parts[place] as Line];
}

/** Where one side stands as it was, what happened happened on the other. */
function nameOnOneSide(above: Line, below: Line, context: CheckContext): Slip | null {
  if (above.kind !== 'relation' || below.kind !== 'relation' || above.sign !== below.sign) return null;
  if (sameExpr(above.right, below.right)) return nameBetween(above.left, below.left, false, context);
  return sameExpr(above.left, below.left) ? nameBetween(above.right, below.right, false, context) : null;
}

function nameByStatement(above: Line, below: Line, context: CheckContext, follows: Follows): Slip | null {
  const filter = mayFollow(below, above, context);
  const cost = exprsOf(above).reduce((total, expr) => total + costOf(expr), 0);
  let confirmed = 0;
  for (const slip of allSlips) {
    for (const candidate of statementsOf(slip, above, below, context)) {
      context.budget.spend(cost);
      if (candidate === below) return slip;
      if (!filter(candidate)) continue;
      confirmed += 1;
      if (confirmed > mostConfirmed) return null;
      if (follows(candidate, below)) return slip;
    }
  }
  return null;
}

function* statementsOf(slip: Slip, above: Line, below: Line, context: CheckContext): Generator<Line> {
  if (slip.lines) yield* slip.lines(above, below, context);
  // Cases that are not solved yet have a mistake of their own rather than one of the line above.
  if (!slip.rewrites || above.kind !== 'relation' || (below.kind === 'any' && !listOf(below))) return;
  for (const rewrite of slip.rewrites) {
    for (const left of everywhere(above.left, rewrite)) yield { ...above, left };
    for (const right of everywhere(above.right, rewrite)) yield { ...above, right };
  }
}
