import { readFileSync } from 'node:fs';
import { checkDerivation } from '../../../api/checker/rule-derivation.ts';
import { printLine } from '../../../shared/maths/print.ts';
import { readLine } from '../../../shared/maths/read.ts';
import type { Evidence, Verdict } from '../../../shared/schemas/verdict.ts';
import document from '../slips/slip-cases.json';

type Numbers = 'real' | 'complex';

/** A faulty derivation and what is expected of its evidence; null for a line that is not scored. */
export interface FreshRow {
  /** Any of these names, null for none. */
  readonly slips: readonly (string | null)[];
  readonly fault: number;
  readonly lines: readonly string[];
  readonly rest: readonly (string | null)[];
  readonly assume: readonly string[];
  readonly settings: { readonly numbers: Numbers; readonly unknown?: string };
}

export interface FreshResult {
  readonly row: FreshRow;
  readonly verdict: Verdict;
  readonly evidence: Evidence;
  /** right, other or missing; unscored where the line or ending is not given. */
  readonly line: Score;
  readonly ending: Score;
  readonly slip: Score;
}

type Score = 'right' | 'other' | 'missing' | 'unscored';

const names = new Map(document.cases.map(({ entry, slip }) => [entry, slip]));

/** The rows of a file as its first lines say, read from beside this one. */
export function readFresh(file: string): FreshRow[] {
  const text = readFileSync(new URL(file, import.meta.url), 'utf8');
  return text
    .split('\n')
    .filter((line) => line.includes(' ;; ') && !line.startsWith('#'))
    .map(toRow);
}

function toRow(text: string): FreshRow {
  const [slips = '', fault = '', lines = '', rest = '', extra = ''] = text.split(' ;; ').map((part) => part.trim());
  const settings = extra.split(' // ');
  const valueOf = (key: string): string[] =>
    settings.filter((one) => one.startsWith(`${key} `)).map((one) => one.slice(key.length + 1));
  const [unknown] = valueOf('unknown');
  return {
    slips: slips.split('|').map((one) => (one === '-' ? null : (names.get(`slip-${one}`) ?? one))),
    fault: Number(fault),
    lines: lines.split(' // '),
    rest: rest.split(' // ').map((one) => (one === '?' ? null : one)),
    assume: valueOf('assume'),
    settings: { numbers: settings.includes('complex') ? 'complex' : 'real', ...(unknown ? { unknown } : {}) },
  };
}

/** One spelling for lines that read the same. */
export function canonical(tex: string, numbers: Numbers): string {
  const reading = readLine(tex, { numbers, decimal: 'point', functions: [] });
  return reading.ok ? printLine(reading.line) : `not read: ${tex}`;
}

export function runFresh(row: FreshRow): FreshResult {
  const { lines, assume, settings, fault, rest } = row;
  const verdict = checkDerivation({ lines, assume, settings });
  const evidence = verdict.steps[fault - 1]?.evidence ?? {};
  const spelled = (texs: readonly (string | null)[]): string =>
    texs.map((tex) => canonical(tex ?? '', settings.numbers)).join(' // ');
  const score = (found: readonly string[] | undefined, expected: readonly (string | null)[]): Score => {
    if (expected.includes(null)) return 'unscored';
    return !found ? 'missing' : spelled(found) === spelled(expected) ? 'right' : 'other';
  };
  const found = evidence.slip?.id ?? null;
  return {
    row,
    verdict,
    evidence,
    line: score(evidence.mended && [evidence.mended.line], rest.slice(0, 1)),
    ending: score(evidence.mendedEnding, rest),
    slip: row.slips.includes(found) ? 'right' : found ? 'other' : 'missing',
  };
}
