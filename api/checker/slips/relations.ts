import type { Expr, Line, RelationSign, Term } from '../../../shared/maths/expression.ts';
import { lettersOf } from '../../../shared/maths/letters.ts';
import { fraction, neg, product, quotient, sum, termsOf, whole } from '../evidence/build.ts';
import { factorsOf, isNumber } from './match.ts';

export type Relation = Extract<Line, { kind: 'relation' }>;

const span = { start: 0, end: 0 };

export function relation(left: Expr, sign: RelationSign, right: Expr): Relation {
  return { kind: 'relation', left, sign, right, span };
}

export function any(parts: readonly Line[]): Line {
  return parts.length === 1 ? (parts[0] as Line) : { kind: 'any', parts, span };
}

/** Both ways to look at a relation, the second with its sides exchanged. */
export function bothWays(line: Line): Relation[] {
  if (line.kind !== 'relation') return [];
  return [line, relation(line.right, mirrored(line.sign), line.left)];
}

export function mirrored(sign: RelationSign): RelationSign {
  const turned: Partial<Record<RelationSign, RelationSign>> = { '<': '>', '>': '<', '<=': '>=', '>=': '<=' };
  return turned[sign] ?? sign;
}

export function signedTerms(expr: Expr): readonly Expr[] {
  return termsOf(expr).map(signedTerm);
}

export function signedTerm(term: Term): Expr {
  return term.sign === 'minus' ? neg(term.expr) : term.expr;
}

export function without<T>(items: readonly T[], place: number): T[] {
  return items.filter((_, k) => k !== place);
}

/** A side that is one product, as a factor and the rest, for every factor. */
export function* splitFactors(expr: Expr): Generator<{ factor: Expr; rest: Expr }> {
  const [only] = expr.kind === 'sum' && expr.terms.length === 1 ? expr.terms : [];
  const isNegative = only?.sign === 'minus';
  const factors = factorsOf(only && (isNegative || only.sign === 'plus') ? only.expr : expr);
  for (const [k, factor] of factors.entries()) {
    const rest = factors.length === 1 ? whole(1) : product(...without(factors, k));
    yield {
      factor: isNegative && isNumber(factor) ? neg(factor) : factor,
      rest: isNegative && !isNumber(factor) ? neg(rest) : rest,
    };
    if (factors.length > 2) yield { factor: rest, rest: factor };
  }
  if (expr.kind === 'quotient' && isNumber(expr.denominator))
    yield { factor: quotient(whole(1), expr.denominator), rest: expr.numerator };
}

/** a, b and c of a x^2 + b x + c = 0, found from values and checked; null for anything else. */
export function quadraticOf(
  line: Relation,
  at: (expr: Expr, x: number) => number,
): { a: Expr; b: Expr; c: Expr; letter: string } | null {
  const [letter, ...others] = [...new Set([...lettersOf(line.left), ...lettersOf(line.right)])];
  if (!letter || others.length > 0 || line.sign !== '=') return null;
  const f = (x: number): number => at(line.left, x) - at(line.right, x);
  const c = f(0);
  const a = (f(1) + f(-1)) / 2 - c;
  const b = f(1) - a - c;
  if (![a, b, c].every(Number.isSafeInteger) || a === 0 || f(3) !== 9 * a + 3 * b + c || f(-2) !== 4 * a - 2 * b + c)
    return null;
  const toExpr = (value: number): Expr => fraction({ num: BigInt(value), den: 1n });
  return { a: toExpr(a), b: toExpr(b), c: toExpr(c), letter };
}

/** Terms that several sides share as a factor. */
export function commonFactors(left: Expr, right: Expr, same: (a: Expr, b: Expr) => boolean): Expr[] {
  const inRight = factorsOfSide(right);
  return factorsOfSide(left).filter(
    (factor) => lettersOf(factor).length > 0 && (isZeroSide(right) || inRight.some((other) => same(factor, other))),
  );
}

function isZeroSide(expr: Expr): boolean {
  return expr.kind === 'number' && expr.numerator === 0n;
}

/** Factors, a power counted by its base. */
function factorsOfSide(expr: Expr): Expr[] {
  const [only] = expr.kind === 'sum' && expr.terms.length === 1 ? expr.terms : [];
  return factorsOf(only ? only.expr : expr).flatMap((factor) => (factor.kind === 'power' ? [factor.base] : [factor]));
}

export function sumOf(parts: readonly Expr[]): Expr {
  return parts.length === 0 ? whole(0) : sum(...parts);
}
