import type { Expr } from '../../../shared/maths/expression.ts';
import { sameExpr } from '../../../shared/maths/same.ts';
import { childrenOf, mapExpr } from '../../../shared/maths/walk.ts';
import type { CheckContext } from '../context.ts';
import * as Q from '../numbers/rational.ts';
import { isKnown, isReal } from '../values/arithmetic.ts';
import { evaluate } from '../values/evaluate.ts';
import { signOf } from '../values/powers.ts';
import { addExprs, mulExprs, negateExpr, numberOf, rationalExpr, subExprs } from './build.ts';
import { cutsAtZeros } from './continuity.ts';
import { isFree, linearIn } from './integrand.ts';

type DefiniteExpr = Extract<Expr, { kind: 'integral' }>;

/** A part with a corner or a jump: what it is between its cuts, by the value of `turns` there. */
interface Corner {
  readonly part: Expr;
  /** Zero at the cuts; for a floor, whole there. */
  readonly turns: Expr;
  readonly isStep: boolean;
}

/**
 * An integral with bars, a maximum or minimum, a sign or a floor in it as integrals without, from cut to cut; null where
 * these are not known.
 */
export function withoutBars(node: DefiniteExpr, context: CheckContext): Expr[] | null {
  const { integrand, variable, from, to } = node;
  const [corner] = from && to ? cornersIn(integrand, variable) : [];
  if (!from || !to || !corner) return null;
  const cuts = corner.isStep
    ? cutsAtWholes(corner.turns, variable, from, to, context)
    : cutsAtZeros(corner.turns, variable, from, to, context);
  if (!cuts) return null;
  const pieces: Expr[] = [];
  for (let k = 0; k + 1 < cuts.length; k += 1) {
    const [low, high] = [cuts[k] as Expr, cuts[k + 1] as Expr];
    const middle = evaluate(mulExprs(numberOf(1, 2), addExprs(low, high)), new Map(), 96, context);
    const at = new Map(isKnown(middle) ? [[variable, middle]] : []);
    const opened = isKnown(middle) ? openedAt(corner, at, context) : null;
    if (!opened) return null;
    const inner = mapExpr(integrand, (part) => (sameExpr(part, corner.part) ? opened : part));
    pieces.push({ ...node, integrand: inner, from: low, to: high });
  }
  return pieces;
}

/** What the part is on the whole piece, by its middle. */
function openedAt(
  { part, turns, isStep }: Corner,
  at: Parameters<typeof evaluate>[1],
  context: CheckContext,
): Expr | null {
  if (isStep) {
    const value = evaluate(part, at, 96, context);
    return isKnown(value) && value.kind === 'rational' ? rationalExpr(value.value) : null;
  }
  const value = evaluate(turns, at, 96, context);
  const sign = isKnown(value) && isReal(value) ? signOf(value) : null;
  if (!sign || part.kind !== 'call') return null;
  const [a, b] = part.args;
  switch (part.name) {
    case 'abs':
      return sign > 0 ? turns : negateExpr(turns);
    case 'sign':
      return numberOf(sign);
    case 'max':
      return (sign > 0 ? a : b) ?? null;
    default:
      return (sign > 0 ? b : a) ?? null;
  }
}

/** The innermost ones. */
function cornersIn(expr: Expr, letter: string): Corner[] {
  const inside = childrenOf(expr).flatMap((part) => cornersIn(part, letter));
  const own = cornerOf(expr, letter);
  return own ? [...inside, own] : inside;
}

function cornerOf(expr: Expr, letter: string): Corner | null {
  if (expr.kind !== 'call' || isFree(expr, letter)) return null;
  const [a, b, ...more] = expr.args;
  switch (expr.name) {
    case 'abs':
    case 'sign':
      return a ? { part: expr, turns: a, isStep: false } : null;
    case 'max':
    case 'min':
      return a && b && more.length === 0 ? { part: expr, turns: subExprs(a, b), isStep: false } : null;
    case 'floor':
    case 'ceil':
      return a ? { part: expr, turns: a, isStep: true } : null;
    default:
      return null;
  }
}

const mostSteps = 40n;

/** The stretch cut where something linear is a whole number. */
function cutsAtWholes(turns: Expr, variable: string, from: Expr, to: Expr, context: CheckContext): Expr[] | null {
  const linear = linearIn(turns, variable);
  const values = linear && [linear.slope, linear.constant, from, to].map((expr) => exactValue(expr, context));
  if (!values?.every((value) => value !== null)) return null;
  const [slope, constant, low, high] = values as [Q.Rational, Q.Rational, Q.Rational, Q.Rational];
  const [first, last] = [low, high].map((x) => Q.add(Q.mul(slope, x), constant)) as [Q.Rational, Q.Rational];
  const isRising = Q.compare(first, last) < 0;
  const [least, most] = isRising ? [first, last] : [last, first];
  const inner: Q.Rational[] = [];
  if (Q.floor(most) - Q.floor(least) > mostSteps) return null;
  for (let k = Q.floor(least) + 1n; Q.compare(Q.rational(k), most) < 0; k += 1n)
    inner.push(Q.div(Q.sub(Q.rational(k), constant), slope));
  return [from, ...(isRising ? inner : inner.reverse()).map(rationalExpr), to];
}

function exactValue(expr: Expr, context: CheckContext): Q.Rational | null {
  const value = evaluate(expr, new Map(), 96, context);
  return isKnown(value) && value.kind === 'rational' ? value.value : null;
}
