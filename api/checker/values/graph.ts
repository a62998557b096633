import type { FunctionName } from '../../../shared/maths/expression.ts';
import * as Q from '../numbers/rational.ts';
import type { Rational } from '../numbers/rational.ts';

/** Determinants, transposes and degrees are gone once an expression is a graph. */
export type CallName = Exclude<FunctionName, 'det' | 'transpose' | 'degrees'> | 'factorial' | 'binomial' | 'log';

/** What an expression means, as a graph in which equal parts are one node; `args` are indices of earlier nodes. */
export type GraphNode =
  | { readonly op: 'number'; readonly args: readonly []; readonly value: Rational }
  | { readonly op: 'letter'; readonly args: readonly []; readonly name: string }
  | { readonly op: 'constant'; readonly args: readonly []; readonly name: 'pi' | 'e' | 'i' | 'infinity' }
  | { readonly op: 'add' | 'mul'; readonly args: readonly number[] }
  | { readonly op: 'negate'; readonly args: readonly [number] }
  | { readonly op: 'div'; readonly args: readonly [number, number] }
  /** A whole constant exponent. */
  | { readonly op: 'power'; readonly args: readonly [number]; readonly exponent: number }
  /** The radicand to the power times/degree, in lowest terms, degree >= 2. */
  | {
      readonly op: 'root';
      readonly args: readonly [number];
      readonly degree: number;
      readonly times: number;
      /** A decimal exponent, which needs a positive base (rule 13). */
      readonly positive: boolean;
    }
  /** Base and exponent, where the exponent is no constant fraction. */
  | {
      readonly op: 'pow';
      readonly args: readonly [number, number];
      /** The exponent varies over the real numbers and the base varies too: only a positive base has such powers. */
      readonly positive: boolean;
    }
  | { readonly op: 'call'; readonly args: readonly number[]; readonly name: CallName }
  | {
      readonly op: 'series';
      /** The bounds. */
      readonly args: readonly [number, number];
      readonly operation: 'sum' | 'product';
      readonly index: string;
      readonly body: Graph;
    }
  /** What cannot be evaluated, and why. */
  | { readonly op: 'opaque'; readonly args: readonly []; readonly reason: 'not-covered' | 'limit' };

export interface Graph {
  readonly nodes: readonly GraphNode[];
  readonly root: number;
}

/** Adds nodes to a growing graph; an equal node is never added twice. */
export interface GraphBuilder {
  readonly nodes: GraphNode[];
  readonly push: (node: GraphNode) => number;
  readonly number: (value: Rational) => number;
  readonly add: (args: readonly number[]) => number;
  readonly mul: (args: readonly number[]) => number;
  readonly negate: (arg: number) => number;
  readonly div: (top: number, bottom: number) => number;
  readonly power: (base: number, exponent: number) => number;
  readonly valueOf: (index: number) => Rational | null;
}

const foldBits = 2_000;
/** Longer fractions are left in parts: their common denominators would cost more than they tell. */
const longest = 1n << 600n;
/** The same in sums and products of many numbers, such as the written-out sum of 1/k^2. */
const longestOfMany = 1n << 96n;
const many = 60;
const largestExponent = 1_000_000;

/** Room for 2^17 nodes and exponents up to 2^21 in a double. */
const nodeSpan = 131_072;
const exponentSpan = 4_194_304;

/** A number for the kinds of nodes that are frequent and small, a text for the others. */
function keyOf(node: GraphNode): string | number {
  switch (node.op) {
    case 'number':
      // To the base 32, which long numbers are quickly written in.
      return node.value.den === 1n
        ? `#${node.value.num.toString(32)}`
        : `#${node.value.num.toString(32)}/${node.value.den.toString(32)}`;
    case 'letter':
      return `$${node.name}`;
    case 'constant':
      return `@${node.name}`;
    case 'negate':
      return 8 * node.args[0];
    case 'div':
      return 8 * (node.args[0] * nodeSpan + node.args[1]) + 1;
    case 'power':
      return 8 * (node.args[0] * exponentSpan + node.exponent + exponentSpan / 2) + 2;
    case 'add':
    case 'mul': {
      const [a, b] = node.args;
      if (node.args.length !== 2 || a === undefined || b === undefined) return `${node.op}${node.args.join()}`;
      return 8 * (a * nodeSpan + b) + (node.op === 'add' ? 3 : 4);
    }
    case 'pow':
      return `p${node.args.join()},${node.positive}`;
    case 'root':
      return `r${node.args[0]},${node.degree},${node.times},${node.positive}`;
    case 'call':
      return `${node.name}(${node.args.join()})`;
    default:
      return `${node.op}(${node.args.join()})`;
  }
}

/** (a^m)^n as one power for m > 0, where nothing is lost when a is zero. */
function joinedExponent(m: number, n: number): number | null {
  return m > 0 && n !== 0 && Math.abs(m * n) <= largestExponent ? m * n : null;
}

/** The power as a fraction where it has one and is short. */
function foldedPower(value: Rational, exponent: number): Rational | null {
  if (exponent === 0 || (exponent < 0 && Q.isZero(value))) return null;
  const size = Q.bitLength(value.num) + Q.bitLength(value.den);
  return size * Math.abs(exponent) <= foldBits ? Q.pow(value, exponent) : null;
}

export function createGraphBuilder(onPush: () => void): GraphBuilder {
  return new Builder(onPush);
}

/** A class, for one is made for every comparison: making as many functions each time would cost more than their work. */
class Builder implements GraphBuilder {
  readonly nodes: GraphNode[] = [];
  private readonly known = new Map<string | number, number>();
  private readonly smallNumbers = new Map<number, number>();
  private readonly onPush: () => void;

  constructor(onPush: () => void) {
    this.onPush = onPush;
  }

  push(node: GraphNode): number {
    // Two series or two unknowns are never merged: nothing says that they are equal.
    const key = node.op === 'series' || node.op === 'opaque' ? `${node.op}${this.nodes.length}` : keyOf(node);
    const found = this.known.get(key);
    if (found !== undefined) return found;
    this.onPush();
    this.known.set(key, this.nodes.length);
    return this.nodes.push(node) - 1;
  }

  valueOf(index: number): Rational | null {
    const node = this.nodes[index];
    return node?.op === 'number' ? node.value : null;
  }

  number(value: Rational): number {
    const small = value.den === 1n ? Number(value.num) : NaN;
    if (!Number.isSafeInteger(small)) return this.push({ op: 'number', args: [], value });
    let found = this.smallNumbers.get(small);
    if (found === undefined) {
      found = this.push({ op: 'number', args: [], value });
      this.smallNumbers.set(small, found);
    }
    return found;
  }

  /** Numbers among the arguments become one, and what is left is sorted: a sum or product has no order. */
  private fold(op: 'add' | 'mul', args: readonly number[]): number {
    const join = op === 'add' ? Q.add : Q.mul;
    const neutral = op === 'add' ? Q.zero : Q.one;
    let total = neutral;
    const most = args.length > many ? longestOfMany : longest;
    const rest: number[] = [];
    for (const arg of args) {
      const value = this.valueOf(arg);
      if (value === null) {
        rest.push(arg);
        continue;
      }
      total = join(total, value);
      if (total.den > most || total.num > most || total.num < -most) {
        rest.push(this.push({ op: 'number', args: [], value: total }));
        total = neutral;
      }
    }
    if (rest.length === 0) return this.number(total);
    if (!Q.equals(total, neutral)) rest.push(this.number(total));
    if (rest.length === 1) return rest[0] ?? 0;
    return this.push({ op, args: rest.sort((a, b) => a - b) });
  }

  negate(arg: number): number {
    const value = this.valueOf(arg);
    return value === null ? this.push({ op: 'negate', args: [arg] }) : this.number(Q.negate(value));
  }

  div(top: number, bottom: number): number {
    const divisor = this.valueOf(bottom);
    const value = this.valueOf(top);
    if (divisor !== null && value !== null && !Q.isZero(divisor)) return this.number(Q.div(value, divisor));
    return this.push({ op: 'div', args: [top, bottom] });
  }

  power(base: number, exponent: number): number {
    if (exponent === 1) return base;
    const inner = this.nodes[base];
    const joined = inner?.op === 'power' ? joinedExponent(inner.exponent, exponent) : null;
    if (inner?.op === 'power' && joined !== null) return this.power(inner.args[0], joined);
    const value = this.valueOf(base);
    const folded = value === null ? null : foldedPower(value, exponent);
    if (folded !== null) return this.number(folded);
    return this.push({ op: 'power', args: [base], exponent });
  }

  add(args: readonly number[]): number {
    return this.fold('add', args);
  }

  mul(args: readonly number[]): number {
    return this.fold('mul', args);
  }
}

/** The free letters that a node depends on. */
export function lettersBelow(nodes: readonly GraphNode[], root: number): Set<string> {
  const names = new Set<string>();
  const seen = new Set<number>();
  const open = [root];
  for (let index = open.pop(); index !== undefined; index = open.pop()) {
    const node = nodes[index];
    if (node === undefined || seen.has(index)) continue;
    seen.add(index);
    if (node.op === 'letter') names.add(node.name);
    if (node.op === 'series') {
      for (const name of lettersBelow(node.body.nodes, node.body.root)) if (name !== node.index) names.add(name);
    }
    open.push(...node.args);
  }
  return names;
}
