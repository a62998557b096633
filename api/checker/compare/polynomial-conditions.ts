import * as Q from '../numbers/rational.ts';
import type { Rational } from '../numbers/rational.ts';
import { toFraction } from '../solving/fraction.ts';
import { dividePolynomials, gcdPolynomials, squareFreePart } from '../solving/polynomial.ts';
import type { Polynomial } from '../solving/polynomial.ts';
import { realRoots } from '../solving/real-number.ts';
import type { GraphNode } from '../values/graph.ts';
import type { Need } from './conditions.ts';

/** Zeros of one need that the other line does not share. */
export interface OwnZeros {
  readonly need: Need;
  readonly rational: readonly Rational[];
  /** Further real zeros that are no fractions. */
  readonly hasOthers: boolean;
}

const largestDegree = 60;

/**
 * For lines in one letter that only divide: the real zeros of the denominators of one line at which the other line has a
 * value, exactly. Null where a denominator is no quotient of polynomials or too large.
 */
export function ownZeros(
  nodes: readonly GraphNode[],
  letter: string,
  own: readonly Need[],
  other: readonly Need[],
): OwnZeros[] | null {
  const theirs = other.map((need) => zerosOf(nodes, need, letter));
  const found: OwnZeros[] = [];
  for (const need of own) {
    let rest = zerosOf(nodes, need, letter);
    for (const polynomial of theirs) {
      if (rest === null || polynomial === null) return null;
      rest = withoutShared(rest, polynomial);
    }
    if (rest === null) return null;
    const roots = rootsOf(rest);
    if (roots.rational.length > 0 || roots.hasOthers) found.push({ need, ...roots });
  }
  return found;
}

/** A square-free polynomial with the zeros of a node, poles of the node included. */
function zerosOf(nodes: readonly GraphNode[], need: Need, letter: string): Polynomial | null {
  const fraction = toFraction({ nodes, root: need.arg }, letter);
  if (fraction === null || fraction.num.length > largestDegree || fraction.num.length === 0) return null;
  return fraction.num.length > 1 ? squareFreePart(fraction.num) : fraction.num;
}

function withoutShared(polynomial: Polynomial, other: Polynomial): Polynomial | null {
  if (polynomial.length < 2 || other.length < 2) return polynomial;
  const shared = gcdPolynomials(polynomial, other);
  return shared.length < 2 ? polynomial : dividePolynomials(polynomial, shared);
}

function rootsOf(polynomial: Polynomial): { rational: Rational[]; hasOthers: boolean } {
  const [c = 0n, b = 0n, a = 0n] = polynomial;
  if (polynomial.length < 2) return { rational: [], hasOthers: false };
  if (polynomial.length === 2) return { rational: [Q.rational(-c, b)], hasOthers: false };
  if (polynomial.length === 3) {
    const discriminant = b * b - 4n * a * c;
    if (discriminant < 0n) return { rational: [], hasOthers: false };
    const root = Q.exactRoot({ num: discriminant, den: 1n }, 2);
    if (root === null) return { rational: [], hasOthers: true };
    const roots = [Q.rational(-b - root.num, 2n * a), Q.rational(-b + root.num, 2n * a)];
    return { rational: roots.sort(Q.compare), hasOthers: false };
  }
  const roots = realRoots(polynomial);
  return {
    rational: roots.flatMap((root) => (root.kind === 'rational' ? [root.value] : [])),
    hasOthers: roots.some((root) => root.kind !== 'rational'),
  };
}
