import type { TaskForm } from '../../../shared/schemas/task.ts';

export type GoalKind = TaskForm['goal']['kind'];

export const GOALS: readonly { readonly value: GoalKind; readonly label: string }[] = [
  { value: 'free', label: 'Free: go on from the given line' },
  { value: 'expanded', label: 'Expanded: multiplied out and collected' },
  { value: 'factored', label: 'Factored: written as a product' },
  { value: 'simplified', label: 'Simplified' },
  { value: 'solved', label: 'Solved for a letter' },
  { value: 'target', label: 'A line to arrive at' },
];

/** The goal of a task in the list. */
export function sayGoal(goal: TaskForm['goal']): string {
  switch (goal.kind) {
    case 'free':
      return 'free';
    case 'solved':
      return `solve for ${goal.letter}`;
    case 'target':
      return 'arrive at a line';
    default:
      return `to be ${goal.kind}`;
  }
}

export const EMPTY_TASK: TaskForm = {
  title: '',
  instructions: '',
  given: '',
  goal: { kind: 'expanded' },
  assumptions: [],
  settings: {
    numbers: 'real',
    reversible: false,
    presentationCounts: false,
    constantNeeded: false,
    decimal: 'point',
  },
};
