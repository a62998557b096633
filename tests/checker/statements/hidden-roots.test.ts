import { describe, expect, it } from 'vitest';
import { checkDerivation } from '../../../api/checker/rule-derivation.ts';
import { hiddenRows } from './hidden-roots.ts';

/** Solutions far out, close together, double, on edges, among many waves: no ruling may be wrong, some may be open. */
describe('solutions that are easily missed', () => {
  it('are never ruled falsely, and seldom left undecided', () => {
    const rows = hiddenRows();
    const rulings = rows.map(({ lines, right, assume }) => {
      const { ruling } = checkDerivation({ lines: [...lines], assume: [...(assume ?? [])], settings: {} }).steps[0] as {
        ruling: string;
      };
      return { lines, right, ruling };
    });
    const wrong = rulings.filter(({ right, ruling }) => ruling === (right ? 'fails' : 'holds'));
    expect(wrong).toEqual([]);
    expect(rows.length).toBeGreaterThan(440);
    expect(rulings.filter(({ ruling }) => ruling === 'undecided').length).toBeLessThan(40);
  }, 240_000);
});
