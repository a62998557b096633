import { mulBalls } from '../numbers/ball.ts';
import { toTex } from '../numbers/rational.ts';
import { toFractionGuess } from './fraction-guess.ts';
import { logarithmName } from './logarithm-name.ts';
import { dividePolynomials, type Polynomial } from './polynomial.ts';
import { approximate, enclose, realRoots, type RealNumber } from './real-number.ts';
import type { RealSet } from './real-set.ts';
import { quadraticRoots, surdToTex } from './surd.ts';

/** How computed numbers are written: the author's own form, a multiple of pi, a logarithm; null where none is known. */
export type Recognise = (point: RealNumber) => string | null;

/** A number as TeX: a fraction, a surd, what was recognised, else decimals that end in dots. */
export function nameNumber(a: RealNumber, recognise: Recognise = () => null): string {
  if (a.kind === 'rational') return toTex(a.value);
  if (a.kind === 'algebraic') {
    const quadratic = quadraticFactor(a);
    const roots = quadratic && quadraticRoots(quadratic[0] ?? 0n, quadratic[1] ?? 0n, quadratic[2] ?? 1n);
    if (roots) {
      const isHigh = approximate(a) > -Number(quadratic[1]) / (2 * Number(quadratic[2]));
      return surdToTex(roots[isHigh ? 1 : 0]);
    }
  }
  return recognise(a) ?? logarithmName(a) ?? `${trimDecimals(approximate(a))}\\ldots`;
}

function trimDecimals(value: number): string {
  const size = Math.abs(value);
  return size >= 1e6 || (size > 0 && size < 1e-4) ? value.toPrecision(6) : (Math.trunc(value * 1e4) / 1e4).toFixed(4);
}

/** The quadratic polynomial with whole coefficients that the number is a root of, where there is one. */
function quadraticFactor(a: Extract<RealNumber, { kind: 'algebraic' }>): Polynomial | null {
  if (a.polynomial.length === 3) return a.polynomial;
  if (a.polynomial.length > 14) return null;
  const x = enclose(a, 160);
  for (const other of realRoots(a.polynomial)) {
    const y = enclose(other, 160);
    const sum = toFractionGuess({ mid: x.mid + y.mid, rad: x.rad + y.rad }, 160);
    const product = sum && toFractionGuess(mulBalls(x, y, 160), 160);
    if (!sum || !product) continue;
    const den = sum.den * product.den;
    const candidate = [(product.num * den) / product.den, (-sum.num * den) / sum.den, den];
    if (dividePolynomials(a.polynomial, candidate)) return candidate;
  }
  return null;
}

/** A set as TeX: \left\{-2,3\right\}, intervals, their union, \varnothing, \mathbb{R}. */
export function nameSet(set: RealSet, recognise: Recognise = () => null): string {
  const pieces: string[] = [];
  const isolated: string[] = [];
  const name = (k: number): string => nameNumber(set.points[k] as RealNumber, recognise);
  let open: { from: string; closed: boolean } | null = set.between[0] ? { from: '-\\infty', closed: false } : null;
  for (let k = 0; k < set.points.length; k += 1) {
    const goesOn = set.between[k + 1] === true;
    if (open && !(set.at[k] && goesOn)) {
      pieces.push(interval(open.from, open.closed, name(k), set.at[k] === true));
      open = null;
    }
    if (!open && goesOn) open = { from: name(k), closed: set.at[k] === true && !set.between[k] };
    if (!goesOn && set.at[k] && !set.between[k]) isolated.push(name(k));
  }
  if (open && open.from === '-\\infty') return '\\mathbb{R}';
  if (open) pieces.push(interval(open.from, open.closed, '\\infty', false));
  if (isolated.length > 0) pieces.unshift(`\\left\\{${isolated.join(',')}\\right\\}`);
  return pieces.length === 0 ? '\\varnothing' : pieces.join('\\cup ');
}

function interval(from: string, fromClosed: boolean, to: string, toClosed: boolean): string {
  return `\\left${fromClosed ? '[' : '('}${from},${to}\\right${toClosed ? ']' : ')'}`;
}
