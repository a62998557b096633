import { describe, expect, it } from 'vitest';
import type { Expr } from '../../../shared/maths/expression.ts';
import type { Witness } from '../../../api/checker/compare/comparison.ts';
import { toNumber } from '../../../api/checker/numbers/rational.ts';
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
  const edits = [...roughEdits(target), ...smallEdits(target)].filter((edit) =>
    areClearlyApart(above, edit, names, whole),
  );
  return { above, names, edits: edits.filter((_, k) => k % Math.ceil(edits.length / most) === 0) };
}

describe('identities of textbooks', () => {
  it.each(bookIdentities)('$left is $right ($source)', ({ left, right }) => {
    expect(compare(left, right).kind).toBe('equal');
  });

  it.each(bookIdentities)('tells near misses of $left from $right', ({ left, right }) => {
    const { above, edits } = falseEdits(left, right, false);
    const kinds = edits.map((edit) => compareExpressions(above, edit, contextOf()).kind);
    expect(kinds.filter((kind) => kind !== 'different')).toEqual([]);
  });
});

describe('identities of handbooks', () => {
  it.each(handbookIdentities)('$left is $right ($source)', ({ left, right, whole, assume }) => {
    expect(compare(left, right, { whole, assume }).kind).toBe('equal');
    expect(compare(right, left, { whole, assume }).kind).toBe('equal');
  });

  it.each(handbookIdentities)('tells near misses of $left from $right', ({ left, right, whole, assume }) => {
    const { above, edits } = falseEdits(left, right, whole !== undefined);
    const kinds = edits.map((edit) => compareExpressions(above, edit, contextOf({ whole, assume })).kind);
    expect(kinds.filter((kind) => kind !== 'different' && kind !== 'nothing-in-common')).toEqual([]);
  });

  it('has at least three near misses for each pair', () => {
    const counts = handbookIdentities.map(
      ({ left, right, whole }) => falseEdits(left, right, whole !== undefined).edits.length,
    );
    expect(counts.filter((count) => count < 3).length).toBe(0);
  });
});

/** The two values at a witness in plain doubles; null where a letter's value is no fraction or a side has none. */
function plainPair(above: Expr, below: Expr, witness: Witness): readonly [number, number] | null {
  const at = Object.fromEntries(
    [...witness.at].map(([name, value]) => [name, value.kind === 'rational' ? toNumber(value.value) : Number.NaN]),
  );
  const [x, y] = [plainValue(above, at), plainValue(below, at)];
  return Number.isFinite(x) && Number.isFinite(y) ? [x, y] : null;
}

describe('a witness', () => {
  it('shows different values in plain doubles too', () => {
    const pairs = handbookIdentities.slice(0, 30).flatMap(({ left, right }) => {
      const { above, edits } = falseEdits(left, right, false);
      return edits.flatMap((edit) => {
        const comparison = compareExpressions(above, edit, contextOf());
        const pair = comparison.kind === 'different' ? plainPair(above, edit, comparison.witness) : null;
        return pair === null ? [] : [pair];
      });
    });
    expect(pairs.length).toBeGreaterThan(80);
    expect(pairs.filter(([x, y]) => Math.abs(x - y) < 1e-12)).toEqual([]);
  });
});
