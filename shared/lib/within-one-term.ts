import type { Expr, Span } from '../maths/expression.ts';
import { readLine } from '../maths/read.ts';
import { exprsOf } from '../maths/walk.ts';

/** Whether a marked part lies within one term of a line: one summand, or a whole side that is no sum. */
export function isWithinOneTerm(
  tex: string,
  span: Span,
  settings: { decimal: 'point' | 'comma'; numbers: 'real' | 'complex' },
): boolean {
  const reading = readLine(tex, { ...settings, functions: [] });
  if (!reading.ok) return false;
  return exprsOf(reading.line)
    .flatMap(termSpans)
    .some((term) => term.start <= span.start && span.end <= term.end);
}

function termSpans(expr: Expr): Span[] {
  return expr.kind === 'sum' ? expr.terms.map((term) => term.span) : [expr.bracketed ?? expr.span];
}
