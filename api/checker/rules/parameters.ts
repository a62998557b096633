import { lettersOf } from '../../../shared/maths/letters.ts';
import type { CheckContext } from '../context.ts';
import type { Assignment } from '../solving/fraction.ts';
import { isEmptySet } from '../solving/real-set.ts';
import { solveStatement, type SolveEnv } from '../statements/solve.ts';
import { toStatement } from '../statements/statement.ts';

/** Whether values of letters agree with all assumptions that speak of these letters only. */
export function meetsAssumptions(given: Assignment, context: CheckContext): boolean {
  for (const line of context.assumptions) {
    const letters = lettersOf(line);
    const statement = letters.length > 0 && letters.every((name) => given.has(name)) ? toStatement(line) : null;
    if (!statement || statement.kind === 'member') continue;
    const env: SolveEnv = { letter: '', given, context, window: null, hints: [], families: new Set() };
    if (isEmptySet(solveStatement(statement, env))) return false;
  }
  return true;
}
