import type { Expr } from '../../../shared/maths/expression.ts';
import { lettersOf } from '../../../shared/maths/letters.ts';
import type { CheckContext } from '../context.ts';
import { compareNumbers, type RealNumber } from '../solving/real-number.ts';
import { constantNumber } from '../statements/solve.ts';
import { isListOfValues, type Statement } from '../statements/statement.ts';
import { freeLetters } from './meaning.ts';
import type { SystemSolution } from './solve-system.ts';

/**
 * Values that a line lists for one letter of a system though no solution has them: to be rejected by a later line. None
 * where a solution leaves the letter open. Throws Unsettled.
 */
export function strayValues(
  below: Statement,
  solutions: readonly SystemSolution[],
  context: CheckContext,
): readonly RealNumber[] {
  const [letter, ...others] = freeLetters(below, context);
  if (!letter || others.length > 0 || !isListOfValues(below, letter)) return [];
  const known = solutions.map(({ values, anchor }): RealNumber | null => {
    if (anchor?.letter === letter) return anchor.number;
    const value = values.get(letter);
    return value && lettersOf(value).length === 0 ? numberOf(value, context) : null;
  });
  if (known.includes(null)) return [];
  return valuesOf(below)
    .map((value) => numberOf(value, context))
    .filter((value) => !known.some((other) => other && compareNumbers(value, other).order === 0));
}

function numberOf(expr: Expr, context: CheckContext): RealNumber {
  return constantNumber(expr, { letter: '', given: new Map(), context, window: null, hints: [], families: new Set() });
}

function valuesOf(statement: Statement): readonly Expr[] {
  if (statement.kind === 'compare') return [statement.right];
  if (statement.kind === 'member') return statement.set.kind === 'finite' ? statement.set.items : [];
  return statement.kind === 'any' ? statement.parts.flatMap(valuesOf) : [];
}
