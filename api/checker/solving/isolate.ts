import { ballToNumber } from '../numbers/ball.ts';
import { aroundDouble, pointInterval, type Interval } from '../numbers/interval.ts';
import { isZero, rational, toNumber } from '../numbers/rational.ts';
import { charge } from '../numbers/work.ts';
import type { Graph, GraphBuilder } from '../values/graph.ts';
import { deriveNode } from './derivative.ts';
import { reachable, toDoubleFunction, type DoubleFunction } from './double-evaluator.ts';
import { IntervalEvaluator } from './interval-values.ts';
import type { LineEnv } from './line-env.ts';
import { signAtPoint } from './point-value.ts';
import { approximate, between, compareNumbers, enclose, rationalNumber, type RealNumber } from './real-number.ts';
import { guessNumbers } from './recognise.ts';
import { zeroBetween, zeroBetweenNumbers } from './refine.ts';
import { placeOfCrossing } from './samples.ts';
import { hasNoZeroBeyond, hasNoZeroDownToZero } from './tails.ts';

/** An open stretch of the line; null stands for infinity. */
export interface Stretch {
  readonly from: RealNumber | null;
  readonly to: RealNumber | null;
}

type SomeSign = -1 | 0 | 1 | null;

/** Derivatives that are looked at. */
const mostDerivatives = 4;
const mostBoxes = 320;
const mostScales = 34;

/** Only the nodes that the root depends on, in their order. */
export function compact(graph: Graph): Graph {
  const kept = [...reachable(graph)].sort((a, b) => a - b);
  const places = new Map(kept.map((index, k) => [index, k] as const));
  const nodes = kept.map((index) => {
    const node = graph.nodes[index] as Graph['nodes'][number];
    return { ...node, args: (node.args as readonly number[]).map((arg) => places.get(arg) as number) } as typeof node;
  });
  return { nodes, root: places.get(graph.root) as number };
}

/** Doubles with the point between them. */
function hullOf(point: RealNumber): Interval {
  if (point.kind === 'rational') {
    const x = toNumber(point.value);
    return point.value.den === 1n && Number.isSafeInteger(x) ? pointInterval(x) : widened(x, x);
  }
  const tiny = Math.abs(approximate(point)) < 1e-9;
  const bits = tiny ? 1024 : 96;
  const { mid, rad } = enclose(point, bits);
  return widened(ballToNumber({ mid: mid - rad, rad: 0n }, bits), ballToNumber({ mid: mid + rad, rad: 0n }, bits));
}

/** By the error of two roundings. */
function widened(lo: number, hi: number): Interval {
  return { lo: aroundDouble(aroundDouble(lo).lo).lo, hi: aroundDouble(aroundDouble(hi).hi).hi };
}

/**
 * All zeros of a function on open stretches between the places where it changes its form or has no value; `complete`
 * only where interval arithmetic shows that there are no others. On each box some derivative has one sign all along, so
 * that the zeros of the one before are parted by its own (Rolle).
 */
export class Isolator {
  private readonly env: LineEnv;
  private readonly builder: GraphBuilder;
  private readonly roots: (number | null)[];
  private readonly graphs: Graph[] = [];
  private readonly evaluators: IntervalEvaluator[] = [];
  private readonly doubles: DoubleFunction[] = [];
  private boxes = 0;

  constructor(builder: GraphBuilder, root: number, env: LineEnv) {
    this.builder = builder;
    this.roots = [root];
    this.env = env;
  }

  private has(k: number): boolean {
    if (k > mostDerivatives) return false;
    while (this.roots.length <= k) {
      const last = this.roots[this.roots.length - 1] ?? null;
      const tooLong = this.builder.nodes.length > 3000;
      this.roots.push(last === null || tooLong ? null : deriveNode(this.builder, last, this.env.letter));
    }
    return this.roots[k] !== null;
  }

  private graph(k: number): Graph {
    this.graphs[k] ??= compact({ nodes: this.builder.nodes, root: this.roots[k] as number });
    return this.graphs[k];
  }

  private evaluator(k: number): IntervalEvaluator {
    this.evaluators[k] ??= new IntervalEvaluator(this.graph(k));
    return this.evaluators[k];
  }

  private signOn(k: number, x: Interval): -1 | 0 | 1 {
    if (!this.has(k)) return 0;
    const evaluator = this.evaluator(k);
    charge(1 + evaluator.size / 2);
    return evaluator.signInside(x);
  }

  /** Null: no value there, or not known. */
  private signAt(k: number, point: RealNumber): SomeSign {
    const evaluator = this.evaluator(k);
    charge(1 + evaluator.size / 2);
    const value = evaluator.at(hullOf(point));
    if (value && value.lo > 0) return 1;
    if (value && value.hi < 0) return -1;
    // Powers too large for a double are too costly for balls.
    if (value && !Number.isFinite(value.hi - value.lo) && Math.abs(approximate(point)) > 700) return null;
    return signAtPoint(this.graph(k), this.env.letter, point, new Map(), this.env.context)?.sign ?? null;
  }

  /** The zeros on an open stretch, those at its ends left out; null where it is not shown that these are all. */
  zerosOn(stretch: Stretch): RealNumber[] | null {
    this.boxes = 0;
    const { from, to } = stretch;
    if ([from, to].some((end) => end && !Number.isFinite(approximate(end)))) return null;
    if (from && to) return this.zerosInBox(from, to);
    const start = from ?? to;
    const parting = rationalNumber(start ? this.beside(start, from ? 1 : -1) : rational(123, 10_000));
    const near = start ? this.zerosInBox(from ?? parting, to ?? parting) : [];
    const right = to ? [] : this.zerosBeyond(parting, 1);
    const left = from ? [] : this.zerosBeyond(parting, -1);
    if (!near || !right || !left) return null;
    return [...near, ...right, ...left, ...this.atPoint(parting)];
  }

  private beside(point: RealNumber, side: 1 | -1) {
    const x = approximate(point);
    const step = 1.0137 + Math.abs(x) / 8;
    return rational(BigInt(Math.round((x + side * step) * 1024)), 1024n);
  }

  private atPoint(point: RealNumber): RealNumber[] {
    return this.signAt(0, point) === 0 ? [point] : [];
  }

  /** From a point outwards, each time four times as far, until nothing can follow. */
  private zerosBeyond(start: RealNumber, side: 1 | -1): RealNumber[] | null {
    const found: RealNumber[] = [];
    let here = start;
    let reach = 1;
    for (let k = 0; k < mostScales; k += 1) {
      if (this.isFreeBeyond(here, side)) return found;
      reach *= 4;
      const x = approximate(start) + side * reach;
      const next = rationalNumber(rational(BigInt(Math.round(x * 1024)), 1024n));
      const zeros = side === 1 ? this.zerosInBox(here, next) : this.zerosInBox(next, here);
      if (!zeros) return null;
      found.push(...zeros, ...this.atPoint(next));
      here = next;
    }
    return null;
  }

  /** Whether the function has one sign from a point on: it or a derivative has, and all before it lead away from zero. */
  private isFreeBeyond(point: RealNumber, side: 1 | -1): boolean {
    const x = approximate(point);
    const { lo, hi } = hullOf(point);
    const ray = side === 1 ? { lo, hi: Infinity } : { lo: -Infinity, hi };
    for (let k = 0; k <= mostDerivatives; k += 1) {
      let sign = this.signOn(k, ray);
      for (let j = k - 1; sign !== 0 && j >= 0; j -= 1) {
        const here = this.signAt(j, point);
        const away = (sign * side) as -1 | 1;
        sign = here === 0 || here === away ? away : 0;
      }
      if (sign !== 0) return true;
    }
    return hasNoZeroBeyond(this.graph(0), this.env.letter, x, side);
  }

  private zerosInBox(from: RealNumber, to: RealNumber): RealNumber[] | null {
    this.boxes += 1;
    charge(4);
    if (this.boxes > mostBoxes) return null;
    const hull = { lo: hullOf(from).lo, hi: hullOf(to).hi };
    if (this.signOn(0, hull) !== 0) return [];
    for (let k = 1; k <= mostDerivatives; k += 1) {
      if (this.signOn(k, hull) === 0) continue;
      const zeros = this.zerosOfDerivative(0, k, from, to);
      if (zeros) return zeros;
    }
    const isAtZero = from.kind === 'rational' && isZero(from.value) && this.signAt(0, from) === null;
    if (isAtZero && hasNoZeroDownToZero(this.graph(0), this.env.letter, hull.hi)) return [];
    // Doubles do not tell the ends apart.
    if (hull.hi - hull.lo < 1e-15 * Math.abs(hull.lo)) return null;
    const middle = rationalNumber(this.parting(from, to, hull));
    const left = this.zerosInBox(from, middle);
    const right = left && this.zerosInBox(middle, to);
    return right && [...(left as RealNumber[]), ...this.atPoint(middle), ...right];
  }

  /** Nearly the middle: where zeros lie in school work boxes should not end. */
  private parting(from: RealNumber, to: RealNumber, { lo, hi }: Interval) {
    const x = lo + (hi - lo) * 0.4931;
    const scale = 2 ** Math.max(0, Math.ceil(-Math.log2(hi - lo)) + 6);
    if (hi - lo < 1e-9 * (1 + Math.abs(x)) || scale > 2 ** 60) return between(from, to);
    return rational(BigInt(Math.round(x * scale)), BigInt(scale));
  }

  /**
   * The zeros of the derivative of order `k` inside a box on which that of order `top` has one sign: one at most between
   * neighbouring zeros of the next one. Null where an end without a value leaves it open.
   */
  private zerosOfDerivative(k: number, top: number, from: RealNumber, to: RealNumber): RealNumber[] | null {
    if (k === top) return [];
    const critical = this.zerosOfDerivative(k + 1, top, from, to);
    if (!critical) return null;
    const points = [from, ...critical, to];
    const signs = points.map((point) => this.signAt(k, point));
    const found: RealNumber[] = [];
    for (let j = 0; j + 1 < points.length; j += 1) {
      const [a, b] = [points[j], points[j + 1]] as [RealNumber, RealNumber];
      const [s, t] = [signs[j], signs[j + 1]] as [SomeSign, SomeSign];
      if (s === null || t === null) {
        if (!this.leadsAway(k, a, b, s, t)) return null;
      } else if (s * t < 0) {
        const zero = this.zeroOf(k, a, b);
        if (!zero) return null;
        found.push(zero);
      }
      if (j > 0 && s === 0) found.push(a);
    }
    return found;
  }

  /** Between two ends of which one has no value: the size grows from the other end on. */
  private leadsAway(k: number, a: RealNumber, b: RealNumber, s: SomeSign, t: SomeSign): boolean {
    if (s === null && t === null) return false;
    const slope = this.signAt(k + 1, rationalNumber(between(a, b)));
    if (slope === null) return false;
    return s === null ? t !== null && t * slope <= 0 && slope !== 0 : s * slope >= 0 && slope !== 0;
  }

  /** The only zero between two points with different signs, by its short name where it has one. */
  private zeroOf(k: number, a: RealNumber, b: RealNumber): RealNumber | null {
    const graph = this.graph(k);
    const { letter, context } = this.env;
    const near = this.roughZero(k, a, b);
    const scale = 1e-6 * (1 + Math.abs(near));
    for (const guess of [...this.env.hints, ...guessNumbers(near)]) {
      if (!(Math.abs(approximate(guess) - near) <= scale)) continue;
      const isInside = compareNumbers(guess, a).order > 0 && compareNumbers(guess, b).order < 0;
      if (isInside && signAtPoint(graph, letter, guess, new Map(), context)?.sign === 0) return guess;
    }
    const f = { graph, letter, given: new Map(), context };
    const [low, high] = [near - scale / 1000, near + scale / 1000];
    const isTight = low > approximate(a) && high < approximate(b);
    return (isTight ? zeroBetween(f, low, high) : null) ?? zeroBetweenNumbers(f, a, b);
  }

  /** Where doubles have it. */
  private roughZero(k: number, a: RealNumber, b: RealNumber): number {
    this.doubles[k] ??= toDoubleFunction(this.graph(k), this.env.letter, new Map());
    return placeOfCrossing(this.doubles[k], approximate(a), approximate(b));
  }
}
