import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { checkDerivation } from '../../api/checker/rule-derivation.ts';
import { verdictSchema, type CheckSettings } from '../../shared/schemas/verdict.ts';

interface Case {
  readonly id: string;
  readonly topic: string;
  readonly lines: readonly string[];
  readonly assume?: readonly string[];
  readonly settings?: CheckSettings;
  readonly firstFault: number | null;
}

function readCases(name: string): Case[] {
  const text = readFileSync(new URL(`./data/${name}`, import.meta.url), 'utf8');
  return text
    .trim()
    .split('\n')
    .map((line) => JSON.parse(line) as Case);
}

// The sources of the rows are in data/README.md.
describe.each(['derivations.jsonl', 'harder.jsonl', 'statements.jsonl'])('the derivations of %s', (name) => {
  it.each(readCases(name))('$id, $topic: the first fault is $firstFault', ({ lines, assume, settings, firstFault }) => {
    const verdict = checkDerivation({ lines, assume: assume ?? [], settings: settings ?? {} });
    expect({ outcome: verdict.outcome, firstFault: verdict.firstFault }).toEqual({
      outcome: firstFault === null ? 'sound' : 'faulty',
      firstFault,
    });
    expect(verdictSchema.parse(verdict)).toEqual(verdict);
    for (const step of verdict.steps.filter(({ ruling }) => ruling === 'fails')) {
      const { witness, lost, gained } = step.evidence;
      expect(witness ?? lost ?? gained).toBeDefined();
    }
  });
});
