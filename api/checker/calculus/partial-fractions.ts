import * as Q from '../numbers/rational.ts';
import type { Rational } from '../numbers/rational.ts';
import { derivePolynomial, squareFreePart, type Polynomial } from '../solving/polynomial.ts';
import { isolateRealRoots } from '../solving/real-roots.ts';

/** coef / (k + shift)^order. */
export interface Pole {
  readonly shift: Rational;
  readonly order: number;
  readonly coef: Rational;
}

const highestOrder = 6;

/** num / den as a polynomial (lowest coefficient first) and poles; null where a pole is no fraction or of too high order. */
export function partialFractions(
  num: Polynomial,
  den: Polynomial,
): { readonly whole: readonly Rational[]; readonly poles: readonly Pole[] } | null {
  const roots = isolateRealRoots(squareFreePart(den));
  if (!roots.every(({ low, high }) => Q.equals(low, high))) return null;
  const { quotient, rest } = divided(num.map(exact), den.map(exact));
  const poles: Pole[] = [];
  let count = 0;
  for (const { low: at } of roots) {
    const order = orderOf(den, at);
    if (order > highestOrder) return null;
    count += order;
    const bottom = shifted(den.map(exact), at).slice(order);
    const coefs = seriesQuotient(shifted(rest, at), bottom, order);
    coefs.forEach((coef, k) => {
      if (!Q.isZero(coef)) poles.push({ shift: Q.negate(at), order: order - k, coef });
    });
  }
  return count === den.length - 1 ? { whole: quotient, poles } : null;
}

function exact(value: bigint): Rational {
  return { num: value, den: 1n };
}

function orderOf(den: Polynomial, at: Rational): number {
  let order = 0;
  for (let p = den; p.length > 0 && Q.isZero(valueAt(p.map(exact), at)); p = derivePolynomial(p)) order += 1;
  return order;
}

function valueAt(p: readonly Rational[], x: Rational): Rational {
  return p.reduceRight<Rational>((total, coef) => Q.add(Q.mul(total, x), coef), Q.zero);
}

/** The coefficients of p(x + at). */
function shifted(p: readonly Rational[], at: Rational): Rational[] {
  const result = [...p];
  for (let k = 0; k < p.length; k += 1)
    for (let j = p.length - 2; j >= k; j -= 1)
      result[j] = Q.add(result[j] as Rational, Q.mul(at, result[j + 1] as Rational));
  return result;
}

function divided(num: readonly Rational[], den: readonly Rational[]): { quotient: Rational[]; rest: Rational[] } {
  const rest = [...num];
  const quotient: Rational[] = [];
  const lead = den[den.length - 1] as Rational;
  for (let k = num.length - den.length; k >= 0; k -= 1) {
    const times = Q.div(rest[k + den.length - 1] as Rational, lead);
    quotient[k] = times;
    den.forEach((coef, j) => (rest[k + j] = Q.sub(rest[k + j] as Rational, Q.mul(times, coef))));
  }
  return { quotient, rest: rest.slice(0, den.length - 1) };
}

/** The first coefficients of a / b. */
function seriesQuotient(a: readonly Rational[], b: readonly Rational[], count: number): Rational[] {
  const result: Rational[] = [];
  for (let k = 0; k < count; k += 1) {
    let top = a[k] ?? Q.zero;
    for (let j = 1; j <= k; j += 1) top = Q.sub(top, Q.mul(b[j] ?? Q.zero, result[k - j] as Rational));
    result.push(Q.div(top, b[0] as Rational));
  }
  return result;
}
