import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import type { CheckSettings, Note } from '../../../shared/schemas/verdict.ts';
import { checkDerivation } from '../../../api/checker/rule-derivation.ts';

/** A whole derivation: the number of its first fault, or its outcome, and notes that must be on some step. */
interface Row {
  readonly lines: readonly string[];
  readonly outcome: number | 'sound' | 'undecided';
  readonly notes?: readonly Note[];
  readonly assume?: readonly string[];
  readonly settings?: CheckSettings;
  readonly uses?: readonly (readonly number[] | null)[];
}

/* Written by hand from the rules' text, by somebody who had not written the checker. */
const rows = JSON.parse(readFileSync(new URL('hand-derivations.json', import.meta.url), 'utf8')) as Row[];

describe('derivations written by hand', { timeout: 60_000 }, () => {
  it.each(rows.map((row) => [row.lines.join(' ;; '), row] as const))('%s', (_, row) => {
    const { lines, assume = [], settings = {}, uses } = row;
    const verdict = checkDerivation(
      { lines, assume, settings, ...(uses ? { uses } : {}) },
      // The rulings alone: what explains them counts as one more step, and is left out.
      { timedOut: [lines.length] },
    );
    expect(verdict.firstFault ?? verdict.outcome).toBe(row.outcome);
    const notes = verdict.steps.flatMap((step) => step.notes);
    expect(notes).toEqual(expect.arrayContaining([...(row.notes ?? [])]));
  });
});
