import { describe, expect, it } from 'vitest';
import { createRandom } from '../../../api/checker/numbers/random.ts';
import { checkDerivation } from '../../../api/checker/rule-derivation.ts';
import { hostileInput } from './hostile-inputs.ts';

describe('hostile inputs (fuzz.ts runs as many as wanted)', { timeout: 120_000 }, () => {
  it('are each answered with a ruling for every step', () => {
    for (let seed = 1; seed <= 400; seed += 1) {
      const input = hostileInput(createRandom(seed));
      const verdict = checkDerivation(input);
      expect(verdict.steps.map(({ step }) => step)).toEqual(input.lines.slice(1).map((_, k) => k + 1));
      expect(verdict.firstFault === null).toBe(verdict.outcome !== 'faulty');
    }
  });

  it('get the same answer every time', () => {
    for (let seed = 500; seed <= 540; seed += 1) {
      const input = hostileInput(createRandom(seed));
      expect(checkDerivation(input)).toEqual(checkDerivation(input));
    }
  });
});
