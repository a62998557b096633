import type { CSSProperties, ReactNode } from 'react';
import { Fragment } from 'react';
import { classNames } from './class-names.ts';
import type { EdgeLine, MendPlace } from './edge-line.tsx';
import { EdgeLineRow } from './edge-line.tsx';
import { strokesOf } from './edge-strokes.ts';
import { widthEm } from './tex-pieces.ts';

export interface DerivationProps {
  readonly lines: readonly EdgeLine[];
  /** Names the list for screen readers. */
  readonly label?: string;
  /** Opens the notch once, when a verdict is shown for the first time. */
  readonly reveal?: boolean;
  /**
   * plain: reasons and notes in the page's margin. review: the margin holds `aside`, on a leader from the bracket.
   * ruling: two lines, large. narrow: no margin at all.
   */
  readonly layout?: 'plain' | 'review' | 'ruling' | 'narrow';
  /** In the review layout: what hangs in the margin, folded under the bracketed line on a phone. */
  readonly aside?: ReactNode;
  /** In the review layout: below the last line. */
  readonly foot?: ReactNode;
  /** The number of the first line, 0 (given) unless an excerpt begins later. */
  readonly from?: number;
  /** The edge runs on below the last line. */
  readonly continues?: boolean;
  readonly className?: string;
}

/** Two columns of lines beside each other must fit in about this much. */
const BESIDE_EM = 25;

function mendPlaces(lines: readonly EdgeLine[]): readonly (MendPlace | null)[] {
  const mended = lines.flatMap((line, index) => (line.mended ? [index] : []));
  return lines.map((_, index) =>
    mended.includes(index) ? { isFirst: index === mended[0], isLast: index === mended.at(-1) } : null,
  );
}

function isMendNarrow(lines: readonly EdgeLine[]): boolean {
  const widest = (texts: readonly (string | undefined)[]) => Math.max(0, ...texts.map((tex) => widthEm(tex ?? '')));
  return widest(lines.map((line) => line.tex)) + widest(lines.map((line) => line.mended?.tex)) <= BESIDE_EM;
}

function numbersOf(lines: readonly EdgeLine[], from: number): readonly number[] {
  let next = from;
  return lines.map((line) => {
    if (line.isWords) return -1;
    next += 1;
    return next - 1;
  });
}

/** How many lines below have nothing in the margin, so that a tall note may reach down beside them. */
function freeBelow(lines: readonly EdgeLine[], index: number): number {
  if (!lines[index]?.note) return 0;
  const next = lines.slice(index + 1).findIndex((line) => line.note || line.reason);
  return next < 0 ? lines.length - 1 - index : next;
}

function rowStyle(lines: readonly EdgeLine[], index: number, isReview: boolean): CSSProperties | undefined {
  if (isReview) return { '--i': index + 1 } as CSSProperties;
  const free = freeBelow(lines, index);
  return free > 0 ? ({ '--free': free } as CSSProperties) : undefined;
}

function layoutClass(lines: readonly EdgeLine[], layout: DerivationProps['layout']): string | false {
  if (layout === 'review') return 'rev';
  if (layout === 'ruling') return 'two-l';
  if (layout === 'narrow') return 'no-margin';
  if (!lines.some((line) => line.mended)) return false;
  return isMendNarrow(lines) ? 'has-mend' : 'mend-under';
}

/** The edge: a derivation as an ordered list, its lines at the ticks of one stroke that says how each step fares. */
export function Derivation(props: DerivationProps) {
  const { lines, label, reveal, layout = 'plain', aside, foot, from = 0, continues, className } = props;
  const rows = strokesOf(
    lines.map((line) => ({ state: line.state ?? null, isBracketed: Boolean(line.bracket), isLine: !line.isWords })),
    continues,
  );
  const numbers = numbersOf(lines, from);
  const places = mendPlaces(lines);
  const isReview = layout === 'review';
  const bracketed = lines.findIndex((line) => line.bracket);
  const foldAfter = bracketed < 0 ? lines.length - 1 : bracketed;
  return (
    <ol
      className={classNames('deriv', layoutClass(lines, layout), reveal && 'reveal', className)}
      aria-label={label}
      style={styleOf(lines, isReview)}
    >
      {lines.map((line, index) => {
        const row = rows[index];
        if (!row) return null;
        return (
          <Fragment key={line.id}>
            <EdgeLineRow
              line={line}
              row={row}
              number={numbers[index] ?? 0}
              isFirst={index === 0}
              mend={places[index] ?? null}
              style={rowStyle(lines, index, isReview)}
            />
            {isReview && aside && index === foldAfter ? <Fold runsOn={index < lines.length - 1}>{aside}</Fold> : null}
          </Fragment>
        );
      })}
      {isReview && foot ? <li className="rev-foot">{foot}</li> : null}
    </ol>
  );
}

/** Custom properties that the stylesheet lays the list out by. */
function styleOf(lines: readonly EdgeLine[], isReview: boolean): CSSProperties | undefined {
  const fill = lines.find((line) => typeof line.bracket === 'number')?.bracket;
  const style: Record<string, string | number> = {};
  if (isReview) style['--n'] = lines.length;
  if (typeof fill === 'number') style['--bracket'] = `${(2 + 3 * fill).toFixed(2)}px`;
  return Object.keys(style).length > 0 ? style : undefined;
}

function Fold({ children, runsOn }: { children: ReactNode; runsOn: boolean }) {
  return (
    <li className="ln fold">
      {runsOn ? (
        <span className="e e-fold" aria-hidden="true">
          <svg className="sg s-plain">
            <line x1="24" x2="24" y1="0" y2="100%" />
          </svg>
        </span>
      ) : null}
      <div className="fold-in">{children}</div>
    </li>
  );
}
