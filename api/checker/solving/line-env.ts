import type { CheckContext } from '../context.ts';
import type { Assignment } from './fraction.ts';
import type { RealNumber } from './real-number.ts';

/** A stretch of the line outside of which nothing is claimed. */
export interface Window {
  readonly low: number;
  readonly high: number;
  /** Nothing outside of it is asked about, so that it counts for functions that do not repeat themselves too. */
  readonly isAll: boolean;
}

/** What a statement about one letter is solved with. */
export interface LineEnv {
  readonly letter: string;
  /** Values of the other letters. */
  readonly given: Assignment;
  readonly context: CheckContext;
  readonly window: Window | null;
  /** Numbers at which zeros are looked for first: the points of the other line. */
  readonly hints: readonly RealNumber[];
}
