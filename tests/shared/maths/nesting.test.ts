import { describe, expect, it } from 'vitest';
import type { Expr, Line, Span } from '../../../shared/maths/expression.ts';
import { readLine } from '../../../shared/maths/read.ts';
import { childrenOf, exprsOf } from '../../../shared/maths/walk.ts';
import caseLines from './case-lines.json' with { type: 'json' };
import { READINGS } from './reading-table.ts';

const LINES = [...READINGS.map(([tex]) => tex), ...caseLines.flatMap(({ lines }) => lines)].map(tokensOf);
const TOKENS = LINES.flat();

function tokensOf(tex: string): readonly string[] {
  return tex.match(/\\(?:[a-zA-Z]+ ?|.)|./g) ?? [];
}

/** Whole numbers below the given one, the same in every run. */
function createDice(seed: number): (below: number) => number {
  let state = seed;
  return (below) => {
    state = (state * 1_103_515_245 + 12_345) % 2_147_483_648;
    return Math.floor((state / 2_147_483_648) * below);
  };
}

/** Random tokens in a row, or a written line with one token put in, left out or exchanged. */
function randomTex(dice: (below: number) => number): string {
  const some = (most: number) => Array.from({ length: dice(most + 1) }, () => TOKENS[dice(TOKENS.length)]!);
  if (dice(4) === 0) return some(12).join('');
  const line = LINES[dice(LINES.length)]!;
  return line.toSpliced(dice(line.length + 1), dice(2), ...some(1)).join('');
}

function isWithin(inner: Span, outer: Span): boolean {
  return outer.start <= inner.start && inner.start <= inner.end && inner.end <= outer.end;
}

/** The nodes that reach beyond what holds them. */
function strays(tex: string, line: Line): string[] {
  const found: string[] = [];
  const check = (span: Span, within: Span) => {
    if (!isWithin(span, within)) found.push(`${span.start}-${span.end} of ${tex}`);
  };
  const visit = (expr: Expr, within: Span) => {
    if (expr.bracketed) check(expr.bracketed, within);
    check(expr.span, expr.bracketed ?? within);
    if (expr.kind === 'sum') for (const { span } of expr.terms) check(span, expr.span);
    for (const part of childrenOf(expr)) visit(part, expr.span);
  };
  const whole = { start: 0, end: tex.length };
  check(line.span, whole);
  for (const expr of exprsOf(line)) visit(expr, whole);
  return found;
}

describe('random tokens', () => {
  it('are read or refused inside the text, each node within the one that holds it', () => {
    const dice = createDice(17);
    const wrong: string[] = [];
    let read = 0;
    for (let run = 0; run < 20_000; run += 1) {
      const tex = randomTex(dice);
      const reading = readLine(tex);
      if (reading.ok) {
        read += 1;
        wrong.push(...strays(tex, reading.line));
      } else if (!isWithin(reading.refusal.span, { start: 0, end: tex.length }))
        wrong.push(`refused elsewhere: ${tex}`);
    }
    expect(wrong).toEqual([]);
    expect(read).toBeGreaterThan(4_000);
  });
});
