import type { Expr } from '../../../shared/maths/expression.ts';
import { sameExpr } from '../../../shared/maths/same.ts';
import { childrenOf, mapExpr } from '../../../shared/maths/walk.ts';
import type { CheckContext } from '../context.ts';
import * as Q from '../numbers/rational.ts';
import { Unsettled } from '../solving/unsettled.ts';
import { isKnown } from '../values/arithmetic.ts';
import { evaluate } from '../values/evaluate.ts';
import { divExprs, mulExprs, numberOf, piExpr, powExprs, rationalExpr, rationalOf } from './build.ts';
import { isFree, linearIn } from './integrand.ts';
import type { LimitValue } from './limit-value.ts';

type Limit = (expr: Expr) => LimitValue;

/**
 * Whether an expression has no limit because a sine and cosine in it go on turning: at the points where these are 0, 1 or
 * -1 it tends to values that are certainly apart. All sines and cosines that turn have the same argument, and that passes
 * through all angles since it is continuous.
 */
export function turnsForEver(expr: Expr, variable: string, limit: Limit, areApart: AreApart): boolean {
  const angles = turningAngles(expr, variable, limit);
  const [angle] = angles;
  if (!angle || !angles.every((other) => sameExpr(other, angle)) || jumps(angle)) return false;
  const found: LimitValue[] = [];
  for (const [sine, cosine] of phases) {
    const fixed = mapExpr(expr, (node) =>
      isCircular(node) && node.args[0] && sameExpr(node.args[0], angle)
        ? numberOf(node.name === 'sin' ? sine : cosine)
        : node,
    );
    const value = attempt(() => limit(fixed));
    if (value && found.some((other) => areApart(other, value))) return true;
    if (value) found.push(value);
  }
  return false;
}

type AreApart = (a: LimitValue, b: LimitValue) => boolean;

const phases = [
  [0, 1],
  [1, 0],
  [-1, 0],
  [0, -1],
] as const;

function isCircular(expr: Expr): expr is Extract<Expr, { kind: 'call' }> {
  return expr.kind === 'call' && (expr.name === 'sin' || expr.name === 'cos');
}

/** The arguments, beyond all bounds, of sines and cosines. */
function turningAngles(expr: Expr, variable: string, limit: Limit): Expr[] {
  const inside = childrenOf(expr).flatMap((part) => turningAngles(part, variable, limit));
  const [angle] = isCircular(expr) ? expr.args : [];
  if (!angle || isFree(angle, variable) || attempt(() => limit(angle))?.kind !== 'infinite') return inside;
  return [angle, ...inside];
}

function attempt(limit: () => LimitValue): LimitValue | null {
  try {
    return limit();
  } catch (cause) {
    if (cause instanceof Unsettled) return null;
    throw cause;
  }
}

function jumps(expr: Expr): boolean {
  if (expr.kind === 'call' && ['floor', 'ceil', 'sign'].includes(expr.name)) return true;
  return expr.kind === 'factorial' || childrenOf(expr).some(jumps);
}

/**
 * The expression for even and for odd values of a whole letter, where it has powers of numbers below zero or sines and
 * cosines of multiples of a right angle; null where it has none.
 */
export function byParity(expr: Expr, letter: string, context: CheckContext): readonly [Expr, Expr] | null {
  let isFound = false;
  const forParity = (parity: 0 | 1): Expr =>
    mapExpr(expr, (node) => {
      const fixed = fixedSign(node, letter, parity, context);
      if (fixed) isFound = true;
      return fixed ?? node;
    });
  const both = [forParity(0), forParity(1)] as const;
  return isFound ? both : null;
}

function fixedSign(node: Expr, letter: string, parity: 0 | 1, context: CheckContext): Expr | null {
  const base = node.kind === 'power' ? rationalOf(node.base) : null;
  if (node.kind === 'power' && base && Q.sign(base) < 0) {
    const times = wholeLinear(node.exponent, letter);
    if (!times) return null;
    const sign = (times.slope * BigInt(parity) + times.constant) % 2n === 0n ? 1 : -1;
    return mulExprs(numberOf(sign), powExprs(rationalExpr(Q.absolute(base)), node.exponent));
  }
  if (!isCircular(node) || !node.args[0] || isFree(node.args[0], letter)) return null;
  const linear = linearIn(node.args[0], letter);
  const [slope, constant] = [linear?.slope, linear?.constant].map((part) => part && turnsIn(part, context));
  if (!slope || !constant || slope.den !== 1n || !linear) return null;
  const start = evaluateAt(node.name, linear.constant, context);
  if (!start) return null;
  return (slope.num * BigInt(parity)) % 2n === 0n ? start : mulExprs(numberOf(-1), start);
}

/** How many times pi a number is, where that is a fraction. */
function turnsIn(expr: Expr, context: CheckContext): Q.Rational | null {
  const value = evaluate(divExprs(expr, piExpr), new Map(), 128, context);
  return isKnown(value) && value.kind === 'rational' ? value.value : null;
}

function evaluateAt(name: 'sin' | 'cos' | string, angle: Expr, context: CheckContext): Expr | null {
  const call: Expr = { kind: 'call', name: name === 'sin' ? 'sin' : 'cos', args: [angle], span: angle.span };
  return isKnown(evaluate(call, new Map(), 128, context)) ? call : null;
}

function wholeLinear(expr: Expr, letter: string): { slope: bigint; constant: bigint } | null {
  const linear = linearIn(expr, letter);
  const [slope, constant] = [linear?.slope, linear?.constant].map((part) => (part ? rationalOf(part) : null));
  if (!slope || !constant || slope.den !== 1n || constant.den !== 1n) return null;
  return { slope: slope.num, constant: constant.num };
}
