import type { Expr, Term } from '../../../shared/maths/expression.ts';
import { sameExpr } from '../../../shared/maths/same.ts';
import { childrenOf } from '../../../shared/maths/walk.ts';
import * as Q from '../numbers/rational.ts';
import { neg, termsOf } from './build.ts';
import { collect, keyOf, negated, spread, type Monomial } from './monomials.ts';

/**
 * The parts of a line that match a part of the line above, worked out term by term: they are right as they stand, so a
 * mend leaves them alone where it can.
 */
export function findRightParts(above: Expr, below: Expr): ReadonlySet<Expr> {
  const found = new Set<Expr>();
  matchParts(above, below, found);
  return found;
}

/** The same for both sides of a relation, what stands on the right counted as moved to the left. */
export function findRightTerms(above: readonly [Expr, Expr], below: readonly [Expr, Expr]): ReadonlySet<Expr> {
  const found = new Set<Expr>();
  const terms = (sides: readonly [Expr, Expr]): Term[] => [...termsOf(sides[0]), ...termsOf(sides[1]).map(turned)];
  matchTerms(spreadAll(terms(above)), terms(below), found);
  return found;
}

function turned(term: Term): Term {
  return { ...term, sign: term.sign === 'minus' ? 'plus' : 'minus' };
}

function spreadAll(terms: readonly Term[]): Monomial[] | null {
  const parts = terms.map((term) => spread(term.sign === 'minus' ? neg(term.expr) : term.expr));
  return parts.includes(null) ? null : parts.flatMap((part) => part ?? []);
}

function matchParts(above: Expr, below: Expr, found: Set<Expr>): void {
  if (sameExpr(above, below)) return mark(below, found);
  if (above.kind === 'quotient' && below.kind === 'quotient') {
    if (areSame(above.denominator, below.denominator)) {
      mark(below.denominator, found);
      matchParts(above.numerator, below.numerator, found);
    } else if (areSame(above.numerator, below.numerator)) {
      mark(below.numerator, found);
      matchParts(above.denominator, below.denominator, found);
    }
    return;
  }
  if (below.kind === 'sum') return matchTerms(spread(above), below.terms, found);
  if (below.kind === 'product') return matchFactors(above, below.factors, found);
  const [before, after] = [childrenOf(above), childrenOf(below)];
  if (above.kind === below.kind && before.length === after.length)
    before.forEach((part, k) => matchParts(part, after[k] as Expr, found));
}

function areSame(a: Expr, b: Expr): boolean {
  if (sameExpr(a, b)) return true;
  const [left, right] = [spread(a), spread(b)];
  return left !== null && right !== null && collect([...left, ...right.map(negated)]).length === 0;
}

/** A term is right when it is one of the terms above, or when all like terms together come to what they come to above. */
function matchTerms(above: readonly Monomial[] | null, terms: readonly Term[], found: Set<Expr>): void {
  if (!above) return;
  const left = [...above];
  const own = terms.map((term) => ({ term, parts: spread(term.sign === 'minus' ? neg(term.expr) : term.expr) }));
  for (const { term, parts } of own) {
    const [only] = parts ?? [];
    if (!only || parts?.length !== 1) continue;
    const place = left.findIndex(
      (other) => keyOf(other) === keyOf(only) && Q.equals(other.coefficient, only.coefficient),
    );
    if (place < 0) continue;
    left.splice(place, 1);
    mark(term.expr, found);
  }
  const all = own.flatMap(({ parts }) => parts ?? []);
  const wrong = new Set(collect([...above, ...all.map(negated)]).map(keyOf));
  for (const { term, parts } of own) {
    if (parts && parts.length > 0 && parts.every((part) => !wrong.has(keyOf(part)))) mark(term.expr, found);
  }
}

function matchFactors(above: Expr, factors: readonly Expr[], found: Set<Expr>): void {
  const left = above.kind === 'product' ? [...above.factors] : [above];
  for (const factor of factors) {
    const place = left.findIndex((other) => sameExpr(other, factor));
    if (place < 0) continue;
    left.splice(place, 1);
    mark(factor, found);
  }
}

function mark(expr: Expr, found: Set<Expr>): void {
  found.add(expr);
  for (const part of childrenOf(expr)) mark(part, found);
}
