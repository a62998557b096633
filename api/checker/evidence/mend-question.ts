import type { Expr, Line, ReadSettings, Span } from '../../../shared/maths/expression.ts';
import type { Budget, CheckContext } from '../context.ts';
import { isFiniteNumber, isNear, minus, over, sizeOf, type Complex } from './complex-double.ts';
import type { Candidate } from './edits.ts';
import { estimate, estimateCost, type Place } from './estimate.ts';

/** A line that does not follow, and what it should follow from. */
export interface MendQuestion {
  readonly above: Line;
  /** The line above as written; null where the step starts from something else. */
  readonly aboveTex: string | null;
  readonly line: Line;
  readonly tex: string;
  /** Which member of a chain failed, 1 for the first. */
  readonly link: number;
  /** The solutions of the line above as TeX, where it has one letter. */
  readonly solutions: string | null;
  /** What is known beside the line above: the equations of a system. */
  readonly known: readonly Line[];
  readonly lost: readonly string[];
  readonly gained: readonly string[];
  /** Changes of a line above that was mended, made here as well. */
  readonly carried: readonly Candidate[];
  /** Too long for more than a look at its terms. */
  readonly isLarge: boolean;
  readonly settings: ReadSettings;
  readonly context: CheckContext;
  /** The ruling of the checker itself on the step to another line. */
  readonly holds: (line: Line) => boolean;
}

/** The expressions of a line that may be changed, and how a change is judged in doubles. */
export interface Aim {
  /** Nodes of the line: the expression itself, or both sides. */
  readonly roots: readonly Expr[];
  /** What is looked at: the expression, or left minus right; it has the roots as nodes. */
  readonly tree: Expr;
  /** The expression that the tree should equal, where that is known in symbols. */
  readonly wanted: Expr | null;
  readonly places: readonly Place[];
  /** The work of looking at one change, and what it is taken from. */
  readonly cost: number;
  readonly budget: Budget;
  /** Values that the tree must take; several sets where the scale is open. */
  readonly targets: readonly (readonly Complex[])[];
  /** What matches the line above as it stands, and is rather left alone. */
  readonly isRight: (node: Expr) => boolean;
  /** What a change costs more where it takes the line for another than the nearest one. */
  readonly extra: number;
}

/** The work of looking at some expressions; a number that is solved for is looked at some ten times over. */
export function costOf(...exprs: readonly Expr[]): number {
  return 4 + exprs.reduce((count, expr) => count + 3 * estimateCost(expr), 0);
}

export function outer(expr: Expr): Span {
  return expr.bracketed ?? expr.span;
}

/** Whether an expression has the wanted values at all places where both are known, and at one at least. */
export function hits(expr: Expr, target: readonly Complex[], places: readonly Place[]): boolean {
  let compared = 0;
  for (const [k, place] of places.entries()) {
    const wanted = target[k];
    if (!wanted || !isFiniteNumber(wanted)) continue;
    const value = estimate(expr, place);
    if (!isFiniteNumber(value) || !isNear(value, wanted)) return false;
    compared += 1;
  }
  return compared > 0;
}

/** Left minus right. */
export function differenceAt(line: Extract<Line, { kind: 'relation' }>, place: Place): Complex {
  return minus(estimate(line.left, place), estimate(line.right, place));
}

/** One number by which one row of values is a multiple of another, null where there is none. */
export function commonRatio(values: readonly Complex[], by: readonly Complex[]): Complex | null {
  let ratio: Complex | null = null;
  for (const [k, value] of values.entries()) {
    const other = by[k];
    if (!other || !isFiniteNumber(value) || !isFiniteNumber(other) || sizeOf(other) < 1e-12) return null;
    const own = over(value, other);
    if (sizeOf(own) < 1e-12 || (ratio && !isNear(own, ratio))) return null;
    ratio ??= own;
  }
  return ratio;
}
