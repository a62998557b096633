import type { CheckContext } from '../context.ts';
import { ballBetween, ballSign, type Ball } from '../numbers/ball.ts';
import { evaluatePrepared } from '../values/evaluate.ts';
import { toBall } from '../values/arithmetic.ts';
import type { Graph } from '../values/graph.ts';
import type { KnownValue } from '../values/value.ts';
import type { Assignment } from './fraction.ts';
import { enclose, type RealNumber } from './real-number.ts';

/** A function of one letter that can be evaluated in balls. */
export interface BallFunction {
  readonly graph: Graph;
  readonly letter: string;
  readonly given: Assignment;
  readonly context: CheckContext;
}

const extraBits = 64;
const mostBits = 1100;

function valueAt(f: BallFunction, mid: bigint, bits: number): Ball | null {
  const wide = bits + extraBits;
  const x: KnownValue = { kind: 'ball', re: { mid: mid << BigInt(extraBits), rad: 0n }, im: null };
  const point = new Map<string, KnownValue>([[f.letter, x]]);
  for (const [name, value] of f.given) point.set(name, { kind: 'rational', value });
  const value = evaluatePrepared(f.graph, point, wide, f.context);
  if (value.kind === 'undefined' || value.kind === 'unknown' || value.kind === 'gaussian') return null;
  const ball = toBall(value, wide);
  return ball.im === null ? ball.re : null;
}

/** The doubles low and high as multiples of 2^-bits. */
function toFixed(value: number, bits: number): bigint {
  const scaled = BigInt(Math.round(value * 2 ** 40));
  return bits >= 40 ? scaled << BigInt(bits - 40) : scaled >> BigInt(40 - bits);
}

/**
 * The zero between two doubles at which the function has certain, different signs; null where that is not so. The
 * function must be continuous between them.
 */
export function zeroBetween(f: BallFunction, low: number, high: number): RealNumber | null {
  const start = { low: toFixed(low, 96), high: toFixed(high, 96) };
  const first = narrow(f, start, 96);
  return first && computedFrom(f, first, 96);
}

/** The zero inside a bracket that was found with some bits, narrowed further as more are asked for. */
function computedFrom(f: BallFunction, first: Bracket, known: number): RealNumber {
  return {
    kind: 'computed',
    expr: null,
    enclose: (bits) => {
      const used = Math.max(Math.min(bits, mostBits), known);
      const shift = BigInt(used - known);
      const wide = { low: first.low << shift, high: first.high << shift };
      const found = narrow(f, wide, used) ?? wide;
      const at = BigInt(bits - used);
      return at >= 0n
        ? ballBetween(found.low << at, found.high << at)
        : ballBetween(found.low >> -at, (found.high >> -at) + 1n);
    },
  };
}

/**
 * The same between two numbers, however close they are: 320 bits to begin with where 96 cannot tell them apart. Null
 * where the signs there are not certain or not different.
 */
export function zeroBetweenNumbers(f: BallFunction, a: RealNumber, b: RealNumber): RealNumber | null {
  for (const bits of [96, 320]) {
    const start = { low: enclose(a, bits).mid, high: enclose(b, bits).mid };
    const first = start.high - start.low > 1n << 40n ? narrow(f, start, bits) : null;
    if (first) return computedFrom(f, first, bits);
  }
  return null;
}

interface Bracket {
  readonly low: bigint;
  readonly high: bigint;
}

/** Secant steps with a margin that shrinks as they succeed, halving where they do not. */
function narrow(f: BallFunction, start: Bracket, bits: number): Bracket | null {
  let { low, high } = start;
  const atLow = valueAt(f, low, bits);
  const atHigh = valueAt(f, high, bits);
  if (!atLow || !atHigh) return null;
  const below = ballSign(atLow);
  if (below === 0 || below * ballSign(atHigh) !== -1) return null;
  let [fLow, fHigh] = [atLow.mid, atHigh.mid];
  let margin = 6n;
  const probe = (at: bigint): number => {
    if (at <= low || at >= high) return 0;
    const value = valueAt(f, at, bits);
    const sign = value ? ballSign(value) : 0;
    if (value && sign === below) [low, fLow] = [at, value.mid];
    else if (value && sign === -below) [high, fHigh] = [at, value.mid];
    return sign;
  };
  for (let k = 0; k < 400 && high - low > 1n << 14n; k += 1) {
    const width = high - low;
    const guess = low + (width * fLow) / (fLow - fHigh);
    const step = width >> margin > 1n << 12n ? width >> margin : 1n << 12n;
    probe(guess - step);
    probe(guess + step);
    if (high - low <= width >> (margin - 2n)) margin = margin * 2n;
    else {
      margin = 4n;
      if (probe((low + high) >> 1n) === 0 && high - low === width) break;
    }
  }
  return { low, high };
}
