/** What a stretch of TeX is marked as; each has its own rule under it. */
export type MarkKind = 'wrong' | 'right' | 'marked' | 'bad';

/** A stretch of a TeX string, by character offsets, end not included. */
export interface MarkedSpan {
  readonly start: number;
  readonly end: number;
  readonly as: MarkKind;
}

/** A stretch with the class names that it is set with. */
interface ClassedSpan {
  readonly start: number;
  readonly end: number;
  readonly as: string;
}

/** Terms of a line that can be picked, in reading order. */
export interface TermChoice {
  readonly spans: readonly { readonly start: number; readonly end: number }[];
  /** The index of the one that is picked. */
  readonly picked: number | null;
  readonly onPick: (index: number) => void;
}

/** An equation in its two columns, so that the signs of many stand under each other. */
export interface Sides {
  readonly lhs: string;
  /** Begins with the relation sign. */
  readonly rhs: string;
}

const RELATION_WORDS = new Set('le leq ge geq ne neq lt gt leqslant geqslant approx equiv sim'.split(' '));
const CLOSED_UP = new Set(['+', '-', '=', '<', '>', '\u2212', '\u00b1']);

function isBalanced(piece: string): boolean {
  let depth = 0;
  for (let at = 0; at < piece.length; at += 1) {
    if (piece[at] === '\\') at += 1;
    else if (piece[at] === '{') depth += 1;
    else if (piece[at] === '}') depth -= 1;
    if (depth < 0) return false;
  }
  const opened = piece.match(/\\left(?![a-z])/g)?.length ?? 0;
  const closed = piece.match(/\\right(?![a-z])/g)?.length ?? 0;
  return depth === 0 && opened === closed && !/[&]|\\\\/.test(piece);
}

/** Puts classes around the marked stretches. A stretch that cuts through a group of TeX, or through another, is left unmarked. */
export function markSpans(tex: string, spans: readonly ClassedSpan[] = []): string {
  const fromTheEnd = [...spans].sort((one, other) => other.start - one.start);
  let marked = tex;
  let free = tex.length;
  for (const { start, end, as } of fromTheEnd) {
    const piece = tex.slice(start, end);
    if (start < 0 || start >= end || end > free || !isBalanced(piece)) continue;
    // An empty group keeps the space of a sign that now begins a group of its own.
    const lead = CLOSED_UP.has(piece.trimStart()[0] ?? '') ? '{}' : '';
    const set = `\\htmlClass{${as}}{${lead}${piece}}`;
    const isScript = /[\^_]\s*$/.test(tex.slice(0, start));
    marked = marked.slice(0, start) + (isScript ? `{${set}}` : set) + marked.slice(end);
    free = start;
  }
  return marked;
}

/** The terms as stretches that can be found again in what was set, the picked one marked. */
export function termSpans({ spans, picked }: Omit<TermChoice, 'onPick'>): readonly ClassedSpan[] {
  return spans.map(({ start, end }, index) => ({
    start,
    end,
    as: `term term-${index}${index === picked ? ' marked' : ''}`,
  }));
}

function wordAt(tex: string, at: number): string {
  return /^[a-zA-Z]+/.exec(tex.slice(at + 1))?.[0] ?? tex.charAt(at + 1);
}

/** Where the relation signs stand outside of every group, with their lengths. */
function relations(tex: string): readonly { readonly at: number; readonly length: number }[] {
  const found: { at: number; length: number }[] = [];
  let depth = 0;
  for (let at = 0; at < tex.length; at += 1) {
    const sign = tex.charAt(at);
    if (sign === '\\') {
      const word = wordAt(tex, at);
      if (word === 'left' || word === 'begin') depth += 1;
      if (word === 'right' || word === 'end') depth -= 1;
      if (depth === 0 && RELATION_WORDS.has(word)) found.push({ at, length: word.length + 1 });
      at += word.length;
    } else if ('{([|'.includes(sign)) depth += sign === '|' ? 0 : 1;
    else if ('})]'.includes(sign)) depth -= 1;
    else if (depth === 0 && (sign === '=' || sign === '<' || sign === '>')) found.push({ at, length: 1 });
  }
  return found;
}

/** The two sides at the first relation sign; null for an expression and for statements that are more than one relation. */
export function splitRelation(tex: string): Sides | null {
  if (/\\(lor|land|text|quad|qquad|implies|iff|Rightarrow|Leftrightarrow|vee|wedge)(?![a-zA-Z])/.test(tex)) return null;
  const first = relations(tex)[0];
  const isSeveral = first && /,|\\;/.test(tex.slice(first.at).replaceAll('{,}', '.'));
  if (!first || isSeveral) return null;
  return { lhs: tex.slice(0, first.at).trim(), rhs: tex.slice(first.at).trim() };
}

const SHORT_WORDS = /\\(?:left|right|displaystyle|textstyle|,|;|!|:|htmlClass\{[a-z]+\})/g;

/** Roughly how many em a piece of TeX is wide; fractions count as their wider part. */
export function widthEm(tex: string): number {
  let plain = tex.replace(SHORT_WORDS, '');
  const fraction = /\\[dt]?frac\{([^{}]*)\}\{([^{}]*)\}/;
  for (let found = fraction.exec(plain); found; found = fraction.exec(plain)) {
    const [whole, over = '', under = ''] = found;
    plain = plain.replace(whole, over.length > under.length ? over : under);
  }
  const signs = plain.match(/\\?(?:cdot|times|pm|mp|le|ge|ne|leq|geq|neq)(?![a-z])|[+\-=<>]/g)?.length ?? 0;
  const small = plain.match(/[\^_](?:\{[^{}]*\}|.)/g)?.join('').length ?? 0;
  const names = plain.replace(/\\(sin|cos|tan|cot|log|ln|exp|lim|arcsin|arccos|arctan)(?![a-z])/g, '$1');
  const glyphs = names.replace(/\\[a-zA-Z]+/g, 'x').replace(/[{}^_\s]/g, '').length;
  return glyphs * 0.52 + signs * 0.7 - small * 0.15;
}
