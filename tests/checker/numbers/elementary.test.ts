import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { ballFromRational, ballToNumber, magnitude } from '../../../api/checker/numbers/ball.ts';
import type { Ball } from '../../../api/checker/numbers/ball.ts';
import {
  arcsinBall,
  arctanBall,
  expBall,
  lnBall,
  piBall,
  sinCosBall,
} from '../../../api/checker/numbers/elementary.ts';
import { rational } from '../../../api/checker/numbers/rational.ts';
import type { Rational } from '../../../api/checker/numbers/rational.ts';

type Compute = (a: Ball, bits: number) => Ball | null;

const functions: Readonly<Record<string, Compute>> = {
  exp: expBall,
  ln: lnBall,
  sin: (a, bits) => sinCosBall(a, bits)?.sin ?? null,
  cos: (a, bits) => sinCosBall(a, bits)?.cos ?? null,
  arctan: arctanBall,
  arcsin: arcsinBall,
};

const coarse = 192;
const fine = 640;

/** Whether the ball of few bits holds the (much narrower) ball of many bits. */
function holds(compute: Compute, x: Rational): boolean | null {
  const few = compute(ballFromRational(x, coarse), coarse);
  const many = compute(ballFromRational(x, fine), fine);
  if (few === null || many === null) return null;
  const shift = BigInt(fine - coarse);
  return magnitude((few.mid << shift) - many.mid) <= (few.rad << shift) + many.rad;
}

const argument = fc
  .tuple(fc.integer({ min: -(10 ** 9), max: 10 ** 9 }), fc.integer({ min: 1, max: 10 ** 9 }))
  .map(([num, den]) => rational(num, den));

describe('balls of elementary functions', () => {
  it.each(Object.keys(functions))('%s of few bits holds the value of many bits', (name) => {
    const compute = functions[name] ?? expBall;
    fc.assert(
      fc.property(argument, (x) => {
        if (name === 'exp' && magnitude(x.num) > 500n * x.den) return;
        expect(holds(compute, x)).not.toBe(false);
      }),
      { numRuns: 300 },
    );
  });

  it('agree with tabulated constants', () => {
    // Digits of pi and e from Abramowitz & Stegun, table 1.1 (from memory).
    const digits = (ball: Ball, bits: number) => ((ball.mid * 10n ** 30n) >> BigInt(bits)).toString();
    expect(digits(piBall(200), 200)).toBe('3141592653589793238462643383279');
    const one = ballFromRational(rational(1), 200);
    expect(digits(expBall(one, 200) ?? one, 200)).toBe('2718281828459045235360287471352');
    expect(digits(lnBall(ballFromRational(rational(10), 200), 200) ?? one, 200)).toBe(
      '2302585092994045684017991454684',
    );
  });

  it('keep a known number of radius when the argument has one', () => {
    const wide = { mid: 1n << 192n, rad: 1n << 100n };
    const exp = expBall(wide, 192);
    expect(exp && exp.rad > 2n * wide.rad).toBe(true);
    expect(lnBall({ mid: 1n << 100n, rad: 1n << 100n }, 192)).toBeNull();
  });

  it('give up on results beyond reach instead of working for ever', () => {
    expect(expBall(ballFromRational(rational(10n ** 12n), 192), 192)).toBeNull();
    expect(
      ballToNumber(expBall(ballFromRational(rational(-(10n ** 12n)), 192), 192) ?? { mid: 1n, rad: 0n }, 192),
    ).toBe(0);
  });
});
