import { readFileSync } from 'node:fs';

/** Two lines with the truth that independent programs agreed on, in TeX and in plain notation. */
export interface BenchPair {
  readonly topic: string;
  readonly tex: readonly [string, string];
  readonly plain: readonly [string, string];
  readonly right: boolean;
  readonly settings: Record<string, unknown>;
}

interface Row {
  readonly topic: string;
  readonly kind: string;
  readonly lines: [string, string];
  readonly right: boolean;
  readonly plain: [string, string];
  readonly settings?: Record<string, unknown>;
}

// Both npm run and the tests start in the root of the repository.
const roundsBefore = 4;
const file = 'tests/checker/data/steps.jsonl';

export interface BenchPairs {
  readonly measured: readonly BenchPair[];
  /**
   * Other pairs, several times over, which every engine is asked about before: code is compiled and tables are filled, no
   * answer is known.
   */
  readonly before: readonly BenchPair[];
}

/** Steps from expression to expression of the kept set: some to measure, spread evenly over it, and the rest. */
export function readPairs(most: number): BenchPairs {
  const rows = readFileSync(file, 'utf8')
    .split('\n')
    .filter(Boolean)
    .map((line) => JSON.parse(line) as Row)
    .filter((row) => row.kind === 'expression');
  const every = Math.max(1, rows.length / most);
  const picked = new Set(Array.from({ length: Math.min(most, rows.length) }, (_, k) => Math.floor(k * every)));
  return {
    measured: rows.filter((_, k) => picked.has(k)).map(toPair),
    before: Array.from({ length: roundsBefore }, () => rows.filter((_, k) => !picked.has(k)).map(toPair)).flat(),
  };
}

function toPair({ topic, lines, right, plain, settings }: Row): BenchPair {
  return { topic, tex: lines, plain, right, settings: settings ?? {} };
}

export interface StatementRow {
  readonly lines: [string, string];
  readonly assume: readonly string[];
  readonly settings: Record<string, unknown>;
}

/** Steps from statement to statement in one letter. */
export function readStatements(): StatementRow[] {
  return readFileSync(file, 'utf8')
    .split('\n')
    .filter(Boolean)
    .map((line) => JSON.parse(line) as Row & { assume?: string[] })
    .filter((row) => row.kind === 'statement')
    .map(({ lines, assume, settings }) => ({ lines, assume: assume ?? [], settings: settings ?? {} }));
}
