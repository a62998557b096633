import { describe, expect, it } from 'vitest';
import type { Expr } from '../../../shared/maths/expression.ts';
import { printExpr } from '../../../shared/maths/print.ts';
import { readLine } from '../../../shared/maths/read.ts';
import { compareExpressions } from '../../../api/checker/compare/compare-expressions.ts';
import { createContext } from '../../../api/checker/context.ts';
import { antiderivative } from '../../../api/checker/evidence/antiderivative.ts';
import { derive } from '../../../api/checker/evidence/derive.ts';
import { shortDifference } from '../../../api/checker/evidence/difference.ts';
import { neg, sum } from '../../../api/checker/evidence/build.ts';
import { askNerdamer } from '../../../api/checker/suggest/ask-nerdamer.ts';
import { suggestAntiderivative, suggestForm } from '../../../api/checker/suggest/suggest-form.ts';

function expr(tex: string): Expr {
  const reading = readLine(tex);
  if (!reading.ok || reading.line.kind !== 'expression') throw new Error(`not an expression: ${tex}`);
  return reading.line.expr;
}

describe('suggestions of an outside library', { timeout: 30_000 }, () => {
  it('are read back in the letters of the line', () => {
    const found = suggestForm(expr('t^2-9'), 'factor');
    expect(found && compareExpressions(found, expr('(t-3)(t+3)'), createContext()).kind).toBe('equal');
  });

  it('are asked for only where the answer is known to come', () => {
    expect(suggestForm(expr('(x+y+z+1)^{12}'), 'expand')).toBeNull();
    expect(suggestForm(expr('\\sqrt{x}+1'), 'factor')).toBeNull();
    expect(suggestAntiderivative(expr('\\sin(x^2)'), 'x')).toBeNull();
    expect(suggestAntiderivative(expr('a\\sin x'), 'x')).toBeNull();
  });

  it('leave nothing behind after an error', () => {
    const before = askNerdamer('expand((x+1)^2)');
    expect(askNerdamer('integrate(((')).toBeNull();
    expect(askNerdamer('expand((x+1)^2)')).toBe(before);
  });

  it.each(['x\\cos x', 'x^2e^x', 'x\\ln x', 'x\\sin(3x)', 'x^2\\cos x', 'xe^{2x+1}'])(
    'an antiderivative of %s counts only when its derivative is the integrand',
    (tex) => {
      const found = antiderivative(expr(tex), 'x', createContext());
      const back = found && derive(found, 'x');
      if (!found) return expect(found).toBeNull();
      return expect(back && compareExpressions(back, expr(tex), createContext()).kind).toBe('equal');
    },
  );

  it('finds the antiderivative of a product by parts', () => {
    const found = antiderivative(expr('x\\cos x'), 'x', createContext());
    expect(found && printExpr(found)).toBe('x\\sin x+\\cos x');
  });
});

describe('the difference of two lines', { timeout: 30_000 }, () => {
  it.each([
    ['(x+3)^2', 'x^2+9', '6x'],
    ['\\frac{x+9}{x+6}', '\\frac{3}{2}', '-\\frac{x}{2\\left(x+6\\right)}'],
    ['(2+6i)^2', '4+36', null],
    ['(x+1)^{30}', 'x^{30}+1', null],
    ['\\int_1^2 3x\\,dx', '9', '-\\frac{9}{2}'],
  ])('of %s and %s', (above, below, expected) => {
    const found = shortDifference(expr(above), expr(below), createContext());
    if (expected === null) return expect(found === null || found.length <= 80).toBe(true);
    return expect(found).toBe(expected);
  });

  it('is what the checker finds equal', () => {
    for (const [above, below] of [
      ['(a+b)(a-b)', 'a^2+b^2'],
      ['\\frac{1}{x}+\\frac{1}{x+1}', '\\frac{2}{x(x+1)}'],
    ] as const) {
      const found = shortDifference(expr(above), expr(below), createContext());
      expect(found).not.toBeNull();
      const whole = sum(expr(above), neg(expr(below)));
      expect(compareExpressions(whole, expr(found ?? '0'), createContext()).kind).toBe('equal');
    }
  });
});
