import type { Expr, Line, Span } from '../../../shared/maths/expression.ts';
import { childrenOf, exprsOf } from '../../../shared/maths/walk.ts';
import { termsOfLine } from '../../../shared/lib/within-one-term.ts';
import type { Evidence } from '../../../shared/schemas/verdict.ts';
import type { Edit } from './edits.ts';
import { outer, type MendQuestion } from './mend-question.ts';
import type { MendedLine } from './mend-line.ts';

type WrongPart = NonNullable<Evidence['wrongPart']>;

/**
 * The one term, factor or side within which the whole mend lies: with that part replaced the step holds. Null where
 * the mend reaches over several parts or puts in a new one.
 */
export function findWrongPart({ tex, line, settings }: MendQuestion, mended: MendedLine): WrongPart | null {
  const isAnew = coversAll(line, mended.edits);
  const edits = isAnew ? trimmed(tex, mended) : mended.edits;
  if (mended.isRewritten && coversAll(line, edits)) return null;
  const { decimal, numbers } = settings;
  const sign = changedSign(line, mended);
  const whole = edits.length === 1 ? exprsOf(line).map(outer) : sidesOf(line);
  const parts = sign ? [sign] : [...termsOfLine(tex, { decimal, numbers }), ...fractionParts(line), ...whole];
  const holdsAll = (part: Span): boolean => edits.every((edit) => isWithin(edit, part, tex));
  const found = parts.find(holdsAll);
  const inner = exprsOf(line).flatMap(innerParts).filter(holdsAll);
  const span = sign ? found : (inner.sort((a, b) => lengthOf(a) - lengthOf(b))[0] ?? found);
  if (!span) return null;
  const is = tex.slice(span.start, span.end).trim();
  const end = mended.tex.length - (tex.length - span.end);
  const shouldBe = mended.tex
    .slice(span.start, end)
    .trim()
    .replace(/^\{([^{}]*(\{[^{}]*\}[^{}]*)*)\}$/, '$1');
  if (shouldBe === '' || is === shouldBe) return null;
  const lostSign =
    is.startsWith('-') && !/^[+-]/.test(shouldBe) && exprsOf(line).some((expr) => isOneOfSeveral(expr, span));
  return { span, is, shouldBe: lostSign ? `+${shouldBe}` : shouldBe };
}

function coversAll(line: Line, edits: readonly Edit[]): boolean {
  return exprsOf(line).some((expr) =>
    edits.some(({ start, end }) => start <= outer(expr).start && outer(expr).end <= end),
  );
}

const token = /\\[a-zA-Z]+|\d+|\s+|./g;

/** Of a longer piece that was written anew only that in which the two texts differ, from the first token to the last. */
function trimmed(tex: string, { edits }: MendedLine): readonly Edit[] {
  return edits.map((edit) => {
    const [before, after] = [tex.slice(edit.start, edit.end), edit.text].map((text) => text.match(token) ?? []);
    if (!before || !after || before.length < 2) return edit;
    let front = 0;
    while (front < before.length && before[front] === after[front]) front += 1;
    let back = 0;
    const most = Math.min(before.length, after.length) - front;
    while (back < most && before[before.length - 1 - back] === after[after.length - 1 - back]) back += 1;
    const length = (tokens: readonly string[]): number => tokens.join('').length;
    return {
      start: edit.start + length(before.slice(0, front)),
      end: edit.end - length(before.slice(before.length - back)),
      text: after.slice(front, after.length - back).join(''),
    };
  });
}

function isOneOfSeveral(expr: Expr, span: Span): boolean {
  if (
    expr.kind === 'sum' &&
    expr.terms.length > 1 &&
    expr.terms.some((term) => term.span.start === span.start && term.span.end === span.end)
  )
    return true;
  return childrenOf(expr).some((part) => isOneOfSeveral(part, span));
}

/** A new term and a new value belong to no part; a sign belongs to what follows it, an exponent or factor to either. */
function isWithin(edit: Edit, part: Span, tex: string): boolean {
  if (edit.start === edit.end) {
    const isSign = /^[+-]$/.test(edit.text);
    if (!isSign && /^[+-]|[+-]$|=/.test(edit.text)) return false;
    if (isSign ? edit.start === part.end : edit.start === part.start && /^[+-]/.test(tex.slice(part.start)))
      return false;
    if (edit.start === part.end && !/^(\^|[a-zA-Z])/.test(edit.text)) return false;
  }
  return edit.start >= part.start && edit.end <= part.end;
}

function lengthOf({ start, end }: Span): number {
  return end - start;
}

/** Numerators and denominators as a whole. */
function fractionParts(line: Line): Span[] {
  const within = (expr: Expr): Span[] => [
    ...(expr.kind === 'quotient' ? [outer(expr.numerator), outer(expr.denominator)] : []),
    ...childrenOf(expr).flatMap(within),
  ];
  return exprsOf(line).flatMap(within);
}

/** What stands inside a limit, an integral, a sum or brackets of evaluation, and the entries of a matrix: term by term. */
function innerParts(expr: Expr): Span[] {
  const isFrame = ['limit', 'integral', 'series', 'evaluated', 'matrix'].includes(expr.kind);
  const parts = childrenOf(expr);
  const own = isFrame
    ? parts.flatMap((part) => [outer(part), ...(part.kind === 'sum' ? part.terms.map((term) => term.span) : [])])
    : [];
  return [...own, ...parts.flatMap(innerParts)];
}

function sidesOf(line: Line): Span[] {
  return line.kind === 'relation' ? [outer(line.left), outer(line.right)] : [];
}

/** The relation sign, where that alone was changed. */
function changedSign(line: Line, { edits }: MendedLine): Span | null {
  if (line.kind === 'any' || line.kind === 'all')
    return line.parts.map((part) => signIn(part, edits)).find((span) => span !== null) ?? null;
  return signIn(line, edits);
}

function signIn(line: Line, edits: readonly Span[]): Span | null {
  const [only, ...more] = edits;
  if (line.kind !== 'relation' || !only || more.length > 0 || only.start === only.end) return null;
  const gap = { start: outer(line.left).end, end: outer(line.right).start };
  return only.start >= gap.start && only.end <= gap.end ? gap : null;
}
