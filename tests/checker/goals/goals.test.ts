import { describe, expect, it } from 'vitest';
import { isExpanded } from '../../../api/checker/goals/expanded.ts';
import { isFactored } from '../../../api/checker/goals/factored.ts';
import { checkDerivation } from '../../../api/checker/rule-derivation.ts';
import { readLine } from '../../../shared/maths/read.ts';
import type { Expr } from '../../../shared/maths/expression.ts';
import type { Goal } from '../../../shared/schemas/verdict.ts';

function read(tex: string): Expr {
  const reading = readLine(tex);
  if (!reading.ok || reading.line.kind !== 'expression') throw new Error(tex);
  return reading.line.expr;
}

describe('the expanded form', () => {
  it.each(['x^2+5x+6', '-3x', '2ab-\\frac{1}{2}b^2', 'x', '7', '3\\sqrt{2}+x', 'x^2y-xy^2'])(
    'is reached by %s',
    (tex) => {
      expect(isExpanded(read(tex))).toBe(true);
    },
  );
  it.each(['(x+2)(x+3)', 'x^2+2x+3x+6', '2(x+1)', '(x+1)^2', '3\\cdot 2x', '(2x)^3', 'ab+ba'])(
    'is not reached by %s',
    (tex) => {
      expect(isExpanded(read(tex))).toBe(false);
    },
  );
});

describe('the factored form', () => {
  it.each([
    '(x+2)(x+3)',
    '4(x+2)',
    'x^2+1',
    '(x-y)(x+y)',
    '2x(x^2+x+1)',
    '(x^2-2)(x^2+2)',
    '(a+b)^3',
    'x^4+1',
    'x^2+xy+y^2',
  ])('is reached by %s', (tex) => {
    expect(isFactored(read(tex))).toBe(true);
  });
  it.each(['x^2+5x+6', '(x^2-4)(x+1)', 'x^2-y^2', 'x^4+4', 'xy+y', '(x^2+2xy+y^2)z', 'x^4-5x^2+6', 'a^3-b^3'])(
    'is not reached by %s',
    (tex) => {
      expect(isFactored(read(tex))).toBe(false);
    },
  );
});

function notesWith(goal: Goal, lines: readonly string[]): readonly string[] {
  const verdict = checkDerivation({ lines, assume: [], settings: { goal } });
  expect(verdict.outcome).toBe('sound');
  return verdict.steps[verdict.steps.length - 1]?.notes ?? [];
}

describe('a sound derivation', () => {
  it('is unfinished until the letter is solved for', () => {
    const goal: Goal = { kind: 'solved', letter: 'x' };
    expect(notesWith(goal, ['2x+3=7', '2x=4'])).toContain('unfinished');
    expect(notesWith(goal, ['2x+3=7', '2x=4', 'x=2'])).not.toContain('unfinished');
    expect(notesWith(goal, ['x^2=4', 'x=2\\text{ or }x=-2'])).not.toContain('unfinished');
    expect(notesWith(goal, ['x^2=4', 'x^2-4=0'])).toContain('unfinished');
  });

  it('is unfinished until the target is written, in any order', () => {
    const goal: Goal = { kind: 'target', target: '2x+6' };
    expect(notesWith(goal, ['2(x+3)', '6+2x'])).not.toContain('unfinished');
    expect(notesWith(goal, ['2(x+3)', '2x+2\\cdot 3'])).toContain('unfinished');
  });

  it('has no goal to reach where the task is free or the teacher judges', () => {
    expect(notesWith({ kind: 'free' }, ['x+x', '2x'])).toEqual([]);
    expect(notesWith({ kind: 'simplified' }, ['x+x', '2x+0'])).toEqual([]);
  });
});
