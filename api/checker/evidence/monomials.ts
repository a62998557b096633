import type { Expr } from '../../../shared/maths/expression.ts';
import { printExpr } from '../../../shared/maths/print.ts';
import * as Q from '../numbers/rational.ts';
import type { Rational } from '../numbers/rational.ts';
import { fraction, neg, power, product, quotient, root, sum, whole } from './build.ts';

/** A fraction times whole powers of parts that are not taken further apart, each known by how it is printed. */
export interface Monomial {
  readonly coefficient: Rational;
  readonly powers: ReadonlyMap<string, Power>;
}
interface Power {
  readonly base: Expr;
  readonly exponent: number;
}

const mostTerms = 120;
const largestExponent = 6;
const noPowers: ReadonlyMap<string, Power> = new Map();

/**
 * The terms of an expression multiplied out, like terms not joined and in the order of the work; null where there are
 * too many. Exact: the sum of the terms is the expression wherever it has a value.
 */
export function spread(expr: Expr): Monomial[] | null {
  switch (expr.kind) {
    case 'number':
      return [{ coefficient: { num: expr.numerator, den: expr.denominator }, powers: noPowers }];
    case 'sum':
      return spreadSum(expr);
    case 'product': {
      let terms: Monomial[] | null = [{ coefficient: Q.one, powers: noPowers }];
      for (const factor of expr.factors) terms = terms && times(terms, spread(factor));
      return terms;
    }
    case 'quotient': {
      const top = spread(expr.numerator);
      const bottom = spread(expr.denominator);
      const [only] = bottom ?? [];
      if (!top || !bottom) return null;
      if (bottom.length === 1 && only && !Q.isZero(only.coefficient)) return times(top, [inverse(only)]);
      return times(top, [atom(expr.denominator, -1)]);
    }
    case 'power':
      return spreadPower(expr);
    case 'root':
      return [spreadRoot(expr)];
    default:
      return [atom(expr, 1)];
  }
}

function spreadSum(expr: Extract<Expr, { kind: 'sum' }>): Monomial[] | null {
  const terms: Monomial[] = [];
  for (const term of expr.terms) {
    const inner = term.sign === 'plus' || term.sign === 'minus' ? spread(term.expr) : null;
    if (!inner || terms.length + inner.length > mostTerms) return null;
    terms.push(...(term.sign === 'minus' ? inner.map(negated) : inner));
  }
  return terms;
}

export function negated(term: Monomial): Monomial {
  return { ...term, coefficient: Q.negate(term.coefficient) };
}

function atom(base: Expr, exponent: number): Monomial {
  return normal(Q.one, new Map([[printExpr(base), { base, exponent }]]));
}

function times(left: readonly Monomial[], right: readonly Monomial[] | null): Monomial[] | null {
  if (!right || left.length * right.length > mostTerms) return null;
  return left.flatMap((a) => right.map((b) => multiplied(a, b)));
}

function multiplied(a: Monomial, b: Monomial): Monomial {
  const powers = new Map(a.powers);
  for (const [key, { base, exponent }] of b.powers) {
    powers.set(key, { base, exponent: (powers.get(key)?.exponent ?? 0) + exponent });
  }
  return normal(Q.mul(a.coefficient, b.coefficient), powers);
}

function inverse(term: Monomial): Monomial {
  const powers = new Map([...term.powers].map(([key, { base, exponent }]) => [key, { base, exponent: -exponent }]));
  return normal(Q.div(Q.one, term.coefficient), powers);
}

/** i^2 = -1, and the square of the root of a number or letter is the number or letter. */
function normal(coefficient: Rational, powers: ReadonlyMap<string, Power>): Monomial {
  let factor = coefficient;
  const kept = new Map<string, Power>();
  for (const [key, { base, exponent }] of powers) {
    let left = exponent;
    if (base.kind === 'constant' && base.name === 'i') {
      const turns = ((exponent % 4) + 4) % 4;
      if (turns >= 2) factor = Q.negate(factor);
      left = turns % 2;
    } else if (base.kind === 'root' && base.radicand.kind === 'number' && !base.degree) {
      const pairs = Math.floor(exponent / 2);
      factor = Q.mul(factor, Q.pow({ num: base.radicand.numerator, den: base.radicand.denominator }, pairs));
      left = exponent - 2 * pairs;
    } else if (base.kind === 'root' && base.radicand.kind === 'letter' && !base.degree && exponent >= 2) {
      const { radicand } = base;
      const pairs = Math.floor(exponent / 2);
      const known = powers.get(radicand.name)?.exponent ?? 0;
      kept.set(radicand.name, { base: radicand, exponent: known + pairs });
      left = exponent - 2 * pairs;
    }
    if (left !== 0 && !kept.has(key)) kept.set(key, { base, exponent: left });
  }
  return { coefficient: factor, powers: kept };
}

function spreadPower(expr: Extract<Expr, { kind: 'power' }>): Monomial[] | null {
  const exponent = wholeValue(expr.exponent);
  if (exponent === null || Math.abs(exponent) > 60) return [atom(expr, 1)];
  const base = spread(expr.base);
  const [only] = base ?? [];
  if (!base) return null;
  if (base.length === 1 && only) {
    if (Q.isZero(only.coefficient)) return exponent > 0 ? [only] : [atom(expr, 1)];
    const powers = new Map(
      [...only.powers].map(([key, part]) => [key, { base: part.base, exponent: part.exponent * exponent }]),
    );
    return [normal(Q.pow(only.coefficient, exponent), powers)];
  }
  if (exponent < 0) return [atom(expr.base, exponent)];
  if (exponent > largestExponent) return null;
  let terms: Monomial[] | null = [{ coefficient: Q.one, powers: noPowers }];
  for (let k = 0; k < exponent; k += 1) terms = terms && times(terms, base);
  return terms;
}

export function wholeValue(expr: Expr): number | null {
  if (expr.kind === 'number') return expr.denominator === 1n && expr.numerator < 1000n ? Number(expr.numerator) : null;
  const [only] = expr.kind === 'sum' && expr.terms.length === 1 ? expr.terms : [];
  const inner = only?.sign === 'minus' ? wholeValue(only.expr) : null;
  return inner === null ? null : -inner;
}

function spreadRoot(expr: Extract<Expr, { kind: 'root' }>): Monomial {
  const { radicand } = expr;
  if (expr.degree || radicand.kind !== 'number' || radicand.denominator !== 1n || radicand.numerator > 1_000_000n)
    return atom(expr, 1);
  let outside = 1n;
  let inside = radicand.numerator;
  for (let k = 2n; k * k <= inside; k += 1n) {
    while (inside > 0n && inside % (k * k) === 0n) [outside, inside] = [outside * k, inside / (k * k)];
  }
  const factor = { num: outside, den: 1n };
  if (inside === 1n || inside === 0n) return { coefficient: inside === 0n ? Q.zero : factor, powers: noPowers };
  const base = root(whole(inside));
  return { coefficient: factor, powers: new Map([[printExpr(base), { base, exponent: 1 }]]) };
}

/** Equal for like terms. */
export function keyOf(term: Monomial): string {
  return [...term.powers]
    .map(([key, { exponent }]) => `${key}^${exponent}`)
    .sort()
    .join('*');
}

/** Like terms joined, in order of first appearance; what comes to nothing is left out. */
export function collect(terms: readonly Monomial[]): Monomial[] {
  const found = new Map<string, Monomial>();
  for (const term of terms) {
    const key = keyOf(term);
    const other = found.get(key);
    found.set(key, other ? { ...other, coefficient: Q.add(other.coefficient, term.coefficient) } : term);
  }
  return [...found.values()].filter((term) => !Q.isZero(term.coefficient));
}

/** Number first, then the parts in order of first appearance; negative exponents below. */
export function monomialExpr({ coefficient, powers }: Monomial): Expr {
  const size = Q.absolute(coefficient);
  const above: Expr[] = [];
  const below: Expr[] = [];
  for (const { base, exponent } of powers.values()) {
    (exponent > 0 ? above : below).push(power(base, whole(Math.abs(exponent))));
  }
  const isPlain = below.length === 0 && (size.den === 1n || above.length === 0);
  const result = isPlain
    ? product(fraction(size), ...above)
    : quotient(product(whole(size.num), ...above), product(whole(size.den), ...below));
  return coefficient.num < 0n ? neg(result) : result;
}

export function sumExpr(terms: readonly Monomial[]): Expr {
  return terms.length === 0 ? whole(0) : sum(...terms.map(monomialExpr));
}

/** Multiplied out with like terms joined; null where that is too long. */
export function expanded(expr: Expr): Monomial[] | null {
  const terms = spread(expr);
  return terms && collect(terms);
}
