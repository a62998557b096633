import { expect, it } from 'vitest';
import { checkDerivation } from '../../../api/checker/rule-derivation.ts';

const evidenceOf = (...lines: string[]) => checkDerivation({ lines, assume: [], settings: {} }).steps[0]?.evidence;

it('completes the square anew for the mended line, and carries that to the end', () => {
  expect(
    evidenceOf('x^2-4x=2x+7', 'x^2-2x=7', '(x-1)^2=8', 'x-1=\\pm\\sqrt{8}', 'x=1\\pm\\sqrt{8}')?.mendedEnding,
  ).toEqual(['x^2-6x=7', '(x-3)^2=16', 'x-3=\\pm\\sqrt{16}', 'x=3\\pm\\sqrt{16}']);
  expect(evidenceOf('y^2+2y=7y+5', 'y^2+9y=5', '(y+\\frac{9}{2})^2=\\frac{101}{4}')?.mendedEnding?.[1]).toBe(
    '(y-\\frac{5}{2})^2=\\frac{45}{4}',
  );
});

it('names no slip of listing values below a line that lists none', () => {
  const evidence = evidenceOf('x^2+3x=5x+8', 'x^2+2x=8', '(x+1)^2=9', 'x+1=\\pm 3', 'x=2\\text{ or }x=-4');
  expect(evidence?.slip).toBeUndefined();
  expect(evidence?.mendedEnding).toEqual(['x^2-2x=8', '(x-1)^2=9', 'x-1=\\pm 3', 'x=-2\\text{ or }x=4']);
});
