import { expect, test } from 'vitest';
import { checkDerivation } from '../../../api/checker/rule-derivation.ts';

// Common practice, from memory: a kept value is named by what shuts it out, not by a rule that fits by chance.
test.each([
  [['\\sqrt{2x+3}=x', '2x+3=x^2', 'x=3\\text{ or }x=-1'], 'a-root-that-squaring-brought-in-was-kept'],
  [['\\sqrt{x+2}=x', 'x+2=x^2', 'x=2\\text{ or }x=-1'], 'a-root-that-squaring-brought-in-was-kept'],
  [
    ['\\log_2 x+\\log_2(x-2)=3', 'x(x-2)=8', 'x=4\\text{ or }x=-2'],
    'a-root-outside-the-domain-of-a-logarithm-was-kept',
  ],
  [
    ['\\frac{x^2}{x-1}=\\frac{1}{x-1}', 'x^2=1', 'x=1\\text{ or }x=-1'],
    'a-root-at-which-a-denominator-is-zero-was-kept',
  ],
])('%j keeps a value: %s', (lines, slip) => {
  const { steps } = checkDerivation({ lines, assume: [], settings: {} });
  expect(steps[1]?.notes).toContain('not-rejected');
  expect(steps[1]?.evidence.slip?.id).toBe(slip);
});

test.each([
  [['(x-3)^2-(x+1)(x-1)', 'x^2-6x+9-x^2-1']],
  [['7-(a+b)(a-b)', '7-a^2-b^2']],
  [['10-(y-2)^2', '10-y^2-4y+4']],
])('%j: the minus reached only the first term of a product', (lines) => {
  const [step] = checkDerivation({ lines, assume: [], settings: {} }).steps;
  expect(step?.evidence.slip?.id).toBe('the-minus-in-front-of-a-bracket-reached-only-its-first-term');
});
