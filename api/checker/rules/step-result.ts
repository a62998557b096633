import type { Evidence, Note, StepRuling, UndecidedReason } from '../../../shared/schemas/verdict.ts';
import type { Reached } from '../solving/real-set.ts';

/** The ruling on one step before it gets its number. */
export type StepResult = Omit<StepRuling, 'step'>;

export function holds(reached: Reached, notes: readonly Note[] = [], evidence: Evidence = {}): StepResult {
  return { ruling: 'holds', reached, notes: [...notes], evidence };
}

export function fails(reached: Reached, evidence: Evidence, notes: readonly Note[] = []): StepResult {
  return { ruling: 'fails', reached, notes: [...notes], evidence };
}

export function undecided(reason: UndecidedReason, notes: readonly Note[] = [], evidence: Evidence = {}): StepResult {
  return { ruling: 'undecided', reached: null, notes: [...notes], evidence: { ...evidence, reason } };
}
