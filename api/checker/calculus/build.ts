import type { Expr, Span } from '../../../shared/maths/expression.ts';
import * as Q from '../numbers/rational.ts';
import type { Rational } from '../numbers/rational.ts';

/** Expressions that calculus makes, with numbers folded and zeros left out, so that they stay short. */

const span: Span = { start: 0, end: 0 };

export function rationalExpr(value: Rational): Expr {
  const size: Expr = {
    kind: 'number',
    numerator: value.num < 0n ? -value.num : value.num,
    denominator: value.den,
    written: 'integer',
    decimals: 0,
    span,
  };
  return value.num < 0n ? { kind: 'sum', terms: [{ sign: 'minus', expr: size, span }], span } : size;
}

export function numberOf(value: number | bigint, den: number | bigint = 1n): Expr {
  return rationalExpr(Q.rational(value, den));
}

export const zeroExpr = numberOf(0);
export const oneExpr = numberOf(1);
export const infinityExpr: Expr = { kind: 'constant', name: 'infinity', span };
export const piExpr: Expr = { kind: 'constant', name: 'pi', span };
/** Has no value anywhere. */
export const noValueExpr: Expr = {
  kind: 'quotient',
  numerator: oneExpr,
  denominator: zeroExpr,
  written: 'fraction',
  span,
};

/** The fraction that an expression is, where numbers and signs alone say so. */
export function rationalOf(expr: Expr): Rational | null {
  switch (expr.kind) {
    case 'number':
      return Q.rational(expr.numerator, expr.denominator);
    case 'sum': {
      let total = Q.zero;
      for (const term of expr.terms) {
        const value = rationalOf(term.expr);
        if (value === null || (term.sign !== 'plus' && term.sign !== 'minus')) return null;
        total = Q.add(total, term.sign === 'plus' ? value : Q.negate(value));
      }
      return total;
    }
    case 'product': {
      let total = Q.one;
      for (const factor of expr.factors) {
        const value = rationalOf(factor);
        if (value === null) return null;
        total = Q.mul(total, value);
      }
      return total;
    }
    case 'quotient': {
      const top = rationalOf(expr.numerator);
      const bottom = top && rationalOf(expr.denominator);
      return top && bottom && !Q.isZero(bottom) ? Q.div(top, bottom) : null;
    }
    case 'power': {
      const base = rationalOf(expr.base);
      const exponent = base && rationalOf(expr.exponent);
      if (!base || !exponent || exponent.den !== 1n || exponent.num > 64n || exponent.num < -64n) return null;
      return Q.isZero(base) && exponent.num <= 0n ? null : Q.pow(base, Number(exponent.num));
    }
    default:
      return null;
  }
}

export function isZeroExpr(expr: Expr): boolean {
  const value = rationalOf(expr);
  return value !== null && Q.isZero(value);
}

function isOneExpr(expr: Expr): boolean {
  const value = rationalOf(expr);
  return value !== null && Q.equals(value, Q.one);
}

export function addExprs(...parts: readonly Expr[]): Expr {
  let total = Q.zero;
  const rest: Expr[] = [];
  for (const part of parts) {
    const value = rationalOf(part);
    if (value === null) rest.push(part);
    else total = Q.add(total, value);
  }
  if (!Q.isZero(total)) rest.push(rationalExpr(total));
  if (rest.length === 0) return zeroExpr;
  if (rest.length === 1) return rest[0] as Expr;
  return { kind: 'sum', terms: rest.map((expr) => ({ sign: 'plus', expr, span })), span };
}

export function negateExpr(expr: Expr): Expr {
  const value = rationalOf(expr);
  if (value !== null) return rationalExpr(Q.negate(value));
  return { kind: 'sum', terms: [{ sign: 'minus', expr, span }], span };
}

export function subExprs(a: Expr, b: Expr): Expr {
  return isZeroExpr(b) ? a : addExprs(a, negateExpr(b));
}

export function mulExprs(...factors: readonly Expr[]): Expr {
  let total = Q.one;
  const rest: Expr[] = [];
  for (const factor of factors) {
    const value = rationalOf(factor);
    if (value === null) rest.push(factor);
    else total = Q.mul(total, value);
  }
  if (Q.isZero(total)) return zeroExpr;
  if (!Q.equals(total, Q.one)) rest.unshift(rationalExpr(total));
  if (rest.length === 0) return oneExpr;
  if (rest.length === 1) return rest[0] as Expr;
  return { kind: 'product', factors: rest, joins: rest.slice(1).map(() => 'dot' as const), span };
}

export function divExprs(numerator: Expr, denominator: Expr): Expr {
  const [a, b] = [rationalOf(numerator), rationalOf(denominator)];
  if (a && b && !Q.isZero(b)) return rationalExpr(Q.div(a, b));
  if (isOneExpr(denominator)) return numerator;
  if (a && Q.isZero(a) && !b) return zeroExpr;
  return { kind: 'quotient', numerator, denominator, written: 'fraction', span };
}

export function powExprs(base: Expr, exponent: Expr): Expr {
  if (isOneExpr(exponent)) return base;
  const whole: Expr = { kind: 'power', base, exponent, span };
  const value = rationalOf(whole) ?? rootOf(base, exponent);
  return value === null ? whole : rationalExpr(value);
}

/** A broken power of a positive fraction, where it is one. */
function rootOf(base: Expr, exponent: Expr): Rational | null {
  const [a, r] = [rationalOf(base), rationalOf(exponent)];
  if (!a || !r || a.num <= 0n || r.den === 1n || r.den > 12n || r.num > 64n || r.num < -64n) return null;
  const root = Q.exactRoot(a, Number(r.den));
  return root && Q.pow(root, Number(r.num));
}

export function callOf(name: Extract<Expr, { kind: 'call' }>['name'], ...args: readonly Expr[]): Expr {
  return { kind: 'call', name, args, span };
}

export function sqrtExpr(radicand: Expr): Expr {
  return { kind: 'root', degree: null, radicand, span };
}

export function letterOf(name: string): Expr {
  return { kind: 'letter', name, span };
}

/** The same value, with a value only where `needed` has one. */
export function wherever(needed: Expr, expr: Expr): Expr {
  const nothing: Expr = { kind: 'product', factors: [zeroExpr, needed], joins: ['dot'], span };
  return {
    kind: 'sum',
    terms: [
      { sign: 'plus', expr, span },
      { sign: 'plus', expr: nothing, span },
    ],
    span,
  };
}
