import { bitLength, exactRoot, rational, type Rational } from '../numbers/rational.ts';
import type { Graph, GraphNode } from '../values/graph.ts';
import {
  addPolynomials,
  dividePolynomials,
  gcdPolynomials,
  leading,
  multiplyPolynomials,
  onePolynomial,
  powerPolynomial,
  primitivePart,
  scalePolynomial,
  type Polynomial,
} from './polynomial.ts';

/** A rational function of one letter, not reduced; it has no value where `holes` is zero. */
export interface PolynomialFraction {
  readonly num: Polynomial;
  readonly den: Polynomial;
  /** Product of all that was divided by, as written: cancelled factors included. */
  readonly holes: Polynomial;
}

const largestDegree = 400;

/** Values that stand in for letters, exact. */
export type Assignment = ReadonlyMap<string, Rational>;

const noValues: Assignment = new Map();

/**
 * A node of a graph as a rational function of the letter with rational coefficients, or null where it is none (or has
 * no value anywhere).
 */
export function toFraction(graph: Graph, letter: string, given: Assignment = noValues): PolynomialFraction | null {
  const known = new Map<number, PolynomialFraction | null>();
  const visit = (index: number): PolynomialFraction | null => {
    const found = known.get(index);
    if (found !== undefined) return found;
    const node = graph.nodes[index];
    const result = node ? nodeToFraction(node, letter, given, visit) : null;
    const fits = result && result.num.length <= largestDegree && result.den.length <= largestDegree ? result : null;
    known.set(index, fits);
    return fits;
  };
  return visit(graph.root);
}

type Visit = (index: number) => PolynomialFraction | null;

function nodeToFraction(node: GraphNode, letter: string, given: Assignment, visit: Visit): PolynomialFraction | null {
  switch (node.op) {
    case 'number':
      return constantFraction(node.value);
    case 'letter': {
      if (node.name === letter) return { num: [0n, 1n], den: onePolynomial, holes: onePolynomial };
      const value = given.get(node.name);
      return value ? constantFraction(value) : null;
    }
    case 'add':
      return fold(node.args, visit, addFractions);
    case 'mul':
      return fold(node.args, visit, multiplyFractions);
    case 'negate': {
      const inside = visit(node.args[0]);
      return inside && negateFraction(inside);
    }
    case 'div': {
      const top = visit(node.args[0]);
      const bottom = top && visit(node.args[1]);
      return top && bottom && divideFractions(top, bottom);
    }
    case 'power': {
      const base = visit(node.args[0]);
      const size = base && (Math.max(base.num.length, base.den.length) - 1) * Math.abs(node.exponent);
      return base && size !== null && size <= largestDegree && Math.abs(node.exponent) <= 4096
        ? raise(base, node.exponent)
        : null;
    }
    case 'root': {
      const inside = constantOf(visit(node.args[0]));
      if (!inside || (node.positive && inside.num <= 0n) || (inside.num === 0n && node.times < 0)) return null;
      const root = exactRoot(inside, node.degree);
      return root && raise(constantFraction(root), node.times);
    }
    case 'pow': {
      const exponent = constantOf(visit(node.args[1]));
      const base = exponent?.den === 1n && exponent.num < 4096n && exponent.num > -4096n ? visit(node.args[0]) : null;
      return base && exponent && (base.num.length - 1) * Math.abs(Number(exponent.num)) <= largestDegree
        ? raise(base, Number(exponent.num))
        : null;
    }
    case 'call': {
      const inside = node.name === 'abs' && node.args[0] !== undefined ? constantOf(visit(node.args[0])) : null;
      return inside && constantFraction(inside.num < 0n ? { num: -inside.num, den: inside.den } : inside);
    }
    default:
      return null;
  }
}

type Operation = (a: PolynomialFraction, b: PolynomialFraction) => PolynomialFraction;

function fold(args: readonly number[], visit: Visit, operation: Operation): PolynomialFraction | null {
  let result: PolynomialFraction | null = null;
  for (const arg of args) {
    const next = visit(arg);
    if (!next) return null;
    result = result === null ? next : operation(result, next);
    if (result.num.length > largestDegree) return null;
  }
  return result;
}

/** The fraction that a constant function is worth, in lowest terms. */
function constantOf(a: PolynomialFraction | null): Rational | null {
  if (!a || a.num.length > 1 || a.den.length !== 1 || a.holes.length !== 1) return null;
  return rational(a.num[0] ?? 0n, a.den[0] ?? 1n);
}

export function negateFraction(a: PolynomialFraction): PolynomialFraction {
  return { ...a, num: scalePolynomial(a.num, -1n) };
}

function joinHoles(a: Polynomial, b: Polynomial): Polynomial {
  if (a.length === 1) return b;
  return b.length === 1 ? a : multiplyPolynomials(a, b);
}

export function addFractions(a: PolynomialFraction, b: PolynomialFraction): PolynomialFraction {
  const holes = joinHoles(a.holes, b.holes);
  if (a.den === b.den || (a.den.length === b.den.length && a.den.every((c, k) => c === b.den[k]))) {
    return { num: addPolynomials(a.num, b.num), den: a.den, holes };
  }
  return {
    num: addPolynomials(multiplyPolynomials(a.num, b.den), multiplyPolynomials(b.num, a.den)),
    den: multiplyPolynomials(a.den, b.den),
    holes,
  };
}

export function subtractFractions(a: PolynomialFraction, b: PolynomialFraction): PolynomialFraction {
  return addFractions(a, negateFraction(b));
}

export function multiplyFractions(a: PolynomialFraction, b: PolynomialFraction): PolynomialFraction {
  return {
    num: multiplyPolynomials(a.num, b.num),
    den: multiplyPolynomials(a.den, b.den),
    holes: joinHoles(a.holes, b.holes),
  };
}

/** Null where the divisor is the zero function: there is no value anywhere. */
export function divideFractions(a: PolynomialFraction, b: PolynomialFraction): PolynomialFraction | null {
  if (b.num.length === 0) return null;
  return {
    num: multiplyPolynomials(a.num, b.den),
    den: multiplyPolynomials(a.den, b.num),
    holes: joinHoles(joinHoles(a.holes, b.holes), b.num),
  };
}

/** Bits of the largest coefficient; longer ones cost more than they tell. */
const longestCoefficient = 20_000;

function raise(base: PolynomialFraction, power: number): PolynomialFraction | null {
  const bits = [...base.num, ...base.den].reduce((most, c) => Math.max(most, bitLength(c)), 0);
  if (bits > 1 && bits * Math.abs(power) > longestCoefficient) return null;
  if (power > 0) {
    return { num: powerPolynomial(base.num, power), den: powerPolynomial(base.den, power), holes: base.holes };
  }
  if (base.num.length === 0) return null;
  return {
    num: powerPolynomial(base.den, -power),
    den: powerPolynomial(base.num, -power),
    holes: joinHoles(base.holes, base.num),
  };
}

function constantFraction(value: Rational): PolynomialFraction {
  return { num: value.num === 0n ? [] : [value.num], den: [value.den], holes: onePolynomial };
}

/** The value of a graph without letters where it is a fraction reached by + - * / and exact roots. */
export function toRational(graph: Graph, given: Assignment = noValues): Rational | null {
  return constantOf(toFraction(graph, '', given));
}

/** Numerator without the factors that it shares with the denominator, and the sign-carrying denominator. */
export function reduceFraction(a: PolynomialFraction): PolynomialFraction {
  if (a.den.length === 1 || a.num.length === 0) return a;
  const common = gcdPolynomials(a.num, a.den);
  if (common.length === 1) return a;
  const num = dividePolynomials(a.num, common);
  const den = dividePolynomials(a.den, common);
  if (!num || !den) return a;
  // The quotients come back primitive: the factor that this lost has to be put in again.
  const lost = rational(leading(a.num) * leading(den), leading(a.den) * leading(num));
  return { num: scalePolynomial(num, lost.num), den: scalePolynomial(den, lost.den), holes: a.holes };
}

export function samePolynomial(a: Polynomial, b: Polynomial): boolean {
  const p = primitivePart(a);
  const q = primitivePart(b);
  return p.length === q.length && p.every((c, k) => c === q[k]);
}
