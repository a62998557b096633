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
  if (mended.isRewritten) return null;
  const { decimal, numbers } = settings;
  const sign = changedSign(line, mended);
  const parts = sign ? [sign] : [...termsOfLine(tex, { decimal, numbers }), ...fractionParts(line), ...sidesOf(line)];
  const holdsAll = (part: Span): boolean => mended.edits.every((edit) => isWithin(edit, part));
  const found = parts.find(holdsAll);
  const inner = exprsOf(line).flatMap(innerParts).filter(holdsAll);
  const span = sign ? found : (inner.sort((a, b) => lengthOf(a) - lengthOf(b))[0] ?? found);
  if (!span) return null;
  const is = tex.slice(span.start, span.end).trim();
  const end = mended.tex.length - (tex.length - span.end);
  const shouldBe = mended.tex.slice(span.start, end).trim();
  if (shouldBe === '' || is === shouldBe) return null;
  const lostSign =
    is.startsWith('-') && !/^[+-]/.test(shouldBe) && exprsOf(line).some((expr) => isOneOfSeveral(expr, span));
  return { span, is, shouldBe: lostSign ? `+${shouldBe}` : shouldBe };
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

/** What is put in at the very end of a part, a new term and a new value belong to no part. */
function isWithin(edit: Edit, part: Span): boolean {
  if (edit.start === edit.end && (edit.start === part.end || /^[+-]|=/.test(edit.text))) return false;
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
