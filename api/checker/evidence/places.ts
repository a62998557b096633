import type { Expr, Line } from '../../../shared/maths/expression.ts';
import { lettersOf } from '../../../shared/maths/letters.ts';
import type { CheckContext } from '../context.ts';
import { createRandom } from '../numbers/random.ts';
import { isFiniteNumber, isNear, real, type Complex } from './complex-double.ts';
import { estimate, type Place } from './estimate.ts';

/** Places without pattern, the letters positive so that roots and logarithms have their values there. */
export function choosePlaces(subjects: readonly (Expr | Line)[], count: number, context: CheckContext): Place[] {
  const names = [...new Set(subjects.flatMap((subject) => [...lettersOf(subject)]))];
  const random = createRandom(context.seed + 17);
  return Array.from({ length: count }, () => ({
    letters: new Map(names.map((name) => [name, letterAt(name, random(1_000_000) / 1_000_000, context)])),
    definitions: context.definitions,
  }));
}

function letterAt(name: string, unit: number, context: CheckContext): Complex {
  return real(context.wholeLetters.has(name) ? 2 + Math.floor(unit * 7) : 0.37 + 2.9 * unit);
}

/** Whether two expressions may be equal: apart at a place where both have a value, they are not. */
export function mayBeEqual(a: Expr, values: readonly Complex[], places: readonly Place[]): boolean {
  let compared = 0;
  for (const [k, place] of places.entries()) {
    const wanted = values[k];
    if (!wanted || !isFiniteNumber(wanted)) continue;
    const value = estimate(a, place);
    if (!isFiniteNumber(value)) continue;
    if (!isNear(value, wanted)) return false;
    compared += 1;
    if (compared === 2) return true;
  }
  return compared > 0;
}
