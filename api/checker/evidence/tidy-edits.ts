import type { Expr, Line, ReadSettings, Span } from '../../../shared/maths/expression.ts';
import { printExpr } from '../../../shared/maths/print.ts';
import { readLine } from '../../../shared/maths/read.ts';
import { childrenOf, exprsOf } from '../../../shared/maths/walk.ts';
import { rational } from '../numbers/rational.ts';
import { fraction, isOne, isZero, product, quotient, whole } from './build.ts';
import { splice, type Edit } from './edits.ts';
import { outer } from './mend-question.ts';

/** A piece of the changed text that nobody would leave so, and what is written instead. */
interface Oddity {
  readonly span: Span;
  readonly text: string;
}

const mostTidied = 4;
const largestRooted = 10_000n;

/**
 * The edits of a line so that what comes of them reads as a person writes it: no fraction of whole numbers that is a
 * whole number or has a common factor, no zero among the terms, no factor 1, no two signs in a row. Only what the edits
 * changed is looked at; the rest is the author's.
 */
export function tidied(tex: string, edits: readonly Edit[], settings: ReadSettings): readonly Edit[] {
  let current = edits;
  for (let turn = 0; turn < mostTidied; turn += 1) {
    const spliced = splice(tex, current);
    const reading = spliced && readLine(spliced.tex, settings);
    const oddity = spliced && reading?.ok ? findOddity(reading.line, spliced.tex, spliced.changed) : null;
    const next = oddity && withReplaced(current, oddity);
    if (!next) return current;
    current = next;
  }
  return current;
}

function findOddity(line: Line, tex: string, changed: readonly Span[]): Oddity | null {
  for (const expr of exprsOf(line)) {
    const looks: Looks = {
      tex,
      isChanged: (span) => changed.some((own) => own.start < span.end && span.start < own.end),
      isNew: (span) => changed.some((own) => own.start <= span.start && span.end <= own.end),
    };
    const found = oddityIn(expr, looks);
    if (found) return found;
  }
  return null;
}

type Inside = 'sum' | 'function' | null;

interface Looks {
  readonly tex: string;
  /** In part. */
  readonly isChanged: (span: Span) => boolean;
  /** As a whole. */
  readonly isNew: (span: Span) => boolean;
}

function oddityIn(expr: Expr, looks: Looks, inside: Inside = null): Oddity | null {
  const { tex, isChanged, isNew } = looks;
  const within = insideOf(expr, inside);
  for (const part of childrenOf(expr)) {
    const found = oddityIn(part, looks, within);
    if (found) return found;
  }
  if (!isChanged(outer(expr))) return null;
  if (expr.kind === 'root') return isNew(expr.span) ? wholeRoot(expr) : null;
  if (expr.kind === 'quotient') return reducible(expr, inside);
  if (expr.kind === 'sum') return zeroTerm(expr, isChanged) ?? leadingPlus(expr, tex) ?? twoSigns(expr, tex, isChanged);
  return expr.kind === 'product' ? (unitFactor(expr, isChanged) ?? numbersApart(expr, isNew)) : null;
}

function insideOf(expr: Expr, inside: Inside): Inside {
  if (expr.kind === 'call' || expr.kind === 'log') return 'function';
  return expr.kind === 'sum' && expr.terms.length > 1 ? (inside ?? 'sum') : inside;
}

/** A quotient of logarithms and one of several fractions over a common denominator are rather left as they are. */
function reducible(expr: Extract<Expr, { kind: 'quotient' }>, inside: Inside): Oddity | null {
  const { numerator, denominator } = expr;
  if (numerator.kind === 'quotient' && denominator.kind !== 'number' && denominator.kind !== 'sum') {
    const below = product(numerator.denominator, denominator);
    return { span: outer(expr), text: printExpr(quotient(numerator.numerator, below)) };
  }
  if (numerator.kind !== 'number' || denominator.kind !== 'number' || isZero(denominator)) return null;
  if (numerator.written !== 'integer' || denominator.written !== 'integer') return null;
  const value = rational(numerator.numerator, denominator.numerator);
  const isLeft = inside === 'function' || (inside === 'sum' && value.den !== 1n);
  const isLowest = value.den === denominator.numerator && value.den !== 1n;
  return isLeft || isLowest ? null : { span: outer(expr), text: printExpr(fraction(value)) };
}

function wholeRoot({ degree, radicand, span }: Extract<Expr, { kind: 'root' }>): Oddity | null {
  if (degree || radicand.kind !== 'number' || radicand.denominator !== 1n || radicand.numerator > largestRooted)
    return null;
  const value = Math.round(Math.sqrt(Number(radicand.numerator)));
  return BigInt(value * value) === radicand.numerator ? { span, text: String(value) } : null;
}

/** Several whole numbers in a product that is new as a whole. */
function numbersApart(expr: Extract<Expr, { kind: 'product' }>, isNew: (span: Span) => boolean): Oddity | null {
  const isNumber = (factor: Expr): boolean => factor.kind === 'number' && factor.written === 'integer';
  if (expr.factors.filter(isNumber).length < 2 || !isNew(outer(expr))) return null;
  const number = expr.factors.reduce(
    (value, one) => (one.kind === 'number' && isNumber(one) ? value * one.numerator : value),
    1n,
  );
  const text = printExpr(product(whole(number), ...expr.factors.filter((factor) => !isNumber(factor))));
  return { span: outer(expr), text };
}

function zeroTerm(expr: Extract<Expr, { kind: 'sum' }>, isChanged: (span: Span) => boolean): Oddity | null {
  if (expr.terms.length < 2) return null;
  const place = expr.terms.findIndex((term) => isZero(term.expr) && isChanged(term.span));
  const [zero, next] = [expr.terms[place], expr.terms[place + 1]];
  if (!zero) return null;
  // The sign behind a leading zero goes with it, unless it is a minus.
  const end = place === 0 && next ? (next.sign === 'plus' ? outer(next.expr).start : next.span.start) : zero.span.end;
  return { span: { start: zero.span.start, end }, text: '' };
}

function leadingPlus({ span }: Expr, tex: string): Oddity | null {
  return tex[span.start] === '+' ? { span: { start: span.start, end: span.start + 1 }, text: '' } : null;
}

function twoSigns(
  expr: Extract<Expr, { kind: 'sum' }>,
  tex: string,
  isChanged: (span: Span) => boolean,
): Oddity | null {
  for (const { sign, expr: inner, span } of expr.terms) {
    const [only] = inner.kind === 'sum' && inner.terms.length === 1 ? inner.terms : [];
    if (!only || inner.bracketed || only.sign !== 'minus' || !isChanged(span)) continue;
    const signs = { start: span.start, end: outer(only.expr).start };
    if (/^[+-]\s*-\s*$/.test(tex.slice(signs.start, signs.end)))
      return { span: signs, text: sign === 'minus' ? '+' : '-' };
  }
  return null;
}

function unitFactor(expr: Extract<Expr, { kind: 'product' }>, isChanged: (span: Span) => boolean): Oddity | null {
  for (const [k, factor] of expr.factors.entries()) {
    const [before, after] = [expr.factors[k - 1], expr.factors[k + 1]];
    if (!isOne(factor) || factor.kind !== 'number' || !isChanged(outer(factor))) continue;
    if (after) return { span: { start: outer(factor).start, end: outer(after).start }, text: '' };
    if (before) return { span: { start: outer(before).end, end: outer(factor).end }, text: '' };
  }
  return null;
}

/** The edits with a piece of the text that comes of them replaced; null where it cuts one of them in two. */
function withReplaced(edits: readonly Edit[], { span, text }: Oddity): Edit[] | null {
  const ordered = [...edits].sort((a, b) => a.start - b.start || a.end - b.end);
  let shift = 0;
  let [start, end]: [number | null, number | null] = [null, null];
  const kept: Edit[] = [];
  let inner = '';
  for (const edit of ordered) {
    const from = edit.start + shift;
    const to = from + edit.text.length;
    if (to <= span.start || from >= span.end) {
      if (from >= span.end) end ??= span.end - shift;
      kept.push(edit);
    } else if (span.start <= from && to <= span.end) {
      start ??= span.start - shift;
    } else {
      // The piece lies within one edit.
      if (!(from <= span.start && span.end <= to)) return null;
      inner = edit.text.slice(0, span.start - from) + text + edit.text.slice(span.end - from);
      return [...ordered.filter((other) => other !== edit), { ...edit, text: inner }];
    }
    shift += edit.text.length - (edit.end - edit.start);
    if (start !== null && from < span.end) end = span.end - shift;
  }
  if (start === null || end === null) return null;
  return [...kept, { start, end, text }];
}
