import { charge } from '../numbers/work.ts';
import type { UndecidedReason } from '../../../shared/schemas/verdict.ts';

/** Thrown where a statement cannot be solved with certainty; caught where a step begins, which is then undecided. */
export class Unsettled extends Error {
  readonly reason: UndecidedReason;

  constructor(reason: UndecidedReason) {
    // What is tried and given up thousands of times in a step is work as well.
    charge(16);
    super(`not settled: ${reason}`);
    this.name = 'Unsettled';
    this.reason = reason;
  }
}
