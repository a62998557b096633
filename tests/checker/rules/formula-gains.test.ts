import { describe, expect, it } from 'vitest';
import { checkDerivation } from '../../../api/checker/rule-derivation.ts';

const r = String.raw;

function rulingOf(above: string, below: string): string | undefined {
  return checkDerivation({ lines: [above, below], assume: [], settings: {} }).steps[0]?.ruling;
}

// Found by the large set: the sign of C decides whether there is a value, and the values that there are never satisfy N=Ce^{kt}.
describe('a formula whose values are gained wherever it has one', () => {
  it.each([
    ['N=Ce^{kt}', r`t=\frac{\ln N-\ln(-C)}{k}`],
    ['N=Ce^{kt}', r`k=\frac{\ln(-N)-\ln C}{t}`],
  ])('%s to %s does not hold', (above, below) => {
    expect(rulingOf(above, below)).not.toBe('holds');
  });

  it.each([
    ['N=Ce^{kt}', r`t=\frac{\ln N-\ln C}{k}`],
    [r`T=2\pi\sqrt{\frac{h}{g}}`, r`h=\frac{gT^2}{4\pi^2}`],
  ])('%s to %s holds: gained for some letters only', (above, below) => {
    expect(rulingOf(above, below)).toBe('holds');
  });
});
