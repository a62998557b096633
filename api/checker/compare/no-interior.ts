import * as Q from '../numbers/rational.ts';
import type { Rational } from '../numbers/rational.ts';
import { toFraction } from '../solving/fraction.ts';
import { squareFreePart } from '../solving/polynomial.ts';
import { approximate, between, realRoots } from '../solving/real-number.ts';
import type { RealNumber } from '../solving/real-number.ts';
import { fromRational } from '../values/arithmetic.ts';
import type { GraphNode } from '../values/graph.ts';
import { meets } from './conditions.ts';
import type { Need } from './conditions.ts';
import type { Fact, Pair } from './pair.ts';

/** A condition on a quotient of polynomials in the one letter. */
interface Condition {
  readonly need: Need;
  readonly num: readonly bigint[];
  readonly den: readonly bigint[];
}

/**
 * Whether needs and facts in one real letter certainly leave no interval: between the roots of everything involved,
 * which are isolated exactly, one of them fails everywhere. False where that is not so or cannot be told.
 */
export function leavesNoInterval(pair: Pair, needs: readonly Need[]): boolean {
  const [letter] = pair.names;
  if (letter === undefined || pair.names.length !== 1 || pair.moving.every((mark) => mark === 0)) return false;
  const conditions = [...needs, ...pair.facts.map(needOfFact)].flatMap((need) => conditionOf(need, pair.nodes, letter));
  const roots = conditions.flatMap(rootsOf);
  roots.sort((a, b) => approximate(a) - approximate(b));
  const distinct = roots.filter((root, k) => k === 0 || approximate(root) > approximate(roots[k - 1] ?? root));
  for (let k = 0; k <= distinct.length; k += 1) {
    const at = between(distinct[k - 1] ?? null, distinct[k] ?? null);
    if (!conditions.some((condition) => failsAt(condition, at))) return false;
  }
  return true;
}

function needOfFact(fact: Fact): Need {
  return { arg: fact.node, kind: fact.strict ? 'positive' : 'nonnegative' };
}

function conditionOf(need: Need, nodes: readonly GraphNode[], letter: string): Condition[] {
  if (!['positive', 'nonnegative', 'within-one', 'inside-one', 'beyond-one', 'from-one', 'nonzero'].includes(need.kind))
    return [];
  const fraction = toFraction({ nodes, root: need.arg }, letter);
  if (fraction === null || fraction.num.length > 40 || fraction.den.length > 40) return [];
  return [{ need, num: fraction.num, den: fraction.den }];
}

function rootsOf({ need, num, den }: Condition): RealNumber[] {
  const shifts = ['positive', 'nonnegative', 'nonzero'].includes(need.kind) ? [0n] : [-1n, 1n];
  const polynomials = [den, ...shifts.map((shift) => addScaled(num, den, shift))];
  return polynomials.flatMap((polynomial) => (polynomial.length > 1 ? realRoots(squareFreePart(polynomial)) : []));
}

function addScaled(a: readonly bigint[], b: readonly bigint[], factor: bigint): bigint[] {
  const sum = Array.from({ length: Math.max(a.length, b.length) }, (_, k) => (a[k] ?? 0n) + factor * (b[k] ?? 0n));
  while (sum.length > 0 && sum.at(-1) === 0n) sum.pop();
  return sum;
}

function failsAt({ need, num, den }: Condition, at: Rational): boolean {
  const bottom = valueOf(den, at);
  if (Q.isZero(bottom)) return true;
  return meets(need, fromRational(Q.div(valueOf(num, at), bottom)), 64) === false;
}

function valueOf(polynomial: readonly bigint[], at: Rational): Rational {
  return polynomial.reduceRight<Rational>(
    (sum, coefficient) => Q.add(Q.mul(sum, at), { num: coefficient, den: 1n }),
    Q.zero,
  );
}
