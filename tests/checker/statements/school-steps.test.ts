import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import type { CheckSettings } from '../../../shared/schemas/verdict.ts';
import { checkDerivation } from '../../../api/checker/rule-derivation.ts';

interface Row {
  readonly topic: string;
  readonly lines: readonly string[];
  readonly right: boolean;
  /** The first fault, where the row is a whole derivation. */
  readonly at?: number;
  readonly assume?: readonly string[];
  readonly settings?: CheckSettings;
}

const rows = JSON.parse(readFileSync(new URL('school-steps.json', import.meta.url), 'utf8')) as readonly Row[];

/* Written by hand from what school texts and first-year college texts work through, before the checker was tried on it. */
describe('steps and derivations of school and college', { timeout: 120_000 }, () => {
  const ruled = rows.map((row) => {
    const { lines, assume = [], settings = {} } = row;
    const { outcome, firstFault } = checkDerivation({ lines, assume, settings }, { timedOut: [lines.length] });
    return { ...row, outcome, firstFault };
  });

  it('are never ruled falsely', () => {
    expect(ruled.filter(({ right, outcome }) => outcome === (right ? 'faulty' : 'sound'))).toEqual([]);
    expect(ruled.filter(({ at, firstFault }) => at !== undefined && firstFault !== null && firstFault !== at)).toEqual(
      [],
    );
  });

  it('are undecided in at most 1 of 40: most of these name no unknown', () => {
    const open = ruled.filter(({ outcome }) => outcome === 'undecided');
    expect(open.length, JSON.stringify(open.map(({ lines }) => lines))).toBeLessThanOrEqual(rows.length / 40);
  });
});
