import type { Note } from '../../../shared/schemas/verdict.ts';
import type { StepResult } from '../rules/step-result.ts';

const doubtful: ReadonlySet<Note> = new Set<Note>(['candidates', 'not-rejected', 'presentation', 'remark', 'definition', 'empty', 'meaningless', 'constant']);

/** A step that holds, and not by a way out that a mended line should not need. */
export function isPlainlyHeld({ ruling, notes }: StepResult): boolean {
  return ruling === 'holds' && !notes.some((note) => doubtful.has(note));
}
