import type { Expr } from '../../../shared/maths/expression.ts';
import { compareExpressions } from '../compare/compare-expressions.ts';
import type { CheckContext } from '../context.ts';
import * as Q from '../numbers/rational.ts';
import { Unsettled } from '../solving/unsettled.ts';
import { infinityExpr, negateExpr, noValueExpr, numberOf, zeroExpr } from './build.ts';
import { expand } from './expand.ts';
import {
  compareScales,
  constantSeries,
  powerSeries,
  signOfCoefficient,
  unitScale,
  type Expansion,
  type Series,
} from './series-ring.ts';

export type LimitValue =
  | { readonly kind: 'finite'; readonly value: Expr }
  | { readonly kind: 'infinite'; readonly sign: 1 | -1 }
  | { readonly kind: 'none' };

/** Where a letter goes: to a value from one side, or beyond all bounds. */
export interface Target {
  readonly to: Expr;
  readonly side: 'left' | 'right';
}

/** 1 or -1 for an infinity with its sign, null for anything else. */
export function infinitySign(expr: Expr): 1 | -1 | null {
  if (expr.kind === 'constant' && expr.name === 'infinity') return 1;
  if (expr.kind !== 'sum' || expr.terms.length !== 1) return null;
  const [term] = expr.terms;
  const inner = term ? infinitySign(term.expr) : null;
  if (!term || inner === null) return null;
  return term.sign === 'minus' ? (-inner as 1 | -1) : term.sign === 'plus' ? inner : null;
}

/** The limit from one side; throws Unsettled where it is not known for certain. */
export function sideLimit(expr: Expr, variable: string, target: Target, context: CheckContext): LimitValue {
  for (const steps of stepsTried) {
    try {
      const expansion: Expansion = { ...context, steps };
      return limitOfSeries(expand(expr, variable, seriesAt(target), expansion), expansion);
    } catch (cause) {
      if (
        !(cause instanceof Unsettled) ||
        cause.reason !== 'not-settled' ||
        steps === stepsTried[stepsTried.length - 1]
      )
        throw cause;
    }
  }
  throw new Unsettled('not-settled');
}

/** Few terms first: most limits need no more, and zeros among many coefficients take long to prove. */
const stepsTried = [2, 5, 9];

function seriesAt({ to, side }: Target): Series {
  const beyond = infinitySign(to);
  if (beyond !== null) return powerSeries(numberOf(beyond), Q.minusOne);
  const step = powerSeries(numberOf(side === 'left' ? -1 : 1), Q.one);
  const at = constantSeries(to);
  return { terms: [...at.terms, ...step.terms], error: null };
}

function limitOfSeries(series: Series, context: Expansion): LimitValue {
  const [lead] = series.terms;
  if (!lead) {
    if (series.error && compareScales(series.error, unitScale, context) >= 0) throw new Unsettled('not-settled');
    return { kind: 'finite', value: zeroExpr };
  }
  const order = compareScales(lead.scale, unitScale, context);
  if (order === 0) return { kind: 'finite', value: lead.coef };
  if (order < 0) return { kind: 'finite', value: zeroExpr };
  return { kind: 'infinite', sign: signOfCoefficient(lead.coef, context) as 1 | -1 };
}

/** The limit as it is written: from both sides it has a value only where these agree. */
export function limitOf(node: Extract<Expr, { kind: 'limit' }>, context: CheckContext): LimitValue {
  const { operand, variable, to, side } = node;
  if (infinitySign(to) !== null) return sideLimit(operand, variable, { to, side: 'right' }, context);
  if (side !== 'both') return sideLimit(operand, variable, { to, side }, context);
  const right = sideLimit(operand, variable, { to, side: 'right' }, context);
  const left = sideLimit(operand, variable, { to, side: 'left' }, context);
  if (right.kind === 'infinite' && left.kind === 'infinite') return right.sign === left.sign ? right : { kind: 'none' };
  if (right.kind !== 'finite' || left.kind !== 'finite') return { kind: 'none' };
  const found = compareExpressions(left.value, right.value, context);
  if (found.kind === 'equal') return right;
  if (found.kind === 'different') return { kind: 'none' };
  throw new Unsettled('not-settled');
}

/** A limit as an expression: an infinity, or one without a value, where it is one. */
export function limitExpr(limit: LimitValue): Expr {
  switch (limit.kind) {
    case 'finite':
      return limit.value;
    case 'infinite':
      return limit.sign > 0 ? infinityExpr : negateExpr(infinityExpr);
    case 'none':
      return noValueExpr;
  }
}
