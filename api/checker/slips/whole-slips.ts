import type { Expr, Line, NumberExpr } from '../../../shared/maths/expression.ts';
import { lettersOf } from '../../../shared/maths/letters.ts';
import { sameExpr } from '../../../shared/maths/same.ts';
import { childrenOf, mapChildren, mapExpr, mapLine, exprsOf } from '../../../shared/maths/walk.ts';
import { compareExpressions } from '../compare/compare-expressions.ts';
import { letter, product, sum, whole } from '../evidence/build.ts';
import { real } from '../evidence/complex-double.ts';
import { expanded, monomialExpr, spread, type Monomial } from '../evidence/monomials.ts';
import * as Q from '../numbers/rational.ts';
import { estimate } from '../evidence/estimate.ts';
import { withPlus } from './may-follow.ts';
import { everywhere, rule } from './rewrite.ts';
import { memory, ruled, slip, toRule, type Slip } from './slip.ts';

const noDefinitions = { letters: new Map(), functions: new Map() };
const largestConstant = 400;

/** (x+p)(x+q) with pq = c, where the middle term is another one. */
function* wrongPairs(above: Expr, below: Expr): Generator<Expr> {
  if (below.kind !== 'product') return;
  const [name, ...others] = lettersOf(above);
  if (!name || others.length > 0) return;
  const at = (x: number): number =>
    estimate(above, { letters: new Map([[name, real(x)]]), definitions: noDefinitions }).re;
  const [c, one, two, three] = [at(0), at(1), at(2), at(3)];
  const lead = (two - 2 * one + c) / 2;
  const isQuadratic = lead === 1 && three - 3 * two + 3 * one - c === 0;
  if (!isQuadratic || !Number.isInteger(c) || c === 0 || Math.abs(c) > largestConstant) return;
  const factor = (p: number): Expr => sum(letter(name), whole(p));
  for (let p = -Math.abs(c); p <= Math.abs(c); p += 1) {
    if (p !== 0 && c % p === 0 && p <= c / p) yield product(factor(p), factor(c / p));
  }
}

/** ax^2 + px + qx + c with pq = ac or -ac, where p + q is not the middle coefficient. */
function* wrongSplits(above: Expr, below: Expr): Generator<Expr> {
  const [own, parts] = [termsByDegree(above), termsByDegree(below)];
  if (own?.length !== 3 || parts?.length !== 4) return;
  const of = (terms: readonly Monomial[], degree: number): number[] =>
    terms.filter((term) => degreeOf(term) === degree).map((term) => Q.toNumber(term.coefficient));
  const [[a = 0], [c = 0]] = [of(own, 2), of(own, 0)];
  const [p = 0, q = 0] = of(parts, 1);
  const isKept = of(parts, 2)[0] === a && of(parts, 0)[0] === c && of(own, 1).length === 1;
  if (isKept && a * c !== 0 && Math.abs(p * q) === Math.abs(a * c)) yield below;
}

/** The terms of a polynomial in one letter; null for anything else. */
function termsByDegree(expr: Expr): readonly Monomial[] | null {
  if (expr.kind !== 'sum' || lettersOf(expr).length !== 1) return null;
  const terms = spread(expr);
  return terms?.every(({ powers }) => [...powers.values()].every(({ base }) => base.kind === 'letter')) ? terms : null;
}

function degreeOf({ powers }: Monomial): number {
  return [...powers.values()].reduce((degree, { exponent }) => degree + exponent, 0);
}

/** One number written as another; everything else is the same. */
export function isMiscopied(above: Line, below: Line): boolean {
  const [before, after] = [exprsOf(above), exprsOf(below)];
  if (above.kind !== below.kind || before.length !== after.length) return false;
  const marked = mapLine(above, (expr) => expr);
  if (marked.kind === 'relation' && below.kind === 'relation' && marked.sign !== below.sign) return false;
  const changes = before.map((expr, k) => countChanges(expr, after[k] as Expr));
  return changes.reduce((total, count) => total + count, 0) === 1;
}

/** How many leaves differ in kind or value; infinite where the shapes differ. */
function countChanges(a: Expr, b: Expr): number {
  if (sameExpr(a, b)) return 0;
  if (a.kind === 'number' && b.kind === 'number') return looksAlike(a, b) ? 1 : Infinity;
  const [before, after] = [childrenOf(a), childrenOf(b)];
  if (a.kind !== b.kind || before.length === 0 || before.length !== after.length) return Infinity;
  let place = -1;
  const emptied = mapChildren(a, () => {
    place += 1;
    return after[place] as Expr;
  });
  if (!sameExpr(emptied, b)) return Infinity;
  return before.reduce((total, part, k) => total + countChanges(part, after[k] as Expr), 0);
}

/** The same digits but for one, or in another order: 17 and 11, 17 and 71. */
function looksAlike(a: NumberExpr, b: NumberExpr): boolean {
  const [before, after] = [String(a.numerator), String(b.numerator)];
  if (a.denominator !== b.denominator || before.length !== after.length || before.length < 2) return false;
  const differing = [...before].filter((digit, k) => digit !== after[k]).length;
  return differing === 1 || [...before].sort().join('') === [...after].sort().join('');
}

/** A part of the line above replaced by a decimal of the line below that it rounds to. */
function* roundings(above: Expr, below: Expr): Generator<Expr> {
  const decimals = decimalsIn(below);
  for (const decimal of decimals) {
    const value = Number(decimal.numerator) / Number(decimal.denominator);
    const half = 0.5 * 10 ** -decimal.decimals;
    yield* everywhere(above, function* round(part) {
      if (part.kind === 'number' || lettersOf(part).length > 0) return;
      const exact = estimate(part, { letters: new Map(), definitions: noDefinitions });
      if (exact.im === 0 && Math.abs(exact.re - value) <= half * 1.0001 && exact.re !== value) yield decimal;
    });
  }
}

function decimalsIn(expr: Expr): NumberExpr[] {
  if (expr.kind === 'number') return expr.written === 'decimal' ? [expr] : [];
  return childrenOf(expr).flatMap(decimalsIn);
}

const withoutBrackets = [
  rule('-(a+b)', '-a+b'),
  rule('-(a-b)', '-a-b'),
  rule('-a(b+c)', '-ab+c'),
  rule('-a(b-c)', '-ab-c'),
  rule('a(b+c)', 'ab+c'),
  rule('a(b-c)', 'ab-c'),
];

const differences = [
  'a^2+b^2 -> (a+b)(a-b)',
  'a^2+k -> (a+\\sqrt{k})(a-\\sqrt{k})',
  'ka^2+m -> (\\sqrt{k}a+\\sqrt{m})(\\sqrt{k}a-\\sqrt{m})',
  'ka^2+mb^2 -> (\\sqrt{k}a+\\sqrt{m}b)(\\sqrt{k}a-\\sqrt{m}b)',
].map(toRule);

/** Only where the line below has factors: a sign that was lost comes to the same. */
function* asDifference(above: Expr, below: Expr): Generator<Expr> {
  if (!hasFactors(below)) return;
  for (const rewrite of differences) yield* everywhere(above, rewrite);
}

function hasFactors(expr: Expr): boolean {
  const isProduct = expr.kind === 'product' && expr.factors.filter((factor) => factor.kind === 'sum').length > 1;
  return isProduct || childrenOf(expr).some(hasFactors);
}

/** Multiplied out with the unit as a letter, whose square is then taken as 1. */
function* unitSquaredToOne(above: Expr): Generator<Expr> {
  if (!hasUnit(above)) return;
  const terms = expanded(mapExpr(above, (node) => (isUnit(node) ? unitLetter : node)));
  if (!terms) return;
  const lowered = terms.map((term): Expr => {
    const power = term.powers.get(unitName)?.exponent ?? 0;
    const others = new Map([...term.powers].filter(([key]) => key !== unitName));
    const rest = monomialExpr({ coefficient: term.coefficient, powers: others });
    return power % 2 === 0 ? rest : product(rest, unit);
  });
  if (terms.some((term) => (term.powers.get(unitName)?.exponent ?? 0) > 1)) yield sum(...lowered);
}

const unitName = '\u25b3';
const unitLetter = letter(unitName);
const unit: Expr = { kind: 'constant', name: 'i', span: { start: 0, end: 0 } };

function isUnit(expr: Expr): boolean {
  return expr.kind === 'constant' && expr.name === 'i';
}

function hasUnit(expr: Expr): boolean {
  return isUnit(expr) || childrenOf(expr).some(hasUnit);
}

export const wholeSlips: readonly Slip[] = [
  slip('a sum of squares was factorised like a difference', 'brackets', memory, { rank: 6, whole: asDifference }),
  ruled(
    'the square was completed without compensating',
    'brackets',
    memory,
    ['a^2+ka -> (a+\\frac{k}{2})^2', 'a^2-ka -> (a-\\frac{k}{2})^2'],
    6,
  ),
  slip('the square of the imaginary unit was taken as one', 'sign', memory, {
    rank: 7,
    rewrites: ['k\\mathrm{i}^2 -> k', '\\mathrm{i}^2 -> 1'].map(toRule),
    whole: unitSquaredToOne,
  }),
  slip('the factor pair had the right product and the wrong sum', 'brackets', memory, { rank: 6, whole: wrongPairs }),
  slip('the middle term was split with the wrong sum', 'sign', memory, { rank: 4, whole: wrongSplits }),
  slip(
    'a root was given both signs',
    'powers-and-roots',
    'Portland State University, Common Errors in Algebra and Calculus',
    {
      rank: 8,
      *whole(above, below, context) {
        const upper = hasRoot(above) ? withPlus(below) : below;
        if (upper !== below && compareExpressions(above, upper, context).kind === 'equal') yield below;
      },
    },
  ),
  slip('a rounded value was carried on', 'copying', memory, { rank: 6, whole: roundings }),
  slip(
    'brackets were lost and the work went on without them',
    'brackets',
    'Schechter, The Most Common Errors in Undergraduate Mathematics (loss of invisible parentheses)',
    {
      rank: 3,
      *whole(above) {
        for (const rewrite of withoutBrackets) yield* everywhere(above, rewrite);
      },
    },
  ),
  slip(
    'a number was copied wrongly from one line to the next',
    'copying',
    'Sleeman 1984, Cognitive Science 8:387-412 (clerical errors class seen in abstract)',
    {
      rank: 1,
      *whole(above, below) {
        const span = above.span;
        if (isMiscopied({ kind: 'expression', expr: above, span }, { kind: 'expression', expr: below, span }))
          yield below;
      },
      *lines(above, below) {
        if (isMiscopied(above, below)) yield below;
      },
    },
  ),
];

function hasRoot(expr: Expr): boolean {
  return expr.kind === 'root' || childrenOf(expr).some(hasRoot);
}
