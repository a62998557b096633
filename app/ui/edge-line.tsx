import type { CSSProperties, ReactNode } from 'react';
import { classNames } from './class-names.ts';
import { EdgeColumn, MendColumn } from './edge-pieces.tsx';
import type { StepState } from '../../shared/lib/step-words.ts';
import type { EdgeRow } from './edge-strokes.ts';
import { SPOKEN_STATES, STEP_WORDS } from './edge-strokes.ts';
import { markedOrPlain, Maths } from './maths.tsx';
import type { MarkedSpan, Sides, TermChoice } from './tex-pieces.ts';
import { splitRelation, termSpans, widthEm } from './tex-pieces.ts';

/** The same place in the derivation, mended. */
export interface MendedLine {
  readonly tex: string;
  readonly spans?: readonly MarkedSpan[];
}

/** One row along the edge. */
export interface EdgeLine {
  readonly id: string;
  /** What is written; left out where `content` stands in its place. */
  readonly tex?: string;
  /** Stretches of `tex` to be marked. */
  readonly spans?: readonly MarkedSpan[];
  /** Terms of `tex` that can be picked with the pointer. */
  readonly terms?: TermChoice;
  /** An editor, choices, words: anything in place of set maths. */
  readonly content?: ReactNode;
  /** Words between two lines: no tick, no number, no step. */
  readonly isWords?: boolean;
  /** Stands instead of the number; by default lines count from `given`. */
  readonly label?: ReactNode;
  /** Before the number, such as `not read`. */
  readonly beforeLabel?: ReactNode;
  /** The state of the step that leads to this line; none for the given one. */
  readonly state?: StepState;
  /** Instead of the state's own words, such as `step 3 fails`; null for none. */
  readonly words?: string | null;
  /** Instead of what a screen reader would say of the step. */
  readonly spoken?: string;
  /** The author's few words beside the line, or a field for them. */
  readonly reason?: ReactNode;
  /** A note in the margin, as tall as it likes. */
  readonly note?: ReactNode;
  /** Hangs the note level with the step, under a hairline in the colour of the fault. */
  readonly isEvidence?: boolean;
  /** Under the line, in its column. */
  readonly under?: ReactNode;
  readonly isMuted?: boolean;
  readonly isCurrent?: boolean;
  /** Encloses the step between this line and the one above; a number from 0 to 1 fills its stroke. */
  readonly bracket?: boolean | number;
  readonly mended?: MendedLine;
  /** Stands over the gutter and the edge of this step, such as a radio button. */
  readonly control?: ReactNode;
}

/** Widths from which the sides of an equation no longer stand in two columns: on phones, on tablets and in reviews, anywhere. */
const UNSPLIT_FROM_EM = { phone: 14.5, tablet: 18, anywhere: 27 } as const;

function widthClass(tex: string): string | undefined {
  const width = widthEm(tex);
  if (width > UNSPLIT_FROM_EM.anywhere) return 'unsplit';
  if (width > UNSPLIT_FROM_EM.tablet) return 'unsplit-tablet';
  return width > UNSPLIT_FROM_EM.phone ? 'unsplit-phone' : undefined;
}

/** Maths in its columns: the sides of an equation left and right of the sign, an expression across both. */
export function LineMaths({ tex, spans, terms }: { tex: string; spans?: readonly MarkedSpan[]; terms?: TermChoice }) {
  const marked = markedOrPlain(tex, terms ? termSpans(terms) : spans);
  const sides = splitRelation(marked);
  const onTerm = terms?.onPick;
  if (!sides) return <Maths tex={marked} display className="mx" onTerm={onTerm} />;
  return (
    <span className={classNames('mx-pair', widthClass(tex))}>
      {sides.lhs ? <Maths tex={sides.lhs} display className="mx l" onTerm={onTerm} /> : null}
      <Maths tex={`{}${sides.rhs}`} display className="mx r" onTerm={onTerm} />
    </span>
  );
}

function Mend({ line, place }: { line: MendedLine; place: MendPlace }) {
  const isWorded = place.isFirst || place.isLast;
  return (
    <div className={classNames('mend', place.isFirst && 'mend-first', !isWorded && 'mend-mid')}>
      <MendColumn isFirst={place.isFirst} isLast={place.isLast} />
      {isWorded ? (
        <span className="ml">{place.isFirst ? 'mended' : 'mended ending'}</span>
      ) : (
        <span className="sr-only">mended</span>
      )}
      <MendMaths line={line} />
    </div>
  );
}

function MendMaths({ line }: { line: MendedLine }) {
  const sides: Sides | null = splitRelation(markedOrPlain(line.tex, line.spans));
  if (!sides) return <Maths tex={line.tex} spans={line.spans} display className="mm" />;
  return (
    <span className="mm-pair">
      <Maths tex={sides.lhs || '{}'} display className="mm l" />
      <Maths tex={`{}${sides.rhs}`} display className="mm r" />
    </span>
  );
}

/** Where a mended line stands in its branch. */
export interface MendPlace {
  readonly isFirst: boolean;
  readonly isLast: boolean;
}

export interface EdgeLineRowProps {
  readonly line: EdgeLine;
  readonly row: EdgeRow;
  /** 0 for the given line. */
  readonly number: number;
  readonly isFirst: boolean;
  readonly mend: MendPlace | null;
  readonly style?: CSSProperties;
}

function spokenFor(line: EdgeLine, number: number): string | null {
  if (line.spoken !== undefined) return line.spoken || null;
  if (line.bracket) return null;
  const state = line.state ? SPOKEN_STATES[line.state] : '';
  return state ? `step ${number}: ${line.words ?? state}` : null;
}

function wordsFor(line: EdgeLine, number: number): string | null {
  if (line.words !== undefined) return line.words;
  if (line.bracket) return `step ${number}`;
  return line.state ? STEP_WORDS[line.state] : null;
}

function Label({ line, number }: { line: EdgeLine; number: number }) {
  const isGiven = number === 0 && line.label === undefined;
  return (
    <span className={classNames('no', isGiven && 'given')}>
      {line.beforeLabel ? <span className="nr">{line.beforeLabel}</span> : null}
      {isGiven ? null : <span className="sr-only">line </span>}
      {isGiven ? 'given' : (line.label ?? number)}
    </span>
  );
}

/** One item of the list: its part of the edge, what is written, and what stands beside it. */
export function EdgeLineRow({ line, row, number, isFirst, mend, style }: EdgeLineRowProps) {
  const words = line.isWords ? null : wordsFor(line, number);
  const spoken = line.isWords ? null : spokenFor(line, number);
  const isOpen = row.step?.knot != null || Boolean(line.bracket);
  const className = classNames(
    'ln',
    isFirst && row.step === null && 'first',
    isOpen && 'open',
    line.state && `is-${line.state}`,
    line.bracket ? 'is-bracket' : null,
    line.isMuted && 'dim',
  );
  return (
    <li className={className} style={style} aria-current={line.isCurrent ? 'step' : undefined}>
      {line.isWords ? null : <Label line={line} number={number} />}
      {words ? (
        <span className="lab" aria-hidden={spoken ? 'true' : undefined}>
          {words}
        </span>
      ) : null}
      {spoken ? <span className="sr-only">{spoken}</span> : null}
      <EdgeColumn row={row} />
      {line.control}
      {line.content !== undefined ? <div className={line.isWords ? 'wordsln' : 'mx own'}>{line.content}</div> : null}
      {line.content === undefined && line.tex !== undefined ? (
        <LineMaths tex={line.tex} spans={line.spans} terms={line.terms} />
      ) : null}
      {line.under ? <div className="under">{line.under}</div> : null}
      {mend?.isFirst ? <i className="branch" aria-hidden="true" /> : null}
      {mend && line.mended ? <Mend line={line.mended} place={mend} /> : null}
      {line.reason ? <div className="reason">{line.reason}</div> : null}
      {line.note ? <div className={classNames('note', line.isEvidence && 'evb')}>{line.note}</div> : null}
      {line.bracket ? <i className="leader" aria-hidden="true" /> : null}
    </li>
  );
}
