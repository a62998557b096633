import { describe, expect, it } from 'vitest';
import type { Expr } from '../../../shared/maths/expression.ts';
import { readLine } from '../../../shared/maths/read.ts';
import { sameExpr } from '../../../shared/maths/same.ts';
import { childrenOf, exprsOf } from '../../../shared/maths/walk.ts';
import caseLines from './case-lines.json' with { type: 'json' };
import { READINGS } from './reading-table.ts';

/** The sine in \sin^2 x and the x_1 in x^2_1 have no text of their own, nor have raised digits, the 1 of \int dx, the base of \lb and the zero of \R^+. */
function hasOwnText(expr: Expr, parent: Expr | null, text: string): boolean {
  if (
    parent?.kind === 'power' &&
    parent.base === expr &&
    (expr.kind === 'call' || expr.kind === 'log' || expr.kind === 'letter') &&
    !expr.bracketed
  ) {
    return expr.span.start !== parent.span.start || expr.span.end !== parent.span.end;
  }
  return (
    !/^(d[a-z]|\+|[½²³]|\\lb)$/.test(text) && !text.includes('dx}') && !text.includes('\\,dx') && expr.kind !== 'matrix'
  );
}

function mismatches(tex: string): string[] {
  const reading = readLine(tex);
  if (!reading.ok || reading.alternatives.length > 0) return [];
  const wrong: string[] = [];
  const visit = (expr: Expr, parent: Expr | null) => {
    const text = tex.slice(expr.span.start, expr.span.end);
    const again = readLine(text);
    const isSame = again.ok && again.line.kind === 'expression' && sameExpr(again.line.expr, expr);
    if (!isSame && hasOwnText(expr, parent, text)) wrong.push(text);
    for (const part of childrenOf(expr)) visit(part, expr);
  };
  for (const expr of exprsOf(reading.line)) visit(expr, null);
  return wrong;
}

describe('spans', () => {
  it('hold exactly the text that reads as the node', () => {
    for (const tex of [...READINGS.map(([line]) => line), ...caseLines.flatMap(({ lines }) => lines)]) {
      expect([tex, ...mismatches(tex)]).toEqual([tex]);
    }
  });

  it('of a term begin with its sign, and brackets stand in their own span', () => {
    const tex = '2x-3\\left(x+1\\right)';
    const reading = readLine(tex);
    if (!reading.ok || reading.line.kind !== 'expression' || reading.line.expr.kind !== 'sum')
      throw new Error('not a sum');
    const { terms } = reading.line.expr;
    expect(terms.map(({ span }) => tex.slice(span.start, span.end))).toEqual(['2x', '-3\\left(x+1\\right)']);
    const factor = childrenOf(terms[1]!.expr)[1]!;
    expect(tex.slice(factor.span.start, factor.span.end)).toBe('x+1');
    expect(tex.slice(factor.bracketed?.start, factor.bracketed?.end)).toBe('\\left(x+1\\right)');
  });

  it('split digits as TeX does', () => {
    const tex = 'x^23';
    const reading = readLine(tex);
    if (!reading.ok || reading.line.kind !== 'expression') throw new Error('not an expression');
    expect(childrenOf(reading.line.expr).map(({ span }) => tex.slice(span.start, span.end))).toEqual(['x^2', '3']);
  });
});
