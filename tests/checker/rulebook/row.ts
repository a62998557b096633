import type { CheckSettings, Note } from '../../../shared/schemas/verdict.ts';

/** The number of the first step that fails, null where all hold, or that the outcome is undecided. */
export type Ruling = number | null | 'undecided';

export interface RowOptions {
  readonly assume?: readonly string[];
  readonly settings?: CheckSettings;
  readonly uses?: readonly (readonly number[] | null)[];
  /** A note that has to be on the last step, or on the first fault. */
  readonly note?: Note;
}

/** Rule, lines that are parted by two semicolons, ruling. */
export type Row = readonly [rule: string, lines: string, ruling: Ruling, options?: RowOptions];

/** TeX as it stands. */
export const tex = String.raw;

export function linesOf([, lines]: Row): string[] {
  return lines.split(';;').map((line) => line.trim());
}
