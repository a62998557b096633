import { rational } from '../numbers/rational.ts';
import type { Graph } from '../values/graph.ts';
import type { DoubleFunction } from './double-evaluator.ts';
import type { LineEnv } from './line-env.ts';
import { signAtPoint } from './point-value.ts';
import { approximate, rationalNumber, type RealNumber } from './real-number.ts';
import { guessNumbers } from './recognise.ts';
import { zeroBetween } from './refine.ts';
import { findCrossings, placeOfCrossing, positionsBetween, smallestSize } from './samples.ts';
import { Unsettled } from './unsettled.ts';

function isZeroAt(graph: Graph, at: RealNumber, env: LineEnv): boolean {
  return signAtPoint(graph, env.letter, at, env.given, env.context)?.sign === 0;
}

/**
 * Zeros that samples in doubles show between known points, each confirmed in balls; there may be others. Throws Unsettled
 * where a sign cannot be made out.
 */
export function sampledZeros(
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
