import { expect, test } from 'vitest';
import { checkDerivation } from '../../../api/checker/rule-derivation.ts';

function rule(lines: readonly string[], settings = {}): string {
  const [step] = checkDerivation({ lines, assume: [], settings }).steps;
  return step?.ruling ?? 'none';
}

// The parts of a+bi and the angle of e^{it} are real, r in r e^{it} is not negative: common practice, values from memory.
test.each([
  ['|a+bi|', '\\sqrt{a^2+b^2}', 'holds'],
  ['|x+yi|^2', 'x^2+y^2', 'holds'],
  ['|a+bi|', 'a+b', 'fails'],
  ['|a+bi|', '\\sqrt{a^2-b^2}', 'fails'],
  ['|e^{i\\theta}|', '1', 'holds'],
  ['|re^{it}|', 'r', 'holds'],
  ['\\overline{a+bi}', 'a-bi', 'holds'],
  ['\\overline{a+bi}', 'a+bi', 'fails'],
  ['\\operatorname{Re}(a+bi)', 'a', 'holds'],
  ['\\operatorname{Im}(e^{i\\theta})', '\\sin\\theta', 'holds'],
  ['\\operatorname{Im}(e^{i\\theta})', '\\cos\\theta', 'fails'],
])('%s to %s %s', (above, below, ruling) => {
  expect(rule([above, below])).toBe(ruling);
});

// z stands for a complex number: https://dlmf.nist.gov/1.9 (from memory).
test.each([
  ['z\\bar{z}', '|z|^2', 'holds'],
  ['\\operatorname{Re}(z)', '\\frac{z+\\bar{z}}{2}', 'holds'],
  ['z+\\bar{z}', '2z', 'fails'],
])('a conjugate of z makes the numbers complex: %s to %s %s', (above, below, ruling) => {
  expect(rule([above, below])).toBe(ruling);
});

test('z is not real because other letters are', () => {
  expect(rule(['z+|a+bi|', '\\bar{z}+|a+bi|'])).toBe('fails');
  expect(rule(['|z|^2', 'z^2'], { numbers: 'complex' })).toBe('fails');
});
