import type { Expr } from '../../../shared/maths/expression.ts';
import { lettersOf } from '../../../shared/maths/letters.ts';
import { compareExpressions } from '../compare/compare-expressions.ts';
import type { CheckContext } from '../context.ts';
import * as Q from '../numbers/rational.ts';
import { Unsettled } from '../solving/unsettled.ts';
import {
  addExprs,
  callOf,
  infinityExpr,
  mulExprs,
  negateExpr,
  noValueExpr,
  numberOf,
  oneExpr,
  subExprs,
  zeroExpr,
} from './build.ts';
import { hasFactorial, ratioOfTerms, withoutTowers } from './towers.ts';
import { expand } from './expand.ts';
import type { LimitValue } from './limit-value.ts';
import { byParity, turnsForEver } from './turns.ts';
import {
  compareScales,
  constantSeries,
  powerSeries,
  signOfCoefficient,
  unitScale,
  type Expansion,
  type Series,
  type SeriesTerm,
} from './series-ring.ts';

export type { LimitValue };

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
export const stepsTried = [2, 5, 9];

/** What the letter is on its way there. */
export function seriesAt({ to, side }: Target): Series {
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

/** The limit of what is defined for all real numbers near the target; none where it goes on turning. */
export function limitFromSide(expr: Expr, variable: string, target: Target, context: CheckContext): LimitValue {
  try {
    return sideLimit(expr, variable, target, context);
  } catch (cause) {
    if (!(cause instanceof Unsettled) || cause.reason === 'no-domain' || context.numbers === 'complex') throw cause;
    const inner = (part: Expr): LimitValue => sideLimit(part, variable, target, context);
    const composed = attempt(() => composedLimit(expr, variable, inner, context));
    if (composed) return composed;
    if (turnsForEver(expr, variable, inner, (a, b) => haveSameValue(a, b, context) === false)) return { kind: 'none' };
    throw cause;
  }
}

function attempt<Found>(find: () => Found): Found | null {
  try {
    return find();
  } catch (cause) {
    if (cause instanceof Unsettled) return null;
    throw cause;
  }
}

/** By the limits of the parts of a sum, a multiple or a logarithm; null where these do not say. */
function composedLimit(
  expr: Expr,
  variable: string,
  limit: (part: Expr) => LimitValue,
  context: CheckContext,
): LimitValue | null {
  const inner = (part: Expr): LimitValue => {
    const found = attempt(() => limit(part)) ?? composedLimit(part, variable, limit, context);
    if (!found) throw new Unsettled('not-covered');
    return found;
  };
  if (expr.kind === 'sum') {
    const parts = expr.terms.map(({ sign, expr: part }) => (sign === 'minus' ? negated(inner(part)) : inner(part)));
    return expr.terms.every(({ sign }) => sign === 'plus' || sign === 'minus') ? sumOfLimits(parts) : null;
  }
  if (expr.kind === 'product') {
    const moving = expr.factors.filter((factor) => lettersOf(factor).includes(variable));
    const fixed = mulExprs(...expr.factors.filter((factor) => !moving.includes(factor)));
    const [only] = moving;
    if (moving.length !== 1 || !only || moving.length === expr.factors.length) return null;
    const found = inner(only);
    if (found.kind === 'finite') return { kind: 'finite', value: mulExprs(fixed, found.value) };
    const sign = signOfCoefficient(fixed, context);
    return found.kind === 'infinite' && sign !== 0 ? { kind: 'infinite', sign: (sign * found.sign) as 1 | -1 } : null;
  }
  const [argument] = expr.kind === 'call' && (expr.name === 'ln' || expr.name === 'abs') ? expr.args : [];
  if (expr.kind !== 'call' || !argument) return null;
  const found = inner(argument);
  if (found.kind === 'infinite') return expr.name === 'abs' || found.sign > 0 ? { kind: 'infinite', sign: 1 } : null;
  if (found.kind !== 'finite') return null;
  if (expr.name === 'abs') return { kind: 'finite', value: callOf('abs', found.value) };
  return signOfCoefficient(found.value, context) > 0 ? { kind: 'finite', value: callOf('ln', found.value) } : null;
}

function negated(limit: LimitValue): LimitValue {
  if (limit.kind === 'finite') return { kind: 'finite', value: negateExpr(limit.value) };
  return limit.kind === 'infinite' ? { kind: 'infinite', sign: limit.sign > 0 ? -1 : 1 } : limit;
}

function sumOfLimits(parts: readonly LimitValue[]): LimitValue | null {
  if (parts.some(({ kind }) => kind === 'none')) return null;
  const signs = new Set(parts.flatMap((part) => (part.kind === 'infinite' ? [part.sign] : [])));
  if (signs.size > 1) return null;
  if (signs.size === 1) return { kind: 'infinite', sign: signs.has(1) ? 1 : -1 };
  return { kind: 'finite', value: addExprs(...parts.flatMap((part) => (part.kind === 'finite' ? [part.value] : []))) };
}

/** Null where it is not certain. */
function haveSameValue(a: LimitValue, b: LimitValue, context: CheckContext): boolean | null {
  if (a.kind === 'infinite' && b.kind === 'infinite') return a.sign === b.sign;
  if (a.kind !== 'finite' || b.kind !== 'finite') return false;
  const found = compareExpressions(a.value, b.value, context);
  return found.kind === 'equal' ? true : found.kind === 'different' ? false : null;
}

function joined(a: LimitValue, b: LimitValue, context: CheckContext): LimitValue {
  if (a.kind === 'none' || b.kind === 'none') return { kind: 'none' };
  const areSame = haveSameValue(a, b, context);
  if (areSame === null) throw new Unsettled('not-settled');
  return areSame ? a : { kind: 'none' };
}

/** Letters that stand for whole numbers by custom. */
const usualWhole: ReadonlySet<string> = new Set(['n', 'k', 'm', 'N']);

const beyondAll: Target = { to: infinityExpr, side: 'right' };

/** The limit of a sequence, or those of its even and of its odd terms. Throws Unsettled. */
export function sequenceLimits(expr: Expr, index: string, context: CheckContext): readonly LimitValue[] {
  return (byParity(expr, index, context) ?? [expr]).map((part) => limitOfTerms(part, index, context));
}

/** Factorials and powers that cancel are left out; a sequence with factorials tends to 0 where its terms' ratio is below 1. */
function limitOfTerms(expr: Expr, index: string, context: CheckContext): LimitValue {
  const isSteep = hasFactorial(expr, index);
  const plain = isSteep ? withoutTowers(expr, index, context) : null;
  if (plain) return sideLimit(plain, index, beyondAll, context);
  if (isSteep && lettersOf(expr).length === 1 && shrinks(expr, index, context))
    return { kind: 'finite', value: zeroExpr };
  try {
    return sideLimit(expr, index, beyondAll, context);
  } catch (cause) {
    const simpler = cause instanceof Unsettled && !isSteep ? withoutTowers(expr, index, context) : null;
    if (!simpler) throw cause;
    return sideLimit(simpler, index, beyondAll, context);
  }
}

function shrinks(expr: Expr, index: string, context: CheckContext): boolean {
  const ratio = ratioOfTerms(expr, index, context);
  const sign = attempt(() => {
    const found = ratio && sideLimit(ratio, index, beyondAll, context);
    if (found?.kind !== 'finite') return 0;
    return signOfCoefficient(subExprs(oneExpr, mulExprs(found.value, found.value)), context);
  });
  return sign === 1;
}

/** The largest term of a sequence far out, in powers of 1/k. Throws Unsettled. */
export function leadBeyond(expr: Expr, index: string, context: CheckContext): SeriesTerm | null {
  for (const steps of stepsTried) {
    const [lead] = expand(expr, index, seriesAt(beyondAll), { ...context, steps }).terms;
    if (lead) return lead;
  }
  return null;
}

/** A sequence: where its terms change their sign, the limits of every other one. */
function limitOfSequence(expr: Expr, variable: string, context: CheckContext): LimitValue {
  const [even, odd] = sequenceLimits(expr, variable, context);
  return even && odd ? joined(even, odd, context) : (even as LimitValue);
}

/** The limit as it is written: from both sides it has a value only where these agree. */
export function limitOf(node: Extract<Expr, { kind: 'limit' }>, context: CheckContext): LimitValue {
  const { operand, variable, to, side } = node;
  const from = (way: 'left' | 'right'): LimitValue => limitFromSide(operand, variable, { to, side: way }, context);
  const beyond = infinitySign(to);
  if (beyond === 1 && (usualWhole.has(variable) || context.wholeLetters.has(variable)))
    return limitOfSequence(operand, variable, context);
  if (beyond !== null) return from('right');
  return side === 'both' ? joined(from('right'), from('left'), context) : from(side);
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
