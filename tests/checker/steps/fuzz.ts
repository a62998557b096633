import { existsSync, readFileSync } from 'node:fs';
import { workDone } from '../../../api/checker/numbers/work.ts';
import { checkDerivation } from '../../../api/checker/rule-derivation.ts';
import { warmUp } from '../../../api/checker/warm-up.ts';
import { inputOf } from './hostile-kinds.ts';

/*
 * Puts hostile inputs through the checker, as a worker would, and prints the slowest, what was thrown and the memory in
 * use: npx esbuild tests/checker/steps/fuzz.ts --bundle --platform=node --format=esm --packages=external
 * --outfile=fuzz.mjs && node fuzz.mjs COUNT SEED
 *
 * Times are those of this thread on the processor: the machine may be doing other things. A step's time is its own
 * ruling, or what explains the faults, or all of the derivation by the number of its steps, whichever is most.
 */

const [count = 1000, first = 1] = process.argv.slice(2).map(Number);
const shown = 150;
const threadTimes = '/proc/thread-self/schedstat';
const hasThreadTimes = existsSync(threadTimes);
const outcomes = new Map<string, number>();
const times: number[] = [];
let over = 0;
let crashes = 0;
let peak = 0;

warmUp();
for (let seed = first; seed < first + count; seed += 1) {
  run(seed);
  if (seed % 100 === 0) peak = Math.max(peak, process.memoryUsage().rss);
  if ((seed - first) % 1000 === 999) report(seed - first + 1);
}

function run(seed: number): void {
  const input = inputOf(seed);
  const clock = startClock();
  const pieces: string[] = [];
  let at = 0;
  let most = 0;
  let outcome: string;
  const ended = (): void => {
    const { ms, work } = clock.piece();
    most = Math.max(most, ms);
    pieces.push(`${at}:${ms.toFixed(0)}ms/${(work / 1000).toFixed(0)}k`);
  };
  try {
    const onStep = (step: number): void => {
      ended();
      at = step;
    };
    outcome = checkDerivation(input, { onStep }).outcome;
  } catch (cause) {
    outcome = 'crash';
    crashes += 1;
    process.stdout.write(`crash ${seed} ${String(cause).slice(0, 200)} ${JSON.stringify(input.lines).slice(0, 300)}\n`);
  }
  ended();
  const ms = Math.max(most, clock.all() / (input.lines.length - 1));
  times.push(ms);
  if (ms > 300) over += 1;
  outcomes.set(outcome, (outcomes.get(outcome) ?? 0) + 1);
  if (ms > shown)
    process.stdout.write(
      `slow ${seed} ${ms.toFixed(0)} ms ${outcome} ${pieces.join(' ')} ${JSON.stringify(input.lines).slice(0, 400)}\n`,
    );
}

function startClock(): { readonly piece: () => { ms: number; work: number }; readonly all: () => number } {
  const start = reading();
  let last = start;
  return {
    piece: () => {
      const now = reading();
      const found = { ms: now.ms - last.ms, work: now.work - last.work };
      last = now;
      return found;
    },
    all: () => reading().ms - start.ms,
  };
}

function reading(): { ms: number; work: number } {
  return { ms: threadMs(), work: workDone() };
}

/** Of this thread where the system tells it, else of the process, with all that the engine does beside. */
function threadMs(): number {
  if (hasThreadTimes) return Number(readFileSync(threadTimes, 'utf8').split(' ')[0]) / 1e6;
  const { user, system } = process.cpuUsage();
  return (user + system) / 1000;
}

function report(done: number): void {
  const sorted = times.toSorted((a, b) => a - b);
  const at = (share: number): string =>
    (sorted[Math.min(sorted.length - 1, Math.floor(sorted.length * share))] ?? 0).toFixed(2);
  process.stdout.write(
    `${done} inputs from seed ${first}: ${JSON.stringify(Object.fromEntries(outcomes))}, crashes ${crashes}, over 300 ms a step ${over}, ` +
      `median ${at(0.5)} ms, 99th ${at(0.99)}, 99.9th ${at(0.999)}, largest ${at(1)}, ` +
      `memory now ${(process.memoryUsage().rss / 1e6).toFixed(0)} MB, at most ${(peak / 1e6).toFixed(0)} MB\n`,
  );
}
