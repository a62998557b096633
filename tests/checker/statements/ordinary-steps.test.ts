import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { checkDerivation } from '../../../api/checker/rule-derivation.ts';

interface Row {
  readonly topic: string;
  readonly lines: readonly string[];
  readonly right: boolean;
  readonly assume?: readonly string[];
}

const rows = JSON.parse(readFileSync(new URL('ordinary-steps.json', import.meta.url), 'utf8')) as readonly Row[];

/** Derivations as a school or first-year book has them, right and with one fault, written and judged by hand. */
describe('ordinary steps on statements', () => {
  const outcomes = rows.map((row) => {
    const { outcome } = checkDerivation({ lines: [...row.lines], assume: [...(row.assume ?? [])], settings: {} });
    return { ...row, outcome };
  });

  it('are never ruled falsely', () => {
    expect(outcomes.filter(({ right, outcome }) => outcome === (right ? 'faulty' : 'sound'))).toEqual([]);
  });

  it('are undecided in at most 1 of 100', () => {
    const open = outcomes.filter(({ outcome }) => outcome === 'undecided');
    expect(open.length, JSON.stringify(open.map(({ lines }) => lines))).toBeLessThanOrEqual(rows.length / 100);
  });
});
