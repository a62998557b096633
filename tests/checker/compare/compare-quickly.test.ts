import { readFileSync } from 'node:fs';
import * as fc from 'fast-check';
import { expect, test } from 'vitest';
import { compareAtLength } from '../../../api/checker/compare/compare-expressions.ts';
import { compareQuickly } from '../../../api/checker/compare/compare-quickly.ts';
import type { Comparison } from '../../../api/checker/compare/comparison.ts';
import { createContext } from '../../../api/checker/context.ts';
import type { Expr } from '../../../shared/maths/expression.ts';
import { readLine } from '../../../shared/maths/read.ts';
import { readSteps } from '../steps/step-rows.ts';

function read(tex: string): Expr {
  const reading = readLine(tex, { numbers: 'real', decimal: 'point', functions: [] });
  if (!reading.ok || reading.line.kind !== 'expression') throw new Error(`no expression: ${tex}`);
  return reading.line.expr;
}

/** What people are shown of it. */
function shown(found: Comparison): unknown {
  if (found.kind !== 'different') return found;
  const { atTex, above, below } = found.witness;
  return { kind: 'different', atTex, above, below };
}

function expectSame(above: string, below: string): Comparison | null {
  const quick = compareQuickly(read(above), read(below), createContext());
  if (quick !== null) expect(shown(quick)).toEqual(shown(compareAtLength(read(above), read(below), createContext())));
  return quick;
}

test('is what the general comparison says on the kept steps of algebra', () => {
  const rows = readSteps(readFileSync(new URL('../data/steps.jsonl', import.meta.url), 'utf8'));
  const algebra = rows.filter(({ kind, topic }) => kind === 'expression' && /^(algebra|fractions)$/.test(topic));
  const answers = algebra.map(({ lines }) => expectSame(lines[0] as string, lines[1] as string));
  expect(algebra.length).toBeGreaterThan(100);
  expect(answers.filter((found) => found !== null).length / answers.length).toBeGreaterThan(0.8);
});

const leaf = fc.oneof(
  fc.integer({ min: 0, max: 12 }).map(String),
  fc.constantFrom('x', 'y', 'a', '0.5', '\\frac{2}{3}', '10^{20}', '2\\frac{1}{2}'),
);
const tree = fc.letrec<{ expr: string }>((tie) => ({
  expr: fc.oneof(
    { maxDepth: 4 },
    leaf,
    fc.tuple(tie('expr'), tie('expr')).map(([a, b]) => `\\left(${a}+${b}\\right)`),
    fc.tuple(tie('expr'), tie('expr')).map(([a, b]) => `\\left(${a}-\\left(${b}\\right)\\right)`),
    fc.tuple(tie('expr'), tie('expr')).map(([a, b]) => `\\left(${a}\\right)\\left(${b}\\right)`),
    fc.tuple(tie('expr'), tie('expr')).map(([a, b]) => `\\frac{${a}}{${b}}`),
    fc.tuple(tie('expr'), fc.integer({ min: -3, max: 4 })).map(([a, n]) => `\\left(${a}\\right)^{${n}}`),
  ),
})).expr;

test('is what the general comparison says on random quotients', () => {
  let ruled = 0;
  fc.assert(
    fc.property(tree, tree, (a, b) => {
      if (expectSame(a, b)) ruled += 1;
      if (expectSame(a, `\\left(${a}\\right)+0`)) ruled += 1;
      if (expectSame(`${a}-\\left(${b}\\right)`, `\\left(${a}\\right)+\\left(${b}\\right)`)) ruled += 1;
    }),
    { seed: 20_261_201, numRuns: 250 },
  );
  expect(ruled).toBeGreaterThan(300);
}, 60_000);

test.each([
  ['\\frac{1}{x-x}', '\\frac{2}{x-x}'],
  ['\\frac{1}{2-2}', '3'],
  ['\\frac{x^2-1}{x-1}', 'x+1'],
  ['x^0', '1'],
  ['\\sqrt{x}', 'x^2'],
  ['\\pi x', 'x\\pi'],
])('leaves %s to %s to the general comparison', (above, below) => {
  expect(compareQuickly(read(above), read(below), createContext())).toBeNull();
});

test('leaves assumptions and definitions to the general comparison', () => {
  const read1 = readLine('x>0', { numbers: 'real', decimal: 'point', functions: [] });
  const assumptions = read1.ok ? [read1.line] : [];
  expect(assumptions).toHaveLength(1);
  expect(compareQuickly(read('x'), read('x'), createContext({ assumptions }))).toBeNull();
  const definitions = { letters: new Map([['x', read('y+1')]]), functions: new Map() };
  expect(compareQuickly(read('x'), read('y+1'), createContext({ definitions }))).toBeNull();
});
