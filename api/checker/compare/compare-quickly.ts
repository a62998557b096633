import type { Expr } from '../../../shared/maths/expression.ts';
import type { CheckContext } from '../context.ts';
import { primes } from '../numbers/modular.ts';
import { createRandom } from '../numbers/random.ts';
import * as Q from '../numbers/rational.ts';
import { fromRational } from '../values/arithmetic.ts';
import { valueTex } from '../values/value-tex.ts';
import type { Comparison } from './comparison.ts';
import { friendlyNumber } from './points.ts';
import { primeBits } from './rational-identity.ts';
import { evaluationsNeeded } from './size-bounds.ts';
import { addOperations, boundOf, createProgram, residueOf, valueOf } from './stack-program.ts';
import type { StackProgram } from './stack-program.ts';

const mostEvaluations = 12;
const mostBitsForValues = 4_000;

/**
 * Rules on what most steps of school algebra are: quotients of polynomials without assumptions or definitions, whose
 * lines divide by the same things. Null where that is not so; the answer is the one that the general comparison gives.
 */
export function compareQuickly(above: Expr, below: Expr, context: CheckContext): Comparison | null {
  const { definitions, assumptions } = context;
  if (assumptions.length > 0 || definitions.letters.size > 0 || definitions.functions.size > 0) return null;
  const letters: string[] = [];
  const pair = [createProgram(letters), createProgram(letters)] as const;
  if (!addOperations(above, pair[0]) || !addOperations(below, pair[1])) return null;
  const bounds = pair.map(boundOf);
  const degree = Math.max(...bounds.map((bound) => bound.degree));
  const bits = Math.max(...bounds.map((bound) => bound.bits));
  if (letters.length === 0) return bits > mostBitsForValues ? null : compareNumbers(pair);
  // What is compared are differences of two values, over a common denominator.
  const count = evaluationsNeeded(2 * degree, 2 * bits + 1, primeBits, primes.length, mostEvaluations);
  if (count === null) return null;
  context.budget.spend(24 + count * ((pair[0].code.length + pair[1].code.length) >> 7));
  const found = evaluate(pair, letters.length, count, context.seed);
  if (found === 'different') return bits > mostBitsForValues ? null : differenceAt(pair, letters, context);
  return found === 'same' ? { kind: 'equal', reached: 'proved', excluded: [], cancelled: [] } : null;
}

function compareNumbers(pair: readonly [StackProgram, StackProgram]): Comparison | null {
  const [above, below] = [valueOf(pair[0], []), valueOf(pair[1], [])];
  if (above === null || below === null) return null;
  if (Q.equals(above, below)) return { kind: 'equal', reached: 'proved', excluded: [], cancelled: [] };
  return differentAt(new Map(), above, below);
}

/** Null where the values are too long to show that they differ. */
function differentAt(at: ReadonlyMap<string, number>, above: Q.Rational, below: Q.Rational): Comparison | null {
  const [aboveTex, belowTex] = [valueTex(fromRational(above), 0), valueTex(fromRational(below), 0)];
  if (aboveTex === belowTex) return null;
  const point = new Map([...at].map(([name, n]) => [name, fromRational(Q.rational(n))]));
  const atTex = Object.fromEntries([...at].map(([name, n]) => [name, String(n)]));
  return { kind: 'different', witness: { at: point, atTex, above: aboveTex, below: belowTex } };
}

/** Null where a denominator vanished or the two divide by different things. */
function evaluate(
  pair: readonly [StackProgram, StackProgram],
  letters: number,
  count: number,
  seed: number,
): 'same' | 'different' | null {
  const random = createRandom(seed);
  const at = new Float64Array(letters);
  const needs = pair.map((program) => new Float64Array(program.needs * count));
  const [needsAbove, needsBelow] = needs as [Float64Array, Float64Array];
  const used: number[] = [];
  while (used.length < count) {
    const p = primes[random(primes.length)] as number;
    if (used.includes(p)) continue;
    for (let k = 0; k < letters; k += 1) at[k] = 1 + random(p - 1);
    const first = residueOf(pair[0], at, p, needsAbove, used.length * pair[0].needs);
    const second = residueOf(pair[1], at, p, needsBelow, used.length * pair[1].needs);
    if (first < 0 || second < 0) return null;
    if (first !== second) return 'different';
    used.push(p);
  }
  const isShared = covers(needsAbove, needsBelow, used) && covers(needsBelow, needsAbove, used);
  return isShared ? 'same' : null;
}

/** Whether each of the one side's divisors is one of the other's, up to its sign, at all evaluations. */
function covers(own: Float64Array, other: Float64Array, used: readonly number[]): boolean {
  const [many, others] = [own.length / used.length, other.length / used.length];
  for (let k = 0; k < many; k += 1) {
    let isMet = false;
    for (let j = 0; j < others && !isMet; j += 1) {
      const sign = own[k] === other[j] ? 1 : -1;
      isMet = used.every((p, n) => {
        const value = own[n * many + k] as number;
        return (sign === 1 ? value : (p - value) % p) === other[n * others + j];
      });
    }
    if (!isMet) return false;
  }
  return true;
}

/** The first of the points that every comparison begins with at which the two have different values. */
function differenceAt(
  pair: readonly [StackProgram, StackProgram],
  letters: readonly string[],
  context: CheckContext,
): Comparison | null {
  if (context.wholeLetters.size > 0) return null;
  for (let k = 0; ; k += 1) {
    const at = letters.map((_, position) => friendlyNumber(k, position, letters.length));
    if (at.includes(null)) return null;
    const [above, below] = [valueOf(pair[0], at as number[]), valueOf(pair[1], at as number[])];
    if (above === null || below === null || Q.equals(above, below)) continue;
    return differentAt(new Map(letters.map((name, n) => [name, at[n] as number])), above, below);
  }
}
