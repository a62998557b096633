import type { Expr, Span } from '../maths/expression.ts';
import { readLine } from '../maths/read.ts';
import { exprsOf } from '../maths/walk.ts';

export interface TermSettings {
  readonly decimal: 'point' | 'comma';
  readonly numbers: 'real' | 'complex';
}

/**
 * The terms of a line that a reviewer can mark, side by side in reading order: the summands of each side with their
 * signs; where a side is one term, the summands within it, else the term as a whole.
 */
export function termsOfLine(tex: string, settings: TermSettings): Span[] {
  const reading = readLine(tex, { ...settings, functions: [] });
  return reading.ok ? exprsOf(reading.line).flatMap((expr) => termsOf(expr, outer(expr))) : [];
}

/** Whether a marked part lies within one term of a line: one summand, or a whole side that is no sum. */
export function isWithinOneTerm(tex: string, span: Span, settings: TermSettings): boolean {
  const reading = readLine(tex, { ...settings, functions: [] });
  if (!reading.ok) return false;
  return exprsOf(reading.line)
    .flatMap((expr) => (expr.kind === 'sum' ? expr.terms.map((term) => term.span) : [outer(expr)]))
    .some((term) => term.start <= span.start && span.end <= term.end);
}

function termsOf(expr: Expr, whole: Span): Span[] {
  if (expr.kind === 'sum') return expr.terms.length > 1 ? expr.terms.map((term) => term.span) : [whole];
  const parts = partsOf(expr).flatMap((part) => termsOf(part, outer(part)));
  return parts.length > 1 ? parts : [whole];
}

/** Where a single term may hold several of its own. */
function partsOf(expr: Expr): readonly Expr[] {
  if (expr.kind === 'quotient') return [expr.numerator, expr.denominator];
  return expr.kind === 'product' ? expr.factors : [];
}

function outer(expr: Expr): Span {
  return expr.bracketed ?? expr.span;
}
