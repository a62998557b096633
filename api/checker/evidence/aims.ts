import type { Expr, Line } from '../../../shared/maths/expression.ts';
import { lettersOf } from '../../../shared/maths/letters.ts';
import { exprsOf } from '../../../shared/maths/walk.ts';
import * as Q from '../numbers/rational.ts';
import { neg, product, sum, termsOf } from './build.ts';
import {
  isFiniteNumber,
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
import { estimate, estimateCost, type Place } from './estimate.ts';
import { differenceAt, type Aim, type MendQuestion } from './mend-question.ts';
import { collect, keyOf, spread } from './monomials.ts';
import { choosePlaces } from './places.ts';
import { workOut } from './worked-out.ts';
import { withPlus } from '../slips/may-follow.ts';

type Relation = Extract<Line, { kind: 'relation' }>;

const placeCount = 3;

/** The expression that the line above says of a line's expression, and that expression; null for statements. */
export function expressionsIn({
  above,
  line,
  link,
}: MendQuestion): { readonly above: Expr; readonly focus: Expr } | null {
  if (above.kind !== 'expression') return null;
  if (line.kind === 'expression') return { above: above.expr, focus: line.expr };
  if (line.kind !== 'relation' && line.kind !== 'chain' && line.kind !== 'continuation') return null;
  const members = exprsOf(line);
  const focus = members[link - 1];
  const from = link > 1 ? members[link - 2] : above.expr;
  return focus && from ? { above: from, focus } : null;
}

/** What a line's parts have to come to. */
export function aimsOf(question: MendQuestion): Aim[] {
  const { above, line, context } = question;
  const pair = expressionsIn(question);
  if (pair) {
    const wanted = workOut(pair.above, pair.focus, context);
    const places = choosePlaces([wanted, pair.focus], placeCount, context);
    return [
      {
        roots: [pair.focus],
        tree: pair.focus,
        wanted,
        places,
        cost: costOf(pair.focus),
        budget: context.budget,
        targets: [places.map((place) => estimate(wanted, place))],
      },
    ];
  }
  if (above.kind !== 'relation' || line.kind !== 'relation') return [];
  const places = choosePlaces([above, line], placeCount, context);
  const work = { cost: costOf(line.left, line.right), budget: context.budget };
  return [
    {
      ...(aimAtRoots(above, line, places) ?? aimAtSolution(above, line, places) ?? aimAtMultiple(above, line, places)),
      ...work,
    },
  ];
}

/** letter = expression: the right side must be what the line above says of the letter, where that can be told. */
function aimAtSolution(above: Relation, line: Relation, places: readonly Place[]): Omit<Aim, 'cost' | 'budget'> | null {
  const { left, right } = line;
  if (left.kind !== 'letter' || lettersOf(right).includes(left.name)) return null;
  const { name } = left;
  for (const back of ways) {
    const target = places.map((place): Complex => {
      return solvedBy(back, (x) => differenceAt(above, { ...place, letters: new Map(place.letters).set(name, x) }));
    });
    if (target.every(isFiniteNumber)) return { roots: [right], tree: right, wanted: null, places, targets: [target] };
  }
  return null;
}

/** The line above may be of first degree in the letter, in its reciprocal or in its square. */
const ways: readonly ((t: Complex) => Complex)[] = [(t) => t, (t) => over(real(1), t), rootOf];

function solvedBy(back: (t: Complex) => Complex, f: (x: Complex) => Complex): Complex {
  const at = (t: number): Complex => f(back(real(t)));
  const [f2, f3, f5] = [at(2), at(3), at(5)];
  const slope = minus(f3, f2);
  const isLinear = isNear(f5, plus(f2, times(real(3), slope))) && sizeOf(slope) > 1e-9;
  return isLinear ? back(minus(real(2), over(f2, slope))) : missing;
}

/** letter = expression with one plus-or-minus: with either sign, one of the two roots of a line above of second degree. */
function aimAtRoots(above: Relation, line: Relation, places: readonly Place[]): Omit<Aim, 'cost' | 'budget'> | null {
  const { left, right } = line;
  const upper = withPlus(right);
  if (left.kind !== 'letter' || upper === right || lettersOf(right).includes(left.name)) return null;
  const roots = places.map((place) =>
    rootsAt((x) => differenceAt(above, { ...place, letters: new Map(place.letters).set(left.name, real(x)) })),
  );
  if (roots.some((pair) => pair === null)) return null;
  const targets = [0, 1].map((k) => roots.map((pair) => (pair as readonly Complex[])[k] as Complex));
  return { roots: [right], tree: upper, wanted: null, places, targets };
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
function aimAtMultiple(above: Relation, line: Relation, places: readonly Place[]): Omit<Aim, 'cost' | 'budget'> {
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
  const scales = scalesOf(sum(above.left, neg(above.right)), tree);
  return {
    roots: [line.left, line.right],
    tree: whole,
    wanted: null,
    places,
    targets: [
      ...scales.map((scale) => values.map((value) => times(real(scale), value))),
      ...(below.length > 0
        ? [1, -1].map((scale) => values.map((value, k) => times(real(scale), times(value, cleared[k] as Complex))))
        : []),
    ],
  };
}

/** What both sides would be multiplied by to clear fractions. */
function denominatorsIn({ left, right }: Relation): Expr[] {
  return [left, right].flatMap(termsOf).flatMap(({ expr }) => (expr.kind === 'quotient' ? [expr.denominator] : []));
}

/** A number that is solved for is looked at some ten times over. */
function costOf(...exprs: readonly Expr[]): number {
  return 4 + exprs.reduce((count, expr) => count + 2 * estimateCost(expr), 0);
}

const mostScales = 4;

function scalesOf(above: Expr, below: Expr): number[] {
  const [before, after] = [spread(above), spread(below)];
  const found = new Set([1, -1]);
  const own = new Map(collect(after ?? []).map((term) => [keyOf(term), term.coefficient]));
  for (const term of collect(before ?? [])) {
    const other = own.get(keyOf(term));
    if (other && found.size < mostScales) found.add(Q.toNumber(Q.div(other, term.coefficient)));
  }
  return [...found];
}
