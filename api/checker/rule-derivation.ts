import type { DerivationInput, StepRuling, Verdict } from '../../shared/schemas/verdict.ts';
import { BudgetSpent, operationsPerStep } from './context.ts';
import { addEvidence } from './evidence/add-evidence.ts';
import { readDerivation, type ReadDerivation } from './read-derivation.ts';
import { applyGoal } from './goals/apply-goal.ts';
import { within } from './numbers/work.ts';
import { joinCases } from './rules/cases.ts';
import { putBrackets } from './rules/lost-brackets.ts';
import { noteMiscopied } from './rules/miscopied.ts';
import { rejectCandidates } from './rules/candidates.ts';
import { undecided, type StepResult } from './rules/step-result.ts';
import { Unsettled } from './solving/unsettled.ts';
import { judgeLine, passStep, planRoute, skipLine, startWalk, type Route, type WalkState } from './walk-derivation.ts';

/** For each second look at a ruling: cases, lost brackets, candidates, the goal. */
export const operationsPerLook = 20_000;

/** How a worker that is watched rules: without the steps that ran out of time before, telling where it is. */
export interface Watch {
  /** The number of lines stands for what explains the rulings. */
  readonly timedOut?: readonly number[];
  readonly onStep?: (step: number) => void;
}

/** Rules on every step of a derivation. Never throws for what a student wrote. */
export function checkDerivation(input: DerivationInput, watch: Watch = {}): Verdict {
  const read = readDerivation(input);
  const route = planRoute(input, read);
  const { rulings, last, before } = ruleSteps(route, watch);
  const kept = unlessSpent(() => rejectCandidates(rulings, last, route), rulings);
  const noted = noteMiscopied(read, kept, route);
  const steps = noted.map((result, k): StepRuling => ({ step: k + 1, ...result }));
  const ruled = toVerdict(steps);
  const verdict = unlessSpent(() => applyGoal(ruled, last, route), ruled);
  // What explains the rulings counts as one step more: should it take too long, the rulings stand without it.
  const explaining = read.lines.length;
  if (watch.timedOut?.includes(explaining)) return verdict;
  watch.onStep?.(explaining);
  return addEvidence(verdict, route, before);
}

/** The outcome and the first fault, by their definitions. */
export function toVerdict(steps: readonly StepRuling[]): Verdict {
  const first = steps.find((step) => step.ruling !== 'holds');
  if (!first) return { outcome: 'sound', firstFault: null, steps: [...steps] };
  const isFaulty = first.ruling === 'fails';
  return { outcome: isFaulty ? 'faulty' : 'undecided', firstFault: isFaulty ? first.step : null, steps: [...steps] };
}

function ruleSteps(route: Route, watch: Watch): { rulings: StepResult[]; last: WalkState; before: WalkState[] } {
  const { lines } = route.read;
  const rulings: StepResult[] = [];
  const before: WalkState[] = [];
  let state = startWalk(route);
  for (let step = 1; step < lines.length; step += 1) {
    const line = lines[step];
    before[step] = state;
    watch.onStep?.(step);
    if (line?.ok && watch.timedOut?.includes(step)) {
      rulings.push(undecided('time'));
      state = passStep(state, line.line);
      continue;
    }
    if (!line?.ok) {
      rulings.push(notReadResult(route.read, step));
      state = skipLine(state);
      continue;
    }
    const found = within(operationsPerStep, () => judgeLine(route, state, step, line.line));
    if (found.result.evidence.reason === 'not-read') {
      rulings.push(notReadResult(route.read, step));
      state = found.state;
      continue;
    }
    const better =
      found.result.ruling === 'fails'
        ? unlessSpent(() => joinCases(route, state, step, found) ?? putBrackets(route, state, step, found), null)
        : null;
    const results = better ? better.results : [found.result];
    rulings.push(...results.map((result) => (isCertain(result, route) ? result : undecided('not-read'))));
    state = better ? better.state : found.state;
    if (better) step += better.results.length - 1;
  }
  return { rulings, last: state, before };
}

/** A second look at a ruling is left out where it takes more work than is allowed; the ruling stands. */
function unlessSpent<T>(look: () => T, otherwise: T): T {
  try {
    return within(operationsPerLook, look);
  } catch (cause) {
    if (cause instanceof BudgetSpent || cause instanceof RangeError || cause instanceof Unsettled) return otherwise;
    throw cause;
  }
}

/** A loss may be what an assumption shuts out that could not be read. */
function isCertain({ ruling }: StepResult, { read }: Route): boolean {
  return ruling !== 'fails' || read.knowsAssumptions;
}

/** The step to a line that was not read, or from one, carries the error with its place. */
function notReadResult(read: ReadDerivation, step: number): StepResult {
  const own = read.lines[step];
  const before = [...read.lines.keys()].reverse().find((line) => line < step && !read.lines[line]?.ok);
  const line = own?.ok === false ? step : (before ?? step);
  const failed = read.lines[line];
  if (!failed || failed.ok) return undecided('not-read');
  const { code, span, found, expected } = failed.error;
  return undecided('not-read', [], { error: { line, code, place: span, found, expected: [...expected] } });
}
