import { performance } from 'node:perf_hooks';
import type { CheckSettings } from '../../../shared/schemas/verdict.ts';
import { checkDerivation } from '../rule-derivation.ts';
import { engines, runEngine, type BenchAnswer, type Timed } from './bench-engines.ts';
import { measureGrowth } from './bench-growth.ts';
import { readPairs, readStatements, type BenchPair } from './bench-pairs.ts';

/*
 * Measures the checker and the general systems that are installed on the same pairs in one run, and how the cost grows:
 * npm run bench [-- PAIRS]
 */

const rationalTopics: ReadonlySet<string> = new Set(['algebra', 'fractions']);
const all = readPairs(Number(process.argv[2] ?? 300));
const pairs = all.measured;
const own = runOwn(false);
const explained = runOwn(true);
const rows: (readonly [string, readonly Timed[] | null])[] = [
  ['this checker, reading and ruling', own],
  ['this checker, with all evidence', explained],
];
for (const engine of engines) rows.push([engine.name, await runEngine(engine, all)]);

print(
  `${pairs.length} pairs of expressions, one process for each engine, 2 s a question, asked ${all.before.length} other questions before; times in ms\n`,
);
printTable(
  ['engine', 'right', 'false equal', 'false different', 'undecided', 'time-outs', 'median', '99th', 'times slower'],
  rows.map(([name, results]) => (results ? [name, ...summary(results)] : [name, 'not installed'])),
);

const rational = pairs.map(({ topic }) => rationalTopics.has(topic));
const rights = pairs.map(({ right }) => right);
const statements = readStatements();
print('\nSteps of one kind, this checker; evidence is what a fault is explained with\n');
printTable(
  ['steps', 'count', 'median', '99th'],
  [
    ['rational', own.filter((_, k) => rational[k])],
    ['all expressions', own],
    ['statements in one letter', timeStatements(false)],
    ['rational, following, with what explains them', explained.filter((_, k) => rational[k] && rights[k])],
    ['rational, faults with their evidence', explained.filter((_, k) => rational[k] && !rights[k])],
    ['all expressions, faults with their evidence', explained.filter((_, k) => !rights[k])],
    ['statements in one letter, with evidence', timeStatements(true)],
  ].map(([name, results]) => [String(name), ...shortSummary(results as Timed[])]),
);

print('\nGrowth, this checker\n');
printTable(
  ['what grows', 'size', 'outcome', 'ms'],
  measureGrowth().map(({ what, size, outcome, ms }) => [what, String(size), outcome, ms.toFixed(2)]),
);

/** What explains a ruling counts as one step after the last; left out where only the ruling is measured. */
function timed(
  lines: readonly string[],
  assume: readonly string[],
  settings: CheckSettings,
  withEvidence: boolean,
): Timed {
  const began = performance.now();
  const { steps } = checkDerivation({ lines, assume, settings }, withEvidence ? {} : { timedOut: [lines.length] });
  const ms = performance.now() - began;
  const answers: Record<string, BenchAnswer> = { holds: 'equal', fails: 'different' };
  return { answer: answers[steps[0]?.ruling ?? ''] ?? 'undecided', ms };
}

function runOwn(withEvidence: boolean): Timed[] {
  const ask = ({ tex, settings }: BenchPair): Timed => timed(tex, [], settings, withEvidence);
  all.before.forEach(ask);
  return pairs.map(ask);
}

function timeStatements(withEvidence: boolean): Timed[] {
  const run = (): Timed[] =>
    statements.map(({ lines, assume, settings }) => timed(lines, assume, settings, withEvidence));
  run();
  return run();
}

function summary(results: readonly Timed[]): string[] {
  const count = (wanted: BenchAnswer, right?: boolean): number =>
    results.filter(({ answer }, k) => answer === wanted && (right === undefined || pairs[k]?.right === right)).length;
  const median = quantile(results, 0.5);
  return [
    String(count('equal', true) + count('different', false)),
    String(count('equal', false)),
    String(count('different', true)),
    String(count('undecided')),
    String(count('timeout')),
    median.toFixed(3),
    quantile(results, 0.99).toFixed(2),
    (median / quantile(own, 0.5)).toFixed(1),
  ];
}

function shortSummary(results: readonly Timed[]): string[] {
  return [String(results.length), quantile(results, 0.5).toFixed(3), quantile(results, 0.99).toFixed(2)];
}

function quantile(results: readonly Timed[], share: number): number {
  const times = results.map(({ ms }) => ms).sort((a, b) => a - b);
  return times[Math.min(times.length - 1, Math.floor(times.length * share))] ?? 0;
}

function printTable(header: readonly string[], body: readonly (readonly string[])[]): void {
  const all = [header, ...body];
  const widths = header.map((_, column) => Math.max(...all.map((row) => row[column]?.length ?? 0)));
  const line = (row: readonly string[]): string =>
    `| ${widths.map((width, column) => (row[column] ?? '').padEnd(width)).join(' | ')} |`;
  print(line(header));
  print(`| ${widths.map((width) => '-'.repeat(width)).join(' | ')} |`);
  for (const row of body) print(line(row));
}

function print(text: string): void {
  process.stdout.write(`${text}\n`);
}
