import {
  absolute,
  add,
  div,
  exactRoot,
  isZero,
  mul,
  negate,
  one,
  rational,
  sign,
  sub,
  zero,
  type Rational,
} from '../numbers/rational.ts';
import type { Graph, GraphNode } from '../values/graph.ts';
import type { Assignment } from './fraction.ts';
import { rationalNumber, realRoots, type RealNumber } from './real-number.ts';

/** whole + part * sqrt(radicand), the radicand square-free and above 1, or 1 where part is zero. */
export interface Surd {
  readonly whole: Rational;
  readonly part: Rational;
  readonly radicand: bigint;
}

export function rationalSurd(value: Rational): Surd {
  return { whole: value, part: zero, radicand: 1n };
}

function make(whole: Rational, part: Rational, radicand: bigint): Surd {
  if (radicand === 1n) return { whole: add(whole, part), part: zero, radicand: 1n };
  return isZero(part) ? { whole, part, radicand: 1n } : { whole, part, radicand };
}

/** value = outside^2 * inside with inside free of squares; null for numbers too long to take apart. */
export function splitSquare(value: bigint): { outside: bigint; inside: bigint } | null {
  if (value > 10n ** 18n) return null;
  let outside = 1n;
  let inside = value;
  for (let p = 2n; p * p <= inside; p += p === 2n ? 1n : 2n) {
    if (p > 40_000n) return null;
    while (inside % (p * p) === 0n) {
      inside /= p * p;
      outside *= p;
    }
  }
  return { outside, inside };
}

/** The square root of a fraction that is not negative. */
export function sqrtSurd(value: Rational): Surd | null {
  if (sign(value) < 0) return null;
  if (isZero(value)) return rationalSurd(zero);
  const split = splitSquare(value.num * value.den);
  return split && make(zero, rational(split.outside, value.den), split.inside);
}

function commonRadicand(a: Surd, b: Surd): bigint | null {
  if (a.radicand === 1n) return b.radicand;
  return b.radicand === 1n || b.radicand === a.radicand ? a.radicand : null;
}

export function addSurds(a: Surd, b: Surd): Surd | null {
  const radicand = commonRadicand(a, b);
  return radicand === null ? null : make(add(a.whole, b.whole), add(a.part, b.part), radicand);
}

export function multiplySurds(a: Surd, b: Surd): Surd | null {
  const radicand = commonRadicand(a, b);
  if (radicand !== null) {
    const whole = add(mul(a.whole, b.whole), mul(mul(a.part, b.part), rational(radicand)));
    return make(whole, add(mul(a.whole, b.part), mul(a.part, b.whole)), radicand);
  }
  if (!isZero(a.whole) || !isZero(b.whole)) return null;
  const split = splitSquare(a.radicand * b.radicand);
  return split && make(zero, mul(mul(a.part, b.part), rational(split.outside)), split.inside);
}

export function negateSurd(a: Surd): Surd {
  return { whole: negate(a.whole), part: negate(a.part), radicand: a.radicand };
}

export function invertSurd(a: Surd): Surd | null {
  const norm = sub(mul(a.whole, a.whole), mul(mul(a.part, a.part), rational(a.radicand)));
  if (isZero(norm)) return null;
  return make(div(a.whole, norm), div(negate(a.part), norm), a.radicand);
}

/** The exact value of a graph without letters that lies in one quadratic field, else null. */
export function toSurd(graph: Graph, given: Assignment = new Map()): Surd | null {
  const known = new Map<number, Surd | null>();
  const visit = (index: number): Surd | null => {
    const found = known.get(index);
    if (found !== undefined) return found;
    const node = graph.nodes[index];
    const result = node ? nodeToSurd(node, given, visit) : null;
    known.set(index, result);
    return result;
  };
  return visit(graph.root);
}

function nodeToSurd(node: GraphNode, given: Assignment, visit: (index: number) => Surd | null): Surd | null {
  switch (node.op) {
    case 'number':
      return rationalSurd(node.value);
    case 'letter': {
      const value = given.get(node.name);
      return value ? rationalSurd(value) : null;
    }
    case 'add':
      return node.args.reduce<Surd | null>((total, arg) => join(total, visit(arg), addSurds), rationalSurd(zero));
    case 'mul':
      return node.args.reduce<Surd | null>((total, arg) => join(total, visit(arg), multiplySurds), rationalSurd(one));
    case 'negate': {
      const inside = visit(node.args[0]);
      return inside && negateSurd(inside);
    }
    case 'div': {
      const bottom = visit(node.args[1]);
      return join(visit(node.args[0]), bottom && invertSurd(bottom), multiplySurds);
    }
    case 'power': {
      const base = visit(node.args[0]);
      return base && raiseSurd(base, node.exponent);
    }
    case 'root': {
      const inside = visit(node.args[0]);
      if (!inside || inside.radicand !== 1n) return null;
      const exact = sign(inside.whole) > 0 ? exactRoot(inside.whole, node.degree) : null;
      if (exact) return raiseSurd(rationalSurd(exact), node.times);
      const root = node.degree === 2 && !node.positive ? sqrtSurd(inside.whole) : null;
      return root && raiseSurd(root, node.times);
    }
    case 'call': {
      const inside = node.name === 'abs' && node.args[0] !== undefined ? visit(node.args[0]) : null;
      return inside && inside.radicand === 1n ? rationalSurd(absolute(inside.whole)) : null;
    }
    default:
      return null;
  }
}

function join(a: Surd | null, b: Surd | null, operation: (a: Surd, b: Surd) => Surd | null): Surd | null {
  return a && b && operation(a, b);
}

function raiseSurd(base: Surd, exponent: number): Surd | null {
  if (Math.abs(exponent) > 60) return null;
  if (exponent === 0) return isZero(base.whole) && isZero(base.part) ? null : rationalSurd(one);
  const start = exponent < 0 ? invertSurd(base) : base;
  let result: Surd | null = start;
  for (let k = 1; k < Math.abs(exponent); k += 1) result = join(result, start, multiplySurds);
  return result;
}

/** The point of the real line: a fraction, or the root of its quadratic polynomial. */
export function surdToNumber(a: Surd): RealNumber {
  if (a.radicand === 1n) return rationalNumber(a.whole);
  const norm = sub(mul(a.whole, a.whole), mul(mul(a.part, a.part), rational(a.radicand)));
  const middle = mul(rational(-2), a.whole);
  const scale = middle.den * norm.den;
  const roots = realRoots([(norm.num * scale) / norm.den, (middle.num * scale) / middle.den, scale]);
  return roots[sign(a.part) > 0 ? 1 : 0] as RealNumber;
}

/** The two roots of c2 x^2 + c1 x + c0, smaller first, where they are real. */
export function quadraticRoots(c0: bigint, c1: bigint, c2: bigint): readonly [Surd, Surd] | null {
  const discriminant = c1 * c1 - 4n * c0 * c2;
  if (discriminant < 0n) return null;
  const root = sqrtSurd(rational(discriminant));
  if (!root) return null;
  const half = rationalSurd(rational(1n, 2n * c2));
  const minus = rationalSurd(rational(-c1));
  const low = addSurds(minus, negateSurd(root));
  const high = addSurds(minus, root);
  const first = low && multiplySurds(low, half);
  const second = high && multiplySurds(high, half);
  if (!first || !second) return null;
  return c2 > 0n ? [first, second] : [second, first];
}

/** TeX in the usual form: \frac{1+\sqrt{5}}{2}, 3\sqrt{2}, -\frac{\sqrt{3}}{2}. */
export function surdToTex(a: Surd): string {
  const den = a.whole.den * (a.part.den / gcdOf(a.whole.den, a.part.den));
  const whole = (a.whole.num * den) / a.whole.den;
  const part = (a.part.num * den) / a.part.den;
  if (part === 0n) return overTex(whole < 0n, `${whole < 0n ? -whole : whole}`, den);
  const size = part < 0n ? -part : part;
  const root = `${size === 1n ? '' : size}\\sqrt{${a.radicand}}`;
  if (whole === 0n) return overTex(part < 0n, root, den);
  const text = `${whole}${part < 0n ? '-' : '+'}${root}`;
  return den === 1n ? text : `\\frac{${text}}{${den}}`;
}

function overTex(negative: boolean, top: string, den: bigint): string {
  return `${negative ? '-' : ''}${den === 1n ? top : `\\frac{${top}}{${den}}`}`;
}

function gcdOf(a: bigint, b: bigint): bigint {
  return b === 0n ? a : gcdOf(b, a % b);
}
