import type { Expr } from '../../../shared/maths/expression.ts';
import { lettersOf } from '../../../shared/maths/letters.ts';
import { sameExpr } from '../../../shared/maths/same.ts';
import { childrenOf, mapExpr } from '../../../shared/maths/walk.ts';
import type { Comparison } from '../compare/comparison.ts';
import type { CheckContext } from '../context.ts';
import type { Statement } from '../statements/statement.ts';
import { Unsettled } from '../solving/unsettled.ts';
import {
  addExprs,
  divExprs,
  infinityExpr,
  letterOf,
  mulExprs,
  powExprs,
  rationalExpr,
  rationalOf,
  zeroExpr,
} from './build.ts';
import { expand } from './expand.ts';
import { factorise, linearIn } from './integrand.ts';
import { termTex } from './term-tex.ts';
import { isOrder, type OrderExpr } from './order-symbol.ts';
import { infinitySign, seriesAt, stepsTried, type Target } from './limit.ts';
import { addSeries, compareScales, negateSeries, type Expansion, type Scale, type Series } from './series-ring.ts';
import * as Q from '../numbers/rational.ts';

/** The orders in an expression that no limit has done away with. */
function ordersIn(expr: Expr, context: CheckContext): OrderExpr[] {
  if (isOrder(expr, context)) return [expr];
  return expr.kind === 'limit' ? [] : childrenOf(expr).flatMap((part) => ordersIn(part, context));
}

/**
 * Two lines with O(...) or o(...): what stands below is a set of functions. It holds where that has all that stands above,
 * and fails where the two have none in common: by expansions on both sides of the point that the orders are about. Null
 * where no line has an order.
 */
export function compareOrders(above: Expr, below: Expr, context: CheckContext): Comparison | null {
  const orders = [above, below].flatMap((expr) => ordersIn(expr, context));
  if (orders.length === 0) return null;
  const open: Comparison = { kind: 'undecided', reason: 'not-covered' };
  const place = placeOf(orders, context);
  if (!place || context.numbers === 'complex') return open;
  const found: Comparison[] = [];
  for (const side of infinitySign(place.to) === null ? (['right', 'left'] as const) : (['right'] as const)) {
    const one = onSide(above, below, place.letter, { to: place.to, side }, context);
    if (one.kind !== 'equal') return one;
    found.push(one);
  }
  return found[0] ?? open;
}

/** The right sides of two equations with the same left side, where one has an order or the left side is f(x) of an unknown f. */
export function sidesOfSame(above: Statement, below: Statement, context: CheckContext): [Expr, Expr] | null {
  if (above.kind !== 'compare' || below.kind !== 'compare' || above.sign !== '=' || below.sign !== '=') return null;
  if (!sameExpr(above.left, below.left)) return null;
  const sides: [Expr, Expr] = [above.right, below.right];
  if (sides.some((side) => ordersIn(side, context).length > 0)) return sides;
  return above.left.kind === 'apply' && !sides.some(hasApplied) ? sides : null;
}

function hasApplied(expr: Expr): boolean {
  return expr.kind === 'apply' || childrenOf(expr).some(hasApplied);
}

function onSide(above: Expr, below: Expr, letter: string, target: Target, context: CheckContext): Comparison {
  for (const steps of stepsTried) {
    try {
      const found = compareSets(above, below, letter, target, { ...context, steps });
      if (found) return found;
    } catch (cause) {
      if (!(cause instanceof Unsettled)) throw cause;
      if (cause.reason !== 'not-settled') return { kind: 'undecided', reason: cause.reason };
    }
  }
  return { kind: 'undecided', reason: 'not-settled' };
}

/** Null where more terms are needed. */
function compareSets(above: Expr, below: Expr, letter: string, target: Target, context: Expansion): Comparison | null {
  const at = seriesAt(target);
  const series = (expr: Expr): Series => expand(expr, letter, at, context);
  const [a, b] = [above, below].map((expr) => series(withoutOrders(expr, context))) as [Series, Series];
  const gap = addSeries(a, negateSeries(b), context);
  const [errorAbove, errorBelow] = [above, below].map((expr) =>
    ordersIn(expr, context).length > 0 ? series(expr).error : null,
  ) as [Scale | null, Scale | null];
  // What an expansion leaves out must not be taken for an order that is written.
  const isFine = (left: Scale | null): boolean =>
    !left || (errorBelow !== null && compareScales(left, errorBelow, context) < 0);
  const isWithin = (scale: Scale | null): boolean =>
    !scale || (errorBelow !== null && compareScales(scale, errorBelow, context) <= 0);
  const [lead] = gap.terms;
  if (lead && [errorAbove, errorBelow].every((error) => !error || compareScales(lead.scale, error, context) > 0))
    return different(a, b, lead.scale, letter, target, context);
  if (!isFine(gap.error) || !isFine(b.error)) return null;
  if (gap.terms.every(({ scale }) => isWithin(scale)) && isWithin(errorAbove))
    return { kind: 'equal', reached: 'proved', excluded: [], cancelled: [] };
  return { kind: 'undecided', reason: 'not-settled' };
}

function withoutOrders(expr: Expr, context: CheckContext): Expr {
  return mapExpr(expr, (node) => (isOrder(node, context) ? zeroExpr : node));
}

/** The first terms that differ are the witness. */
function different(a: Series, b: Series, scale: Scale, letter: string, { to }: Target, context: Expansion): Comparison {
  const step =
    infinitySign(to) !== null
      ? divExprs(rationalExpr(Q.one), letterOf(letter))
      : addExprs(letterOf(letter), mulExprs(rationalExpr(Q.minusOne), to));
  const termOf = ({ terms }: Series): string => {
    const term = terms.find((one) => compareScales(one.scale, scale, context) === 0);
    const coef = term ? term.coef : zeroExpr;
    return termTex(coef, Q.isZero(scale.p) ? rationalExpr(Q.one) : powExprs(step, rationalExpr(scale.p)), context);
  };
  return { kind: 'different', witness: { at: new Map(), atTex: {}, above: termOf(a), below: termOf(b) } };
}

/** The letter that all orders are about, and where it goes: to where their argument is zero, else beyond all bounds. */
function placeOf(orders: readonly OrderExpr[], context: CheckContext): { letter: string; to: Expr } | null {
  let place: { letter: string; to: Expr } | null = null;
  for (const order of orders) {
    const argument = order.args[0] as Expr;
    const letters = lettersOf(argument);
    if (letters.length === 0) continue;
    const [letter] = letters;
    const to = letters.length === 1 && letter !== undefined ? pointOf(argument, letter, context) : null;
    if (letter === undefined || !to) return null;
    if (place && (place.letter !== letter || !sameExpr(place.to, to))) return null;
    place = { letter, to };
  }
  return place;
}

function pointOf(argument: Expr, letter: string, context: CheckContext): Expr | null {
  const { factors } = factorise(argument, letter);
  const [only] = factors;
  const linear = only && factors.length === 1 ? linearIn(only.base, letter) : null;
  if (!only || !linear) return null;
  if (Q.sign(only.times) < 0 || context.wholeLetters.has(letter) || letter === 'n') return infinityExpr;
  const [constant, slope] = [rationalOf(linear.constant), rationalOf(linear.slope)];
  return constant && slope ? rationalExpr(Q.negate(Q.div(constant, slope))) : null;
}
