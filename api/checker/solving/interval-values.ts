import {
  addIntervals,
  aroundDouble,
  arcsinInterval,
  arctanInterval,
  cosInterval,
  divIntervals,
  expInterval,
  intervalSign,
  lnInterval,
  mulIntervals,
  negateInterval,
  pointInterval,
  powInterval,
  rootInterval,
  sinInterval,
  wholeInterval,
  type Interval,
} from '../numbers/interval.ts';
import { toNumber, type Rational } from '../numbers/rational.ts';
import type { Graph, GraphNode } from '../values/graph.ts';
import { reachable } from './double-evaluator.ts';

const piInterval: Interval = { lo: 3.1415926535897927, hi: 3.1415926535897936 };
const one = pointInterval(1);

function constantInterval(value: Rational): Interval {
  const double = toNumber(value);
  if (value.den === 1n && Number.isSafeInteger(double)) return pointInterval(double);
  return Number.isFinite(double) ? aroundDouble(double) : wholeInterval;
}

/**
 * What the nodes of a graph of one letter may be worth while the letter runs through an interval. Where a node has no
 * value on a part of it, the rest counts. Null: no value at all, or a node that is not known here.
 */
export class IntervalEvaluator {
  private readonly graph: Graph;
  private readonly order: readonly number[];
  private readonly values: (Interval | null)[];
  /** The signs found since the values were, 2 where none was looked for. */
  private readonly signs: Int8Array;

  constructor(graph: Graph) {
    this.graph = graph;
    this.order = [...reachable(graph)].sort((a, b) => a - b);
    this.values = graph.nodes.map((node) => (node.op === 'number' ? constantInterval(node.value) : null));
    this.signs = new Int8Array(graph.nodes.length);
  }

  /** How many nodes are looked at for one value. */
  get size(): number {
    return this.order.length;
  }

  at(x: Interval): Interval | null {
    for (const index of this.order) {
      const node = this.graph.nodes[index] as GraphNode;
      if (node.op !== 'number') this.values[index] = this.valueOf(node, x);
    }
    return this.values[this.graph.root] ?? null;
  }

  /**
   * The sign that the root has at every point strictly inside the interval, 0 where that is not known: a product is
   * known by the signs of its factors, so that one of them may reach down to zero at an end.
   */
  signInside(x: Interval): -1 | 0 | 1 {
    this.at(x);
    this.signs.fill(2);
    return this.signOf(this.graph.root, x);
  }

  private signOf(index: number, x: Interval): -1 | 0 | 1 {
    const known = this.signs[index] as -1 | 0 | 1 | 2;
    if (known !== 2) return known;
    const sign = this.findSign(index, x);
    this.signs[index] = sign;
    return sign;
  }

  private findSign(index: number, x: Interval): -1 | 0 | 1 {
    const value = this.values[index];
    if (!value) return 0;
    const plain = intervalSign(value);
    if (plain !== 0) return plain;
    const node = this.graph.nodes[index] as GraphNode;
    switch (node.op) {
      case 'letter':
        return x.lo >= 0 ? 1 : x.hi <= 0 ? -1 : 0;
      case 'negate':
        return -this.signOf(node.args[0], x) as -1 | 0 | 1;
      case 'mul':
      case 'div':
        return (node.args as readonly number[]).reduce<number>((s, arg) => s * this.signOf(arg, x), 1) as -1 | 0 | 1;
      case 'add': {
        const signs = node.args.map((arg) => this.signOf(arg, x));
        return signs.every((s) => s === signs[0]) ? (signs[0] ?? 0) : 0;
      }
      case 'power': {
        const base = this.signOf(node.args[0], x);
        return base < 0 && node.exponent % 2 === 0 ? 1 : base;
      }
      case 'root':
        return this.signOf(node.args[0], x);
      case 'call':
        return node.name === 'exp' ? 1 : 0;
      default:
        return 0;
    }
  }

  private of(index: number | undefined): Interval | null {
    return index === undefined ? null : (this.values[index] ?? null);
  }

  private valueOf(node: GraphNode, x: Interval): Interval | null {
    switch (node.op) {
      case 'letter':
        return x;
      case 'constant':
        return node.name === 'pi' ? piInterval : node.name === 'e' ? expInterval(one) : null;
      case 'add':
        return this.fold(node.args, addIntervals);
      case 'mul':
        return this.fold(node.args, mulIntervals);
      case 'negate': {
        const a = this.of(node.args[0]);
        return a && negateInterval(a);
      }
      case 'div': {
        const [a, b] = [this.of(node.args[0]), this.of(node.args[1])];
        return a && b && divIntervals(a, b);
      }
      case 'power':
        return this.powerOf(this.of(node.args[0]), node.exponent);
      case 'root':
        return node.times === 1 ? this.rootOf(this.of(node.args[0]), node.degree) : null;
      case 'call':
        return this.callOf(node.name, this.of(node.args[0]));
      default:
        return null;
    }
  }

  private fold(args: readonly number[], join: (a: Interval, b: Interval) => Interval): Interval | null {
    let total: Interval | null = null;
    for (const arg of args) {
      const value = this.of(arg);
      if (!value) return null;
      total = total === null ? value : join(total, value);
    }
    return total;
  }

  private powerOf(a: Interval | null, exponent: number): Interval | null {
    if (!a) return null;
    return exponent >= 0 ? powInterval(a, exponent) : divIntervals(one, powInterval(a, -exponent));
  }

  private rootOf(a: Interval | null, degree: number): Interval | null {
    if (!a) return null;
    if (degree % 2 === 0 || a.lo >= 0) return rootInterval(a, degree);
    const size = rootInterval({ lo: Math.max(0, -a.hi), hi: -a.lo }, degree);
    if (!size || a.hi <= 0) return size && negateInterval(size);
    const above = rootInterval({ lo: 0, hi: a.hi }, degree);
    return above && { lo: -size.hi, hi: above.hi };
  }

  private callOf(name: Extract<GraphNode, { op: 'call' }>['name'], a: Interval | null): Interval | null {
    if (!a) return null;
    switch (name) {
      case 'exp':
        return expInterval(a);
      case 'ln':
        return lnInterval(a);
      case 'sin':
        return sinInterval(a);
      case 'cos':
        return cosInterval(a);
      case 'arctan':
        return arctanInterval(a);
      case 'arcsin':
        return arcsinInterval(a);
      default:
        return null;
    }
  }
}
