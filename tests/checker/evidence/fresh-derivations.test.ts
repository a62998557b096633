import { describe, expect, it } from 'vitest';
import { SLIP_KINDS } from '../../../shared/schemas/finding.ts';
import { checkDerivation } from '../../../api/checker/rule-derivation.ts';
import { readFresh, runFresh, type FreshResult } from './read-fresh.ts';

function told({ row, evidence }: FreshResult): string {
  const { mended, mendedEnding, slip } = evidence;
  return `${row.lines.join(' // ')} => ${(mendedEnding ?? [mended?.line]).join(' // ')} (${slip?.id})`;
}

describe.each(['./fresh-derivations.txt', './fresh-derivations-2.txt'])('%s', { timeout: 120_000 }, (file) => {
  const results = readFresh(file).map(runFresh);

  it('has the faults where they are said to be, and what should have been is sound', () => {
    for (const { row, verdict } of results) {
      const { lines, fault, rest, assume, settings } = row;
      expect(verdict.firstFault, lines.join(' // ')).toBe(fault);
      const right = [...lines.slice(0, fault), ...rest.flatMap((line) => (line === null ? [] : [line]))];
      if (!rest.includes(null)) expect(checkDerivation({ lines: right, assume, settings }).outcome).toBe('sound');
    }
  });

  it('gives the mended lines and endings as a person would', () => {
    const missed = (what: 'line' | 'ending'): string[] =>
      results.filter((one) => one[what] !== 'right' && one[what] !== 'unscored').map(told);
    const scored = results.filter(({ line }) => line !== 'unscored').length;
    expect(missed('line').length, missed('line').join('\n')).toBeLessThanOrEqual(scored * 0.05);
    expect(missed('ending').length, missed('ending').join('\n')).toBeLessThanOrEqual(scored * 0.1);
  });

  it('never gives a mended line or ending that is not sound', () => {
    for (const { row, evidence } of results) {
      const { lines, fault, assume, settings } = row;
      for (const rest of [evidence.mended && [evidence.mended.line], evidence.mendedEnding]) {
        if (!rest) continue;
        const verdict = checkDerivation({ lines: [...lines.slice(0, fault), ...rest], assume, settings });
        expect(verdict.firstFault, rest.join(' // ')).toBeNull();
        expect(verdict.steps[fault - 1]?.ruling, rest.join(' // ')).toBe('holds');
      }
    }
  });

  it('names the slip, never wrongly, and one of ten kinds', () => {
    expect(results.filter(({ slip }) => slip === 'other').map(told)).toEqual([]);
    expect(results.filter(({ slip }) => slip === 'missing').length).toBeLessThanOrEqual(results.length * 0.03);
    for (const { evidence } of results) if (evidence.slip) expect(SLIP_KINDS).toContain(evidence.slip.kind);
    expect(SLIP_KINDS.length).toBeLessThanOrEqual(10);
  });
});
