import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import type { CheckSettings, Verdict } from '../../../shared/schemas/verdict.ts';
import { checkDerivation } from '../../../api/checker/rule-derivation.ts';

/** Lines that lead up to a step, and the lines that hold, fail or stay undecided after them. */
interface Row {
  readonly topic: string;
  readonly above: readonly string[];
  readonly assume?: readonly string[];
  readonly settings?: CheckSettings;
  readonly holds?: readonly string[];
  readonly fails?: readonly string[];
  readonly undecided?: readonly string[];
}

/*
 * Written by hand from the rules' text: true rewritings of school and college, each with near misses by one small edit,
 * and pairs that differ only where a sampler does not look (a break far out, a narrow gap, a turn of the logarithm).
 */
const rows = JSON.parse(readFileSync(new URL('hand-expressions.json', import.meta.url), 'utf8')) as Row[];
const topics = [...new Set(rows.map(({ topic }) => topic))];

function outcomeOf(row: Row, line: string): Verdict['outcome'] {
  const { above, assume = [], settings = {} } = row;
  const lines = [...above, line];
  // The rulings alone: what explains them counts as one more step, and is left out.
  return checkDerivation({ lines, assume, settings }, { timedOut: [lines.length] }).outcome;
}

describe('steps between expressions written by hand', { timeout: 60_000 }, () => {
  it('are more than a thousand, most of them near misses', () => {
    const count = (key: 'holds' | 'fails'): number => rows.reduce((sum, row) => sum + (row[key]?.length ?? 0), 0);
    expect(count('holds') + count('fails')).toBeGreaterThan(1_000);
    expect(count('fails')).toBeGreaterThan(count('holds'));
  });

  it.each(topics)('on %s are ruled as the rules demand', (topic) => {
    const wrong: string[] = [];
    for (const row of rows.filter((one) => one.topic === topic)) {
      const wanted = [
        ...(row.holds ?? []).map((line) => [line, 'sound'] as const),
        ...(row.fails ?? []).map((line) => [line, 'faulty'] as const),
        ...(row.undecided ?? []).map((line) => [line, 'undecided'] as const),
      ];
      for (const [line, outcome] of wanted) {
        const found = outcomeOf(row, line);
        if (found !== outcome) wrong.push(`${row.above.join(' to ')} to ${line} is ${found}, not ${outcome}`);
      }
    }
    expect(wrong).toEqual([]);
  });
});
