import type { Span } from '../../../shared/maths/expression.ts';

/** A piece of the author's text replaced by another; `start` equal to `end` puts something in. */
export interface Edit {
  readonly start: number;
  readonly end: number;
  readonly text: string;
}

/** One way to change a line: what it costs, where its first change is, and whether it touches what was right. */
export interface Candidate {
  readonly edits: readonly Edit[];
  readonly cost: number;
  readonly touchesRight: boolean;
}

export interface Spliced {
  readonly tex: string;
  /** Where the new pieces stand. */
  readonly changed: readonly Span[];
}

/** The text with its edits made, or null where two of them overlap. */
export function splice(tex: string, edits: readonly Edit[]): Spliced | null {
  const ordered = [...edits].sort((a, b) => a.start - b.start || a.end - b.end);
  let text = '';
  let at = 0;
  const changed: Span[] = [];
  for (const { start, end, text: piece } of ordered) {
    if (start < at) return null;
    text += tex.slice(at, start);
    const fitted = fit(text, piece, tex.slice(end));
    changed.push({ start: text.length, end: text.length + fitted.length });
    text += fitted;
    at = end;
  }
  text += tex.slice(at);
  return { tex: text, changed: changed.map((span) => visible(span, text.length)) };
}

/** Braces where TeX would take only the first sign, and a blank where a command would run into a letter. */
function fit(before: string, piece: string, after: string): string {
  if (piece.length > 1 && /(\^|_|\\[dt]?frac\s*(\{[^{}]*\}|\d)?|\\sqrt)\s*$/.test(before) && !isGroup(piece))
    return `{${piece}}`;
  const runsInto = /\\[a-zA-Z]+$/.test(before) && /^[a-zA-Z]/.test(piece);
  const runsOn = /\\[a-zA-Z]+$/.test(piece) && /^[a-zA-Z]/.test(after);
  return `${runsInto ? ' ' : ''}${piece}${runsOn ? ' ' : ''}`;
}

function isGroup(piece: string): boolean {
  return piece.startsWith('{') && piece.endsWith('}');
}

/** What was taken out leaves its neighbour marked, so that something can be seen. */
function visible({ start, end }: Span, length: number): Span {
  return end > start
    ? { start, end }
    : { start: Math.max(0, Math.min(start, length - 1)), end: Math.min(length, start + 1) };
}
