import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { checkDerivation } from '../../../api/checker/rule-derivation.ts';
import { readSteps } from './step-rows.ts';

/*
 * 1500 of the 20 000 steps that make_steps.py draws from seed 5, each label agreed on by at least two of SymPy 1.11, Maxima
 * 5.46 and PARI/GP 2.15, which are named beside it: even over topics, following and not.
 */
const rows = readSteps(readFileSync(new URL('../data/steps.jsonl', import.meta.url), 'utf8'));
const topics = [...new Set(rows.map(({ topic }) => topic))];

const open: string[] = [];

describe('the kept steps', { timeout: 60_000 }, () => {
  it('cover every topic, and each label has two programs behind it', () => {
    expect(rows.length).toBeGreaterThan(1400);
    expect(topics.length).toBeGreaterThanOrEqual(20);
    expect(rows.every(({ by }) => by.length >= 2)).toBe(true);
  });

  it.each(topics)('of %s: no false ruling', (topic) => {
    const wrong: string[] = [];
    for (const row of rows.filter((one) => one.topic === topic)) {
      const { steps } = checkDerivation({ lines: row.lines, assume: row.assume ?? [], settings: row.settings ?? {} });
      const ruling = steps[0]?.ruling;
      if (ruling === 'undecided') open.push(row.id);
      else if ((ruling === 'holds') !== row.right) wrong.push(`${row.id}: ${row.lines.join(' to ')} ruled ${ruling}`);
    }
    expect(wrong).toEqual([]);
  });

  it('leave at most 1 in 200 undecided', () => {
    expect(open.length * 200).toBeLessThanOrEqual(rows.length);
  });
});
