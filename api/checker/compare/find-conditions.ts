import type { Expr, Line, RelationSign, Span } from '../../../shared/maths/expression.ts';
import { printLine } from '../../../shared/maths/print.ts';
import type { CheckContext } from '../context.ts';
import * as Q from '../numbers/rational.ts';
import type { Rational } from '../numbers/rational.ts';
import { toFraction } from '../solving/fraction.ts';
import { fromPi, fromRational } from '../values/arithmetic.ts';
import { evaluateNodes } from '../values/evaluate.ts';
import { lettersBelow } from '../values/graph.ts';
import { callExpr, letterExpr, nodeToExpr, numberExpr } from '../values/node-expr.ts';
import type { KnownValue, Point } from '../values/value.ts';
import { relationLine } from '../values/truth.ts';
import { compareAt } from './agreement.ts';
import type { PointResult } from './agreement.ts';
import { breakUp } from './break-points.ts';
import type { Condition } from './comparison.ts';
import { meets, relationOf } from './conditions.ts';
import type { Need } from './conditions.ts';
import type { Pair } from './pair.ts';
import { markNeeded } from './modular-values.ts';
import { pointsOf } from './points.ts';
import { ownZeros } from './polynomial-conditions.ts';
import type { OwnZeros } from './polynomial-conditions.ts';
import type { Region } from './points.ts';
import type { Sample, Samples } from './sampling.ts';

export interface FoundConditions {
  readonly excluded: readonly Condition[];
  readonly cancelled: readonly Condition[];
}

const none: FoundConditions = { excluded: [], cancelled: [] };
const mostTries = 90;
const ladder = [128] as const;

/**
 * What one line needs that the other does not: a need counts only when there is a point at which the other line has a
 * value and the need is not met.
 */
export function findConditions(pair: Pair, samples: Samples, region: Region, context: CheckContext): FoundConditions {
  const found = conditionsWithoutPoints(pair, region);
  if (found !== null) return found;
  const onlyBelow = needsOfOne(pair.needsBelow, pair.needsAbove);
  const onlyAbove = needsOfOne(pair.needsAbove, pair.needsBelow);
  const tried: Sample[] = [...samples.aboveOnly, ...samples.belowOnly];
  let count = 0;
  const unshared = [...onlyBelow, ...onlyAbove];
  const wanted = markNeeded(
    pair.nodes,
    unshared.map(({ arg }) => arg),
  );
  for (const point of pointsToTry(pair, unshared, samples, region, context)) {
    if ((count += 1) > mostTries) break;
    // Only points that break a need tell something, and few do.
    const values = evaluateNodes(pair.nodes, point, ladder[0], context, wanted);
    if (!unshared.some((need) => meets(need, values[need.arg], ladder[0]) === false)) continue;
    const result = compareAt(pair, point, context, ladder);
    if (result.agreement === 'above-only' || result.agreement === 'below-only') tried.push({ point, result });
  }
  return {
    excluded: conditionsFrom(pair, onlyBelow, tried, 'above-only'),
    cancelled: conditionsFrom(pair, onlyAbove, tried, 'below-only'),
  };
}

/** What can be told without any points; null where it takes some. */
export function conditionsWithoutPoints(pair: Pair, region: Region): FoundConditions | null {
  const onlyBelow = needsOfOne(pair.needsBelow, pair.needsAbove);
  const onlyAbove = needsOfOne(pair.needsAbove, pair.needsBelow);
  if (onlyBelow.length === 0 && onlyAbove.length === 0) return none;
  return exactConditions(pair, onlyBelow, onlyAbove, region);
}

/** Lines in one letter that only divide need no points. */
function exactConditions(
  pair: Pair,
  onlyBelow: readonly Need[],
  onlyAbove: readonly Need[],
  region: Region,
): FoundConditions | null {
  const [letter] = region.names;
  const isDivision = (need: Need): boolean => need.kind === 'nonzero';
  if (letter === undefined || region.names.length !== 1 || pair.whole.has(letter)) return null;
  if (region.context.numbers === 'complex' || ![...pair.needsAbove, ...pair.needsBelow].every(isDivision)) return null;
  const below = ownZeros(pair.nodes, letter, onlyBelow, pair.needsAbove);
  const above = ownZeros(pair.nodes, letter, onlyAbove, pair.needsBelow);
  if (below === null || above === null) return null;
  return {
    excluded: conditionsOfZeros(below, letter, pair, region),
    cancelled: conditionsOfZeros(above, letter, pair, region),
  };
}

function conditionsOfZeros(zeros: readonly OwnZeros[], letter: string, pair: Pair, region: Region): Condition[] {
  const found = new Map<string, Condition>();
  for (const { need, rational, hasOthers } of zeros) {
    const admitted = rational.filter((value) => region.admits(new Map([[letter, fromRational(value)]])));
    const expr = hasOthers ? nodeToExpr(pair.nodes, need.arg) : null;
    const lines =
      expr === null
        ? admitted.map((value) => relationLine(letterExpr(letter), '!=', numberExpr(value)))
        : [plainLine(need, expr)];
    for (const line of lines) {
      const tex = printLine(line);
      found.set(tex, { tex, line });
    }
  }
  return [...found.values()];
}

function needsOfOne(own: readonly Need[], other: readonly Need[]): Need[] {
  return own.filter((need) => !other.some(({ arg, kind }) => arg === need.arg && kind === need.kind));
}

/** Both sides of the zeros of what is needed, and the zeros themselves where they are exact. */
function* pointsToTry(
  pair: Pair,
  needs: readonly Need[],
  samples: Samples,
  region: Region,
  context: CheckContext,
): Generator<Point> {
  yield* pointsOf(region, context.seed, 6);
  const moving = pair.names.filter((name) => !region.whole.has(name));
  const base = samples.common[1] ?? samples.common[0];
  yield* mirrored(base, moving, region);
  for (const letter of region.equations.length === 0 && pair.nodes.length < 400 ? moving : []) {
    const given = new Map<string, Rational>();
    for (const name of region.names) {
      const value = base?.point.get(name);
      if (name !== letter) given.set(name, value?.kind === 'rational' ? value.value : Q.rational(3));
    }
    for (const value of candidates(pair, needs, letter, given, region)) {
      const point = new Map<string, KnownValue>([...given].map(([name, known]) => [name, fromRational(known)]));
      point.set(letter, value);
      if (region.admits(point)) yield point;
    }
  }
}

/** A known point with the signs of two or more letters changed: ln(xy) has a value where x and y are both negative. */
function* mirrored(base: Sample | undefined, moving: readonly string[], region: Region): Generator<Point> {
  if (!base || moving.length < 2 || moving.length > 3 || region.equations.length > 0) return;
  for (let signs = 1; signs < 1 << moving.length; signs += 1) {
    const point = new Map(base.point);
    moving.forEach((name, k) => {
      const value = point.get(name);
      if ((signs >> k) % 2 === 1 && value?.kind === 'rational') point.set(name, fromRational(Q.negate(value.value)));
    });
    if (region.admits(point)) yield point;
  }
}

function candidates(
  pair: Pair,
  needs: readonly Need[],
  letter: string,
  given: ReadonlyMap<string, Rational>,
  region: Region,
): KnownValue[] {
  const { gaps, exact } = breakUp(pair, letter, given);
  const turns = region.traits.turns || needs.some(({ kind }) => kind === 'sine' || kind === 'cosine');
  const multiples = turns ? Array.from({ length: 25 }, (_, k) => fromPi(Q.rational(k - 12, 12))) : [];
  const halves = turns ? Array.from({ length: 9 }, (_, k) => fromPi(Q.rational(k - 4, 2))) : [];
  const sides = needs.every(({ kind }) => kind === 'nonzero') ? [] : gaps;
  return [...exact.map(fromRational), ...sides.map(fromRational), ...halves, ...multiples];
}

function conditionsFrom(
  pair: Pair,
  needs: readonly Need[],
  tried: readonly Sample[],
  agreement: PointResult['agreement'],
): Condition[] {
  const found = new Map<string, Condition>();
  for (const need of needs) {
    const failing = tried.filter(
      ({ result }) => result.agreement === agreement && meets(need, result.values.all[need.arg], result.bits) === false,
    );
    if (failing.length === 0) continue;
    for (const line of linesOf(need, pair, failing)) {
      const tex = printLine(line);
      found.set(tex, { tex, line });
    }
  }
  return [...found.values()];
}

const nowhere: Span = { start: 0, end: 0 };

/** A need as short lines: linear ones solved for the letter, zeros of one letter named when they are fractions. */
function linesOf(need: Need, pair: Pair, failing: readonly Sample[]): Line[] {
  const relation = relationOf(need);
  const names = [...lettersBelow(pair.nodes, need.arg)];
  const [letter] = names;
  if (relation !== null && letter !== undefined && names.length === 1) {
    const solved = solvedFor(letter, need, relation, pair, failing);
    if (solved !== null) return solved;
  }
  const expr = nodeToExpr(pair.nodes, need.arg);
  return expr === null ? [] : [plainLine(need, expr)];
}

function solvedFor(
  letter: string,
  need: Need,
  relation: { sign: RelationSign; to: number },
  pair: Pair,
  failing: readonly Sample[],
): Line[] | null {
  const fraction = toFraction({ nodes: pair.nodes, root: need.arg }, letter);
  if (fraction === null || fraction.den.length !== 1) return null;
  const [constant, slope] = fraction.num;
  const den = fraction.den[0] ?? 1n;
  if (fraction.num.length === 2 && constant !== undefined && slope !== undefined) {
    const root = Q.div(Q.sub(Q.rational(relation.to), Q.rational(constant, den)), Q.rational(slope, den));
    const rising = slope > 0n === den > 0n;
    return [relationLine(letterExpr(letter), rising ? relation.sign : flipped(relation.sign), numberExpr(root))];
  }
  if (need.kind !== 'nonzero') return null;
  return rootLines(letter, fraction.num.length - 1, failing);
}

/** Named one by one only when every root that fails is known exactly. */
function rootLines(letter: string, degree: number, failing: readonly Sample[]): Line[] | null {
  const values = new Map<string, Rational>();
  for (const { point } of failing) {
    const value = point.get(letter);
    if (value?.kind !== 'rational') return null;
    values.set(Q.toTex(value.value), value.value);
  }
  if (values.size === 0 || values.size > degree) return null;
  return [...values.values()].sort(Q.compare).map((value) => relationLine(letterExpr(letter), '!=', numberExpr(value)));
}

function flipped(sign: RelationSign): RelationSign {
  switch (sign) {
    case '>':
      return '<';
    case '>=':
      return '<=';
    case '<':
      return '>';
    case '<=':
      return '>=';
    default:
      return sign;
  }
}

function plainLine(need: Need, expr: Expr): Line {
  const zero = numberExpr(Q.zero);
  const one = numberExpr(Q.one);
  switch (need.kind) {
    case 'nonzero':
      return relationLine(expr, '!=', zero);
    case 'positive':
      return relationLine(expr, '>', zero);
    case 'nonnegative':
      return relationLine(expr, '>=', zero);
    case 'from-one':
      return relationLine(expr, '>=', one);
    case 'beyond-one':
      return relationLine(callExpr('abs', [expr]), '>=', one);
    case 'within-one':
      return relationLine(callExpr('abs', [expr]), '<=', one);
    case 'inside-one':
      return relationLine(callExpr('abs', [expr]), '<', one);
    case 'cosine':
      return relationLine(callExpr('cos', [expr]), '!=', zero);
    case 'sine':
      return relationLine(callExpr('sin', [expr]), '!=', zero);
    case 'whole':
      return {
        kind: 'membership',
        letter: expr,
        set: { kind: 'integers', span: nowhere },
        negated: false,
        span: nowhere,
      };
  }
}
