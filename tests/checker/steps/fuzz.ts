import { performance } from 'node:perf_hooks';
import { checkDerivation } from '../../../api/checker/rule-derivation.ts';
import { inputOf } from './hostile-kinds.ts';

/*
 * Puts hostile inputs through the checker and prints the slowest, what was thrown and the memory in use:
 * npx tsx tests/checker/steps/fuzz.ts COUNT SEED
 */

const [count = 1000, first = 1] = process.argv.slice(2).map(Number);
const outcomes = new Map<string, number>();
const times: number[] = [];
let over = 0;
let crashes = 0;
let peak = 0;

for (let seed = first; seed < first + count; seed += 1) {
  const input = inputOf(seed);
  const began = process.cpuUsage();
  const start = performance.now();
  let outcome: string;
  try {
    outcome = checkDerivation(input).outcome;
  } catch (cause) {
    outcome = 'crash';
    crashes += 1;
    process.stdout.write(`crash ${seed} ${String(cause).slice(0, 200)} ${JSON.stringify(input.lines).slice(0, 300)}\n`);
  }
  const used = process.cpuUsage(began);
  // The processor's time: the machine may be doing other things.
  const ms = Math.min((used.user + used.system) / 1000, performance.now() - start);
  const steps = input.lines.length - 1;
  times.push(ms / steps);
  if (ms / steps > 300) {
    over += 1;
    process.stdout.write(
      `slow ${seed} ${ms.toFixed(0)} ms ${steps} steps ${outcome} ${JSON.stringify(input.lines).slice(0, 400)}\n`,
    );
  }
  outcomes.set(outcome, (outcomes.get(outcome) ?? 0) + 1);
  if (seed % 500 === 0) peak = Math.max(peak, process.memoryUsage().rss);
  if ((seed - first) % 2500 === 2499) report(seed - first + 1);
}

function report(done: number): void {
  const sorted = times.toSorted((a, b) => a - b);
  const at = (share: number): string =>
    (sorted[Math.min(sorted.length - 1, Math.floor(sorted.length * share))] ?? 0).toFixed(2);
  process.stdout.write(
    `${done} inputs from seed ${first}: ${JSON.stringify(Object.fromEntries(outcomes))}, crashes ${crashes}, over 300 ms a step ${over}, ` +
      `median ${at(0.5)} ms, 99th ${at(0.99)}, 99.9th ${at(0.999)}, largest ${at(1)}, memory at most ${(peak / 1e6).toFixed(0)} MB\n`,
  );
}
