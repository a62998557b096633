import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { rational } from '../../../api/checker/numbers/rational.ts';
import {
  multiplyPolynomials,
  signAt,
  squareFreePart,
  type Polynomial,
} from '../../../api/checker/solving/polynomial.ts';
import { approximate, compareNumbers, realRoots } from '../../../api/checker/solving/real-number.ts';
import { nameNumber } from '../../../api/checker/solving/naming.ts';

const small = fc.bigInt({ min: -40n, max: 40n });

describe('isolating real roots', () => {
  it('finds every fraction that was put in, exactly and in order', () => {
    fc.assert(
      fc.property(
        fc.uniqueArray(small, { minLength: 1, maxLength: 6 }),
        fc.bigInt({ min: 1n, max: 9n }),
        (tops, bottom) => {
          const product = tops.reduce<Polynomial>((p, top) => multiplyPolynomials(p, [-top, bottom]), [1n]);
          const expected = [...tops].sort((a, b) => (a < b ? -1 : 1)).map((top) => rational(top, bottom));
          const found = realRoots(squareFreePart(product));
          expect(found.map((root) => (root.kind === 'rational' ? root.value : null))).toEqual(expected);
        },
      ),
    );
  });

  it('brackets each irrational root by a change of sign', () => {
    fc.assert(
      fc.property(fc.array(small, { minLength: 3, maxLength: 8 }), (coefficients) => {
        const p = squareFreePart([...coefficients, 1n]);
        const roots = realRoots(p);
        for (const root of roots) {
          if (root.kind !== 'algebraic') continue;
          expect(signAt(p, root.interval.low) * signAt(p, root.interval.high)).toBe(-1);
        }
        for (let k = 1; k < roots.length; k += 1) {
          expect(compareNumbers(roots[k - 1] as (typeof roots)[0], roots[k] as (typeof roots)[0]).order).toBe(-1);
        }
      }),
    );
  });

  it('knows one number by two polynomials', () => {
    const [, a] = realRoots([-2n, 0n, 1n]);
    const b = realRoots(multiplyPolynomials([-2n, 0n, 1n], [-7n, 3n])).find(
      (root) => Math.abs(approximate(root) - Math.SQRT2) < 1e-9,
    );
    expect(a && b && compareNumbers(a, b)).toEqual({ order: 0, certain: true });
  });

  it('names quadratic roots as surds', () => {
    const names = realRoots([-1n, -1n, 1n]).map((root) => nameNumber(root));
    expect(names).toEqual(['\\frac{1-\\sqrt{5}}{2}', '\\frac{1+\\sqrt{5}}{2}']);
    expect(realRoots(multiplyPolynomials([-3n, 0n, 1n], [-5n, 1n])).map((root) => nameNumber(root))).toEqual([
      '-\\sqrt{3}',
      '\\sqrt{3}',
      '5',
    ]);
  });
});
