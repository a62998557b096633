import { readFileSync } from 'node:fs';
import { performance } from 'node:perf_hooks';
import { checkDerivation } from '../../../api/checker/rule-derivation.ts';
import type { Step } from './step-rows.ts';
import { readSteps } from './step-rows.ts';

/*
 * Rules on every step of a file that make_steps.py made, and prints what was ruled falsely, the share left undecided and
 * the times by kind: npx tsx tests/checker/steps/run-steps.ts steps.jsonl
 */

interface Tally {
  steps: number;
  falseHolds: number;
  falseFails: number;
  undecided: number;
  readonly times: number[];
}

const tallies = new Map<string, Tally>();

function tallyOf(name: string): Tally {
  const found = tallies.get(name) ?? { steps: 0, falseHolds: 0, falseFails: 0, undecided: 0, times: [] };
  tallies.set(name, found);
  return found;
}

function judge(row: Step): void {
  const began = performance.now();
  const verdict = checkDerivation({ lines: row.lines, assume: row.assume ?? [], settings: row.settings ?? {} });
  const ms = performance.now() - began;
  const step = verdict.steps[0];
  const isFalse = step?.ruling === (row.right ? 'fails' : 'holds');
  if (isFalse || step?.ruling === 'undecided' || ms > 300) {
    const why = isFalse ? 'FALSE' : step?.ruling === 'undecided' ? 'open' : 'slow';
    const reason = step?.evidence.reason ?? '';
    process.stdout.write(
      `${why} ${row.id} ${row.topic} is ${row.right} ruled ${step?.ruling} ${reason} ${ms.toFixed(0)} ms ${JSON.stringify(row.lines)} ${JSON.stringify(row.settings ?? {})}\n`,
    );
  }
  for (const tally of [tallyOf(row.topic), tallyOf(`= ${row.kind}`), tallyOf('= all')]) {
    tally.steps += 1;
    tally.times.push(ms);
    if (step?.ruling === 'undecided') tally.undecided += 1;
    else if (isFalse) tally[row.right ? 'falseFails' : 'falseHolds'] += 1;
  }
}

const rows = readSteps(readFileSync(process.argv[2] ?? '', 'utf8'));
// The first rulings of a process are slow: the code is not yet compiled.
for (const row of rows.slice(0, 300)) {
  checkDerivation({ lines: row.lines, assume: row.assume ?? [], settings: row.settings ?? {} });
}
for (const row of rows) judge(row);

const header = ['topic', 'steps', 'false holds', 'false fails', 'undecided', 'median ms', '99th ms', 'largest ms'];
process.stdout.write(`${header.join('\t')}\n`);
for (const [name, tally] of [...tallies].sort(([a], [b]) => a.localeCompare(b))) {
  const times = tally.times.sort((a, b) => a - b);
  const at = (share: number): string =>
    (times[Math.min(times.length - 1, Math.floor(times.length * share))] ?? 0).toFixed(3);
  const cells = [name, tally.steps, tally.falseHolds, tally.falseFails, tally.undecided, at(0.5), at(0.99), at(1)];
  process.stdout.write(`${cells.join('\t')}\n`);
}
