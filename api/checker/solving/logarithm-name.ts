import { ballFromRational, mulBalls } from '../numbers/ball.ts';
import { expBall, lnBall } from '../numbers/elementary.ts';
import { rational, toTex, type Rational } from '../numbers/rational.ts';
import { toFractionGuess } from './fraction-guess.ts';
import { approximate, enclose, type RealNumber } from './real-number.ts';

const bits = 200;
/** null: e. The fractions are what is left of two bases in one equation. */
const bases: readonly (Rational | null)[] = [
  null,
  ...[2, 3, 5, 6, 7, 10].map((base) => rational(base)),
  ...[2, 3, 4, 5, 6, 7].flatMap((top) =>
    [2, 3, 5].flatMap((den) => (top > den && top % den > 0 ? [rational(top, den)] : [])),
  ),
];
const largest = 10_000n;

/**
 * A computed number as a short fraction, a logarithm or a quotient of two, where it is one to 50 digits: `\ln 5`,
 * `\frac{\ln 3}{\ln 2}`. For showing only; null where it is none.
 */
export function logarithmName(a: RealNumber): string | null {
  if (a.kind !== 'computed' || a.exact || Math.abs(approximate(a)) > 40) return null;
  const x = enclose(a, bits);
  const fraction = toFractionGuess(x, bits);
  if (fraction && isShort(fraction)) return toTex(fraction);
  for (const base of bases) {
    const below = base && lnBall(ballFromRational(base, bits), bits);
    const scaled = below ? mulBalls(x, below, bits) : x;
    for (const times of base ? [1n] : [1n, 2n, 3n]) {
      const power = expBall({ mid: scaled.mid * times, rad: scaled.rad * times }, bits);
      const value = power && toFractionGuess(power, bits);
      if (!value || !isShort(value) || value.num <= 0n || value.num === value.den) continue;
      const above = nameLogarithm(value);
      if (base) return `\\frac{${above}}{${nameLogarithm(base)}}`;
      return times === 1n ? above : `\\frac{${above}}{${times}}`;
    }
  }
  return null;
}

function isShort({ num, den }: Rational): boolean {
  return num < largest && num > -largest && den < largest;
}

function nameLogarithm(value: Rational): string {
  if (value.den === 1n) return `\\ln ${value.num}`;
  return value.num === 1n ? `-\\ln ${value.den}` : `\\ln\\frac{${value.num}}{${value.den}}`;
}
