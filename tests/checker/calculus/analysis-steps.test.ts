import { describe, expect, it } from 'vitest';
import { judgeLines, lettersFor } from './judge-lines.ts';
import firstYearSteps from './first-year-steps.json';
import nearMisses from './near-misses.json';
import ordinarySteps from './ordinary-steps.json';

interface AnalysisRow {
  readonly topic: string;
  readonly lines: readonly string[];
  /** One letter a step, by hand: h for holds, f for fails. */
  readonly want: string;
  readonly numbers?: 'complex';
  readonly assume?: readonly string[];
}

/** What was ruled against its truth, what was left open, and the number of steps. */
function tally(rows: readonly AnalysisRow[]) {
  const wrong: string[] = [];
  const open: string[] = [];
  let steps = 0;
  for (const { topic, lines, want, numbers, assume } of rows) {
    const found = lettersFor(judgeLines(lines, numbers ? { numbers } : {}, assume ?? []));
    steps += want.length;
    for (const [k, letter] of [...found].entries()) {
      const text = `${topic}, step ${k + 1} is ${letter}, not ${want[k]}: ${lines.join('  |  ')}`;
      if (letter !== 'h' && letter !== 'f') open.push(text);
      else if (letter !== want[k]) wrong.push(text);
    }
  }
  return { wrong, open, steps };
}

describe('calculus, sums, matrices and complex numbers, written by hand', { timeout: 240_000 }, () => {
  it('rules no near miss falsely', () => {
    const { wrong, open } = tally(nearMisses as readonly AnalysisRow[]);
    expect(wrong).toEqual([]);
    expect(open.length).toBeLessThanOrEqual(26);
  });

  it('rules no step of a first course falsely', () => {
    const { wrong, open } = tally(firstYearSteps as readonly AnalysisRow[]);
    expect(wrong).toEqual([]);
    expect(open.length).toBeLessThanOrEqual(4);
  });

  it('rules no ordinary step falsely', () => {
    const { wrong, open } = tally(ordinarySteps as readonly AnalysisRow[]);
    expect(wrong).toEqual([]);
    expect(open.length).toBeLessThanOrEqual(29);
  });
});
