import type { Expr, SumExpr } from '../../../shared/maths/expression.ts';
import type { Rational } from '../numbers/rational.ts';

/** Expressions that the checker makes for itself: they stand nowhere in a text. */
const span = { start: 0, end: 0 };

export function numberExpr(value: Rational): Expr {
  const size: Expr = {
    kind: 'number',
    numerator: value.num < 0n ? -value.num : value.num,
    denominator: value.den,
    written: 'integer',
    decimals: 0,
    span,
  };
  return value.num < 0n ? minusExpr(size) : size;
}

export function letterExpr(name: string): Expr {
  return { kind: 'letter', name, span };
}

export function minusExpr(expr: Expr): SumExpr {
  return { kind: 'sum', terms: [{ sign: 'minus', expr, span }], span };
}

export function sumExpr(parts: readonly Expr[]): Expr {
  if (parts.length === 1) return parts[0] as Expr;
  return { kind: 'sum', terms: parts.map((expr) => ({ sign: 'plus', expr, span })), span };
}

export function differenceExpr(left: Expr, right: Expr): SumExpr {
  return {
    kind: 'sum',
    terms: [
      { sign: 'plus', expr: left, span },
      { sign: 'minus', expr: right, span },
    ],
    span,
  };
}

export function productExpr(factors: readonly Expr[]): Expr {
  if (factors.length === 1) return factors[0] as Expr;
  if (factors.length === 0) return numberExpr({ num: 1n, den: 1n });
  return { kind: 'product', factors, joins: factors.slice(1).map(() => 'times' as const), span };
}

export function quotientExpr(numerator: Expr, denominator: Expr): Expr {
  return { kind: 'quotient', numerator, denominator, written: 'fraction', span };
}

export function powerExpr(base: Expr, exponent: Rational): Expr {
  return { kind: 'power', base, exponent: numberExpr(exponent), span };
}

/** The signed terms of a difference of two sides, each with its sign as a factor of 1 or -1. */
export interface SignedTerm {
  readonly negative: boolean;
  readonly expr: Expr;
}

export function termsOf(expr: Expr, negative = false): SignedTerm[] {
  if (expr.kind !== 'sum') return [{ negative, expr }];
  return expr.terms.flatMap((term) => termsOf(term.expr, negative !== (term.sign === 'minus')));
}

export function fromTerms(terms: readonly SignedTerm[]): Expr {
  if (terms.length === 0) return numberExpr({ num: 0n, den: 1n });
  return {
    kind: 'sum',
    terms: terms.map(({ negative, expr }) => ({ sign: negative ? 'minus' : 'plus', expr, span })),
    span,
  };
}
