import type { DerivationInput, Verdict } from '../../shared/schemas/verdict.ts';
import { checkDerivation } from './rule-derivation.ts';
import { warmUp } from './warm-up.ts';

export interface CheckTask {
  readonly input: DerivationInput;
  /** Steps that ran out of time before and are left undecided now. */
  readonly timedOut: readonly number[];
  /** The number of the step at work, for the watch outside. */
  readonly progress: SharedArrayBuffer;
}

export interface CheckAnswer {
  readonly verdict: Verdict;
  /** Reading and ruling. */
  readonly ms: number;
  /** Finding what explains the faults. */
  readonly explainMs: number;
}

warmUp();

/** The task of the pool. */
export default function check({ input, timedOut, progress }: CheckTask): CheckAnswer {
  const at = new Int32Array(progress);
  Atomics.store(at, 0, 0);
  const started = performance.now();
  let ruled = Infinity;
  const verdict = checkDerivation(input, {
    timedOut,
    onStep: (step) => {
      Atomics.store(at, 0, step);
      // What explains the rulings counts as one step after the last.
      if (step === input.lines.length) ruled = performance.now();
    },
  });
  const ended = performance.now();
  ruled = Math.min(ruled, ended);
  return { verdict, ms: ruled - started, explainMs: ended - ruled };
}
