import type { Note } from '../../../shared/schemas/verdict.ts';
import type { StepResult } from '../rules/step-result.ts';
import type { WalkState, WalkStep } from '../walk-derivation.ts';

const doubtful: ReadonlySet<Note> = new Set<Note>([
  'not-rejected',
  'presentation',
  'remark',
  'definition',
  'empty',
  'meaningless',
  'constant',
]);

/** A step that holds, and not by a way out that a mended line should not need. */
export function isPlainlyHeld({ ruling, notes }: StepResult): boolean {
  return ruling === 'holds' && !notes.some((note) => doubtful.has(note) || note === 'candidates');
}

/** The same for a step of a derivation: a value may be dropped that does not satisfy the given, but none such listed. */
export function followsPlainly({ result, state }: WalkStep, before: WalkState): boolean {
  return (
    result.ruling === 'holds' &&
    !result.notes.some((note) => doubtful.has(note)) &&
    state.candidates.length === before.candidates.length
  );
}
