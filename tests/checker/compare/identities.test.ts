import { describe, expect, it } from 'vitest';
import { compareExpressions } from '../../../api/checker/compare/compare-expressions.ts';
import { bookIdentities } from './book-identities.ts';
import { handbookIdentities } from './handbook-identities.ts';
import { areClearlyApart, namesIn, roughEdits, smallEdits } from './near-misses.ts';
import { plainValue } from './plain-values.ts';
import { compare, contextOf, expression } from './reading.ts';

const most = 8;

/** Small edits of the right side that plain doubles show to be wrong. */
function falseEdits(left: string, right: string, whole: boolean) {
  const above = expression(left);
  const names = [...namesIn(above, namesIn(expression(right)))];
  const target = expression(right);
  const edits = [...roughEdits(target), ...smallEdits(target)].filter((edit) => areClearlyApart(above, edit, names, whole));
  return { above, names, edits: edits.filter((_, k) => k % Math.ceil(edits.length / most) === 0) };
}

describe('identities of textbooks', () => {
  it.each(bookIdentities)('$left is $right ($source)', ({ left, right }) => {
    expect(compare(left, right).kind).toBe('equal');
  });

  it.each(bookIdentities)('tells near misses of $left from $right', ({ left, right }) => {
    const { above, edits } = falseEdits(left, right, false);
    for (const edit of edits) expect(compareExpressions(above, edit, contextOf()).kind).toBe('different');
  });
});

describe('identities of handbooks', () => {
  it.each(handbookIdentities)('$left is $right ($source)', ({ left, right, whole, assume }) => {
    expect(compare(left, right, { whole, assume }).kind).toBe('equal');
    expect(compare(right, left, { whole, assume }).kind).toBe('equal');
  });

  it.each(handbookIdentities)('tells near misses of $left from $right', ({ left, right, whole, assume }) => {
    const { above, edits } = falseEdits(left, right, whole !== undefined);
    for (const edit of edits) {
      const kind = compareExpressions(above, edit, contextOf({ whole, assume })).kind;
      expect(['different', 'nothing-in-common']).toContain(kind);
    }
  });

  it('has at least three near misses for each pair', () => {
    const counts = handbookIdentities.map(({ left, right, whole }) => falseEdits(left, right, whole !== undefined).edits.length);
    expect(counts.filter((count) => count < 3).length).toBe(0);
  });
});

describe('a witness', () => {
  it('shows different values in plain doubles too', () => {
    for (const { left, right } of handbookIdentities.slice(0, 20)) {
      const { above, edits } = falseEdits(left, right, false);
      for (const edit of edits) {
        const comparison = compareExpressions(above, edit, contextOf());
        if (comparison.kind !== 'different') continue;
        const values = [...comparison.witness.at].map(([name, value]) =>
          [name, value.kind === 'rational' ? Number(value.value.num) / Number(value.value.den) : Number.NaN] as const);
        const at = Object.fromEntries(values);
        const [x, y] = [plainValue(above, at), plainValue(edit, at)];
        if (Number.isFinite(x) && Number.isFinite(y)) expect(Math.abs(x - y)).toBeGreaterThan(1e-12);
      }
    }
  });
});
