import type { DerivationInput, Verdict } from '../../shared/schemas/verdict.ts';
import { checkDerivation } from './rule-derivation.ts';

export interface CheckTask {
  readonly input: DerivationInput;
  /** Steps that ran out of time before and are left undecided now. */
  readonly timedOut: readonly number[];
  /** The number of the step at work, for the watch outside. */
  readonly progress: SharedArrayBuffer;
}

export interface CheckAnswer {
  readonly verdict: Verdict;
  readonly ms: number;
}

// The first derivations of a fresh worker are slow for want of compiled code: these are spent before any real one.
const warmUp: readonly (readonly string[])[] = [
  ['2(x+3)^2', '2x^2+12x+18', '\\sin^2 x+\\cos^2 x'],
  ['x^2-5x+6=0', '(x-2)(x-3)=0', 'x=2\\text{ or }x=3'],
  ['\\sqrt{x+6}=x', 'x+6=x^2', 'x=3'],
  ['3(x-2)-x', '3x-2-x', '2x-2'],
  ['\\sin 2x=1', 'x=\\frac{\\pi}{4}+k\\pi'],
  ['\\frac{x+9}{x+6}', '\\frac{3}{2}'],
];
for (const lines of warmUp) checkDerivation({ lines, assume: [], settings: {} });

/** The task of the pool. */
export default function check({ input, timedOut, progress }: CheckTask): CheckAnswer {
  const at = new Int32Array(progress);
  Atomics.store(at, 0, 0);
  const started = performance.now();
  const verdict = checkDerivation(input, {
    timedOut,
    onStep: (step) => {
      Atomics.store(at, 0, step);
    },
  });
  return { verdict, ms: performance.now() - started };
}
