import { describe, expect, it } from 'vitest';
import { operationsPerStep } from '../../../api/checker/context.ts';
import { allowed } from '../../../api/checker/evidence/add-evidence.ts';
import { createRandom } from '../../../api/checker/numbers/random.ts';
import { charge, within, workDone } from '../../../api/checker/numbers/work.ts';
import { checkDerivation, operationsPerLook } from '../../../api/checker/rule-derivation.ts';
import type { DerivationInput } from '../../../shared/schemas/verdict.ts';
import { hostileInput } from './hostile-inputs.ts';
import { inputOf } from './hostile-kinds.ts';

/** Each step with a second look, candidates and the goal; the first fault, and two more with a quarter each. */
function mostWork(steps: number): number {
  return steps * (operationsPerStep + operationsPerLook) + 2 * operationsPerLook + 1.5 * (allowed.fault + allowed.slip);
}

function workOf(input: DerivationInput): number {
  const before = workDone();
  checkDerivation(input);
  return workDone() - before;
}

/** Seeds whose inputs once took from 0.3 to 16 s a step. */
const onceSlow = [
  2000036, 2000481, 2000842, 2004923, 2005968, 2012935, 2040232, 2040602, 2040670, 2040895, 2041008, 2041013, 2041204,
  2041317, 2042018, 2042039, 2043102, 2044427,
];

describe('the work on a derivation', { timeout: 120_000 }, () => {
  it.each(onceSlow)('keeps its limit on the input of seed %i', (seed) => {
    const input = hostileInput(createRandom(seed));
    expect(workOf(input)).toBeLessThanOrEqual(mostWork(input.lines.length - 1));
  });

  it('keeps its limit on hostile inputs of all kinds, without a crash', () => {
    for (let seed = 9_000_001; seed < 9_000_301; seed += 1) {
      const input = inputOf(seed);
      expect(workOf(input), `seed ${seed}`).toBeLessThanOrEqual(mostWork(input.lines.length - 1));
    }
  });

  it('is refused before it is done, and nothing is begun after that', () => {
    const before = workDone();
    const begin = (): void => within(10, () => charge(1e12));
    expect(begin).toThrow('spent');
    expect(workDone() - before).toBe(10);
    expect(() => within(10, () => charge(10))).not.toThrow();
  });
});
