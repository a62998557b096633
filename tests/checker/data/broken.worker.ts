import type { CheckAnswer, CheckTask } from '../../../api/checker/check.worker.ts';
import { checkDerivation } from '../../../api/checker/rule-derivation.ts';

/** A worker with an error of its own at step 2. */
export default function check({ input, timedOut, progress }: CheckTask): CheckAnswer {
  const at = new Int32Array(progress);
  const verdict = checkDerivation(input, {
    timedOut,
    onStep: (step) => {
      Atomics.store(at, 0, step);
      if (step === 2 && !timedOut.includes(2)) throw new TypeError('broken on purpose');
    },
  });
  return { verdict, ms: 1, explainMs: 0 };
}
