import { comparesOf, type Statement } from '../statements/statement.ts';
import type { StatementQuestion } from './statement-step.ts';
import { undecided, type StepResult } from './step-result.ts';

/** Whether the step is about several equations that hold together for several letters. */
export function isSystem({ above, below, known }: StatementQuestion, letters: readonly string[]): boolean {
  if (letters.length < 2) return known.some((statement) => isJoint(statement));
  return [above, below, ...known].some(isJoint);
}

function isJoint(statement: Statement): boolean {
  return statement.kind === 'all' && comparesOf(statement).filter((compare) => compare.sign === '=').length > 1;
}

export function judgeSystemStep(_question: StatementQuestion): StepResult {
  return undecided('not-covered');
}
