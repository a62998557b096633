import { describe, expect, it } from 'vitest';
import { markSpans, splitRelation, widthEm } from '../../../app/ui/tex-pieces.ts';

describe('marking stretches of TeX', () => {
  it('keeps the space of a sign that begins the stretch', () => {
    expect(markSpans('2x+8-3', [{ start: 2, end: 4, as: 'wrong' }])).toBe('2x\\htmlClass{wrong}{{}+8}-3');
  });

  it('keeps an exponent an exponent', () => {
    expect(markSpans('x^2', [{ start: 2, end: 3, as: 'wrong' }])).toBe('x^{\\htmlClass{wrong}{2}}');
  });

  it('marks several stretches without moving their places', () => {
    const marked = markSpans('a+b+c', [
      { start: 0, end: 1, as: 'wrong' },
      { start: 4, end: 5, as: 'right' },
    ]);
    expect(marked).toBe('\\htmlClass{wrong}{a}+b+\\htmlClass{right}{c}');
  });

  it('leaves a stretch unmarked that cuts through a group, or overlaps another', () => {
    expect(markSpans('\\frac{a}{b}', [{ start: 6, end: 9, as: 'wrong' }])).toBe('\\frac{a}{b}');
    const both = markSpans('abc', [
      { start: 0, end: 2, as: 'wrong' },
      { start: 1, end: 3, as: 'right' },
    ]);
    expect(both).toBe('a\\htmlClass{right}{bc}');
  });
});

describe('splitting at the relation sign', () => {
  it('splits an equation and an inequality', () => {
    expect(splitRelation('2x+1=7')).toEqual({ lhs: '2x+1', rhs: '=7' });
    expect(splitRelation('x \\le 3')).toEqual({ lhs: 'x', rhs: '\\le 3' });
  });

  it('puts a line that goes on with the sign under the signs above it', () => {
    expect(splitRelation('=3a')).toEqual({ lhs: '', rhs: '=3a' });
  });

  it('passes over signs inside of groups and names that begin like a relation', () => {
    expect(splitRelation('\\sum_{j=0}^{2} j')).toBeNull();
    expect(splitRelation('\\left(a\\right)^2 = 4')).toEqual({ lhs: '\\left(a\\right)^2', rhs: '= 4' });
  });

  it('leaves expressions and several statements whole', () => {
    expect(splitRelation('x^2-1')).toBeNull();
    expect(splitRelation('x=1 \\lor x=2')).toBeNull();
    expect(splitRelation('x=1, y=2')).toBeNull();
    expect(splitRelation('x=1{,}5')).toEqual({ lhs: 'x', rhs: '=1{,}5' });
  });
});

it('measures a fraction by its wider part', () => {
  expect(widthEm('\\frac{a+b+c}{2}')).toBeCloseTo(widthEm('a+b+c'), 5);
  expect(widthEm('x')).toBeLessThan(widthEm('x+y'));
});
