import type { Expr } from '../../../shared/maths/expression.ts';
import type { CheckContext } from '../context.ts';
import { addBalls, magnitude, type Ball } from '../numbers/ball.ts';
import { isKnown, isReal, toBall } from '../values/arithmetic.ts';
import { evaluate, prepare } from '../values/evaluate.ts';
import type { Graph } from '../values/graph.ts';
import { taylorOf } from './taylor.ts';

export const quadratureBits = 112;
const order = 20;
/** The error that is asked for on each piece: 2^-74. */
const tolerance = 1n << 38n;
const deepest = 14;
const mostPieces = 400;

/**
 * An enclosure of an integral between two numbers, by Taylor's formula on pieces: the remainder is at most the highest
 * coefficient on the piece times its length to that power. Null where the integrand is not enclosed on all of the way.
 */
export function encloseIntegral(
  integrand: Expr,
  letter: string,
  from: Expr,
  to: Expr,
  context: CheckContext,
): Ball | null {
  const [a, b] = [endOf(from, context), endOf(to, context)];
  if (!a || !b) return null;
  const graph = prepare(integrand, context);
  const job: Job = { graph, letter, context, left: mostPieces };
  // Whole pieces between the middles of the ends; the small stretches to the ends are bounded by the values there.
  const sign = a.mid <= b.mid ? 1n : -1n;
  const [low, high] = sign > 0n ? [a, b] : [b, a];
  const total = overPiece(job, low.mid, high.mid, 0);
  const value = graph && total && edges(job, low, high);
  if (!total || !value) return null;
  const sum = addBalls(total, value);
  return sign > 0n ? sum : { mid: -sum.mid, rad: sum.rad };
}

interface Job {
  readonly graph: Graph;
  readonly letter: string;
  readonly context: CheckContext;
  left: number;
}

function endOf(expr: Expr, context: CheckContext): Ball | null {
  const value = evaluate(expr, new Map(), quadratureBits, context);
  return isKnown(value) && isReal(value) ? toBall(value, quadratureBits).re : null;
}

/** What the uncertainty of the ends can add: their radius times the size of the integrand there. */
function edges({ graph, letter, context }: Job, ...ends: readonly Ball[]): Ball | null {
  let rad = 0n;
  for (const end of ends) {
    if (end.rad === 0n) continue;
    const jet = taylorOf(graph, letter, end, 1, quadratureBits, context);
    if (!jet?.[0]) return null;
    rad += (((magnitude(jet[0].mid) + jet[0].rad) * end.rad) >> BigInt(quadratureBits)) + 1n;
  }
  return { mid: 0n, rad };
}

function overPiece(job: Job, low: bigint, high: bigint, depth: number): Ball | null {
  const direct = taylorIntegral(job, low, high, depth >= deepest);
  if (direct) return direct;
  if (depth >= deepest || job.left <= 0) return null;
  const middle = (low + high) >> 1n;
  const first = overPiece(job, low, middle, depth + 1);
  const second = first && overPiece(job, middle, high, depth + 1);
  return first && second && addBalls(first, second);
}

function taylorIntegral(job: Job, low: bigint, high: bigint, anyway: boolean): Ball | null {
  if ((job.left -= 1) < 0) return null;
  const { graph, letter, context } = job;
  const bits = quadratureBits;
  const middle = (low + high) >> 1n;
  const half = ((high - low) >> 1n) + 1n;
  const whole: Ball = { mid: middle, rad: half + 1n };
  if (half >> BigInt(bits) > 3n) return null;
  const beyond = taylorOf(graph, letter, whole, order, bits, context)?.[order];
  if (!beyond) return null;
  // Powers of the length are kept whole: they soon are smaller than a unit in the last place.
  const remainder = scaledPower(2n * sizeOf(beyond), half, order + 1) / BigInt(order + 1) + 1n;
  if (remainder > tolerance && !anyway) return null;
  const jet = taylorOf(graph, letter, { mid: middle, rad: 0n }, order, bits, context);
  if (!jet) return null;
  let total: Ball = { mid: 0n, rad: remainder + (8n * sizeOf(jet[0] as Ball)) / (1n << BigInt(bits)) + 64n };
  for (let k = 0; k < order; k += 2) {
    const { mid, rad } = jet[k] as Ball;
    const under = BigInt(k + 1);
    total = addBalls(total, {
      mid: scaledPower(2n * mid, half, k + 1) / under,
      rad: scaledPower(2n * rad, half, k + 1) / under + 2n,
    });
  }
  return total;
}

/** value times half^times, for a half in units of 2^-bits. */
function scaledPower(value: bigint, half: bigint, times: number): bigint {
  return (value * half ** BigInt(times)) >> BigInt(quadratureBits * times);
}

function sizeOf(ball: Ball): bigint {
  return magnitude(ball.mid) + ball.rad;
}
