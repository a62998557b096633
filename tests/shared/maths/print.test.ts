import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { printExpr, printLine } from '../../../shared/maths/print.ts';
import { DEFAULT_READ_SETTINGS, readLine } from '../../../shared/maths/read.ts';
import { sameExpr, sameLine } from '../../../shared/maths/same.ts';
import { explainRefusal } from '../../../shared/maths/refusals.ts';
import { arbitraryExpr, arbitraryLine } from './arbitrary-line.ts';

describe('printing', () => {
  it('reads the same again for every kind of expression', () => {
    const result = fc.check(
      fc.property(arbitraryExpr, (expr) => {
        const reading = readLine(printExpr(expr));
        return reading.ok && reading.line.kind === 'expression' && sameExpr(reading.line.expr, expr);
      }),
      { numRuns: 3000, seed: 7 },
    );
    expect(result.counterexample).toBeNull();
  });

  it('reads the same again for every kind of line, with a point or a comma', () => {
    const result = fc.check(
      fc.property(arbitraryLine, fc.constantFrom('point' as const, 'comma' as const), (line, decimal) => {
        const reading = readLine(printLine(line, decimal), { ...DEFAULT_READ_SETTINGS, decimal });
        return reading.ok && sameLine(reading.line, line);
      }),
      { numRuns: 1500, seed: 11 },
    );
    expect(result.counterexample).toBeNull();
  });

  it('puts brackets only where they are needed', () => {
    const shown = (tex: string) => {
      const reading = readLine(tex);
      return reading.ok ? printLine(reading.line) : explainRefusal(reading.refusal).code;
    };
    expect(shown('((x))+(2)(y)')).toBe('x+2y');
    expect(shown('\\sin\\left(x\\right)+\\ln(2)')).toBe('\\sin x+\\ln 2');
    expect(shown('\\left(x+1\\right)^{2}')).toBe('\\left(x+1\\right)^2');
    expect(shown('{x}^{n+1}')).toBe('x^{n+1}');
  });
});
