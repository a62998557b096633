import { ballFromRational, subBalls, type Ball } from '../numbers/ball.ts';
import { rational, type Rational } from '../numbers/rational.ts';

/** The short fraction inside a ball, by continued fractions; null where none is short enough to be no chance hit. */
export function toFractionGuess(ball: Ball, bits: number): Rational | null {
  let [num, den] = [ball.mid, 1n << BigInt(bits)];
  let [p0, q0, p1, q1] = [0n, 1n, 1n, 0n];
  for (let k = 0; k < 40 && den !== 0n; k += 1) {
    let quotient = num / den;
    if (num < 0n && quotient * den !== num) quotient -= 1n;
    [num, den] = [den, num - quotient * den];
    [p0, q0, p1, q1] = [p1, q1, quotient * p1 + p0, quotient * q1 + q0];
    const guess = rational(p1, q1);
    const gap = subBalls(ballFromRational(guess, bits), ball);
    const distance = gap.mid < 0n ? -gap.mid : gap.mid;
    if (distance <= gap.rad + 1n) return q1 < 1n << BigInt(Math.floor(bits / 5)) ? guess : null;
    if (q1 > 1n << BigInt(Math.floor(bits / 4))) return null;
  }
  return null;
}
