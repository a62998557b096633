import type { ReactNode } from 'react';
import type { ReadLine } from '../../shared/schemas/review.ts';
import type { EdgeLine, MendedLine } from '../ui/edge-line.tsx';
import type { StepState } from '../../shared/lib/step-words.ts';
import type { MarkedSpan, TermChoice } from '../ui/tex-pieces.ts';

/** What a page adds to a line of a derivation. */
export interface LineExtras {
  readonly state?: StepState;
  readonly control?: ReactNode;
  readonly bracket?: boolean | number;
  readonly isMuted?: boolean;
  readonly isCurrent?: boolean;
  readonly spans?: readonly MarkedSpan[];
  readonly terms?: TermChoice;
  readonly note?: ReactNode;
  readonly isEvidence?: boolean;
  readonly mended?: MendedLine;
}

/** Lines along the edge, with the words that stand between them and the lines they name as used. */
export function toEdgeLines(lines: readonly ReadLine[], extras: (line: ReadLine) => LineExtras): EdgeLine[] {
  return lines.flatMap((line) => {
    const words: EdgeLine[] =
      line.prose.trim() === '' ? [] : [{ id: `words-${line.number}`, isWords: true, content: line.prose }];
    return [...words, { id: `line-${line.number}`, tex: line.tex, reason: reasonOf(line), ...extras(line) }];
  });
}

function reasonOf({ reason, uses }: ReadLine): string | undefined {
  const from = uses && `from ${uses.length === 1 ? 'line' : 'lines'} ${uses.join(', ')}`;
  return [reason, from].filter(Boolean).join(' · ') || undefined;
}
