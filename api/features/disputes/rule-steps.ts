import { concludeSteps } from '../../../shared/lib/judge-finding.ts';
import type { Decision } from '../../../shared/schemas/dispute.ts';
import type { StepRuling, Verdict } from '../../../shared/schemas/verdict.ts';

/** The verdict with one step as a teacher decides it; the first fault follows from all steps. */
export function ruleStep(steps: readonly StepRuling[], step: number, decision: Decision): Verdict {
  const ruled = steps.map((each) => (each.step === step ? decided(each, decision) : each));
  return { ...concludeSteps(ruled), steps: ruled };
}

/** The verdict with the first fault where a teacher sees it: everything before it holds; null: everything holds. */
export function ruleFirstFault(steps: readonly StepRuling[], firstFault: number | null): Verdict {
  const ruled = steps.map((each) => {
    if (each.step === firstFault) return decided(each, 'fails');
    return (firstFault === null || each.step < firstFault) && each.ruling !== 'holds' ? decided(each, 'holds') : each;
  });
  return { ...concludeSteps(ruled), steps: ruled };
}

/** Every step undecided: for a version that the checker never finished. */
export function undecidedSteps(count: number): StepRuling[] {
  return Array.from({ length: count }, (_, i) => ({
    step: i + 1,
    ruling: 'undecided',
    reached: null,
    notes: [],
    evidence: { reason: 'not-settled' },
  }));
}

/** A teacher's word stands without a proof; evidence against it is no longer part of the verdict. */
function decided(step: StepRuling, decision: Decision): StepRuling {
  if (decision === 'fails') {
    const { reason: _reason, error: _error, ...evidence } = step.evidence;
    return step.ruling === 'fails' ? step : { ...step, ruling: 'fails', reached: null, evidence };
  }
  const notes =
    decision === 'presentation' && !step.notes.includes('presentation')
      ? [...step.notes, 'presentation' as const]
      : step.notes;
  return step.ruling === 'holds'
    ? { ...step, notes }
    : { ...step, ruling: 'holds', reached: null, notes, evidence: {} };
}
