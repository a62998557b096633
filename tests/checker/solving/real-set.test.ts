import { describe, expect, it } from 'vitest';
import { rational } from '../../../api/checker/numbers/rational.ts';
import { nameSet } from '../../../api/checker/solving/naming.ts';
import { rationalNumber, type RealNumber } from '../../../api/checker/solving/real-number.ts';
import {
  complement,
  difference,
  intersection,
  isEmptySet,
  setOfPoints,
  union,
  type RealSet,
} from '../../../api/checker/solving/real-set.ts';

const at = (value: number): RealNumber => rationalNumber(rational(value));
const above = (value: number, closed: boolean): RealSet => ({
  points: [at(value)],
  at: [closed],
  between: [false, true],
  reached: 'proved',
});

describe('sets of real numbers', () => {
  it('are written as intervals and points', () => {
    expect(nameSet(intersection(above(1, false), complement(above(4, true))))).toBe('\\left(1,4\\right)');
    expect(nameSet(union(setOfPoints([at(0)]), above(2, true)))).toBe(
      '\\left\\{0\\right\\}\\cup \\left[2,\\infty\\right)',
    );
    expect(nameSet(difference(above(1, true), setOfPoints([at(3)])))).toBe(
      '\\left[1,3\\right)\\cup \\left(3,\\infty\\right)',
    );
    expect(nameSet(complement(setOfPoints([])))).toBe('\\mathbb{R}');
  });

  it('tell strict from not strict', () => {
    const gap = difference(above(3, true), above(3, false));
    expect(isEmptySet(gap)).toBe(false);
    expect(nameSet(gap)).toBe('\\left\\{3\\right\\}');
  });
});
