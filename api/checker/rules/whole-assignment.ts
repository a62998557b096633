import { isFiniteNumber, isNear, real } from '../evidence/complex-double.ts';
import { estimate, estimateCost, type Place } from '../evidence/estimate.ts';
import { rational } from '../numbers/rational.ts';
import type { Assignment } from '../solving/fraction.ts';
import { comparesOf, type CompareStatement } from '../statements/statement.ts';
import type { OneLetterQuestion } from './one-letter.ts';

const mostTried = 400;

/**
 * Small whole numbers for the other letters of a formula at which the unknown is a small whole number as well and the line
 * below is wrong, to the precision of doubles: those that come to least in sum. Null where there are none among the first
 * few hundred. Only where each of the two lines is one equation.
 */
export function wholeAssignment(
  { above, below, letter, context }: Omit<OneLetterQuestion, 'given'>,
  names: readonly string[],
): Assignment | null {
  const [first, ...others] = comparesOf(above);
  const [second, ...more] = comparesOf(below);
  if (!first || !second || others.length > 0 || more.length > 0) return null;
  if (first.sign !== '=' || second.sign !== '=' || names.length === 0) return null;
  const cost = [first.left, first.right, second.left, second.right].reduce((sum, expr) => sum + estimateCost(expr), 0);
  for (const values of wholeTuples(names.length + 1)) {
    context.budget.spend(cost >> 2);
    const [unknown, ...rest] = values;
    const letters = new Map([[letter, real(unknown as number)]]);
    names.forEach((name, k) => letters.set(name, real(rest[k] as number)));
    const place: Place = { letters, definitions: context.definitions };
    if (holdsAt(first, place) === true && holdsAt(second, place) === false)
      return new Map(names.map((name, k) => [name, rational(rest[k] as number)]));
  }
  return null;
}

/** Null where a side has no value. */
function holdsAt({ left, right }: CompareStatement, place: Place): boolean | null {
  const [a, b] = [estimate(left, place), estimate(right, place)];
  return isFiniteNumber(a) && isFiniteNumber(b) ? isNear(a, b) : null;
}

const known = new Map<number, readonly (readonly number[])[]>();

/** Tuples of whole numbers from 1 on, the least sum first. */
function wholeTuples(size: number): readonly (readonly number[])[] {
  const found = known.get(size);
  if (found) return found;
  const made: number[][] = [];
  for (let total = size; made.length < mostTried; total += 1) made.push(...withSum(size, total));
  known.set(size, made.slice(0, mostTried));
  return made.slice(0, mostTried);
}

function withSum(size: number, total: number): number[][] {
  if (size === 1) return [[total]];
  return Array.from({ length: total - size + 1 }, (_, k) => k + 1).flatMap((value) =>
    withSum(size - 1, total - value).map((rest) => [value, ...rest]),
  );
}
