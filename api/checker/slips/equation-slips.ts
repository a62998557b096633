import type { Expr, Line } from '../../../shared/maths/expression.ts';
import { lettersOf } from '../../../shared/maths/letters.ts';
import { isZero, neg, product, quotient, sum } from '../evidence/build.ts';
import { expanded, sumExpr } from '../evidence/monomials.ts';
import { isNumber } from './match.ts';
import { bothWays, relation, signedTerms, splitFactors, sumOf, without, type Relation } from './relations.ts';
import { memory, slip, type Slip } from './slip.ts';

const sleeman = 'Sleeman 1984, Cognitive Science 8:387-412';
const squibb = 'Payne & Squibb 1990, Cognitive Science 14:445-481';
const carry = 'Carry, Lewis & Bernard 1979, Psychology of Equation Solving';

/** A term taken from one side to the other with the sign that it had. */
function* movedWithSign(above: Line, wants: (term: Expr) => boolean): Generator<Line> {
  for (const { left, sign, right } of bothWays(above)) {
    const terms = signedTerms(left);
    if (terms.length < 2) continue;
    for (const [k, term] of terms.entries()) {
      if (!isZero(term) && wants(term))
        yield relation(sumOf(without(terms, k)), sign, isZero(right) ? term : sum(right, term));
    }
  }
}

/**
 * The equation as the author may have had it in mind when a term was moved: as it stands, with brackets multiplied out, or
 * a factor of a sum brought to the other side.
 */
function* asWorked(above: Line): Generator<Line> {
  yield above;
  if (above.kind !== 'relation') return;
  const { left, sign, right } = above;
  const [first, second] = [left, right].map((side) => (hasBrackets(side) ? expanded(side) : null));
  if (first || second) yield relation(first ? sumExpr(first) : left, sign, second ? sumExpr(second) : right);
  if (sign !== '=') return;
  for (const way of bothWays(above)) {
    const { left: side } = way;
    const factors = side.kind === 'product' ? side.factors : [];
    const sums = factors.filter((factor) => factor.kind === 'sum' && factor.terms.length > 1);
    const [only] = sums;
    if (only && sums.length === 1)
      yield relation(only, '=', quotient(way.right, product(...factors.filter((factor) => factor !== only))));
    if (side.kind === 'quotient' && side.numerator.kind === 'sum' && side.numerator.terms.length > 1)
      yield relation(side.numerator, '=', product(way.right, side.denominator));
  }
}

function hasBrackets(expr: Expr): boolean {
  if (expr.kind === 'product') {
    const others = expr.factors.filter((factor) => factor.kind !== 'sum');
    return others.length === expr.factors.length - 1 && others.every((factor) => lettersOf(factor).length === 0);
  }
  return expr.kind === 'sum' && expr.terms.some((term) => hasBrackets(term.expr));
}

function* movedAnywhere(above: Line, wants: (term: Expr) => boolean): Generator<Line> {
  for (const line of asWorked(above)) yield* movedWithSign(line, wants);
}

function isNegative(term: Expr): boolean {
  return term.kind === 'sum' && term.terms[0]?.sign === 'minus';
}

type Solved = (factor: Expr, rest: Expr, right: Expr) => Iterable<readonly [Expr, Expr]>;

/** What a wrong rule makes of factor times rest = right. */
function onProducts(solved: Solved): (above: Line) => Generator<Line> {
  return function* lines(above) {
    for (const { left, sign, right } of bothWays(above)) {
      for (const { factor, rest } of splitFactors(left)) {
        if (lettersOf(rest).length === 0) continue;
        for (const [newLeft, newRight] of solved(factor, rest, right)) yield relation(newLeft, sign, newRight);
      }
    }
  };
}

/** All terms but one divided or multiplied by a number that stands in the line. */
function* onAllButOne(
  above: Line,
  change: (term: Expr, by: Expr) => Expr,
  numbersOf: (term: Expr) => Expr[],
): Generator<Line> {
  if (above.kind !== 'relation') return;
  const sides = [signedTerms(above.left), signedTerms(above.right)] as const;
  const all = [...sides[0].map((term) => ({ side: 0, term })), ...sides[1].map((term) => ({ side: 1, term }))];
  if (all.length < 3) return;
  for (const by of all.flatMap(({ term }) => numbersOf(term))) {
    for (const [spared] of all.entries()) {
      const parts = all.map(({ side, term }, k) => ({ side, term: k === spared ? term : change(term, by) }));
      const side = (wanted: number): Expr =>
        sumOf(parts.filter((part) => part.side === wanted).map((part) => part.term));
      yield relation(side(0), above.sign, side(1));
    }
  }
}

function coefficientsOf(term: Expr): Expr[] {
  return [...splitFactors(term)]
    .map(({ factor }) => factor)
    .filter((factor) => (isNumber(factor) || factor.kind === 'letter') && lettersOf(term).length > 0);
}

function denominatorsOf(term: Expr): Expr[] {
  const inner = term.kind === 'sum' && term.terms.length === 1 ? (term.terms[0]?.expr ?? term) : term;
  return inner.kind === 'quotient' ? [inner.denominator] : [];
}

/** y = x/a to x = y/a, y = a x to x = a y. */
function* wrongInverse(above: Line): Generator<Line> {
  for (const { left, sign, right } of bothWays(above)) {
    if (right.kind === 'quotient') {
      yield relation(right.numerator, sign, quotient(left, right.denominator));
      yield relation(right.denominator, sign, product(left, right.numerator));
    }
    if (right.kind === 'product') {
      for (const { factor, rest } of splitFactors(right)) yield relation(factor, sign, product(left, rest));
    }
  }
}

function isRelation(line: Line): line is Relation {
  return line.kind === 'relation';
}

export const equationSlips: readonly Slip[] = [
  slip('a term was moved across without changing its sign', 'both-sides', `${sleeman}; ${squibb}`, {
    rank: 6,
    lines: (above) => movedAnywhere(above, (term) => !isNegative(term)),
  }),
  slip(
    'different things were done to the two sides',
    'both-sides',
    'Kieran 1981, Educ. Stud. Math. 12:317-326 (from memory)',
    {
      rank: 6,
      lines: (above) => movedAnywhere(above, isNegative),
    },
  ),
  slip('the coefficient was subtracted instead of divided by', 'both-sides', sleeman, {
    rank: 6,
    lines: onProducts(function* solved(factor, rest, right) {
      yield [rest, sum(right, neg(factor))];
    }),
  }),
  slip('the division was made the wrong way round', 'both-sides', squibb, {
    rank: 6,
    lines: onProducts(function* solved(factor, rest, right) {
      if (!isZero(right)) yield [rest, quotient(factor, right)];
    }),
  }),
  slip('a sign was changed on dividing by a coefficient', 'sign', squibb, {
    rank: 6,
    lines: onProducts(function* solved(factor, rest, right) {
      if (isNumber(factor)) yield [rest, neg(quotient(right, factor))];
    }),
  }),
  slip('a coefficient was multiplied by instead of divided by', 'both-sides', memory, {
    rank: 4,
    lines: onProducts(function* solved(factor, rest, right) {
      yield [rest, product(right, factor)];
    }),
  }),
  slip('only one term of a side was divided', 'both-sides', carry, {
    rank: 6,
    lines: (above) => onAllButOne(above, (term, by) => quotient(term, by), coefficientsOf),
  }),
  slip('fractions were cleared from only one term', 'both-sides', carry, {
    rank: 7,
    lines: (above) => onAllButOne(above, (term, by) => product(by, term), denominatorsOf),
  }),
  slip('a formula was rearranged with the wrong inverse', 'both-sides', memory, {
    rank: 5,
    *lines(above) {
      if (isRelation(above) && above.sign === '=') yield* wrongInverse(above);
    },
  }),
];
