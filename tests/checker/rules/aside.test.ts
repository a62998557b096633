import { describe, expect, it } from 'vitest';
import { checkDerivation } from '../../../api/checker/rule-derivation.ts';

function rulings(lines: readonly string[]) {
  return checkDerivation({ lines, assume: [], settings: {} }).steps.map(({ ruling }) => ruling);
}

/** Lines about letters of their own, in the manner of school books (common practice). */
describe('a line aside from the equation', () => {
  it.each([
    ['the discriminant, worked out', ['x^2-6x-7=0', 'D=36+28=64', 'x=\\frac{6\\pm 8}{2}'], ['holds', 'holds']],
    [
      'the discriminant in a, b and c',
      ['2x^2-4x-4=0', 'b^2-4ac=16+32=48', 'x=\\frac{4\\pm\\sqrt{48}}{4}'],
      ['holds', 'holds'],
    ],
    ['a helper value', ['2x+6=14', 'm=14-6=8', '2x=8'], ['holds', 'holds']],
    ['an arithmetic slip within it', ['x^2-6x-7=0', 'D=36+28=54', 'x=7\\text{ or }x=-1'], ['fails', 'holds']],
    [
      'a discriminant that is not the equation’s',
      ['x^2-6x-7=0', 'D=36-28=8', 'x=7\\text{ or }x=-1'],
      ['undecided', 'holds'],
    ],
    ['a formula in unknown letters', ['3x=6', 'p+q=9', 'x=2'], ['undecided', 'holds']],
  ])('%s', (_name, lines, expected) => {
    expect(rulings(lines)).toEqual(expected);
  });

  it('is not what a miscopied letter is read as', () => {
    expect(rulings(['2x=10', 'y=5'])).not.toContain('holds');
  });
});
