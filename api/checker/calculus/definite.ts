import type { Expr } from '../../../shared/maths/expression.ts';
import { lettersOf } from '../../../shared/maths/letters.ts';
import type { CheckContext } from '../context.ts';
import { Unsettled } from '../solving/unsettled.ts';
import {
  addExprs,
  callOf,
  infinityExpr,
  mulExprs,
  negateExpr,
  noValueExpr,
  sqrtExpr,
  subExprs,
  wherever,
} from './build.ts';
import { splitAt, type Cut } from './continuity.ts';
import { isEverywhere, linearNeeds } from './needs.ts';
import { infinitySign, limitFromSide, type LimitValue } from './limit.ts';
import { isFree } from './integrand.ts';
import { substitute } from './substitute.ts';

export interface DefiniteIntegral {
  readonly variable: string;
  readonly from: Expr;
  readonly to: Expr;
}

/**
 * The integral of the derivative of F: F(to) - F(from), by pieces where F has gaps, without a value where a limit at a gap
 * is infinite. F' is the integrand wherever F has a value. Throws Unsettled where that is not certain.
 */
export function throughAntiderivative(
  primitive: Expr,
  { variable, from, to }: DefiniteIntegral,
  context: CheckContext,
): Expr {
  const at = (value: Expr): Expr => substitute(primitive, variable, value);
  if (isEverywhere(primitive, variable) && infinitySign(from) === null && infinitySign(to) === null)
    return subExprs(at(to), at(from));
  const isNumeric = [from, to, primitive].every((expr) => lettersOf(expr).every((name) => name === variable));
  if (!isNumeric || !isFree(from, variable) || !isFree(to, variable))
    return withLetters(primitive, { variable, from, to }, context);
  const cuts = splitAt(primitive, variable, from, to, context);
  if (cuts === null) throw new Unsettled('not-settled');
  return addPieces(primitive, variable, cuts, context);
}

/** F at each end of each piece, as a limit where the end is a gap; beyond all bounds only at the ends of the whole. */
function addPieces(primitive: Expr, variable: string, cuts: readonly Cut[], context: CheckContext): Expr {
  const parts: Expr[] = [];
  const signs = new Set<number>();
  for (let k = 0; k + 1 < cuts.length; k += 1) {
    const [low, high] = [cuts[k] as Cut, cuts[k + 1] as Cut];
    const upper = endValue(primitive, variable, high, high.isDescending ? 'right' : 'left', context);
    const lower = endValue(primitive, variable, low, low.isDescending ? 'left' : 'right', context);
    if (upper.kind === 'none' || lower.kind === 'none') return noValueExpr;
    if ((upper.kind === 'infinite' && k + 2 < cuts.length) || (lower.kind === 'infinite' && k > 0)) return noValueExpr;
    if (upper.kind === 'infinite') signs.add(upper.sign);
    if (lower.kind === 'infinite') signs.add(-lower.sign);
    if (upper.kind === 'finite' && lower.kind === 'finite') parts.push(subExprs(upper.value, lower.value));
  }
  if (signs.size > 1) return noValueExpr;
  if (signs.size === 1) return signs.has(1) ? infinityExpr : negateExpr(infinityExpr);
  return addExprs(...parts);
}

function endValue(
  primitive: Expr,
  variable: string,
  cut: Cut,
  side: 'left' | 'right',
  context: CheckContext,
): LimitValue {
  if (!cut.isGap) return { kind: 'finite', value: substitute(primitive, variable, cut.at) };
  return limitFromSide(primitive, variable, { to: cut.at, side }, context);
}

/** Bounds or parameters with letters: certain where all that F needs is linear in the variable, and keeps its sign. */
function withLetters(primitive: Expr, { variable, from, to }: DefiniteIntegral, context: CheckContext): Expr {
  if (infinitySign(from) !== null || infinitySign(to) !== null) throw new Unsettled('not-covered');
  const needs = linearNeeds(primitive, variable);
  if (needs === null) throw new Unsettled('not-covered');
  const value = subExprs(substitute(primitive, variable, to), substitute(primitive, variable, from));
  return needs.reduce<Expr>((total, need) => {
    const ends = mulExprs(substitute(need.expr, variable, from), substitute(need.expr, variable, to));
    if (context.numbers !== 'real') return total;
    return wherever(need.strict ? callOf('ln', ends) : sqrtExpr(ends), total);
  }, value);
}
