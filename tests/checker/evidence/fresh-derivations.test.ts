import { describe, expect, it } from 'vitest';
import { SLIP_KINDS } from '../../../shared/schemas/finding.ts';
import { checkDerivation } from '../../../api/checker/rule-derivation.ts';
import { isFiniteNumber, isNear, real } from '../../../api/checker/evidence/complex-double.ts';
import { estimate } from '../../../api/checker/evidence/estimate.ts';
import { roughTruth } from '../../../api/checker/evidence/rough-truth.ts';
import type { Line } from '../../../shared/maths/expression.ts';
import { readLine } from '../../../shared/maths/read.ts';
import { readFresh, runFresh, type FreshResult, type FreshRow } from './read-fresh.ts';

function told({ row, evidence }: FreshResult): string {
  const { mended, mendedEnding, slip } = evidence;
  return `${row.lines.join(' // ')} => ${(mendedEnding ?? [mended?.line]).join(' // ')} (${slip?.id})`;
}

const wholePlaces = Array.from({ length: 11 }, (_, k) => k - 5);

function linesOf({ lines }: FreshRow): string {
  return lines.join(' // ');
}

function lineOf(tex: string, { settings }: FreshRow): Line | null {
  const reading = readLine(tex, { numbers: settings.numbers, decimal: 'point', functions: [] });
  return reading.ok ? reading.line : null;
}

/** Whether two lines in one letter differ in value or in truth at a whole number. */
function areApart(above: Line, below: Line, name: string, x: number): boolean {
  const place = { letters: new Map([[name, real(x)]]), definitions: { letters: new Map(), functions: new Map() } };
  if (above.kind === 'expression' && below.kind === 'expression') {
    const [a, b] = [estimate(above.expr, place), estimate(below.expr, place)];
    return isFiniteNumber(a) && isFiniteNumber(b) && !isNear(a, b);
  }
  const [a, b] = [roughTruth(above, place), roughTruth(below, place)];
  return a !== null && b !== null && a !== b;
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

  it('has witnesses in whole numbers where there are any from -5 to 5', () => {
    for (const { row, evidence } of results) {
      const [above, below] = [row.lines[row.fault - 1] ?? '', row.lines[row.fault] ?? ''].map((tex) =>
        lineOf(tex, row),
      );
      const at = Object.entries(evidence.witness?.at ?? {});
      if (!above || !below || at.every(([, value]) => /^-?\d+$/.test(value))) continue;
      expect(
        at.length === 1 && wholePlaces.some((x) => areApart(above, below, at[0]?.[0] ?? '', x)),
        linesOf(row),
      ).toBe(false);
    }
  });

  it('names the slip, never wrongly, and one of ten kinds', () => {
    expect(results.filter(({ slip }) => slip === 'other').map(told)).toEqual([]);
    expect(results.filter(({ slip }) => slip === 'missing').length).toBeLessThanOrEqual(results.length * 0.03);
    for (const { evidence } of results) if (evidence.slip) expect(SLIP_KINDS).toContain(evidence.slip.kind);
    expect(SLIP_KINDS.length).toBeLessThanOrEqual(10);
  });
});
