import type { Statement } from '../statements/statement.ts';
import type { CheckContext } from '../context.ts';
import { haveSameComplexRoots } from './complex-roots.ts';
import { judgeSameEquation } from './formula.ts';
import { holds, undecided, type StepResult } from './step-result.ts';

/** Statements about complex numbers. */
export function judgeComplexStep(
  question: { readonly above: Statement; readonly below: Statement; readonly context: CheckContext },
  letters: readonly string[],
): StepResult {
  const { above, below, context } = question;
  const letter = letters[0];
  if (letters.length === 1 && letter !== undefined) {
    const env = { letter, given: new Map(), context, window: null, hints: [] };
    if (haveSameComplexRoots(above, below, env)) return holds('proved');
  }
  return judgeSameEquation(above, below, context) ?? undecided('not-covered');
}
