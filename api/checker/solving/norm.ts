import type { Graph, GraphNode } from '../values/graph.ts';
import { gcd, wholeRoot, type Rational } from '../numbers/rational.ts';
import { reachable } from './double-evaluator.ts';
import type { LineEnv } from './line-env.ts';
import {
  addPolynomials,
  areProportional,
  leading,
  multiplyPolynomials,
  scalePolynomial,
  signAt,
  squareFreePart,
  type Polynomial,
} from './polynomial.ts';
import { realRoots, type RealNumber } from './real-number.ts';

/** Exponents of the roots, joined, to a polynomial in the letter. */
type Element = ReadonlyMap<string, Polynomial>;

/** An element over another one. */
interface Quotient {
  readonly top: Element;
  readonly bottom: Element;
}

/** A root that is not taken: its square or cube is an element in the roots before it. */
interface Root {
  readonly radicand: Element;
  readonly degree: 2 | 3;
}

/** A stretch of the line: a number on it, and the signs that nodes have there; null where one is not known. */
export interface OnStretch {
  readonly sample: Rational;
  readonly signOf: (node: number) => -1 | 0 | 1 | null;
}

export interface NormRoots {
  /** 'zero': the function is zero all along. */
  readonly roots: readonly RealNumber[] | 'zero';
  /** Whether the answer is for this stretch only. */
  readonly isLocal: boolean;
}

const mostRoots = 5;
const mostDegree = 48;
const mostTerms = 200;

class TooLong extends Error {}

/**
 * Numbers among which all zeros of an algebraic function on a stretch are, the real roots of its norm: the product over
 * all choices of its roots. Bars are taken off by the signs on the stretch. Null where the function is not algebraic or
 * its norm too long.
 */
export function rootsOfNorm(graph: Graph, env: LineEnv, stretch: OnStretch): NormRoots | null {
  try {
    const tower = new Tower(graph, env, stretch);
    const value = tower.visit(graph.root);
    if (!value) return null;
    const isLocal = tower.isLocal;
    if (value.top.size === 0) return { roots: 'zero', isLocal };
    const norm = tower.norm(value.top);
    if (norm.length === 0) return null;
    env.context.budget.spend(norm.length ** 2);
    return { roots: realRoots(squareFreePart(norm)), isLocal };
  } catch (cause) {
    if (cause instanceof TooLong) return null;
    throw cause;
  }
}

/** Whether every node of a graph is algebraic. */
export function isAlgebraic(graph: Graph): boolean {
  return [...reachable(graph)].every((index) => {
    const node = graph.nodes[index] as GraphNode;
    if (['number', 'letter', 'add', 'mul', 'negate', 'div', 'power'].includes(node.op)) return true;
    return node.op === 'root' ? node.degree % 2 === 0 || node.degree === 3 : node.op === 'call' && node.name === 'abs';
  });
}

class Tower {
  private readonly roots: Root[] = [];
  private readonly known = new Map<number, Quotient | null>();
  private readonly graph: Graph;
  private readonly env: LineEnv;
  private readonly stretch: OnStretch;
  isLocal = false;

  constructor(graph: Graph, env: LineEnv, stretch: OnStretch) {
    this.graph = graph;
    this.env = env;
    this.stretch = stretch;
  }

  visit(index: number): Quotient | null {
    const found = this.known.get(index);
    if (found !== undefined) return found;
    const node = this.graph.nodes[index];
    const result = node ? this.build(node) : null;
    this.known.set(index, result);
    return result;
  }

  private build(node: GraphNode): Quotient | null {
    switch (node.op) {
      case 'number':
        return { top: constant(node.value.num), bottom: constant(node.value.den) };
      case 'letter': {
        if (node.name === this.env.letter) return { top: element([0n, 1n]), bottom: constant(1n) };
        const value = this.env.given.get(node.name);
        return value ? { top: constant(value.num), bottom: constant(value.den) } : null;
      }
      case 'add':
        return this.fold(node.args, (a, b) => this.sum(a, b));
      case 'mul':
        return this.fold(node.args, (a, b) => this.product(a, b));
      case 'negate': {
        const a = this.visit(node.args[0]);
        return a && { top: scale(a.top, -1n), bottom: a.bottom };
      }
      case 'div': {
        const [a, b] = [this.visit(node.args[0]), this.visit(node.args[1])];
        if (!a || !b || b.top.size === 0) return null;
        return this.product(a, { top: b.bottom, bottom: b.top });
      }
      case 'power':
        return this.power(this.visit(node.args[0]), node.exponent);
      case 'root': {
        const root = this.root(node.args[0], node.degree);
        return this.power(root, node.times);
      }
      case 'call':
        return node.name === 'abs' ? this.size(node.args[0] as number) : null;
      default:
        return null;
    }
  }

  private fold(args: readonly number[], join: (a: Quotient, b: Quotient) => Quotient): Quotient | null {
    let total: Quotient | null = null;
    for (const arg of args) {
      const next = this.visit(arg);
      if (!next) return null;
      total = total === null ? next : join(total, next);
    }
    return total;
  }

  private sum(a: Quotient, b: Quotient): Quotient {
    if (keyOf(a.bottom) === keyOf(b.bottom)) return { top: add(a.top, b.top), bottom: a.bottom };
    return {
      top: add(this.times(a.top, b.bottom), this.times(b.top, a.bottom)),
      bottom: this.times(a.bottom, b.bottom),
    };
  }

  private product(a: Quotient, b: Quotient): Quotient {
    return { top: this.times(a.top, b.top), bottom: this.times(a.bottom, b.bottom) };
  }

  private power(a: Quotient | null, exponent: number): Quotient | null {
    if (!a || Math.abs(exponent) > 24 || (exponent < 0 && a.top.size === 0)) return null;
    const base = exponent < 0 ? { top: a.bottom, bottom: a.top } : a;
    let result: Quotient = { top: constant(1n), bottom: constant(1n) };
    for (let k = 0; k < Math.abs(exponent); k += 1) result = this.product(result, base);
    return result;
  }

  private size(arg: number): Quotient | null {
    const a = this.visit(arg);
    const sign = a && this.stretch.signOf(arg);
    this.isLocal = true;
    if (!a || sign === null || sign === undefined) return null;
    return sign < 0 ? { top: scale(a.top, -1n), bottom: a.bottom } : a;
  }

  /** The root of p / q is that of p q over q, up to a sign, and the norm takes both signs. */
  private root(arg: number, degree: number): Quotient | null {
    const a = this.visit(arg);
    if (!a) return null;
    if (degree === 3) {
      const whole = this.times(a.top, this.times(a.bottom, a.bottom));
      return { top: this.adjoin(whole, 3), bottom: a.bottom };
    }
    if (degree % 2 === 1) return null;
    const half = degree === 2 ? a : this.root(arg, degree / 2);
    if (!half) return null;
    const whole = this.times(half.top, half.bottom);
    const below = half.bottom.get('') ?? [];
    const isNumber = half.bottom.size === 1 && below.length === 1;
    const square = isNumber ? this.rootOfSquare(whole) : null;
    if (square) return { top: leading(below) < 0n ? scale(square, -1n) : square, bottom: half.bottom };
    return { top: this.adjoin(whole, 2), bottom: half.bottom };
  }

  /** sqrt(k s^2) is sqrt(k) s up to a sign, which is told by a value: s does not change it on the stretch. */
  private rootOfSquare(radicand: Element): Element | null {
    const [only] = radicand.values();
    if (radicand.size !== 1 || !radicand.has('') || !only || only.length < 3) return null;
    const part = squareFreePart(only);
    const square = multiplyPolynomials(part, part);
    if (!areProportional(square, only)) return null;
    const [num, den] = [leading(only), leading(square)];
    if (num * den < 0n) return null;
    const factor = num / den;
    if (num !== factor * den) return null;
    const root = wholeRoot(factor, 2);
    const sign = signAt(part, this.stretch.sample);
    this.isLocal = true;
    if (sign === 0) return null;
    const outside = element(scalePolynomial(part, BigInt(sign)));
    return root * root === factor ? scale(outside, root) : this.times(outside, this.adjoin(constant(factor), 2));
  }

  private adjoin(radicand: Element, degree: 2 | 3): Element {
    const key = keyOf(radicand);
    let index = this.roots.findIndex((root) => root.degree === degree && keyOf(root.radicand) === key);
    if (index < 0) {
      if (this.roots.length >= mostRoots) throw new TooLong();
      index = this.roots.push({ radicand, degree }) - 1;
    }
    const exponents = Array.from({ length: index + 1 }, (_, k) => (k === index ? 1 : 0));
    return new Map([[exponents.join(), [1n]]]);
  }

  /** A product, powers of roots put back into what they are roots of. */
  private times(a: Element, b: Element): Element {
    let total: Element = new Map();
    for (const [p, f] of a) {
      for (const [q, g] of b) total = add(total, this.reduced(exponentsOf(p, q), multiplyPolynomials(f, g)));
    }
    return total;
  }

  private reduced(exponents: number[], coefficient: Polynomial): Element {
    this.env.context.budget.spend(1 + (coefficient.length >> 2));
    if (coefficient.length > mostDegree * 4) throw new TooLong();
    const high = exponents.findIndex((exponent, k) => exponent >= (this.roots[k] as Root).degree);
    if (high < 0) return new Map([[trimmed(exponents), coefficient]]);
    const { radicand, degree } = this.roots[high] as Root;
    const rest = exponents.map((exponent, k) => (k === high ? exponent - degree : exponent));
    return this.times(new Map([[trimmed(rest), coefficient]]), radicand);
  }

  /** The product over all choices of the roots, the last one first. */
  norm(whole: Element): Polynomial {
    let a = whole;
    for (let k = this.roots.length - 1; k >= 0; k -= 1) {
      const { radicand, degree } = this.roots[k] as Root;
      const [p, q, r] = partsBy(a, k);
      if (q.size === 0 && r.size === 0) continue;
      const square = (e: Element): Element => this.times(e, e);
      if (degree === 2) a = add(square(p), scale(this.times(square(q), radicand), -1n));
      else {
        const cube = (e: Element): Element => this.times(square(e), e);
        const mixed = this.times(radicand, this.times(p, this.times(q, r)));
        const parts = [
          cube(p),
          this.times(radicand, cube(q)),
          this.times(square(radicand), cube(r)),
          scale(mixed, -3n),
        ];
        a = parts.reduce(add);
      }
      a = withoutContent(a);
      if (a.size === 0) return [];
    }
    const norm = a.get('') ?? [];
    if (norm.length > mostDegree) throw new TooLong();
    return norm;
  }
}

function element(p: Polynomial): Element {
  return p.length === 0 ? new Map() : new Map([['', p]]);
}

function constant(value: bigint): Element {
  return value === 0n ? new Map() : element([value]);
}

function add(a: Element, b: Element): Element {
  const sum = new Map(a);
  for (const [key, p] of b) {
    const total = addPolynomials(sum.get(key) ?? [], p);
    if (total.length === 0) sum.delete(key);
    else sum.set(key, total);
  }
  if (sum.size > mostTerms) throw new TooLong();
  return sum;
}

function scale(a: Element, factor: bigint): Element {
  return new Map([...a].map(([key, p]) => [key, scalePolynomial(p, factor)]));
}

function exponentsOf(p: string, q: string): number[] {
  const [a, b] = [p, q].map((key) => (key === '' ? [] : key.split(',').map(Number))) as [number[], number[]];
  return Array.from({ length: Math.max(a.length, b.length) }, (_, k) => (a[k] ?? 0) + (b[k] ?? 0));
}

function trimmed(exponents: readonly number[]): string {
  let length = exponents.length;
  while (length > 0 && exponents[length - 1] === 0) length -= 1;
  return exponents.slice(0, length).join();
}

/** The elements that stand with the powers 0, 1 and 2 of a root. */
function partsBy(a: Element, root: number): [Element, Element, Element] {
  const parts: [Map<string, Polynomial>, Map<string, Polynomial>, Map<string, Polynomial>] = [
    new Map(),
    new Map(),
    new Map(),
  ];
  for (const [key, p] of a) {
    const exponents = exponentsOf(key, '');
    const own = exponents[root] ?? 0;
    parts[own as 0 | 1 | 2].set(trimmed(exponents.map((e, k) => (k === root ? 0 : e))), p);
  }
  return parts;
}

function withoutContent(a: Element): Element {
  let content = 0n;
  for (const p of a.values()) for (const c of p) content = gcd(content, c);
  if (content <= 1n) return a;
  return new Map([...a].map(([key, p]) => [key, p.map((c) => c / content)]));
}

function keyOf(a: Element): string {
  return [...a]
    .map(([key, p]) => `${key}:${p.join()}`)
    .sort()
    .join(';');
}
