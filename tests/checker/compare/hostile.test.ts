import { describe, expect, it } from 'vitest';
import { createBudget } from '../../../api/checker/context.ts';
import { compareExpressions } from '../../../api/checker/compare/compare-expressions.ts';
import { contextOf, expression, verdictOf } from './reading.ts';

const r = String.raw;
const nested = (wrap: (inner: string) => string, depth: number): string =>
  Array.from({ length: depth }).reduce<string>((inner) => wrap(inner), 'x');

describe('lines made to be hard', () => {
  it.each<[string, string, string]>([
    [r`9^{9^{9^9}}`, r`9^{9^{9^9}}`, 'undecided limit'],
    [r`x^{1000000}`, r`x^{-1000000}`, 'undecided limit'],
    [r`(((x+1)^{1000})^{1000})^{1000}`, r`(x+1)^{1000000000}`, 'undecided limit'],
    [r`1000000!`, '1', 'undecided limit'],
    [r`\sum_{k=1}^{1000000000}k`, '500000000500000000', 'undecided limit'],
    [r`\binom{1000000}{500000}`, '1', 'undecided limit'],
    [r`e^{e^{e^{e^{5}}}}`, '1', 'undecided limit'],
    [r`\int x\,dx`, 'x^2', 'undecided not-covered'],
    [r`(x+1)^{1000000}`, r`(1+x)^{1000000}`, 'equal'],
    [r`\sin(10^{300}x)`, r`\sin(10^{300}x)+1`, 'different'],
    [r`e^{e^{e^{x}}}`, r`e^{e^{e^{x}}}+1`, 'different'],
    [r`\ln(x+10^{40})-\ln(x+10^{40}+1)`, '0', 'different'],
  ])('%s to %s: %s', (above, below, verdict) => {
    expect(verdictOf(above, below)).toBe(verdict);
  });

  it('are answered however deep they are', () => {
    const roots = nested((inner) => `\\sqrt{1+${inner}}`, 30);
    expect(
      verdictOf(
        roots,
        nested((inner) => `\\sqrt{${inner}+1}`, 30),
      ),
    ).toBe('equal');
    expect(
      verdictOf(
        roots,
        nested((inner) => `\\sqrt{2+${inner}}`, 30),
      ),
    ).toBe('different');
    expect(
      verdictOf(
        nested((inner) => `(${inner})^2+1`, 25),
        '0',
      ),
    ).not.toBe('equal');
    expect(
      verdictOf(
        nested((inner) => `\\sin(${inner})`, 40),
        nested((inner) => `\\sin(${inner})`, 40),
      ),
    ).toBe('equal');
  });

  it('show differences that are tiny beside the rest', () => {
    expect(verdictOf(r`\sin x+10^{-60}`, r`\sin x`)).toBe('different');
    expect(verdictOf(r`\lfloor x\rfloor+10^{-90}`, r`\lfloor x\rfloor`)).toBe('different');
    expect(verdictOf(r`\lfloor x\rfloor+e^{-2000}`, r`\lfloor x\rfloor`)).toBe('different');
    expect(verdictOf(r`\arctan1+\arctan2+\arctan3+10^{-500}`, r`\pi`)).toBe('different');
  });

  it('are undecided when the budget is spent', () => {
    const context = { ...contextOf(), budget: createBudget(2) };
    const comparison = compareExpressions(expression(r`\max(x,y)`), expression(r`\max(y,x)+0\sin x`), context);
    expect(comparison).toEqual({ kind: 'undecided', reason: 'limit' });
  });
});
