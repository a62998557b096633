import type { CheckAnswer, CheckTask } from '../../../api/checker/check.worker.ts';
import { checkDerivation } from '../../../api/checker/rule-derivation.ts';

/** A worker that never gets past step 2 unless it is told to leave that step out. */
export default function check({ input, timedOut, progress }: CheckTask): CheckAnswer {
  const at = new Int32Array(progress);
  Atomics.store(at, 0, 0);
  const verdict = checkDerivation(input, {
    timedOut,
    onStep: (step) => {
      Atomics.store(at, 0, step);
      while (step === 2 && !timedOut.includes(2));
    },
  });
  return { verdict, ms: 1, explainMs: 0 };
}
