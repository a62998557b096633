import { bitLength } from '../numbers/rational.ts';
import type { Rational } from '../numbers/rational.ts';
import type { GraphNode } from '../values/graph.ts';

/** Upper bounds for a quotient N/D of polynomials: degrees, and log2 of the sums of the sizes of the coefficients. */
export interface SizeBound {
  readonly topDegree: number;
  readonly bottomDegree: number;
  readonly topBits: number;
  readonly bottomBits: number;
}

const constant: SizeBound = { topDegree: 0, bottomDegree: 0, topBits: 1, bottomBits: 0 };

/** Bounds of every needed node; `kernel` answers for nodes that stand for an independent quantity. */
export function boundSizes(
  nodes: readonly GraphNode[],
  needed: Uint8Array,
  kernel: (index: number) => SizeBound,
): SizeBound[] {
  const bounds: SizeBound[] = [];
  nodes.forEach((node, index) => {
    bounds.push(needed[index] === 1 ? boundOf(node, index, bounds, kernel) : constant);
  });
  return bounds;
}

export const letterBound: SizeBound = { topDegree: 1, bottomDegree: 0, topBits: 0, bottomBits: 0 };

export function boundNumber({ num, den }: Rational): SizeBound {
  return { topDegree: 0, bottomDegree: 0, topBits: bitLength(num), bottomBits: den === 1n ? 0 : bitLength(den) };
}

function boundAt(bounds: readonly SizeBound[], index: number): SizeBound {
  return bounds[index] ?? constant;
}

function boundOf(
  node: GraphNode,
  index: number,
  bounds: readonly SizeBound[],
  kernel: (index: number) => SizeBound,
): SizeBound {
  switch (node.op) {
    case 'number':
      return boundNumber(node.value);
    case 'letter':
      return letterBound;
    case 'add':
      return boundSum(node.args.map((arg) => boundAt(bounds, arg)));
    case 'mul':
      return node.args.map((arg) => boundAt(bounds, arg)).reduce(boundProduct);
    case 'negate':
      return boundAt(bounds, node.args[0]);
    case 'div':
      return boundProduct(boundAt(bounds, node.args[0]), inverted(boundAt(bounds, node.args[1])));
    case 'power': {
      const n = Math.abs(node.exponent);
      const bound = boundAt(bounds, node.args[0]);
      const base = node.exponent < 0 ? inverted(bound) : bound;
      return scaled(base, n);
    }
    default:
      return kernel(index);
  }
}

export function inverted(a: SizeBound): SizeBound {
  return { topDegree: a.bottomDegree, bottomDegree: a.topDegree, topBits: a.bottomBits, bottomBits: a.topBits };
}

export function scaled(a: SizeBound, n: number): SizeBound {
  return {
    topDegree: a.topDegree * n,
    bottomDegree: a.bottomDegree * n,
    topBits: a.topBits * n,
    bottomBits: a.bottomBits * n,
  };
}

export function boundProduct(a: SizeBound, b: SizeBound): SizeBound {
  return {
    topDegree: a.topDegree + b.topDegree,
    bottomDegree: a.bottomDegree + b.bottomDegree,
    topBits: a.topBits + b.topBits,
    bottomBits: a.bottomBits + b.bottomBits,
  };
}

export function boundSum(terms: readonly SizeBound[]): SizeBound {
  let bottomDegree = 0;
  let bottomBits = 0;
  for (const term of terms) {
    bottomDegree += term.bottomDegree;
    bottomBits += term.bottomBits;
  }
  let topDegree = 0;
  let topBits = 0;
  for (const term of terms) {
    topDegree = Math.max(topDegree, term.topDegree + bottomDegree - term.bottomDegree);
    topBits = Math.max(topBits, term.topBits + bottomBits - term.bottomBits);
  }
  return { topDegree, bottomDegree, topBits: topBits + Math.log2(terms.length), bottomBits };
}

/** For the top of the difference of two quotients over the product of their bottoms. */
export function boundDifference(a: SizeBound, b: SizeBound): { degree: number; bits: number } {
  return {
    degree: Math.max(a.topDegree + b.bottomDegree, b.topDegree + a.bottomDegree),
    bits: Math.max(a.topBits + b.bottomBits, b.topBits + a.bottomBits) + 1,
  };
}

const targetBits = 100;

/**
 * How many evaluations, each at a new random prime out of `primeCount` of at least 2^primeBits and at random residues,
 * bring the chance that a polynomial of this size passes for zero below 2^-100; null where more than `most` would be
 * needed. A non-zero polynomial vanishes modulo at most bits/primeBits primes altogether; modulo any other prime it is
 * zero at a random point with a chance of at most degree/p (Schwartz 1980, Zippel 1979).
 */
export function evaluationsNeeded(
  degree: number,
  bits: number,
  primeBits: number,
  primeCount: number,
  most: number,
): number | null {
  const bad = Math.floor(bits / primeBits);
  const perPoint = Math.log2(Math.max(1, degree)) - primeBits;
  if (perPoint > -1) return null;
  for (let m = 5; m <= most; m += 1) {
    let worst = Number.NEGATIVE_INFINITY;
    let chosen = 0;
    for (let j = 0; j <= Math.min(bad, m); j += 1) {
      // j of the m primes are bad: C(m, j) (bad/count)^j, the rest pass by chance.
      worst = Math.max(worst, chosen + (m - j) * perPoint);
      chosen += Math.log2((m - j) / (j + 1)) + Math.log2(Math.max(1, bad - j) / (primeCount - j));
    }
    if (worst + Math.log2(m + 1) < -targetBits) return m;
  }
  return null;
}
