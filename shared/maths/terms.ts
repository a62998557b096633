import type { Expr, ReadSettings, Span } from './expression.ts';
import { DEFAULT_READ_SETTINGS, readLine } from './read.ts';
import { outer } from './reader.ts';
import { childrenOf, exprsOf } from './walk.ts';

export interface SelectablePart {
  readonly span: Span;
  readonly tex: string;
}

export interface Mark {
  readonly span: Span;
  readonly className: string;
}

/** The parts of a line that a reviewer can mark: sides, terms with their signs, factors; in reading order, outer first. */
export function selectableParts(
  tex: string,
  settings: ReadSettings = DEFAULT_READ_SETTINGS,
): readonly SelectablePart[] {
  const reading = readLine(tex, settings);
  if (!reading.ok) return [];
  const spans = new Map<string, Span>();
  for (const expr of exprsOf(reading.line)) addParts(expr, outer(expr), spans);
  return [...spans.values()]
    .sort((one, other) => one.start - other.start || other.end - one.end)
    .map((span) => ({ span, tex: tex.slice(span.start, span.end) }));
}

function addParts(expr: Expr, span: Span, spans: Map<string, Span>): void {
  spans.set(`${span.start}-${span.end}`, { start: span.start, end: span.end });
  if (expr.kind === 'sum') {
    for (const term of expr.terms) addParts(term.expr, term.span, spans);
  } else {
    for (const part of childrenOf(expr)) addParts(part, outer(part), spans);
  }
}

/**
 * The TeX with each span wrapped in `\htmlClass`, for KaTeX with trust; it renders as before. Marks that would cut a group
 * in two or overlap another mark without lying in it are left out.
 */
export function markSpans(tex: string, marks: readonly Mark[]): string {
  const taken: Mark[] = [];
  for (const mark of [...marks].sort(
    (one, other) => one.span.start - other.span.start || other.span.end - one.span.end,
  )) {
    if (isWhole(tex, mark.span) && /^[\w -]+$/.test(mark.className) && taken.every((other) => isNested(mark, other)))
      taken.push(mark);
  }
  return forKatex(insertMarks(tex, taken));
}

function isNested(mark: Mark, other: Mark): boolean {
  const { start, end } = mark.span;
  return start >= other.span.end || (end <= other.span.end && (start > other.span.start || end < other.span.end));
}

/** Each mark opens where its span starts and closes where it ends; the sorted order nests them. */
function insertMarks(tex: string, marks: readonly Mark[]): string {
  let text = '';
  let at = 0;
  const open: Mark[] = [];
  const closeUpTo = (place: number) => {
    for (let last = open[open.length - 1]; last && last.span.end <= place; last = open[open.length - 1]) {
      text += `${tex.slice(at, last.span.end)}}}`;
      at = last.span.end;
      open.pop();
    }
  };
  for (const mark of marks) {
    closeUpTo(mark.span.start);
    text += tex.slice(at, mark.span.start);
    at = mark.span.start;
    const isSigned = /^([+-]|\\[pm]{2}(?![a-zA-Z]))/.test(tex.slice(at, at + 4)) && isAfterOperand(tex, at);
    text += `{\\htmlClass{${mark.className}}{${isSigned ? '{}' : ''}`;
    open.push(mark);
  }
  closeUpTo(tex.length);
  return text + tex.slice(at);
}

/** A sign after an operand keeps its spacing as a sign between terms. */
function isAfterOperand(tex: string, at: number): boolean {
  const before = tex.slice(0, at).trimEnd();
  return before !== '' && !/([=<>(,{[&]|\\(le|ge|ne|leq|geq|neq|approx|left|cdot|times|in)|\\left[([|])$/.test(before);
}

/** Braces, `\left` with `\right` and `\begin` with `\end` pair up within the span, and no command is cut. */
function isWhole(tex: string, { start, end }: Span): boolean {
  if (start < 0 || end > tex.length || start >= end) return false;
  const slice = tex.slice(start, end);
  const before = tex.slice(0, start).replaceAll('\\\\', '');
  if (before.endsWith('\\')) return false;
  if (/\\[a-zA-Z]*$/.test(before) && /^[a-zA-Z]/.test(slice)) return false;
  if (/\\[a-zA-Z]*$/.test(slice) && /^[a-zA-Z]/.test(tex.slice(end))) return false;
  let braces = 0;
  let sized = 0;
  let blocks = 0;
  for (const [token] of slice.matchAll(/\\(?:[a-zA-Z]+|.)|[{}&]/gs)) {
    if (token === '{') braces += 1;
    else if (token === '}') braces -= 1;
    else if (token === '\\left' || token === '\\mleft') sized += 1;
    else if (token === '\\right' || token === '\\mright') sized -= 1;
    else if (token === '\\begin') blocks += 1;
    else if (token === '\\end') blocks -= 1;
    else if (blocks === 0 && (token === '&' || token === '\\\\')) return false;
    if (braces < 0 || sized < 0 || blocks < 0) return false;
  }
  return braces === 0 && sized === 0 && blocks === 0;
}

const FOR_KATEX: ReadonlyMap<string, string> = new Map([
  ['\\exponentialE', 'e'],
  ['\\imaginaryI', 'i'],
  ['\\imaginaryJ', 'j'],
  ['\\differentialD', 'd'],
  ['\\mleft', '\\left'],
  ['\\mright', '\\right'],
  ['%', '\\%'],
  ['$', ''],
  ['\\(', ''],
  ['\\)', ''],
  ['\\[', ''],
  ['\\]', ''],
  ['\\placeholder', '\\square '],
  ['\\lparen', '('],
  ['\\rparen', ')'],
  ['\\infin', '\\infty '],
  ['\\lbrack', '['],
  ['\\rbrack', ']'],
  ['\\lb', '\\operatorname{lb}'],
  ['\\slash', '/'],
]);

/** Commands of the maths field, and signs that TeX gives another meaning, in the spelling that KaTeX knows. */
export function forKatex(tex: string): string {
  return tex.replace(/\\(?:[a-zA-Z]+|.)|[%$]/gs, (token) => FOR_KATEX.get(token) ?? token);
}
