import type { Expr } from '../../../shared/maths/expression.ts';
import type { CheckContext } from '../context.ts';
import { ballToNumber, type Ball } from '../numbers/ball.ts';
import * as Q from '../numbers/rational.ts';
import { toFraction } from '../solving/fraction.ts';
import { squareFreePart } from '../solving/polynomial.ts';
import { isolateRealRoots } from '../solving/real-roots.ts';
import { isKnown, isReal, toBall } from '../values/arithmetic.ts';
import { signOf } from '../values/powers.ts';
import { evaluate, evaluatePrepared, prepare, type Prepared } from '../values/evaluate.ts';
import {
  addExprs,
  divExprs,
  letterOf,
  mulExprs,
  numberOf,
  oneExpr,
  piExpr,
  powExprs,
  rationalExpr,
  rationalOf,
} from './build.ts';
import { differentiate } from './differentiate.ts';
import { infinitySign } from './limit.ts';
import { linearIn, polynomialIn } from './integrand.ts';
import { needsOf } from './needs.ts';
import { isZeroCoefficient } from './series-ring.ts';
import { substitute } from './substitute.ts';

/** An end of a piece: `isGap` where the expression may have no value there. */
export interface Cut {
  readonly at: Expr;
  readonly isGap: boolean;
  readonly isDescending: boolean;
}

const bits = 96;
const deepest = 11;
const mostEvaluations = 1_500;

/**
 * Cuts the stretch between two numbers so that the expression is continuous between neighbouring ones: shown by enclosures
 * of its values on small intervals, but for small stretches around the cuts. Null where that does not succeed.
 */
export function splitAt(
  expr: Expr,
  variable: string,
  from: Expr,
  to: Expr,
  context: CheckContext,
): readonly Cut[] | null {
  const [a, b] = [positionOf(from, context), positionOf(to, context)];
  if (!a || !b) return null;
  if (a.value === b.value) return Q.equals(a.exact ?? Q.one, b.exact ?? Q.zero) ? [] : null;
  const isDescending = a.value > b.value;
  const [low, high] = isDescending ? [b, a] : [a, b];
  const points = cutPoints(expr, variable, low, high, context);
  if (!points) return null;
  const cuts = points.map((point): Cut => ({ at: point.expr, isGap: point.isGap, isDescending }));
  return isDescending ? cuts.reverse() : cuts;
}

/** The stretch between two numbers cut at all zeros of an expression, from the one to the other; null where some may be missed. */
export function cutsAtZeros(expr: Expr, variable: string, from: Expr, to: Expr, context: CheckContext): Expr[] | null {
  const [a, b] = [positionOf(from, context), positionOf(to, context)];
  if (!a || !b || !Number.isFinite(a.value) || !Number.isFinite(b.value) || a.value === b.value) return null;
  const [low, high] = a.value < b.value ? [a, b] : [b, a];
  const zeros = rootsOf(expr, variable, low, high, context);
  if (!zeros) return null;
  if (!zeros.areAll && !areAllZeros(expr, variable, low.value, high.value, zeros.candidates, context)) return null;
  const cuts = between(low, high, zeros.candidates).map(({ expr: at }) => at);
  return a.value < b.value ? cuts : cuts.reverse();
}

/** Whether there are no other zeros: on small stretches the values keep their sign, or rise or fall through one of these. */
function areAllZeros(
  expr: Expr,
  variable: string,
  start: number,
  end: number,
  zeros: readonly Candidate[],
  context: CheckContext,
): boolean {
  const value = prepare(expr, context);
  const slope = prepare(differentiate(expr, variable, context), context);
  let count = 0;
  const signOn = (graph: Prepared, low: number, high: number): number | null => {
    const ball = { kind: 'ball', re: ballAround(low, high), im: null } as const;
    const worth = evaluatePrepared(graph, new Map([[variable, ball]]), bits, context);
    return isKnown(worth) && isReal(worth) ? signOf(worth) : null;
  };
  const visit = (low: number, high: number, depth: number): boolean => {
    if ((count += 1) > mostEvaluations) return false;
    if (signOn(value, low, high)) return true;
    const inside = zeros.filter((zero) => zero.value >= low && zero.value <= high);
    if (inside.length > 0 && signOn(slope, low, high)) return true;
    const middle = (low + high) / 2 + (high - low) / 64;
    return depth < deepest && visit(low, middle, depth + 1) && visit(middle, high, depth + 1);
  };
  return visit(start, end, 0);
}

interface Position {
  readonly expr: Expr;
  /** A double, infinite for an infinity. */
  readonly value: number;
  readonly exact: Q.Rational | null;
}

function positionOf(expr: Expr, context: CheckContext): Position | null {
  const beyond = infinitySign(expr);
  if (beyond !== null) return { expr, value: beyond * Infinity, exact: null };
  const worth = evaluate(expr, new Map(), bits, context);
  if (!isKnown(worth) || !isReal(worth)) return null;
  const exact = worth.kind === 'rational' ? worth.value : null;
  return { expr, value: ballToNumber(toBall(worth, bits).re, bits), exact };
}

interface CutPoint {
  readonly expr: Expr;
  readonly isGap: boolean;
}

/** Beyond this the stretch is looked at in 1/x. */
const farAway = 64;

function cutPoints(
  expr: Expr,
  variable: string,
  low: Position,
  high: Position,
  context: CheckContext,
): CutPoint[] | null {
  const needs = zerosOf(expr, variable, low, high, context);
  if (!needs) return null;
  const { candidates } = needs;
  if (needs.areAll) return between(low, high, candidates);
  const reach = Math.max(
    farAway,
    ...[low.value, high.value, ...candidates.map(({ value }) => value)]
      .filter(Number.isFinite)
      .map((x) => 2 * Math.abs(x)),
  );
  const graph = prepare(expr, context);
  const start = Number.isFinite(low.value) ? low.value : -reach;
  const end = Number.isFinite(high.value) ? high.value : reach;
  const trouble = unresolved(
    graph,
    variable,
    start,
    end,
    context,
    candidates.map(({ value }) => value),
  );
  if (!trouble) return null;
  if ([low, high].some(({ value }) => !Number.isFinite(value) && !isCalm(expr, variable, value, reach, context)))
    return null;
  const inner = candidates.filter(({ value }) => value > start && value < end);
  const width = (end - start) / 2 ** 6;
  const near = (x: number, [from, to]: readonly [number, number]): boolean =>
    x >= from - 1e-9 * width && x <= to + 1e-9 * width;
  const covered = trouble.every(
    (stretch) => inner.some(({ value }) => near(value, stretch)) || near(start, stretch) || near(end, stretch),
  );
  return covered
    ? between(
        low,
        high,
        inner.filter(({ value }) => trouble.some((stretch) => near(value, stretch))),
      )
    : null;
}

/** Ends are approached as limits: for those at which nothing is amiss that is the value. */
function between(low: Position, high: Position, candidates: readonly Candidate[]): CutPoint[] {
  const isNear = (a: number, b: number): boolean => Math.abs(a - b) < 1e-9 * (1 + Math.abs(a));
  const gaps = candidates.filter(
    ({ value }) => value > low.value && value < high.value && !isNear(value, low.value) && !isNear(value, high.value),
  );
  const isGap = ({ value }: Position): boolean =>
    !Number.isFinite(value) || candidates.some((candidate) => isNear(candidate.value, value));
  return [
    { expr: low.expr, isGap: isGap(low) },
    ...[...gaps].sort((a, b) => a.value - b.value).map(({ expr: at }) => ({ expr: at, isGap: true })),
    { expr: high.expr, isGap: isGap(high) },
  ];
}

/** Small stretches on which the values could not be enclosed, joined where they touch. */
function unresolved(
  graph: Prepared,
  variable: string,
  start: number,
  end: number,
  context: CheckContext,
  expected: readonly number[] = [],
): [number, number][] | null {
  const found: [number, number][] = [];
  const pieces = Math.max(1, Math.min(64, Math.ceil((end - start) * 2)));
  let count = 0;
  const visit = (low: number, high: number, depth: number): boolean => {
    if ((count += 1) > mostEvaluations) return false;
    const value = evaluatePrepared(
      graph,
      new Map([[variable, { kind: 'ball', re: ballAround(low, high), im: null }]]),
      bits,
      context,
    );
    if (isKnown(value) && isReal(value)) return true;
    const isExpected = depth >= 6 && expected.some((x) => x >= low && x <= high);
    if (depth >= deepest || isExpected) {
      const last = found[found.length - 1];
      if (last && last[1] >= low) last[1] = high;
      else found.push([low, high]);
      return found.length < 40;
    }
    const middle = (low + high) / 2;
    return visit(low, middle, depth + 1) && visit(middle, high, depth + 1);
  };
  for (let k = 0; k < pieces; k += 1) {
    const [low, high] = [
      start + ((end - start) * k) / pieces,
      k === pieces - 1 ? end : start + ((end - start) * (k + 1)) / pieces,
    ];
    if (!visit(low, high, Math.min(5, Math.floor(Math.log2(pieces))))) return null;
  }
  return found;
}

function ballAround(low: number, high: number): Ball {
  const scale = 2 ** 40;
  const [from, to] = [Math.floor(low * scale), Math.ceil(high * scale)];
  const shift = BigInt(bits - 40);
  const [a, b] = [(BigInt(from) - 1n) << shift, (BigInt(to) + 1n) << shift];
  return { mid: (a + b) >> 1n, rad: ((b - a) >> 1n) + 1n };
}

/** Known on the whole way from `reach` out, but for what lies beyond 2^12 times as far. */
function isCalm(expr: Expr, variable: string, towards: number, reach: number, context: CheckContext): boolean {
  const turned = substitute(expr, variable, divExprs(numberOf(towards > 0 ? 1 : -1), letterOf(variable)));
  const trouble = unresolved(prepare(turned, context), variable, 0, 1 / reach, context);
  return trouble !== null && trouble.every(([low]) => low === 0);
}

interface Candidate {
  readonly expr: Expr;
  readonly value: number;
}

interface Zeros {
  readonly candidates: readonly Candidate[];
  /** Whether there are certainly no others. */
  readonly areAll: boolean;
}

/** The zeros of what the expression needs, where they can be found; null where some cannot. */
function zerosOf(expr: Expr, variable: string, low: Position, high: Position, context: CheckContext): Zeros | null {
  const needs = needsOf(expr, variable);
  if (!needs) return { candidates: [], areAll: false };
  const found: Candidate[] = [];
  let areAll = true;
  for (const need of needs) {
    const zeros = rootsOf(need.expr, variable, low, high, context);
    if (!zeros) return null;
    areAll &&= zeros.areAll;
    for (const root of zeros.candidates)
      if (!found.some(({ value }) => Math.abs(value - root.value) < 1e-9)) found.push(root);
  }
  return { candidates: found, areAll };
}

function rootsOf(need: Expr, variable: string, low: Position, high: Position, context: CheckContext): Zeros | null {
  if (need.kind === 'quotient' || need.kind === 'product') {
    const parts = (need.kind === 'quotient' ? [need.numerator, need.denominator] : need.factors).map((part) =>
      rootsOf(part, variable, low, high, context),
    );
    if (parts.includes(null)) return null;
    return { candidates: parts.flatMap((part) => part?.candidates ?? []), areAll: parts.every((part) => part?.areAll) };
  }
  if (need.kind === 'power' && rationalOf(need.exponent)) return rootsOf(need.base, variable, low, high, context);
  const turning = need.kind === 'call' ? circularRoots(need, variable, low, high, context) : null;
  if (turning) return { candidates: turning, areAll: true };
  const coefs = polynomialIn(need, variable);
  if (coefs?.length === 1) return { candidates: [], areAll: true };
  if (coefs?.length === 2) return { candidates: linearRoot(coefs, context), areAll: true };
  if (coefs?.length === 3) return { candidates: quadraticRoots(coefs, context), areAll: true };
  const fraction = toFraction(prepare(need, context), variable);
  if (!fraction) return { candidates: turningRoots(need, variable, low, high, context), areAll: false };
  if (fraction.num.length < 2) return { candidates: [], areAll: true };
  const roots = isolateRealRoots(squareFreePart(fraction.num));
  const exact = roots
    .filter((root) => Q.equals(root.low, root.high))
    .map(({ low: at }) => ({ expr: rationalExpr(at), value: Q.toNumber(at) }));
  const isOpen = roots.some(
    (root) => Q.toNumber(root.high) > low.value && Q.toNumber(root.low) < high.value && !Q.equals(root.low, root.high),
  );
  return isOpen ? null : { candidates: exact, areAll: true };
}

const mostTurns = 60;

/** The zeros of a sine or cosine of something linear: where that is a multiple of pi, or half a one more. */
function circularRoots(
  need: Extract<Expr, { kind: 'call' }>,
  variable: string,
  low: Position,
  high: Position,
  context: CheckContext,
): Candidate[] | null {
  const linear = need.args[0] ? linearIn(need.args[0], variable) : null;
  if (!linear || (need.name !== 'sin' && need.name !== 'cos')) return null;
  const ends = [low, high].map(({ expr, value }) =>
    Number.isFinite(value) ? positionOf(addExprs(mulExprs(linear.slope, expr), linear.constant), context) : null,
  );
  const [a, b] = ends;
  if (!a || !b) return null;
  const [first, last] = [Math.min(a.value, b.value), Math.max(a.value, b.value)].map((angle) => angle / Math.PI) as [
    number,
    number,
  ];
  if (last - first > mostTurns) return null;
  const found: Candidate[] = [];
  for (let k = Math.floor(first) - 1; k <= Math.ceil(last) + 1; k += 1) {
    const angle = mulExprs(need.name === 'sin' ? numberOf(k) : numberOf(2 * k + 1, 2), piExpr);
    const at = divExprs(addExprs(angle, mulExprs(numberOf(-1), linear.constant)), linear.slope);
    const position = positionOf(at, context);
    if (position) found.push({ expr: at, value: position.value });
  }
  return found;
}

function linearRoot([constant, slope]: readonly Expr[], context: CheckContext): Candidate[] {
  const at = divExprs(mulExprs(numberOf(-1), constant as Expr), slope as Expr);
  const position = positionOf(at, context);
  return position ? [{ expr: at, value: position.value }] : [];
}

function quadraticRoots(coefs: readonly Expr[], context: CheckContext): Candidate[] {
  const [c, b, a] = coefs as [Expr, Expr, Expr];
  const root = powExprs(addExprs(mulExprs(b, b), mulExprs(numberOf(-4), a, c)), numberOf(1, 2));
  return [1, -1].flatMap((sign) => {
    const at = divExprs(addExprs(mulExprs(numberOf(-1), b), mulExprs(numberOf(sign), root)), mulExprs(numberOf(2), a));
    const position = positionOf(at, context);
    return position ? [{ expr: at, value: position.value }] : [];
  });
}

/** Zeros among whole numbers, halves, multiples of pi/12 and small powers of e. */
function turningRoots(need: Expr, variable: string, low: Position, high: Position, context: CheckContext): Candidate[] {
  const e: Expr = { kind: 'constant', name: 'e', span: need.span };
  const places: Candidate[] = [oneExpr, numberOf(0), e, divExprs(oneExpr, e)].flatMap(
    (expr) => positionOf(expr, context) ?? [],
  );
  for (let k = -48; k <= 48; k += 1) {
    places.push({ expr: mulExprs(numberOf(k, 12), piExpr), value: (k * Math.PI) / 12 });
    if (Math.abs(k) <= 12 && k !== 0 && k !== 2) places.push({ expr: numberOf(k, 2), value: k / 2 });
  }
  const graph = prepare(need, context);
  return places.filter(({ expr, value }) => {
    if (value < low.value - 1e-9 || value > high.value + 1e-9) return false;
    const position = evaluate(expr, new Map(), bits, context);
    const worth = isKnown(position) ? evaluatePrepared(graph, new Map([[variable, position]]), bits, context) : null;
    if (!worth || !isKnown(worth) || !isReal(worth) || Math.abs(ballToNumber(toBall(worth, bits).re, bits)) > 1e-12)
      return false;
    return isZeroCoefficient(substitute(need, variable, expr), context);
  });
}
