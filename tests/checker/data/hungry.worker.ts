import type { CheckAnswer, CheckTask } from '../../../api/checker/check.worker.ts';
import { checkDerivation } from '../../../api/checker/rule-derivation.ts';

/** A worker whose step 2 takes more and more memory unless it is told to leave that step out. */
export default function check({ input, timedOut, progress }: CheckTask): CheckAnswer {
  const at = new Int32Array(progress);
  Atomics.store(at, 0, 0);
  const kept: number[][] = [];
  const verdict = checkDerivation(input, {
    timedOut,
    onStep: (step) => {
      Atomics.store(at, 0, step);
      while (step === 2 && input.lines.length > 3 && !timedOut.includes(2)) {
        kept.push(Array.from({ length: 50_000 }, (_, k) => k + 0.5));
      }
    },
  });
  return { verdict, ms: 1, explainMs: 0 };
}
