import type { Expr, Term } from '../../../shared/maths/expression.ts';
import { lettersOf } from '../../../shared/maths/letters.ts';
import { sameExpr } from '../../../shared/maths/same.ts';
import { childrenOf } from '../../../shared/maths/walk.ts';
import { signedTerm } from '../slips/relations.ts';
import * as Q from '../numbers/rational.ts';
import { neg, product, termsOf } from './build.ts';
import { isFiniteNumber, isNear } from './complex-double.ts';
import { estimate, type Place } from './estimate.ts';
import { collect, keyOf, negated, spread, type Monomial } from './monomials.ts';

/**
 * The parts of a line that match a part of the line above, worked out term by term: they are right as they stand, so a
 * mend leaves them alone where it can.
 */
export function findRightParts(above: Expr, below: Expr): ReadonlySet<Expr> {
  const found = new Set<Expr>();
  matchParts(above, below, found);
  matchArguments(above, below, found);
  matchValues(above, below, found);
  return found;
}

const nowhere: Place = { letters: new Map(), definitions: { letters: new Map(), functions: new Map() } };

/** Numbers worked out of functions and roots, one for each term or factor: those that are worth what stands above. */
function matchValues(above: Expr, below: Expr, found: Set<Expr>): void {
  if (above.kind !== below.kind || (above.kind !== 'sum' && above.kind !== 'product')) return;
  const parts = (expr: Expr): readonly Expr[] => (expr.kind === 'sum' ? expr.terms.map(signedTerm) : childrenOf(expr));
  const [before, after] = [parts(above), parts(below)];
  if (before.length !== after.length) return;
  for (const [k, own] of after.entries()) {
    const other = before[k] as Expr;
    if (lettersOf(own).length > 0 || lettersOf(other).length > 0 || !isWorkedOut(other)) continue;
    const [value, wanted] = [estimate(own, nowhere), estimate(other, nowhere)];
    if (isFiniteNumber(value) && isFiniteNumber(wanted) && isNear(value, wanted))
      mark(childrenOf(below)[k] as Expr, found);
  }
}

function isWorkedOut(expr: Expr): boolean {
  return ['call', 'log', 'root'].includes(expr.kind) || childrenOf(expr).some(isWorkedOut);
}

/** Numbers that stand in the arguments of functions above and below were copied. */
function matchArguments(above: Expr, below: Expr, found: Set<Expr>): void {
  const known = numbersInArguments(above);
  for (const own of numbersInArguments(below)) if (known.some((other) => sameExpr(own, other))) found.add(own);
}

function numbersInArguments(expr: Expr, isInside = false): Expr[] {
  if (expr.kind === 'number') return isInside ? [expr] : [];
  const within = isInside || expr.kind === 'call' || expr.kind === 'log';
  return childrenOf(expr).flatMap((part) => numbersInArguments(part, within));
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
  if (above.kind === 'sum' && below.kind === 'quotient' && below.numerator.kind === 'sum')
    return matchTerms(spread(product(above, below.denominator)), below.numerator.terms, found);
  if (above.kind === 'integral' && below.kind === 'evaluated') {
    for (const [limit, own] of [
      [above.from, below.from],
      [above.to, below.to],
    ] as const)
      if (limit && own && sameExpr(limit, own)) mark(own, found);
    return;
  }
  if (below.kind === 'sum') {
    matchTerms(spread(above), below.terms, found);
    if (above.kind === 'sum') matchInside(above.terms, below.terms, found);
    return;
  }
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
    if (!only || parts?.length !== 1 || isJoined(only, above, own)) continue;
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

/** Term against term where there are as many, and none of the two is known to be right as a whole. */
function matchInside(above: readonly Term[], below: readonly Term[], found: Set<Expr>): void {
  if (above.length !== below.length) return;
  for (const [k, term] of below.entries()) {
    const other = above[k];
    if (other?.sign === term.sign && !found.has(term.expr) && other.expr.kind === term.expr.kind)
      matchParts(other.expr, term.expr, found);
  }
}

interface OwnTerm {
  readonly parts: readonly Monomial[] | null;
}

/** All like terms above were joined to this one: that its number is among theirs says nothing. */
function isJoined(term: Monomial, above: readonly Monomial[], own: readonly OwnTerm[]): boolean {
  const key = keyOf(term);
  const alike = own.flatMap(({ parts }) => parts ?? []).filter((other) => keyOf(other) === key);
  return alike.length === 1 && above.filter((other) => keyOf(other) === key).length > 1;
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
