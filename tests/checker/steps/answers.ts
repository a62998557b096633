import { createHash } from 'node:crypto';
import { readFileSync } from 'node:fs';
import { checkDerivation } from '../../../api/checker/rule-derivation.ts';
import type { DerivationInput } from '../../../shared/schemas/verdict.ts';
import { inputOf } from './hostile-kinds.ts';
import { readSteps } from './step-rows.ts';

/*
 * Prints what the checker answers to 500 inputs, one line each; with `after` it is asked other things before and these in
 * the other order: npx tsx tests/checker/steps/answers.ts [after]
 */

const rows = readSteps(readFileSync(new URL('../data/steps.jsonl', import.meta.url), 'utf8'));

function stepsFrom(first: number, count: number): DerivationInput[] {
  // Every third row, so that all topics are among them.
  return Array.from({ length: count }, (_, k) => rows[(first + 3 * k) % rows.length]).flatMap((row) =>
    row ? [{ lines: [...row.lines], assume: [...(row.assume ?? [])], settings: row.settings ?? {} }] : [],
  );
}

function hostileFrom(seed: number, count: number): DerivationInput[] {
  return Array.from({ length: count }, (_, k) => inputOf(seed + k));
}

const asked = [...stepsFrom(0, 340), ...hostileFrom(4_000_001, 160)];
const isAfter = process.argv[2] === 'after';
if (isAfter) [...hostileFrom(5_000_001, 60), ...stepsFrom(1, 120)].forEach((input) => checkDerivation(input));

const answers: string[] = [];
for (const k of isAfter ? [...asked.keys()].reverse() : asked.keys()) {
  answers[k] = JSON.stringify(checkDerivation(asked[k] as DerivationInput));
}
for (const answer of answers) {
  const hash = createHash('sha256').update(answer).digest('hex').slice(0, 16);
  process.stdout.write(`${hash} ${answer.slice(0, 200)}\n`);
}
