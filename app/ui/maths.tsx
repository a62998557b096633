import './maths.css';
import type { TrustContext } from 'katex';
import katex from 'katex';
import type { MouseEvent } from 'react';
import { useMemo } from 'react';
import { classNames } from './class-names.ts';
import type { MarkedSpan } from './tex-pieces.ts';
import { markSpans } from './tex-pieces.ts';

const OUR_CLASSES = new Set(['wrong', 'right', 'marked', 'bad', 'caret', 'slot']);
const TERM = /^term term-(\d+)(?: marked)?$/;
const KEPT = 500;
const rendered = new Map<string, string | null>();

/** People's own TeX may not reach past its formula: no links, pictures, styles or ids, and only the classes drawn here. */
function trust(context: TrustContext): boolean {
  return context.command === '\\htmlClass' && (OUR_CLASSES.has(context.class) || TERM.test(context.class));
}

function render(tex: string, isDisplay: boolean): string | null {
  const key = (isDisplay ? 'd ' : 'i ') + tex;
  const known = rendered.get(key);
  if (known !== undefined) return known;
  let html: string | null;
  try {
    html = katex.renderToString(isDisplay ? `\\displaystyle ${tex}` : tex, {
      output: 'htmlAndMathml',
      strict: false,
      trust,
      throwOnError: true,
      maxSize: 20,
      maxExpand: 500,
    });
  } catch {
    html = null;
  }
  if (rendered.size >= KEPT) rendered.clear();
  rendered.set(key, html);
  return html;
}

/** The TeX with its marks, or as it was where marks would keep it from being set. */
export function markedOrPlain(tex: string, spans: Parameters<typeof markSpans>[1]): string {
  if (!spans || spans.length === 0) return tex;
  const marked = markSpans(tex, spans);
  return render(marked, true) === null ? tex : marked;
}

export interface MathsProps {
  readonly tex: string;
  /** Fractions and sums at their full height, still standing in the line. */
  readonly display?: boolean;
  readonly spans?: readonly MarkedSpan[];
  /** inline: as the words around it. line: a line of its own. lead, ruling: larger ones. */
  readonly size?: 'inline' | 'line' | 'lead' | 'ruling';
  readonly className?: string;
  /** A term was clicked: set with `termSpans`, told by its index. */
  readonly onTerm?: (index: number) => void;
}

const SIZES = {
  inline: undefined,
  line: 'maths-block',
  lead: 'maths-block maths-lead',
  ruling: 'maths-block maths-ruling',
} as const;

/** Typeset maths with MathML for screen readers. TeX that cannot be set is shown as it is, in heavy ink. */
export function Maths({ tex, display, spans, size = 'inline', className, onTerm }: MathsProps) {
  const isDisplay = display ?? size !== 'inline';
  const html = useMemo(() => render(markedOrPlain(tex, spans), isDisplay), [tex, spans, isDisplay]);
  const look = classNames(SIZES[size], className) || undefined;
  if (html === null) {
    return (
      <span className={look}>
        <code className="maths-raw">{tex}</code>
      </span>
    );
  }
  if (onTerm) return <PickableMaths html={html} className={look} onTerm={onTerm} />;
  return <span className={look} dangerouslySetInnerHTML={{ __html: html }} />;
}

/** Terms answer to the pointer; by keyboard they are chosen from the step they belong to. */
function PickableMaths({
  html,
  className,
  onTerm,
}: {
  html: string;
  className?: string;
  onTerm: (index: number) => void;
}) {
  const onClick = (event: MouseEvent<HTMLSpanElement>) => {
    const term = event.target instanceof Element ? event.target.closest('.term') : null;
    const index = term && /term-(\d+)/.exec(term.className)?.[1];
    if (index) onTerm(Number(index));
  };
  return (
    <span
      className={classNames(className, 'pickable')}
      role="presentation"
      onClick={onClick}
      dangerouslySetInnerHTML={{ __html: html }}
    />
  );
}
