import { add, div, equals, isZero, mul, negate, rational, sub, zero, type Rational } from '../numbers/rational.ts';
import type { Graph, GraphNode } from '../values/graph.ts';

/** A complex number with rational parts. */
export interface Gaussian {
  readonly re: Rational;
  readonly im: Rational;
}

/** Lowest power first, no zero at the end. */
export type GaussianPolynomial = readonly Gaussian[];

const none: Gaussian = { re: zero, im: zero };
export const unit: Gaussian = { re: rational(1), im: zero };

function isNone(a: Gaussian): boolean {
  return isZero(a.re) && isZero(a.im);
}

function plus(a: Gaussian, b: Gaussian): Gaussian {
  return { re: add(a.re, b.re), im: add(a.im, b.im) };
}

function times(a: Gaussian, b: Gaussian): Gaussian {
  return { re: sub(mul(a.re, b.re), mul(a.im, b.im)), im: add(mul(a.re, b.im), mul(a.im, b.re)) };
}

export function minus(a: Gaussian): Gaussian {
  return { re: negate(a.re), im: negate(a.im) };
}

export function over(a: Gaussian, b: Gaussian): Gaussian {
  const norm = add(mul(b.re, b.re), mul(b.im, b.im));
  const product = times(a, { re: b.re, im: negate(b.im) });
  return { re: div(product.re, norm), im: div(product.im, norm) };
}

function trimmed(p: Gaussian[]): GaussianPolynomial {
  while (p.length > 0 && isNone(p[p.length - 1] as Gaussian)) p.pop();
  return p;
}

function sum(a: GaussianPolynomial, b: GaussianPolynomial): GaussianPolynomial {
  return trimmed(Array.from({ length: Math.max(a.length, b.length) }, (_, k) => plus(a[k] ?? none, b[k] ?? none)));
}

export function product(a: GaussianPolynomial, b: GaussianPolynomial): GaussianPolynomial {
  if (a.length === 0 || b.length === 0) return [];
  const result = Array.from({ length: a.length + b.length - 1 }, () => none);
  a.forEach((x, i) => b.forEach((y, j) => (result[i + j] = plus(result[i + j] as Gaussian, times(x, y)))));
  return trimmed(result);
}

function scale(p: GaussianPolynomial, factor: Gaussian): GaussianPolynomial {
  return trimmed(p.map((c) => times(c, factor)));
}

/** Leading coefficient 1. */
export function monic(p: GaussianPolynomial): GaussianPolynomial {
  const lead = p[p.length - 1];
  return lead ? p.map((c) => over(c, lead)) : p;
}

function divide(
  a: GaussianPolynomial,
  b: GaussianPolynomial,
): { quotient: GaussianPolynomial; rest: GaussianPolynomial } {
  const lead = b[b.length - 1] as Gaussian;
  const quotient: Gaussian[] = Array.from({ length: Math.max(0, a.length - b.length + 1) }, () => none);
  let rest = [...a];
  for (let shift = a.length - b.length; shift >= 0; shift -= 1) {
    const factor = over(rest[shift + b.length - 1] ?? none, lead);
    quotient[shift] = factor;
    rest = rest.map((c, k) => plus(c, minus(times(factor, b[k - shift] ?? none))));
  }
  return { quotient: trimmed(quotient), rest: trimmed(rest) };
}

export function gcdOf(a: GaussianPolynomial, b: GaussianPolynomial): GaussianPolynomial {
  let [x, y] = [a, b];
  while (y.length > 0) [x, y] = [y, monic(divide(x, y).rest)];
  return monic(x);
}

export function quotientOf(a: GaussianPolynomial, b: GaussianPolynomial): GaussianPolynomial {
  return divide(a, b).quotient;
}

/** Each root once, leading coefficient 1. */
export function simpleRoots(p: GaussianPolynomial): GaussianPolynomial {
  if (p.length <= 2) return monic(p);
  const slope = trimmed(p.slice(1).map((c, k) => times(c, { re: rational(k + 1), im: zero })));
  return monic(quotientOf(p, gcdOf(p, slope)));
}

export function sameGaussian(a: Gaussian, b: Gaussian): boolean {
  return equals(a.re, b.re) && equals(a.im, b.im);
}

export interface GaussianFraction {
  readonly num: GaussianPolynomial;
  readonly den: GaussianPolynomial;
}

const mostDegree = 60;

/** A graph as a quotient of polynomials in the letter with coefficients in Q(i), or null where it is none. */
export function toGaussianFraction(graph: Graph, letter: string): GaussianFraction | null {
  const known: (GaussianFraction | null)[] = [];
  graph.nodes.slice(0, graph.root + 1).forEach((node) => {
    const found = ofNode(node, letter, (arg) => known[arg] ?? null);
    known.push(found && found.num.length <= mostDegree && found.den.length <= mostDegree ? found : null);
  });
  return known[graph.root] ?? null;
}

const whole: GaussianPolynomial = [unit];

function constant(value: Gaussian): GaussianFraction {
  return { num: isNone(value) ? [] : [value], den: whole };
}

function ofNode(
  node: GraphNode,
  letter: string,
  of: (arg: number) => GaussianFraction | null,
): GaussianFraction | null {
  switch (node.op) {
    case 'number':
      return constant({ re: node.value, im: zero });
    case 'constant':
      return node.name === 'i' ? constant({ re: zero, im: rational(1) }) : null;
    case 'letter':
      return node.name === letter ? { num: [none, unit], den: whole } : null;
    case 'add':
      return fold(node.args.map(of), (a, b) => ({
        num: sum(product(a.num, b.den), product(b.num, a.den)),
        den: product(a.den, b.den),
      }));
    case 'mul':
      return fold(node.args.map(of), (a, b) => ({ num: product(a.num, b.num), den: product(a.den, b.den) }));
    case 'negate': {
      const inside = of(node.args[0]);
      return inside && { ...inside, num: scale(inside.num, minus(unit)) };
    }
    case 'div': {
      const [top, bottom] = [of(node.args[0]), of(node.args[1])];
      return top && bottom && bottom.num.length > 0
        ? { num: product(top.num, bottom.den), den: product(top.den, bottom.num) }
        : null;
    }
    case 'power': {
      const base = of(node.args[0]);
      if (!base || node.exponent < 1 || (base.num.length - 1) * node.exponent > mostDegree || node.exponent > 200)
        return null;
      return fold(
        Array.from({ length: node.exponent }, () => base),
        (a, b) => ({ num: product(a.num, b.num), den: product(a.den, b.den) }),
      );
    }
    default:
      return null;
  }
}

function fold(
  parts: readonly (GaussianFraction | null)[],
  join: (a: GaussianFraction, b: GaussianFraction) => GaussianFraction,
): GaussianFraction | null {
  let result: GaussianFraction | null = null;
  for (const part of parts) {
    if (!part) return null;
    result = result === null ? part : join(result, part);
  }
  return result;
}
