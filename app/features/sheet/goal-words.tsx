import type { Goal } from '../../../shared/schemas/verdict.ts';
import { Maths } from '../../ui/maths.tsx';

/** What is to be reached, in a sentence. */
export function GoalWords({ goal }: { readonly goal: Goal }) {
  switch (goal.kind) {
    case 'free':
      return 'Go on from the given line, step by step.';
    case 'expanded':
      return 'Multiply out and collect.';
    case 'factored':
      return 'Write it as a product.';
    case 'simplified':
      return 'Write it as simply as you can.';
    case 'solved':
      return (
        <>
          Solve for <Maths tex={goal.letter} />.
        </>
      );
    case 'target':
      return (
        <>
          Arrive at <Maths tex={goal.target} />.
        </>
      );
  }
}

/** What the task takes for granted, behind the goal. */
export function Assumptions({ assumptions }: { readonly assumptions: readonly string[] }) {
  if (assumptions.length === 0) return null;
  return (
    <span className="muted">
      {' '}
      {assumptions.map((tex, i) => (
        <span key={tex}>
          {i > 0 ? ', ' : ''}
          <Maths tex={tex} />
        </span>
      ))}
    </span>
  );
}
