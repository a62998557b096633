import type { Expr } from '../../../shared/maths/expression.ts';
import { ballFromRational } from '../numbers/ball.ts';
import { lnBall } from '../numbers/elementary.ts';
import { rational, type Rational } from '../numbers/rational.ts';
import { computedNumber } from './linear.ts';
import { rationalNumber, type RealNumber } from './real-number.ts';
import { surdToNumber } from './surd.ts';

/** Short exact numbers near a double: fractions, multiples of pi, square roots, logarithms. Each is a guess to be tried. */
export function guessNumbers(near: number): RealNumber[] {
  const guesses: RealNumber[] = [];
  const fraction = shortFraction(near, 5000);
  if (fraction) guesses.push(rationalNumber(rational(BigInt(fraction.num), BigInt(fraction.den))));
  const turn = shortFraction(near / Math.PI, 400);
  if (turn && turn.num !== 0) {
    const value = { kind: 'pi' as const, value: rational(BigInt(turn.num), BigInt(turn.den)) };
    const multiple = computedNumber(() => value);
    if (multiple) guesses.push(multiple);
  }
  const square = shortFraction(near * near, 200);
  if (square && square.num > 0 && square.num < 100_000) {
    const part = rational(near < 0 ? -1 : 1, BigInt(square.den));
    guesses.push(surdOf(part, BigInt(square.num) * BigInt(square.den)));
  }
  const power = Math.abs(near) < 40 ? shortFraction(Math.exp(near), 60) : null;
  if (power && power.num > 0 && power.num < 100_000 && power.num !== power.den) {
    guesses.push(logarithmOf(rational(BigInt(power.num), BigInt(power.den))));
  }
  return guesses;
}

/** ln of a fraction. */
function logarithmOf(value: Rational): RealNumber {
  const span = { start: 0, end: 0 };
  const argument: Expr = {
    kind: 'number',
    numerator: value.num,
    denominator: value.den,
    written: 'integer',
    decimals: 0,
    span,
  };
  return {
    kind: 'computed',
    expr: { kind: 'call', name: 'ln', args: [argument], span },
    enclose: (bits) => lnBall(ballFromRational(value, bits), bits) ?? { mid: 0n, rad: 1n << BigInt(bits + 8) },
  };
}

function surdOf(part: Rational, radicand: bigint): RealNumber {
  let inside = radicand;
  let outside = 1n;
  for (let p = 2n; p * p <= inside && p < 3000n; p += 1n) {
    while (inside % (p * p) === 0n) {
      inside /= p * p;
      outside *= p;
    }
  }
  const scaled = rational(part.num * outside, part.den);
  return surdToNumber(
    inside === 1n
      ? { whole: scaled, part: rational(0), radicand: 1n }
      : { whole: rational(0), part: scaled, radicand: inside },
  );
}

/** The best fraction with a small denominator within 10^-7 of a double, or null. */
function shortFraction(value: number, mostDen: number): { num: number; den: number } | null {
  if (!Number.isFinite(value) || Math.abs(value) > 1e9) return null;
  let [p0, q0, p1, q1] = [0, 1, 1, 0];
  let rest = value;
  for (let k = 0; k < 20; k += 1) {
    const whole = Math.floor(rest);
    [p0, q0, p1, q1] = [p1, q1, whole * p1 + p0, whole * q1 + q0];
    if (q1 > mostDen) return null;
    if (Math.abs(p1 / q1 - value) < 1e-7 * Math.max(1, Math.abs(value))) return { num: p1, den: q1 };
    rest = 1 / (rest - whole);
  }
  return null;
}

/** A computed number as a multiple of pi or a logarithm, where it is one to 60 digits. */
export function recogniseNumber(a: RealNumber): string | null {
  if (a.kind !== 'computed' || a.exact?.kind !== 'pi') return null;
  const { num, den } = a.exact.value;
  const size = num < 0n ? -num : num;
  const top = size === 1n ? '\\pi' : `${size}\\pi`;
  return `${num < 0n ? '-' : ''}${den === 1n ? top : `\\frac{${top}}{${den}}`}`;
}
