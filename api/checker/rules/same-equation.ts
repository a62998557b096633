import type { CheckContext } from '../context.ts';
import { compareExpressions } from '../compare/compare-expressions.ts';
import type { Expr } from '../../../shared/maths/expression.ts';
import { lettersOf } from '../../../shared/maths/letters.ts';
import { div, isZero, rational, type Rational } from '../numbers/rational.ts';
import type { Assignment } from '../solving/fraction.ts';
import type { Reached } from '../solving/real-set.ts';
import type { CompareStatement, Statement } from '../statements/statement.ts';
import { isKnown, toBall } from '../values/arithmetic.ts';
import { prepare, evaluatePrepared } from '../values/evaluate.ts';
import type { KnownValue, Value } from '../values/value.ts';
import { differenceExpr, numberExpr, productExpr } from './build-expr.ts';
import { holds, type StepResult } from './step-result.ts';

export interface SameUpToFactor {
  readonly reached: Reached;
  readonly factor: Rational;
  /** Whether both have a value at the same places. */
  readonly sameDomain: boolean;
}

/** Whether left - right of one line is left - right of the other times a constant, as an identity; null where not. */
export function sameUpToFactor(
  above: CompareStatement,
  below: CompareStatement,
  given: Assignment,
  context: CheckContext,
): SameUpToFactor | null {
  const a = differenceExpr(above.left, above.right);
  const b = differenceExpr(below.left, below.right);
  const factor = findFactor(a, b, given, context);
  if (!factor) return null;
  const found = compareExpressions(factor.num === factor.den ? a : productExpr([numberExpr(factor), a]), b, context);
  if (found.kind !== 'equal') return null;
  return {
    reached: found.reached,
    factor,
    sameDomain: found.excluded.length === 0 && found.cancelled.length === 0,
  };
}

export function areSameUpToFactor(
  above: CompareStatement,
  below: CompareStatement,
  env: { readonly given: Assignment },
  context: CheckContext,
): boolean {
  return sameUpToFactor(above, below, env.given, context) !== null;
}

const trials: readonly Rational[] = [
  rational(7, 5),
  rational(13, 3),
  rational(1, 7),
  rational(-9, 4),
  rational(23, 2),
  rational(-17, 50),
];

/** b / a at a point where both are short fractions, else a factor of 1 or -1. */
function findFactor(a: Expr, b: Expr, given: Assignment, context: CheckContext): Rational | null {
  const names = [...new Set([...lettersOf(a), ...lettersOf(b)])];
  const graphs = [prepare(a, context), prepare(b, context)] as const;
  for (let k = 0; k < trials.length; k += 1) {
    const point = new Map<string, KnownValue>(
      names.map((name, j) => {
        const value = given.get(name) ?? (trials[(k + j * 5) % trials.length] as Rational);
        return [name, { kind: 'rational', value: context.wholeLetters.has(name) ? rational(k + j + 2) : value }];
      }),
    );
    const [x, y] = graphs.map((graph) => evaluatePrepared(graph, point, 128, context));
    if (!x || !y || x.kind === 'undefined' || y.kind === 'undefined') continue;
    if (x.kind === 'rational' && y.kind === 'rational') {
      if (isZero(x.value) !== isZero(y.value)) return null;
      if (!isZero(x.value)) return div(y.value, x.value);
      continue;
    }
    const ratio = roughRatio(x, y);
    if (ratio) return ratio;
  }
  return null;
}

/** A ratio of two balls where it is close to a short fraction. */
function roughRatio(x: Value, y: Value): Rational | null {
  const [p, q] = [middleOf(x), middleOf(y)];
  if (p === null || q === null || p === 0n) return null;
  for (let den = 1n; den <= 60n; den += 1n) {
    const scaled = (q * den * 2n + (p > 0n ? p : -p)) / (2n * p);
    for (const num of [scaled - 1n, scaled, scaled + 1n]) {
      const gap = q * den - num * p;
      if (num !== 0n && (gap < 0n ? -gap : gap) << 60n < (p < 0n ? -p : p)) return rational(num, den);
    }
  }
  return null;
}

function middleOf(value: Value): bigint | null {
  if (!isKnown(value)) return null;
  const { re, im } = toBall(value, 128);
  return im === null ? re.mid : null;
}

/** The same equation up to a constant factor, in any number of letters; null where it is not. */
export function judgeSameEquation(above: Statement, below: Statement, context: CheckContext): StepResult | null {
  if (above.kind !== 'compare' || below.kind !== 'compare') return null;
  if (above.sign !== '=' || below.sign !== '=') return null;
  const same = sameUpToFactor(above, below, new Map(), context);
  return same?.sameDomain ? holds(same.reached) : null;
}
