import type { Expr, NumberExpr } from '../../../shared/maths/expression.ts';
import { childrenOf, mapChildren } from '../../../shared/maths/walk.ts';
import type { CheckContext } from '../context.ts';
import { ballFromRational, type Ball } from '../numbers/ball.ts';
import { rational, type Rational } from '../numbers/rational.ts';
import { isKnown, toBall } from '../values/arithmetic.ts';
import { evaluatePrepared, prepare } from '../values/evaluate.ts';
import type { KnownValue } from '../values/value.ts';

/**
 * Half a unit of the last digit that an approximate value was written with: 0.005 for 2.50, 1/2 for 7, 50 for 1400
 * (zeros at the end may be rounded ones). Null where the expression is not one written number.
 */
export function roundingHalf(expr: Expr): Rational | null {
  if (expr.kind === 'sum' && expr.terms.length === 1) return roundingHalf((expr.terms[0] as { expr: Expr }).expr);
  if (expr.kind !== 'number' || (expr.written !== 'integer' && expr.written !== 'decimal')) {
    return expr.kind === 'number' && expr.written === 'percent' ? percentHalf(expr.decimals) : null;
  }
  if (expr.written === 'decimal') return rational(1n, 2n * 10n ** BigInt(expr.decimals));
  let unit = 1n;
  while (expr.numerator !== 0n && expr.numerator % (unit * 10n) === 0n) unit *= 10n;
  return rational(unit, 2n);
}

function percentHalf(decimals: number): Rational {
  return rational(1n, 200n * 10n ** BigInt(decimals));
}

/** Bits of the ranges below: far finer than what anybody rounds to. */
export const rangeBits = 128;

/** Whether some number in an expression may have been rounded: one with decimals, or the expression is one number. */
export function mayBeRounded(expr: Expr): boolean {
  return roundingHalf(expr) !== null || hasDecimals(expr);
}

function hasDecimals(expr: Expr): boolean {
  return (expr.kind === 'number' && expr.written === 'decimal') || childrenOf(expr).some(hasDecimals);
}

/**
 * All values of an expression whose decimals stand for the numbers that round to them, as a ball that may be somewhat
 * too wide; null where it has none. Other letters have the values given.
 */
export function rangeOf(expr: Expr, given: ReadonlyMap<string, Rational>, context: CheckContext): Ball | null {
  const point = new Map<string, KnownValue>();
  for (const [name, value] of given) point.set(name, { kind: 'rational', value });
  const isWhole = roundingHalf(expr) !== null;
  const widen = (node: Expr): Expr => {
    if (node.kind !== 'number' || !(isWhole || node.written === 'decimal')) return mapChildren(node, widen);
    const half = roundingHalf(node);
    if (!half) return node;
    const name = `rounded_${point.size}`;
    point.set(name, { kind: 'ball', re: widened(node, half), im: null });
    return { kind: 'letter', name, span: node.span };
  };
  return valueOf(widen(expr), point, context);
}

/** The value of an expression as it stands. */
export function exactRange(expr: Expr, given: ReadonlyMap<string, Rational>, context: CheckContext): Ball | null {
  return valueOf(expr, new Map([...given].map(([name, value]) => [name, { kind: 'rational', value }])), context);
}

function valueOf(expr: Expr, point: ReadonlyMap<string, KnownValue>, context: CheckContext): Ball | null {
  const value = evaluatePrepared(prepare(expr, context), point, rangeBits, context);
  if (!isKnown(value)) return null;
  const { re, im } = toBall(value, rangeBits);
  return im === null ? re : null;
}

/** Numbers that lie half-way between two written ones belong to both: the ends are left out where that decides. */
function widened(node: NumberExpr, half: Rational): Ball {
  const middle = ballFromRational({ num: node.numerator, den: node.denominator }, rangeBits);
  return { mid: middle.mid, rad: (half.num << BigInt(rangeBits)) / half.den - 1n };
}
