import type { Expr, Line } from '../../../shared/maths/expression.ts';
import { lettersOf } from '../../../shared/maths/letters.ts';
import { sameExpr } from '../../../shared/maths/same.ts';
import { isZero, letter, neg, power, product, quotient, root, sum, whole } from '../evidence/build.ts';
import { real } from '../evidence/complex-double.ts';
import { slopeOf } from '../evidence/derive.ts';
import { estimate } from '../evidence/estimate.ts';
import { substituteLetter } from '../evidence/substitute.ts';
import { factorsOf } from './match.ts';
import { any, bothWays, commonFactors, quadraticOf, relation, signedTerms, type Relation } from './relations.ts';
import { memory, slip, type Slip } from './slip.ts';

const noDefinitions = { letters: new Map(), functions: new Map() };
const matz = 'Matz 1980/1982, process model for high-school algebra errors (from memory)';
const openstaxOther = 'OpenStax Algebra and Trigonometry 2e, m51258 Other Types of Equations, Examples 6-7, 11';

function valueAt(expr: Expr, x: number): number {
  const [name] = lettersOf(expr);
  return estimate(expr, { letters: new Map(name ? [[name, real(x)]] : []), definitions: noDefinitions }).re;
}

/** AB = k read as A = k or B = k. */
function* factorsEqual(above: Line): Generator<Line> {
  for (const { left, sign, right } of bothWays(above)) {
    const factors = factorsOf(left).filter((factor) => lettersOf(factor).length > 0);
    if (sign !== '=' || factors.length < 2 || isZero(right)) continue;
    yield any(factors.map((factor) => relation(factor, '=', right)));
  }
}

type Conditions = readonly Line[];

/** The equation with the conditions that stand beside it, such as bounds of the letter. */
function equationIn(above: Line): { equation: Relation; beside: Conditions } | null {
  if (above.kind === 'relation') return { equation: above, beside: [] };
  if (above.kind !== 'all') return null;
  const [equation, ...more] = above.parts.filter(
    (part): part is Relation => part.kind === 'relation' && part.sign === '=',
  );
  return equation && more.length === 0 ? { equation, beside: above.parts.filter((part) => part !== equation) } : null;
}

function withBeside(line: Line, beside: Conditions): Line {
  return beside.length === 0 ? line : { kind: 'all', parts: [line, ...beside], span: line.span };
}

/** Both sides divided by a factor that they share. */
function onCommonFactor(wants: (factor: Expr) => boolean): (above: Line) => Generator<Line> {
  return function* lines(above) {
    const found = equationIn(above);
    if (!found) return;
    const { left, sign, right } = found.equation;
    for (const factor of commonFactors(left, right, sameExpr)) {
      if (wants(factor)) yield withBeside(relation(divided(left, factor), sign, divided(right, factor)), found.beside);
    }
  };
}

/** A side without a factor that it has, so that the value at its zero is there. */
function divided(side: Expr, by: Expr): Expr {
  if (isZero(side)) return side;
  const [only] = side.kind === 'sum' && side.terms.length === 1 ? side.terms : [];
  const factors = [...factorsOf(only ? only.expr : side)];
  const place = factors.findIndex(
    (factor) => sameExpr(factor, by) || (factor.kind === 'power' && sameExpr(factor.base, by)),
  );
  const found = factors[place];
  if (!found) return quotient(side, by);
  const left = found.kind === 'power' && !sameExpr(found, by) ? power(found.base, lowered(found.exponent)) : whole(1);
  const rest = product(...factors.map((factor, k) => (k === place ? left : factor)));
  return only?.sign === 'minus' ? neg(rest) : rest;
}

function lowered(exponent: Expr): Expr {
  return exponent.kind === 'number' && exponent.denominator === 1n
    ? whole(exponent.numerator - 1n)
    : sum(exponent, neg(whole(1)));
}

function isFunction(expr: Expr): boolean {
  return expr.kind === 'call' || expr.kind === 'log';
}

/** a x^2 + b = k read as x = root of (k - b)/a; also for brackets. */
function* positiveRoot(above: Line): Generator<Line> {
  for (const { left, sign, right } of bothWays(above)) {
    if (sign !== '=') continue;
    const moving = signedTerms(left).filter((term) => lettersOf(term).length > 0);
    const fixed = signedTerms(left).filter((term) => lettersOf(term).length === 0);
    const [square] = moving.length === 1 ? factorsOf(moving[0] as Expr).filter(isSquare) : [];
    if (!square || square.kind !== 'power') continue;
    const rest = factorsOf(moving[0] as Expr).filter((factor) => factor !== square);
    if (rest.some((factor) => lettersOf(factor).length > 0)) continue;
    const other = sum(right, ...fixed.map(neg));
    yield relation(square.base, '=', root(rest.length === 0 ? other : quotient(other, product(...rest))));
  }
}

function isSquare(expr: Expr): boolean {
  return expr.kind === 'power' && expr.exponent.kind === 'number' && expr.exponent.numerator === 2n;
}

/** One or all of the roots of linear factors with the sign of the factor. */
function* signsOfFactors(above: Line): Generator<Line> {
  if (above.kind !== 'relation' || above.sign !== '=' || !isZero(above.right)) return;
  const [name, ...others] = lettersOf(above.left);
  if (!name || others.length > 0) return;
  const factors = factorsOf(above.left).filter((factor) => lettersOf(factor).length > 0);
  const roots = factors.map((factor) => rootOfLinear(factor.kind === 'power' ? factor.base : factor, name));
  if (roots.length < 2 || roots.includes(null)) return;
  for (let choice = (1 << roots.length) - 1; choice > 0; choice -= 1) {
    yield any(
      roots.map((value, k) => relation(letter(name), '=', (choice >> k) & 1 ? neg(value as Expr) : (value as Expr))),
    );
  }
}

function rootOfLinear(factor: Expr, name: string): Expr | null {
  const slope = slopeOf(factor, name);
  if (!slope) return null;
  return neg(quotient(substituteLetter(factor, name, whole(0)), slope));
}

function onQuadratics(wrong: (a: Expr, b: Expr, c: Expr) => readonly [Expr, Expr]): (above: Line) => Generator<Line> {
  return function* lines(above) {
    const found = above.kind === 'relation' ? quadraticOf(above, valueAt) : null;
    if (!found) return;
    yield any(wrong(found.a, found.b, found.c).map((value) => relation(letter(found.letter), '=', value)));
  };
}

function discriminant(a: Expr, b: Expr, c: Expr): Expr {
  return sum(power(b, whole(2)), neg(product(whole(4), a, c)));
}

/** Both sides squared. */
function* squared(above: Line): Generator<Line> {
  if (above.kind !== 'relation' || above.sign !== '=') return;
  const square = (side: Expr): Expr => (side.kind === 'root' && !side.degree ? side.radicand : power(side, whole(2)));
  yield relation(square(above.left), '=', square(above.right));
}

/** Denominators multiplied out, whatever makes them zero. */
function* cleared(above: Line): Generator<Line> {
  if (above.kind !== 'relation' || above.sign !== '=') return;
  const { left, right } = above;
  const parts = (side: Expr): readonly [Expr, Expr] =>
    side.kind === 'quotient' ? [side.numerator, side.denominator] : [side, whole(1)];
  const [[top, bottom], [otherTop, otherBottom]] = [parts(left), parts(right)];
  yield sameExpr(bottom, otherBottom)
    ? relation(top, '=', otherTop)
    : relation(product(top, otherBottom), '=', product(otherTop, bottom));
}

/** Logarithms joined and taken off, whatever sign their arguments have. */
function* logsRemoved(above: Line): Generator<Line> {
  if (above.kind !== 'relation' || above.sign !== '=') return;
  const [left, right] = [joined(above.left), joined(above.right)];
  if (left && right) yield relation(left, '=', right);
  const base = baseIn(left ? above.left : above.right);
  if (left && !right && lettersOf(above.right).length === 0) yield relation(left, '=', power(base, above.right));
  if (right && !left && lettersOf(above.left).length === 0) yield relation(power(base, above.left), '=', right);
}

/** The base of the logarithms of a side, which is taken to have one only: what is named is looked at again. */
function baseIn(side: Expr): Expr {
  const [log] = signedTerms(side).flatMap((term) => (term.kind === 'log' ? [term] : []));
  return log ? (log.base ?? whole(10)) : { kind: 'constant', name: 'e', span: side.span };
}

function joined(side: Expr): Expr | null {
  const over: Expr[] = [];
  const under: Expr[] = [];
  for (const term of signedTerms(side)) {
    const isMinus = term.kind === 'sum';
    const inner = term.kind === 'sum' ? (term.terms[0]?.expr ?? term) : term;
    const argument =
      inner.kind === 'log' ? inner.argument : inner.kind === 'call' && inner.name === 'ln' ? inner.args[0] : null;
    if (!argument) return null;
    (isMinus ? under : over).push(argument);
  }
  return under.length > 0 ? quotient(product(...over), product(...under)) : product(...over);
}

export const solutionSlips: readonly Slip[] = [
  slip('the zero-product rule was used with a right side that is not zero', 'solutions', matz, {
    rank: 7,
    lines: factorsEqual,
  }),
  slip(
    'both sides were divided by the unknown and a root was lost',
    'solutions',
    `${memory}; division by zero family: Dawkins, Common Math Errors: Algebra Errors`,
    { rank: 7, lines: onCommonFactor((factor) => factor.kind === 'letter') },
  ),
  slip('both sides were divided by a function that can be zero', 'solutions', memory, {
    rank: 7,
    lines: onCommonFactor(isFunction),
  }),
  slip(
    'both sides were divided by an expression that can be zero',
    'solutions',
    'Dawkins, Common Math Errors: Algebra Errors',
    { rank: 6, lines: onCommonFactor((factor) => factor.kind !== 'letter' && !isFunction(factor)) },
  ),
  slip('only the positive root was taken', 'solutions', memory, { rank: 7, lines: positiveRoot }),
  slip('roots were read with the signs of the factors', 'solutions', memory, { rank: 7, lines: signsOfFactors }),
  slip('only the root part was divided in the quadratic formula', 'solutions', memory, {
    rank: 6.5,
    lines: onQuadratics((a, b, c) => {
      const part = quotient(root(discriminant(a, b, c)), product(whole(2), a));
      return [sum(neg(b), part), sum(neg(b), neg(part))];
    }),
  }),
  slip('the sign of the middle coefficient was lost in the quadratic formula', 'solutions', memory, {
    rank: 6.5,
    lines: onQuadratics((a, b, c) => {
      const part = root(discriminant(a, b, c));
      return [quotient(sum(b, part), product(whole(2), a)), quotient(sum(b, neg(part)), product(whole(2), a))];
    }),
  }),
  slip('the sign under the root of the quadratic formula was wrong', 'solutions', memory, {
    rank: 6.5,
    lines: onQuadratics((a, b, c) => {
      const part = root(sum(power(b, whole(2)), product(whole(4), a, c)));
      return [
        quotient(sum(neg(b), part), product(whole(2), a)),
        quotient(sum(neg(b), neg(part)), product(whole(2), a)),
      ];
    }),
  }),
  slip('a root that squaring brought in was kept', 'solutions', openstaxOther, { rank: 6, lines: squared }),
  slip('a root at which a denominator is zero was kept', 'solutions', `${openstaxOther} (Example 11 family)`, {
    rank: 6,
    lines: cleared,
  }),
  slip(
    'a root outside the domain of a logarithm was kept',
    'solutions',
    'OpenStax Algebra and Trigonometry 2e, m49366 Exponential and Logarithmic Equations, Example 4',
    { rank: 6, lines: logsRemoved },
  ),
];
