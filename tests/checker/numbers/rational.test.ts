import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import * as Q from '../../../api/checker/numbers/rational.ts';

const fraction = fc
  .tuple(fc.bigInt(-(10n ** 12n), 10n ** 12n), fc.bigInt(1n, 10n ** 9n))
  .map(([num, den]) => Q.rational(num, den));

describe('fractions', () => {
  it('keep lowest terms and a positive denominator', () => {
    expect(Q.rational(6, -4)).toEqual({ num: -3n, den: 2n });
    expect(Q.rational(0, 5)).toEqual(Q.zero);
    expect(() => Q.rational(1, 0)).toThrow(RangeError);
  });

  it('have the same greatest common divisor by long steps as by short ones', () => {
    const long = fc.bigInt(0n, 10n ** 300n);
    const short = (a: bigint, b: bigint): bigint => (b === 0n ? a : short(b, a % b));
    fc.assert(
      fc.property(long, long, fc.bigInt(1n, 10n ** 90n), (a, b, common) => {
        expect(Q.gcd(a * common, -b * common)).toBe(short(a * common, b * common));
      }),
      { seed: 3 },
    );
  });

  it('form a field', () => {
    fc.assert(
      fc.property(fraction, fraction, fraction, (a, b, c) => {
        expect(Q.add(a, b)).toEqual(Q.add(b, a));
        expect(Q.mul(a, Q.add(b, c))).toEqual(Q.add(Q.mul(a, b), Q.mul(a, c)));
        expect(Q.sub(Q.add(a, b), b)).toEqual(a);
        expect(Q.isZero(b) ? a : Q.mul(Q.div(a, b), b)).toEqual(a);
      }),
    );
  });

  it('are ordered as their differences say', () => {
    fc.assert(
      fc.property(fraction, fraction, (a, b) => {
        expect(Q.compare(a, b)).toBe(Q.sign(Q.sub(a, b)));
      }),
    );
  });

  it('round down to whole numbers', () => {
    expect(Q.floor(Q.rational(-7, 2))).toBe(-4n);
    expect(Q.floor(Q.rational(7, 2))).toBe(3n);
    expect(Q.floor(Q.rational(-4))).toBe(-4n);
  });

  it('have exact roots only where these are fractions', () => {
    expect(Q.exactRoot(Q.rational(27, 8), 3)).toEqual(Q.rational(3, 2));
    expect(Q.exactRoot(Q.rational(-8), 3)).toEqual(Q.rational(-2));
    expect(Q.exactRoot(Q.rational(2), 2)).toBeNull();
    expect(Q.exactRoot(Q.rational(-4), 2)).toBeNull();
  });

  it('take whole roots of large numbers', () => {
    fc.assert(
      fc.property(fc.bigInt(0n, 10n ** 60n), fc.integer({ min: 2, max: 7 }), (value, degree) => {
        const root = Q.wholeRoot(value, degree);
        expect(root ** BigInt(degree) <= value && (root + 1n) ** BigInt(degree) > value).toBe(true);
      }),
    );
  });

  it('are printed as TeX', () => {
    expect(Q.toTex(Q.rational(-3, 4))).toBe(String.raw`-\frac{3}{4}`);
    expect(Q.toTex(Q.rational(5))).toBe('5');
  });
});
