import type { Expr, Line } from '../../../shared/maths/expression.ts';
import { lettersOf } from '../../../shared/maths/letters.ts';
import { printExpr } from '../../../shared/maths/print.ts';
import { call, fraction, isZero, letter, neg, power, product, quotient, root, sum, whole } from '../evidence/build.ts';
import { expanded, monomialExpr, spread, sumExpr, type Monomial } from '../evidence/monomials.ts';
import { overOneDenominator } from '../evidence/one-denominator.ts';
import * as Q from '../numbers/rational.ts';
import { factorsOf } from '../slips/match.ts';
import { any, mirrored, relation, signedTerms, type Relation } from '../slips/relations.ts';
import { coefficientsOf, degreeIn, inOrder, polynomialExpr } from './polynomial-parts.ts';
import { factoredForm } from './next-expression.ts';
import { nextOfQuadraticOrder } from './next-inequality.ts';
import { nextOfTrigonometric } from './next-trigonometric.ts';

type Move = (line: Relation, name: string) => Line | null;

const none: Line = { kind: 'none', span: { start: 0, end: 0 } };

/** The next line of a model solution for a letter, or null where it is solved or the ways of a first course end. */
export function nextStatement(line: Line, name: string): Line | null {
  if (line.kind === 'any') return nextOfEach(line.parts, name);
  if (line.kind !== 'relation') return null;
  const isSolved = line.left.kind === 'letter' && line.left.name === name && !has(line.right, name);
  if (isSolved) return lettersOf(line.right).length > 0 ? null : valueWorkedOut(line);
  const moves = line.sign === '=' ? equationMoves : orderMoves;
  for (const move of moves) {
    const found = move(line, name);
    if (found && !isSame(found, line)) return found;
  }
  return null;
}

function nextOfEach(parts: readonly Line[], name: string): Line | null {
  const next = parts.map((part) => nextStatement(part, name));
  if (next.every((part) => part === null)) return null;
  const kept = parts.flatMap((part, k) => {
    const line = next[k] ?? part;
    return line.kind === 'none' ? [] : line.kind === 'any' ? line.parts : [line];
  });
  return kept.length === 0 ? none : any(distinct(kept));
}

function distinct(lines: readonly Line[]): Line[] {
  return lines.filter((line, k) => !lines.slice(0, k).some((other) => isSame(other, line)));
}

function isSame(a: Line, b: Line): boolean {
  if (a.kind !== 'relation' || b.kind !== 'relation') return false;
  return a.sign === b.sign && printExpr(a.left) === printExpr(b.left) && printExpr(a.right) === printExpr(b.right);
}

function has(expr: Expr, name: string): boolean {
  return lettersOf(expr).includes(name);
}

/** The letter stands alone: only its value is worked out, where that makes it no longer. */
function valueWorkedOut(line: Relation): Line | null {
  const terms = expanded(line.right);
  const shorter = terms && sumExpr(terms);
  if (!shorter || printExpr(shorter).length > printExpr(line.right).length) return null;
  const found = relation(line.left, line.sign, shorter);
  return isSame(found, line) ? null : found;
}

function sidesExchanged(line: Relation, name: string): Line | null {
  return !has(line.left, name) && has(line.right, name) ? relation(line.right, mirrored(line.sign), line.left) : null;
}

function zeroProduct({ left, right }: Relation, name: string): Line | null {
  const factors = factorsOf(left).filter((factor) => has(factor, name));
  if (!isZero(right) || factorsOf(left).length < 2 || factors.length === 0) return null;
  return any(distinct(factors.map((factor) => relation(factor.kind === 'power' ? factor.base : factor, '=', right))));
}

function takenOff({ left, right }: Relation, name: string): Line | null {
  if (left.kind === 'call' && left.args[0]) {
    const [inner] = left.args;
    if (left.name === 'abs') return barsTakenOff(inner, right);
    if (left.name === 'ln' && right.kind === 'call' && right.name === 'ln' && right.args[0])
      return relation(inner, '=', right.args[0]);
    if (left.name === 'ln' && !has(right, name)) return relation(inner, '=', power(constantE, right));
    if (left.name === 'exp') return relation(inner, '=', call('ln', right));
  }
  if (left.kind === 'root' && !left.degree) return relation(left.radicand, '=', power(right, whole(2)));
  return left.kind === 'power' ? powerTakenOff(left, right, name) : null;
}

function barsTakenOff(inner: Expr, right: Expr): Line | null {
  const [value, ...more] = expanded(right) ?? [];
  if (isZero(right)) return relation(inner, '=', right);
  if (!value || more.length > 0 || value.powers.size > 0) return null;
  if (Q.sign(value.coefficient) < 0) return none;
  return any([relation(inner, '=', right), relation(inner, '=', neg(right))]);
}

const constantE: Expr = { kind: 'constant', name: 'e', span: { start: 0, end: 0 } };

function powerTakenOff(left: Extract<Expr, { kind: 'power' }>, right: Expr, name: string): Line | null {
  if (has(left.exponent, name) && !has(left.base, name)) {
    if (right.kind === 'power' && printExpr(right.base) === printExpr(left.base))
      return relation(left.exponent, '=', right.exponent);
    if (left.base.kind === 'constant' && left.base.name === 'e' && right.kind === 'number' && !isZero(right))
      return relation(left.exponent, '=', call('ln', right));
    return asPower(left, right);
  }
  const isSquare = left.exponent.kind === 'number' && left.exponent.numerator === 2n;
  if (!isSquare || has(right, name) || left.base.kind === 'number') return null;
  const [value] = expanded(right) ?? [];
  if (!value || value.powers.size > 0 || (expanded(right)?.length ?? 0) !== 1) return null;
  if (Q.sign(value.coefficient) < 0) return none;
  const exact = Q.exactRoot(value.coefficient, 2);
  const positive = exact ? fraction(exact) : root(fraction(value.coefficient));
  return any([relation(left.base, '=', positive), relation(left.base, '=', neg(positive))]);
}

/** 8 as a power of 2, where the other side is one of 2. */
function asPower(left: Extract<Expr, { kind: 'power' }>, right: Expr): Line | null {
  if (left.base.kind !== 'number' || right.kind !== 'number' || left.base.numerator < 2n) return null;
  let exponent = 0;
  for (let value = 1n; value <= right.numerator; value *= left.base.numerator) {
    if (value === right.numerator && right.denominator === 1n && exponent > 1)
      return relation(left, '=', { kind: 'power', base: left.base, exponent: whole(exponent), span: right.span });
    exponent += 1;
  }
  return null;
}

/** A root alone on its side, before both sides are squared. */
function rootAlone({ left, right }: Relation): Line | null {
  const terms = signedTerms(left);
  const place = terms.findIndex((term) => term.kind === 'root' && lettersOf(term).length > 0);
  const found = terms[place];
  if (terms.length < 2 || !found) return null;
  const moved = terms.filter((_, k) => k !== place).map(neg);
  return relation(found, '=', sumOrZero([...signedTerms(right).filter((term) => !isZero(term)), ...moved]));
}

function sumOrZero(parts: readonly Expr[]): Expr {
  return parts.length === 0 ? whole(0) : sum(...parts);
}

/** c f(x) + d = b with f no polynomial: f(x) alone, one operation at a time. */
function functionAlone({ left, sign, right }: Relation, name: string): Line | null {
  const isPolynomial = expanded(left)?.every((term) => degreeIn(term, name) !== null);
  if (has(right, name) || isPolynomial || hasBelow(left, name)) return null;
  const terms = signedTerms(left);
  const own = terms.filter((term) => has(term, name));
  const [only] = own;
  if (!only || own.length > 1) return null;
  if (terms.length > 1) {
    const moved = terms.filter((term) => term !== only).map(neg);
    return relation(only, sign, joinedNumbers(sumOrZero([...signedTerms(right).filter((t) => !isZero(t)), ...moved])));
  }
  const numbers = factorsOf(only).filter((factor) => !has(factor, name));
  if (numbers.length === 0) return null;
  const rest = factorsOf(only).filter((factor) => has(factor, name));
  return relation(product(...rest), sign, joinedNumbers(quotient(right, product(...numbers))));
}

function joinedNumbers(side: Expr): Expr {
  const terms = lettersOf(side).length === 0 ? expanded(side) : null;
  return terms ? sumExpr(terms) : side;
}

/** x (a + b) = c: divided by what stands beside the letter. */
function factorDividedOut({ left, sign, right }: Relation, name: string): Line | null {
  if (left.kind !== 'product' || sign !== '=' || has(right, name)) return null;
  const beside = left.factors.filter((factor) => !(factor.kind === 'letter' && factor.name === name));
  if (beside.length !== left.factors.length - 1 || beside.some((factor) => has(factor, name))) return null;
  return beside.some((factor) => factor.kind === 'sum')
    ? relation(letter(name), sign, quotient(right, product(...beside)))
    : null;
}

/** Fractions with the letter below them: each side over one denominator, then multiplied across. */
function denominatorsCleared({ left, right }: Relation, name: string): Line | null {
  if (!hasBelow(left, name) && !hasBelow(right, name)) return null;
  const joined = [left, right].map((side) =>
    side.kind === 'sum' && side.terms.length > 1 ? overOneDenominator(side) : null,
  );
  if (joined.some(Boolean)) return relation(joined[0] ?? left, '=', joined[1] ?? right);
  const parts = (side: Expr): readonly [Expr, Expr] =>
    side.kind === 'quotient' ? [side.numerator, side.denominator] : [side, whole(1)];
  const [[top, bottom], [otherTop, otherBottom]] = [parts(left), parts(right)];
  if (printExpr(bottom) === printExpr(otherBottom)) return relation(top, '=', otherTop);
  return relation(product(top, otherBottom), '=', product(otherTop, bottom));
}

function hasBelow(side: Expr, name: string): boolean {
  return signedTerms(side).some((term) => {
    const inner = term.kind === 'sum' && term.terms.length === 1 ? (term.terms[0]?.expr ?? term) : term;
    return inner.kind === 'quotient' && has(inner.denominator, name);
  });
}

type Side = (terms: readonly Monomial[]) => Expr;

function bothSides(work: (side: Expr) => Monomial[] | null, write: Side): Move {
  return ({ left, sign, right }, name) => {
    const [first, second] = [work(left), work(right)];
    if (!first || !second || [...first, ...second].some((term) => degreeIn(term, name) === null)) return null;
    return relation(write(first), sign, write(second));
  };
}

const multipliedOut = bothSides(spread, sumExpr);
const collected: Move = (line, name) => bothSides(expanded, (terms) => inOrder(terms, name))(line, name);

/** What has the letter on the left, the rest on the right, written out before it is joined. */
function termsMoved({ left, sign, right }: Relation, name: string): Line | null {
  const [first, second] = [expanded(left), expanded(right)];
  if (!first || !second || highest([...first, ...second], name) !== 1) return null;
  const own = (term: Monomial): boolean => degreeIn(term, name) === 1;
  if (first.every(own) && !second.some(own)) return null;
  const write = (kept: Monomial[], moved: Monomial[]): Expr =>
    sumOrZero([...kept.map(monomialExpr), ...moved.map((term) => neg(monomialExpr(term)))]);
  return relation(
    write(first.filter(own), second.filter(own)),
    sign,
    write(
      second.filter((term) => !own(term)),
      first.filter((term) => !own(term)),
    ),
  );
}

function highest(terms: readonly Monomial[], name: string): number | null {
  const degrees = terms.map((term) => degreeIn(term, name));
  return degrees.includes(null) ? null : Math.max(0, ...degrees.map((degree) => degree ?? 0));
}

/** a x = b, where a may have other letters: the letter taken out, then divided by what stands beside it. */
function divided({ left, sign, right }: Relation, name: string): Line | null {
  const terms = expanded(left);
  if (!terms || has(right, name) || highest(terms, name) !== 1 || terms.some((t) => degreeIn(t, name) !== 1))
    return null;
  const factors = terms.map((term) => ({
    coefficient: term.coefficient,
    powers: new Map([...term.powers].filter(([, { base }]) => !(base.kind === 'letter' && base.name === name))),
  }));
  const beside = sumExpr(factors);
  const [only, ...more] = factors;
  if (more.length > 0 && left.kind !== 'product') return relation(product(letter(name), beside), sign, right);
  if (!only || (sign !== '=' && (more.length > 0 || only.powers.size > 0))) return null;
  const turned = sign !== '=' && Q.sign(only.coefficient) < 0 ? mirrored(sign) : sign;
  const value = more.length === 0 && only.powers.size === 0 ? overNumber(right, only.coefficient) : null;
  return relation(letter(name), turned, value ?? quotient(right, beside));
}

function overNumber(side: Expr, by: Q.Rational): Expr | null {
  const [only, ...more] = expanded(side) ?? [];
  if (!only) return whole(0);
  return more.length > 0 ? null : monomialExpr({ ...only, coefficient: Q.div(only.coefficient, by) });
}

/** Everything on the left, then in factors, else by the formula. */
function polynomialSolved({ left, right }: Relation, name: string): Line | null {
  const coefficients = coefficientsOf(sum(left, neg(right)), name);
  if (!coefficients || coefficients.length < 3) return null;
  if (!isZero(right)) {
    const moved = signedTerms(right).map(neg);
    return relation(sum(...signedTerms(left), ...moved), '=', whole(0));
  }
  if (Q.sign(coefficients[coefficients.length - 1] ?? Q.one) < 0)
    return relation(polynomialExpr(coefficients.map(Q.negate), name), '=', right);
  const factored = factoredForm(coefficients, name);
  if (factored.kind === 'product' || factored.kind === 'power') return relation(factored, '=', whole(0));
  return coefficients.length === 3 ? byFormula(coefficients, name) : null;
}

function byFormula(coefficients: readonly Q.Rational[], name: string): Line | null {
  const [c, b, a] = coefficients as [Q.Rational, Q.Rational, Q.Rational];
  const four = Q.rational(4);
  const inside = Q.sub(Q.mul(b, b), Q.mul(four, Q.mul(a, c)));
  if (Q.sign(inside) < 0) return none;
  const radical = root(fraction(inside));
  const below = fraction(Q.mul(Q.rational(2), a));
  const first = Q.isZero(b) ? [] : [fraction(Q.negate(b))];
  return any([
    relation(letter(name), '=', quotient(sum(...first, radical), below)),
    relation(letter(name), '=', quotient(sum(...first, neg(radical)), below)),
  ]);
}

const equationMoves: readonly Move[] = [
  sidesExchanged,
  zeroProduct,
  nextOfTrigonometric,
  takenOff,
  rootAlone,
  functionAlone,
  denominatorsCleared,
  factorDividedOut,
  multipliedOut,
  collected,
  termsMoved,
  divided,
  polynomialSolved,
];

const orderMoves: readonly Move[] = [
  nextOfQuadraticOrder,
  sidesExchanged,
  multipliedOut,
  collected,
  termsMoved,
  divided,
];
