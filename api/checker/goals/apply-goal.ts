import type { Verdict } from '../../../shared/schemas/verdict.ts';
import type { Route, WalkState } from '../walk-derivation.ts';
import { isGoalReached } from './reach-goal.ts';

/** Rule 15: a sound derivation that has not reached the goal is noted as unfinished. */
export function applyGoal(verdict: Verdict, last: WalkState, route: Route): Verdict {
  const goal = route.input.settings.goal;
  const final = verdict.steps[verdict.steps.length - 1];
  if (!goal || !final || verdict.outcome !== 'sound' || isGoalReached(goal, last, route)) return verdict;
  const noted = { ...final, notes: [...final.notes, 'unfinished' as const] };
  return { ...verdict, steps: [...verdict.steps.slice(0, -1), noted] };
}
