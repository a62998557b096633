import type { SlipKind, SureWord } from '../../shared/schemas/finding.ts';
import type { ScoreOutcome } from '../../shared/schemas/review.ts';

export interface SlipKindWords {
  readonly label: string;
  /** A plain example, read as "… instead of …". */
  readonly example: string;
}

/** The kinds of slip in words; the same list stands at every derivation. */
export const SLIP_KIND_WORDS: Record<SlipKind, SlipKindWords> = {
  sign: { label: 'Wrong sign', example: '−3(x − 2) taken as −3x − 6' },
  brackets: { label: 'A bracket multiplied out wrongly', example: '4(x + 2) taken as 4x + 2' },
  'like-terms': { label: 'Unlike terms put together', example: '5x + 2 taken as 7x' },
  'powers-and-roots': { label: 'A power or a root', example: 'x³ · x² taken as x⁶' },
  fractions: { label: 'A fraction or a cancelling', example: '(x + 6)/6 taken as x' },
  'both-sides': { label: 'Not the same on both sides', example: 'x + 7 = 9 taken to x = 16' },
  solutions: { label: 'A solution lost or gained', example: 'x² = 3x taken to x = 3 alone' },
  functions: { label: 'A rule that the function does not have', example: 'sin 2x taken as 2 sin x' },
  calculus: { label: 'A rule of calculus', example: 'the derivative of x · eˣ taken as eˣ' },
  copying: { label: 'Miscopied or miscounted', example: '18 written down as 81, or 7 · 8 taken as 54' },
};

/** How sure a reviewer was, as authors read it. */
export const SURE_WORD_WORDS: Record<SureWord, string> = {
  'cannot-tell': 'Could not tell',
  'a-little': 'A little sure',
  half: 'Half sure',
  nearly: 'Nearly certain',
  certain: 'Certain',
};

/** What became of a finding, as its author and its reviewer read it. */
export const OUTCOME_WORDS: Record<ScoreOutcome, string> = {
  right: 'right',
  carried: 'a carried step, not the first',
  'not-first': 'not the first',
  missed: 'there is a fault',
  'false-alarm': 'there is no fault',
  'no-pick': 'no step named',
  void: 'void: it counts neither for nor against',
  'not-handed-in': 'nothing handed in',
  excused: 'excused',
};

/** The kind of slip in words, or null where none was named. */
export function slipKindLabel(kind: string | null): string | null {
  return kind && kind in SLIP_KIND_WORDS ? SLIP_KIND_WORDS[kind as SlipKind].label : null;
}

/** `first`, `second`, … as far as a desk holds; figures after that. */
export function ordinal(position: number): string {
  return ['first', 'second', 'third', 'fourth', 'fifth', 'sixth'][position - 1] ?? `${position}th`;
}

/** `one`, `two`, … up to twelve; figures after that. */
export function countWord(count: number): string {
  const words = 'no one two three four five six seven eight nine ten eleven twelve'.split(' ');
  return words[count] ?? String(count);
}
