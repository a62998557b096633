import type { Expr } from '../../../shared/maths/expression.ts';
import { mapChildren } from '../../../shared/maths/walk.ts';
import { rational, toNumber, type Rational } from '../numbers/rational.ts';
import { letter } from './build.ts';
import { isFiniteNumber, isNear, minus, over, plus, real, sizeOf, times, type Complex } from './complex-double.ts';
import { estimate, type Place } from './estimate.ts';
import type { Aim } from './mend-question.ts';

/** Stands for a number that is looked for; no letter of a line is called so. */
export const hole = letter('\u25a1');
const holeName = '\u25a1';

/** The tree with one node, known by identity, replaced. */
export function replaceNode(expr: Expr, node: Expr, by: Expr): Expr {
  if (expr === node) return by;
  let isSame = true;
  const changed = mapChildren(expr, (part) => {
    const next = replaceNode(part, node, by);
    if (next !== part) isSame = false;
    return next;
  });
  return isSame ? expr : changed;
}

const mostTurns = 40;
const largestDenominator = 60;

/** The fraction that makes an expression with a hole take the wanted values, null where there is none that is simple. */
export function solveHole(withHole: Expr, start: number, aim: Aim, target: readonly Complex[]): Rational | null {
  const at = (c: Complex, place: Place): Complex =>
    estimate(withHole, { ...place, letters: new Map(place.letters).set(holeName, c) });
  const [first] = aim.places;
  const [wanted] = target;
  if (!first || !wanted || !isFiniteNumber(wanted)) return null;
  const found = findRoot((c) => at(c, first), wanted, start);
  const value = found && simpleFraction(found);
  if (!value) return null;
  const exact = real(toNumber(value));
  const fits = aim.places.every((place, k) => {
    const other = target[k];
    return !other || !isFiniteNumber(other) || isNear(at(exact, place), other);
  });
  return fits ? value : null;
}

/** Straight to the root of what is linear, whose reciprocal is, or what grows by a factor; else by the secant rule. */
function findRoot(at: (c: Complex) => Complex, wanted: Complex, start: number): Complex | null {
  const f = (c: Complex): Complex => minus(at(c), wanted);
  const straight = linearRoot(f);
  if (straight) return straight === 'constant' ? null : straight;
  const turned = linearRoot((c) => minus(over(real(1), at(c)), over(real(1), wanted)));
  if (turned && turned !== 'constant') return turned;
  if (start !== 0 && isNear(at(real(-start)), wanted)) return real(-start);
  const grown = growingRoot(at, wanted);
  if (grown) return grown;
  let [a, b] = [real(start), real(start + 0.5)];
  let [fa, fb] = [f(a), f(b)];
  for (let turn = 0; turn < mostTurns; turn += 1) {
    const rise = minus(fb, fa);
    if (!isFiniteNumber(rise) || sizeOf(rise) === 0) break;
    const next = minus(b, over(times(fb, minus(b, a)), rise));
    if (!isFiniteNumber(next)) return null;
    [a, fa, b] = [b, fb, next];
    fb = f(b);
    if (sizeOf(minus(a, b)) < 1e-13 * Math.max(1, sizeOf(b))) break;
  }
  return isFiniteNumber(fb) && sizeOf(fb) < 1e-7 ? b : null;
}

/** The root of a function of first degree; null where it is of another kind. */
function linearRoot(f: (c: Complex) => Complex): Complex | 'constant' | null {
  const [c1, c2, c3] = [real(2), real(3), real(5)];
  const [f1, f2, f3] = [f(c1), f(c2), f(c3)];
  const slope = minus(f2, f1);
  if (!isFiniteNumber(f1) || !isFiniteNumber(f2) || !isNear(f3, plus(f1, times(real(3), slope)))) return null;
  return sizeOf(slope) < 1e-9 * Math.max(1, sizeOf(f1)) ? 'constant' : minus(c1, over(f1, slope));
}

/** The root of A + B r^c = wanted with a positive r, as an exponent has it; null where it is of another kind. */
function growingRoot(at: (c: Complex) => Complex, wanted: Complex): Complex | null {
  const [f1, f2, f3, f5] = [at(real(1)), at(real(2)), at(real(3)), at(real(5))];
  const [first, second] = [minus(f2, f1), minus(f3, f2)];
  if (!isFiniteNumber(first) || !isFiniteNumber(second) || sizeOf(first) < 1e-12) return null;
  const r = over(second, first).re;
  if (!(r > 0) || Math.abs(r - 1) < 1e-9 || !isNear(f5, plus(f3, times(second, real(r + r * r))))) return null;
  const part = over(first, real(r - 1));
  const power = over(plus(minus(wanted, f1), part), part);
  return power.re > 0 && Math.abs(power.im) < 1e-9 ? real(1 + Math.log(power.re) / Math.log(r)) : null;
}

/** By continued fractions, to ten digits. */
export function simpleFraction(value: Complex): Rational | null {
  if (Math.abs(value.im) > 1e-9 || Math.abs(value.re) > 1e7) return null;
  let [h0, h1, k0, k1] = [0, 1, 1, 0];
  let rest = value.re;
  for (let turn = 0; turn < 12; turn += 1) {
    const part = Math.floor(rest + 1e-11);
    [h0, h1] = [h1, part * h1 + h0];
    [k0, k1] = [k1, part * k1 + k0];
    if (k1 > largestDenominator) return null;
    if (Math.abs(h1 / k1 - value.re) < 1e-9 * Math.max(1, Math.abs(value.re))) return rational(h1, k1);
    rest = 1 / (rest - part);
  }
  return null;
}
