import type { Expr, FunctionName, Term } from '../../../shared/maths/expression.ts';
import type { Rational } from '../numbers/rational.ts';

/** Expressions that stand nowhere in a text. */
const span = { start: 0, end: 0 };

export function whole(value: number | bigint): Expr {
  const size = BigInt(value);
  return size < 0n
    ? neg(whole(-size))
    : { kind: 'number', numerator: size, denominator: 1n, written: 'integer', decimals: 0, span };
}

/** A fraction of whole numbers, as people write it. */
export function fraction({ num, den }: Rational): Expr {
  if (den === 1n) return whole(num);
  return num < 0n ? neg(quotient(whole(-num), whole(den))) : quotient(whole(num), whole(den));
}

export function letter(name: string): Expr {
  return { kind: 'letter', name, span };
}

export function neg(expr: Expr): Expr {
  if (isZero(expr)) return expr;
  if (expr.kind === 'sum' && expr.terms.length === 1 && expr.terms[0]?.sign === 'minus') return expr.terms[0].expr;
  return { kind: 'sum', terms: [{ sign: 'minus', expr, span }], span };
}

/** Signed parts as one sum; sums among them are taken apart. */
export function sum(...parts: readonly Expr[]): Expr {
  const terms = parts.flatMap(termsOf);
  if (terms.length === 1 && terms[0]?.sign === 'plus') return terms[0].expr;
  return terms.length === 0 ? whole(0) : { kind: 'sum', terms, span };
}

export function termsOf(expr: Expr): readonly Term[] {
  return expr.kind === 'sum' ? expr.terms : [{ sign: 'plus', expr, span }];
}

/** Signs move to the front, products among the factors are taken apart, and factors of 1 go. */
export function product(...parts: readonly Expr[]): Expr {
  let negative = false;
  const factors: Expr[] = [];
  for (const part of parts) {
    const [only] = part.kind === 'sum' && part.terms.length === 1 ? part.terms : [];
    const inner = only && (only.sign === 'minus' || only.sign === 'plus') ? only.expr : part;
    if (only?.sign === 'minus') negative = !negative;
    factors.push(...(inner.kind === 'product' ? inner.factors : [inner]));
  }
  const kept = factors.filter((factor) => !isOne(factor));
  if (kept.some(isZero)) return whole(0);
  const result: Expr =
    kept.length === 0
      ? whole(1)
      : kept.length === 1
        ? (kept[0] as Expr)
        : {
            kind: 'product',
            factors: kept,
            joins: kept.slice(1).map((factor) => (startsWithDigit(factor) ? 'dot' : 'implicit')),
            span,
          };
  return negative ? neg(result) : result;
}

function startsWithDigit(factor: Expr): boolean {
  return factor.kind === 'number' || (factor.kind === 'power' && startsWithDigit(factor.base));
}

export function quotient(numerator: Expr, denominator: Expr): Expr {
  return isOne(denominator) ? numerator : { kind: 'quotient', numerator, denominator, written: 'fraction', span };
}

export function power(base: Expr, exponent: Expr): Expr {
  if (isOne(exponent)) return base;
  return isZero(exponent) ? whole(1) : { kind: 'power', base, exponent, span };
}

export function root(radicand: Expr): Expr {
  return { kind: 'root', degree: null, radicand, span };
}

export function call(name: FunctionName, ...args: readonly Expr[]): Expr {
  return { kind: 'call', name, args, span };
}

export function isOne(expr: Expr): boolean {
  return expr.kind === 'number' && expr.numerator === expr.denominator;
}

export function isZero(expr: Expr): boolean {
  return expr.kind === 'number' && expr.numerator === 0n;
}
