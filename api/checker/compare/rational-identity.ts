import { primes } from '../numbers/modular.ts';
import { createRandom } from '../numbers/random.ts';
import type { GraphNode } from '../values/graph.ts';
import { evaluateModular, noResidue, randomLetters } from './modular-values.ts';
import { boundDifference, boundSizes, evaluationsNeeded } from './size-bounds.ts';

/** How two quotients of polynomials compare as formal quotients. */
export type Identity =
  /** The chance of error is below 2^-100. */
  | 'identical'
  | 'likely-identical'
  | 'different'
  /** A denominator of that line is zero everywhere. */
  | 'first-undefined'
  | 'second-undefined';

export const primeBits = 25.97;
const mostEvaluations = 80;

export const rationalOps: ReadonlySet<GraphNode['op']> = new Set([
  'number',
  'letter',
  'add',
  'mul',
  'negate',
  'div',
  'power',
] as const);

/** Compares two nodes built from numbers, letters and i by the four operations and whole powers. */
export function compareRational(
  nodes: readonly GraphNode[],
  needed: Uint8Array,
  first: number,
  second: number,
  names: readonly string[],
  seed: number,
): Identity {
  const bounds = boundSizes(nodes, needed, () => ({ topDegree: 0, bottomDegree: 0, topBits: 1, bottomBits: 0 }));
  const a = bounds[first];
  const b = bounds[second];
  if (a === undefined || b === undefined) return 'likely-identical';
  const { degree, bits } = boundDifference(a, b);
  const wantedCount = evaluationsNeeded(degree, bits, primeBits, primes.length, mostEvaluations);
  const count = wantedCount ?? mostEvaluations;
  const random = createRandom(seed);
  const used = new Set<number>();
  let missingFirst = 0;
  let missingSecond = 0;
  for (let done = 0; done < count;) {
    const choice = random(primes.length);
    if (used.has(choice)) continue;
    used.add(choice);
    const p = primes[choice] ?? 0;
    const residues = evaluateModular(nodes, needed, p, randomLetters(names, random, p), null);
    const x = residues[first] ?? noResidue;
    const y = residues[second] ?? noResidue;
    if (x === noResidue) missingFirst += 1;
    if (y === noResidue) missingSecond += 1;
    if (missingFirst > count) return 'first-undefined';
    if (missingSecond > count) return 'second-undefined';
    if (x === noResidue || y === noResidue) continue;
    if (x !== y) return 'different';
    done += 1;
  }
  return wantedCount === null ? 'likely-identical' : 'identical';
}
