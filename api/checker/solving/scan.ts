import { rational, toNumber } from '../numbers/rational.ts';
import type { Graph, GraphNode } from '../values/graph.ts';
import { listBreaks, type Break } from './breaks.ts';
import { circularArguments, countWaves, zerosOfCircular } from './circular.ts';
import { isDoubleReady, toDoubleFunction, type DoubleFunction } from './double-evaluator.ts';
import type { Sign, SignMap } from './fraction-signs.ts';
import { degreeIn } from './linear.ts';
import { signAtPoint } from './point-value.ts';
import { approximate, between, rationalNumber, type RealNumber } from './real-number.ts';
import { simplify, sortNumbers } from './real-set.ts';
import { guessNumbers } from './recognise.ts';
import { zeroBetween } from './refine.ts';
import { findCrossings, placeOfCrossing, positionsBetween, smallestSize } from './samples.ts';
import type { LineEnv } from './line-env.ts';
import { Unsettled } from './unsettled.ts';

/** Solves a part of the function: the recursion of the caller. */
export type SolvePart = (graph: Graph, env: LineEnv) => SignMap;

const defaultWindow = { low: -41, high: 41 };

/**
 * The signs of a function that is no rational one: its breaks (zeros of denominators, radicands, arguments of
 * logarithms and bars) split the line, zeros are looked for between them by samples in doubles, and each zero and each
 * sign that is answered is confirmed in balls.
 */
export function scanSigns(graph: Graph, outer: LineEnv, solvePart: SolvePart): SignMap {
  const given = new Map([...outer.given].map(([name, value]) => [name, toNumber(value)] as const));
  // Some thousand samples in doubles.
  outer.context.budget.spend(graph.nodes.length * 60);
  if (!isDoubleReady(graph, outer.letter, given)) throw new Unsettled('not-covered');
  const isCircular = circularArguments(graph, outer.letter).length > 0;
  const env = isCircular && !outer.window ? { ...outer, window: defaultWindow } : outer;
  const f = toDoubleFunction(graph, env.letter, given);
  const breaks = breakPoints(graph, env, solvePart);
  const known = [...breaks, ...env.hints.filter((hint) => isZeroAt(graph, hint, env))];
  const edges = sortNumbers(known).points;
  const zeros = zerosBetween(graph, f, edges, env, isCircular ? countWaves(graph, env) : 0);
  const points = sortNumbers([...edges, ...zeros]).points.filter((p) => isInside(p, env));
  const at = points.map((p) => {
    const found = signAtPoint(graph, env.letter, p, env.given, env.context);
    if (!found) throw new Unsettled('not-settled');
    return found.sign;
  });
  return simplify({ points, at, between: signsBetween(graph, f, points, env), reached: 'sampled' });
}

function isInside(p: RealNumber, env: LineEnv): boolean {
  if (!env.window) return true;
  const x = approximate(p);
  return x >= env.window.low - 1e-9 && x <= env.window.high + 1e-9;
}

function isZeroAt(graph: Graph, at: RealNumber, env: LineEnv): boolean {
  return isInside(at, env) && signAtPoint(graph, env.letter, at, env.given, env.context)?.sign === 0;
}

function breakPoints(graph: Graph, env: LineEnv, solvePart: SolvePart): RealNumber[] {
  const found: RealNumber[] = [];
  const seen = new Set<string>();
  for (const item of listBreaks(graph)) {
    const key = `${item.node} ${item.shift} ${item.circular ?? ''}`;
    if (seen.has(key)) continue;
    seen.add(key);
    found.push(...pointsOfBreak(graph, item, env, solvePart));
  }
  return found;
}

function pointsOfBreak(graph: Graph, item: Break, env: LineEnv, solvePart: SolvePart): readonly RealNumber[] {
  if (degreeIn({ nodes: graph.nodes, root: item.node }, env.letter) === 0) return [];
  if (item.circular) {
    const zeros = zerosOfCircular(graph, item.node, item.circular, env);
    if (zeros) return zeros;
    return solvePart(withNode(graph, { op: 'call', name: item.circular, args: [item.node] }), env).points;
  }
  if (item.shift === 0) return solvePart({ nodes: graph.nodes, root: item.node }, env).points;
  const number: GraphNode = { op: 'number', args: [], value: rational(item.shift) };
  const extended = withNode(graph, number);
  return solvePart(withNode(extended, { op: 'add', args: [item.node, extended.root] }), env).points;
}

function withNode(graph: Graph, node: GraphNode): Graph {
  return { nodes: [...graph.nodes, node], root: graph.nodes.length };
}

function zerosBetween(
  graph: Graph,
  f: DoubleFunction,
  edges: readonly RealNumber[],
  env: LineEnv,
  waves: number,
): RealNumber[] {
  const ends = edges.map(approximate);
  const zeros: RealNumber[] = [];
  const low = env.window?.low ?? -Infinity;
  const high = env.window?.high ?? Infinity;
  // A little beyond the window, for zeros at its ends; where such a zero is known already, from there on.
  const isEnd = (end: number): boolean => ends.some((x) => Math.abs(x - end) < 1e-9);
  const margin = (end: number): number => (env.window && !isEnd(end) ? 1e-6 : 0);
  const inner = ends.filter((x) => x > low + 1e-9 && x < high - 1e-9);
  const all = [low - margin(low), ...inner, high + margin(high)];
  for (let k = 0; k + 1 < all.length; k += 1) {
    const [a, b] = [all[k] as number, all[k + 1] as number];
    const share = env.window ? (waves * (b - a)) / (high - low) : 0;
    const positions = positionsBetween(a, b, share);
    for (const crossing of findCrossings(f, positions)) {
      zeros.push(...zerosAt(graph, f, crossing, env));
    }
  }
  return zeros;
}

function zerosAt(
  graph: Graph,
  f: DoubleFunction,
  crossing: { kind: 'crossing' | 'touching'; low: number; high: number },
  env: LineEnv,
): RealNumber[] {
  const found = crossing.kind === 'touching' ? smallestSize(f, crossing.low, crossing.high) : null;
  const at = found ? found.at : placeOfCrossing(f, crossing.low, crossing.high);
  const scale = Math.abs(f(crossing.low)) + Math.abs(f(crossing.high));
  if (found && (!Number.isFinite(scale) || found.size > 1e-7 * scale)) return [];
  for (const guess of guessNumbers(at)) {
    if (approximate(guess) >= crossing.low && approximate(guess) <= crossing.high && isZeroAt(graph, guess, env))
      return [guess];
  }
  const ball = { graph, letter: env.letter, given: env.given, context: env.context };
  if (crossing.kind === 'touching') return touchingZeros(graph, f, crossing, at, env);
  const wider = 1e-9 * (1 + Math.abs(at));
  const zero =
    zeroBetween(ball, crossing.low, crossing.high) ?? zeroBetween(ball, crossing.low - wider, crossing.high + wider);
  if (zero) return [zero];
  // Signs that are noise: the function is zero all along, or the zero is not to be pinned down.
  const middle = rationalNumber(rational(BigInt(Math.round(at * 2 ** 40)), 1n << 40n));
  if (signAtPoint(graph, env.letter, middle, env.given, env.context)?.sign === 0) return [];
  if (isNoise(graph, crossing, env)) return [];
  throw new Unsettled('not-settled');
}

/** Whether the signs on both sides are the same after all: doubles lose them close to a zero that is known. */
function isNoise(graph: Graph, { low, high }: { low: number; high: number }, env: LineEnv): boolean {
  const [a, b] = [low, high].map((x) => {
    const at = rationalNumber(rational(BigInt(Math.round(x * 2 ** 60)), 1n << 60n));
    return signAtPoint(graph, env.letter, at, env.given, env.context);
  });
  return a?.certain === true && b?.certain === true && a.sign === b.sign;
}

/** Two zeros close together, or a zero without change of sign, or neither. */
function touchingZeros(
  graph: Graph,
  f: DoubleFunction,
  { low, high }: { low: number; high: number },
  at: number,
  env: LineEnv,
): RealNumber[] {
  const ball = { graph, letter: env.letter, given: env.given, context: env.context };
  if (Math.sign(f(at)) === -Math.sign(f(low))) {
    return [zeroBetween(ball, low, at), zeroBetween(ball, at, high)].filter((zero) => zero !== null);
  }
  const middle = rationalNumber(rational(BigInt(Math.round(at * 2 ** 40)), 1n << 40n));
  const here = signAtPoint(graph, env.letter, middle, env.given, env.context);
  // Within the error of the place, a value that small may or may not be zero.
  if ((Math.abs(f(at)) || 0) < 1e-12 * (Math.abs(f(low)) + Math.abs(f(high))) || !here)
    throw new Unsettled('not-settled');
  return [];
}

function signsBetween(graph: Graph, f: DoubleFunction, points: readonly RealNumber[], env: LineEnv): Sign[] {
  return Array.from({ length: points.length + 1 }, (_, k) => {
    const low = points[k - 1] ?? null;
    const high = points[k] ?? null;
    const x = between(low ?? windowEnd(env, 'low'), high ?? windowEnd(env, 'high'));
    const found = signAtPoint(graph, env.letter, rationalNumber(x), env.given, env.context);
    if (!found) {
      if (Number.isNaN(f(toNumber(x)))) throw new Unsettled('not-settled');
      throw new Unsettled('limit');
    }
    return found.sign;
  });
}

function windowEnd(env: LineEnv, side: 'low' | 'high'): RealNumber | null {
  if (!env.window) return null;
  const value = side === 'low' ? env.window.low - 1 : env.window.high + 1;
  return rationalNumber(rational(BigInt(Math.round(value * 1024)), 1024n));
}
