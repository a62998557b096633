import type { Expr, Line } from '../../../shared/maths/expression.ts';
import { lettersOf } from '../../../shared/maths/letters.ts';
import type { CheckContext } from '../context.ts';
import * as Q from '../numbers/rational.ts';
import { withPlus } from '../slips/may-follow.ts';
import { fraction, neg, power, product, sum, termsOf, whole } from './build.ts';
import { expressionAim } from './expression-aim.ts';
import {
  expOf,
  isFiniteNumber,
  logOf,
  isNear,
  minus,
  missing,
  over,
  plus,
  real,
  rootOf,
  sizeOf,
  times,
  type Complex,
} from './complex-double.ts';
import { estimate, type Place } from './estimate.ts';
import { costOf, differenceAt, type Aim } from './mend-question.ts';
import { collect, expanded, keyOf, spread, sumExpr } from './monomials.ts';
import { choosePlaces, mayBeEqual } from './places.ts';
import { findRightTerms } from './right-parts.ts';

type Relation = Extract<Line, { kind: 'relation' }>;
type Found = Omit<Aim, 'cost' | 'budget'>;

const placeCount = 3;

/** What the sides of an equation or inequality have to come to, taken together. */
export function relationAims(given: Relation, own: Relation, context: CheckContext): Aim[] {
  const [above, line] = [upper(given), upper(own)];
  const places = choosePlaces([above, line], placeCount, context);
  const work = { cost: costOf(line.left, line.right), budget: context.budget };
  const solved =
    aimAtRoots(given, own, places) ?? aimAtSquare(given, own, places) ?? aimAtSolution(above, line, places);
  const right = findRightTerms([above.left, above.right], [line.left, line.right]);
  const found = solved
    ? [{ ...solved, isRight: (node: Expr) => right.has(node) }]
    : [...aimsAtMultiples(above, line, places)];
  return [...squaredSides(above, line, places, context), ...found.map((aim) => ({ ...aim, ...work }))];
}

/** Signs that stand for two belong to each other: the upper ones, the nodes as they are. */
function upper(line: Relation): Relation {
  return { ...line, left: withPlus(line.left), right: withPlus(line.right) };
}

/** Both sides squared, which one of the two shows: the other by itself. */
function squaredSides(above: Relation, line: Relation, places: readonly Place[], context: CheckContext): Aim[] {
  const sides = [
    { from: above.left, to: line.left, other: above.right, own: line.right },
    { from: above.right, to: line.right, other: above.left, own: line.left },
  ];
  return sides.flatMap(({ from, to, other, own }) => {
    const values = places.map((place) => estimate(to, place));
    const isSquared = lettersOf(from).length > 0 && mayBeEqual(power(from, whole(2)), values, places);
    const terms = isSquared ? expanded(power(other, whole(2))) : null;
    return terms ? [expressionAim(sumExpr(terms), own, context)] : [];
  });
}

/** letter = expression: the right side must be what the line above says of the letter, where that can be told. */
function aimAtSolution(above: Relation, line: Relation, places: readonly Place[]): Found | null {
  const { left, right } = line;
  if (left.kind !== 'letter' || lettersOf(right).includes(left.name)) return null;
  const { name } = left;
  for (const back of ways) {
    const target = places.map((place): Complex => {
      return solvedBy(back, (x) => differenceAt(above, { ...place, letters: new Map(place.letters).set(name, x) }));
    });
    if (target.every(isFiniteNumber))
      return { roots: [right], tree: right, wanted: null, places, targets: [target], isRight: () => false, extra: 0 };
  }
  return null;
}

/** The line above may be of first degree in the letter, in its reciprocal, its square, its logarithm or its exponential. */
const ways: readonly ((t: Complex) => Complex)[] = [
  (t) => t,
  (t) => over(real(1), t),
  rootOf,
  expOf,
  logOf,
  (t) => minus(real(0), logOf(t)),
];

function solvedBy(back: (t: Complex) => Complex, f: (x: Complex) => Complex): Complex {
  const at = (t: number): Complex => f(back(real(t)));
  const [f2, f3, f5] = [at(2), at(3), at(5)];
  const slope = minus(f3, f2);
  const isLinear = isNear(f5, plus(f2, times(real(3), slope))) && sizeOf(slope) > 1e-9;
  return isLinear ? back(minus(real(2), over(f2, slope))) : missing;
}

/** letter = expression with one plus-or-minus: with either sign, one of the two roots of a line above of second degree. */
function aimAtRoots(above: Relation, line: Relation, places: readonly Place[]): Found | null {
  const { left, right } = line;
  const upper = withPlus(right);
  if (left.kind !== 'letter' || upper === right || lettersOf(right).includes(left.name)) return null;
  const roots = places.map((place) =>
    rootsAt((x) => differenceAt(above, { ...place, letters: new Map(place.letters).set(left.name, real(x)) })),
  );
  if (roots.some((pair) => pair === null)) return null;
  const targets = [0, 1].map((k) => roots.map((pair) => (pair as readonly Complex[])[k] as Complex));
  return { roots: [right], tree: upper, wanted: null, places, targets, isRight: () => false, extra: 0 };
}

/** A = plus or minus E below an equation that has the square of A: squared again, it has to be a multiple of that. */
function aimAtSquare(above: Relation, line: Relation, places: readonly Place[]): Found | null {
  const [only, ...more] = line.right.kind === 'sum' ? line.right.terms : [];
  if (only?.sign !== 'plusminus' || more.length > 0) return null;
  const tree = sum(power(line.left, whole(2)), neg(power(only.expr, whole(2))));
  const target = places.map((place) => differenceAt(above, place));
  return { roots: [only.expr], tree, wanted: null, places, targets: [target], isRight: () => false, extra: 0 };
}

function rootsAt(f: (x: number) => Complex): readonly Complex[] | null {
  const [c, one, two, three] = [f(0), f(1), f(2), f(3)];
  if (!c || !one || !two || !three) return null;
  const a = over(plus(minus(two, times(real(2), one)), c), real(2));
  const b = minus(minus(one, a), c);
  const expected = plus(plus(times(real(9), a), times(real(3), b)), c);
  if (!isFiniteNumber(a) || sizeOf(a) < 1e-9 || !isNear(three, expected)) return null;
  const part = rootOf(minus(times(b, b), times(real(4), times(a, c))));
  const root = (sign: number): Complex => over(plus(times(real(-1), b), times(real(sign), part)), times(real(2), a));
  return [root(1), root(-1)];
}

/** Left minus right must be a multiple of what it is above: by 1, by -1, or as some of the like terms have it. */
function* aimsAtMultiples(above: Relation, line: Relation, places: readonly Place[]): Generator<Found> {
  const tree = sum(line.left, neg(line.right));
  const whole: Expr =
    tree.kind === 'sum'
      ? {
          ...tree,
          terms: [
            { sign: 'plus', expr: line.left, span: line.left.span },
            { sign: 'minus', expr: line.right, span: line.right.span },
          ],
        }
      : tree;
  const values = places.map((place) => differenceAt(above, place));
  const below = denominatorsIn(above);
  const cleared = places.map((place) => estimate(product(...below), place));
  const base = { roots: [line.left, line.right], tree: whole, wanted: null, places };
  for (const scale of scalesOf(sum(above.left, neg(above.right)), tree)) {
    const sides: readonly [Expr, Expr] = [product(fraction(scale), above.left), product(fraction(scale), above.right)];
    const right = findRightTerms(sides, [line.left, line.right]);
    const target = values.map((value) => times(real(Q.toNumber(scale)), value));
    const extra = Q.equals(scale, Q.one) ? 0 : Q.equals(scale, Q.minusOne) ? turnedScale : otherScale;
    yield { ...base, targets: [target], isRight: (node) => right.has(node), extra };
  }
  if (below.length === 0) return;
  const targets = [1, -1].map((sign) =>
    values.map((value, k) => times(real(sign), times(value, cleared[k] as Complex))),
  );
  const right = findRightTerms([clear(above.left, below), clear(above.right, below)], [line.left, line.right]);
  yield { ...base, targets, isRight: (node) => right.has(node), extra: 0.05 };
}

/** A side times all denominators, each gone where it stood. */
function clear(side: Expr, below: readonly Expr[]): Expr {
  return sum(
    ...termsOf(side).map(({ sign, expr }) => {
      const [top, bottom] = expr.kind === 'quotient' ? [expr.numerator, expr.denominator] : [expr, null];
      const cleared = product(top, ...below.filter((other) => other !== bottom));
      return sign === 'minus' ? neg(cleared) : cleared;
    }),
  );
}

/** What both sides would be multiplied by to clear fractions. */
function denominatorsIn({ left, right }: Relation): Expr[] {
  return [left, right].flatMap(termsOf).flatMap(({ expr }) => (expr.kind === 'quotient' ? [expr.denominator] : []));
}

const mostScales = 4;
const turnedScale = 0.3;
const otherScale = 0.35;

function scalesOf(above: Expr, below: Expr): Q.Rational[] {
  const [before, after] = [spread(above), spread(below)];
  const found = [Q.one, Q.negate(Q.one)];
  const own = new Map(collect(after ?? []).map((term) => [keyOf(term), term.coefficient]));
  for (const term of collect(before ?? [])) {
    const other = own.get(keyOf(term));
    const scale = other && Q.div(other, term.coefficient);
    if (scale && found.length < mostScales && !found.some((one) => Q.equals(one, scale))) found.push(scale);
  }
  return found;
}
