import type { HandedInLine } from '../../../shared/schemas/sheet.ts';
import type { TaskForm } from '../../../shared/schemas/task.ts';
import type { DerivationInput } from '../../../shared/schemas/verdict.ts';

type TaskTerms = Pick<TaskForm, 'goal' | 'assumptions' | 'settings'>;

/** A derivation under a task's terms, as the checker takes it; line 0 is the given. */
export function toCheckInput(task: TaskTerms, lines: readonly Pick<HandedInLine, 'tex' | 'uses'>[]): DerivationInput {
  const { goal, settings } = task;
  return {
    lines: lines.map(({ tex }) => tex),
    uses: lines.map(({ uses }) => uses),
    assume: task.assumptions,
    settings: {
      numbers: settings.numbers,
      reversible: settings.reversible,
      presentation: settings.presentationCounts ? 'fault' : 'note',
      constant: settings.constantNeeded,
      decimal: settings.decimal,
      goal,
      ...(goal.kind === 'solved' && { unknown: goal.letter }),
    },
  };
}
