import { addMod, bigMod, inverseMod, mulMod, negateMod, primes } from '../numbers/modular.ts';
import { bitLength, gcd, type Rational } from '../numbers/rational.ts';
import { charge, costOfProduct } from '../numbers/work.ts';

/** Whole coefficients, lowest power first, no zero at the end; the zero polynomial is empty. */
export type Polynomial = readonly bigint[];

export const zeroPolynomial: Polynomial = [];
export const onePolynomial: Polynomial = [1n];

export function trim(coefficients: bigint[]): Polynomial {
  while (coefficients.length > 0 && coefficients[coefficients.length - 1] === 0n) coefficients.pop();
  return coefficients;
}

export function degree(p: Polynomial): number {
  return p.length - 1;
}

export function leading(p: Polynomial): bigint {
  return p[p.length - 1] ?? 0n;
}

export function addPolynomials(a: Polynomial, b: Polynomial): Polynomial {
  const result: bigint[] = [];
  for (let k = 0; k < Math.max(a.length, b.length); k += 1) result.push((a[k] ?? 0n) + (b[k] ?? 0n));
  return trim(result);
}

export function scalePolynomial(p: Polynomial, factor: bigint): Polynomial {
  return factor === 0n ? [] : p.map((c) => c * factor);
}

export function subtractPolynomials(a: Polynomial, b: Polynomial): Polynomial {
  return addPolynomials(a, scalePolynomial(b, -1n));
}

/** The bits of the longest coefficient; 0 where all are short. */
function longestBits(p: Polynomial): number {
  let longest = 0n;
  for (const c of p) {
    if (c > longest) longest = c;
    else if (-c > longest) longest = -c;
  }
  return longest < shortCoefficient ? 0 : bitLength(longest);
}

const shortCoefficient = 1n << 128n;

/** Counts so many products of the coefficients of two polynomials. */
function chargeProducts(count: number, a: Polynomial, b: Polynomial): void {
  charge(count * (0.25 + costOfProduct(longestBits(a) + longestBits(b))));
}

export function multiplyPolynomials(a: Polynomial, b: Polynomial): Polynomial {
  if (a.length === 0 || b.length === 0) return [];
  chargeProducts(a.length * b.length, a, b);
  const result = Array.from({ length: a.length + b.length - 1 }, () => 0n);
  a.forEach((x, i) => {
    if (x === 0n) return;
    b.forEach((y, j) => {
      result[i + j] = (result[i + j] ?? 0n) + x * y;
    });
  });
  return result;
}

export function powerPolynomial(p: Polynomial, exponent: number): Polynomial {
  let result: Polynomial = onePolynomial;
  let square = p;
  for (let n = exponent; n > 0; n = Math.floor(n / 2)) {
    if (n % 2 === 1) result = multiplyPolynomials(result, square);
    if (n > 1) square = multiplyPolynomials(square, square);
  }
  return result;
}

export function derivePolynomial(p: Polynomial): Polynomial {
  return trim(p.slice(1).map((c, k) => c * BigInt(k + 1)));
}

/** The same roots, coefficients without a common factor, the leading one positive. */
export function primitivePart(p: Polynomial): Polynomial {
  let content = 0n;
  for (const c of p) {
    content = gcd(content, c);
    if (content === 1n) break;
  }
  if (content === 0n) return p;
  if (leading(p) < 0n) content = -content;
  return content === 1n ? p : p.map((c) => c / content);
}

/** Remainder of a times a power of b's leading coefficient, the sign of a kept. */
function pseudoRemainder(a: Polynomial, b: Polynomial): Polynomial {
  const lead = leading(b);
  const size = lead < 0n ? -lead : lead;
  const rest = [...a];
  while (rest.length >= b.length) {
    const top = rest[rest.length - 1] ?? 0n;
    const shift = rest.length - b.length;
    const factor = lead < 0n ? -top : top;
    charge((rest.length + b.length) * (0.25 + costOfProduct(bitLength(top) + bitLength(lead))));
    for (let k = 0; k < rest.length; k += 1) rest[k] = (rest[k] ?? 0n) * size;
    b.forEach((c, k) => {
      rest[k + shift] = (rest[k + shift] ?? 0n) - factor * c;
    });
    trim(rest);
  }
  return rest;
}

/**
 * Whether a and b have no common factor modulo a prime that divides neither leading coefficient: then they have none over
 * the rationals either. False says nothing.
 */
function areCoprimeModulo(a: Polynomial, b: Polynomial, prime: number): boolean {
  let x = a.map((c) => bigMod(c, prime));
  let y = b.map((c) => bigMod(c, prime));
  if (x[x.length - 1] === 0 || y[y.length - 1] === 0) return false;
  charge((x.length * y.length) / 20);
  while (y.length > 1) [x, y] = [y, remainderModulo(x, y, prime)];
  return y.length === 1;
}

function remainderModulo(x: readonly number[], y: readonly number[], prime: number): number[] {
  const rest = [...x];
  const inverse = inverseMod(y[y.length - 1] ?? 1, prime);
  while (rest.length >= y.length) {
    const factor = mulMod(rest[rest.length - 1] ?? 0, inverse, prime);
    const shift = rest.length - y.length;
    for (let k = 0; k < y.length - 1; k += 1) {
      const less = mulMod(factor, y[k] ?? 0, prime);
      rest[k + shift] = addMod(rest[k + shift] ?? 0, negateMod(less, prime), prime);
    }
    rest.pop();
    while (rest.length > 0 && rest[rest.length - 1] === 0) rest.pop();
  }
  return rest;
}

/** Below this degree the exact way is as fast. */
const leastModular = 6;

/** Greatest common divisor, primitive. */
export function gcdPolynomials(a: Polynomial, b: Polynomial): Polynomial {
  const isLong = a.length > leastModular && b.length > leastModular;
  if (isLong && areCoprimeModulo(a, b, primes[0] ?? 0)) return onePolynomial;
  let x = primitivePart(a);
  let y = primitivePart(b);
  if (x.length < y.length) [x, y] = [y, x];
  while (y.length > 0) {
    if (y.length === 1) return onePolynomial;
    [x, y] = [y, primitivePart(pseudoRemainder(x, y))];
  }
  return x;
}

/** a / b up to a constant where b divides a over the rationals, else null. */
export function dividePolynomials(a: Polynomial, b: Polynomial): Polynomial | null {
  if (b.length === 0) return null;
  if (a.length === 0) return [];
  if (a.length < b.length) return null;
  const lead = leading(b);
  const rest = [...scalePolynomial(a, lead ** BigInt(a.length - b.length + 1))];
  const quotient = Array.from({ length: a.length - b.length + 1 }, () => 0n);
  for (let shift = a.length - b.length; shift >= 0; shift -= 1) {
    const factor = (rest[shift + b.length - 1] ?? 0n) / lead;
    charge(b.length * (0.25 + costOfProduct(bitLength(factor) + bitLength(lead))));
    quotient[shift] = factor;
    b.forEach((c, k) => {
      rest[k + shift] = (rest[k + shift] ?? 0n) - factor * c;
    });
  }
  return rest.every((c) => c === 0n) ? primitivePart(trim(quotient)) : null;
}

/** The same roots, each once. */
export function squareFreePart(p: Polynomial): Polynomial {
  if (p.length <= 2) return primitivePart(p);
  const common = gcdPolynomials(p, derivePolynomial(p));
  return common.length === 1 ? primitivePart(p) : (dividePolynomials(p, common) ?? primitivePart(p));
}

/** p(num/den) times den^degree: the sign of the value, for den > 0. */
export function scaledValueAt(p: Polynomial, at: Rational): bigint {
  let value = 0n;
  let power = 1n;
  const grown = p.length * (bitLength(at.num) + bitLength(at.den));
  charge(p.length * (0.25 + costOfProduct(grown)));
  for (let k = p.length - 1; k >= 0; k -= 1) {
    value = value * at.num + (p[k] ?? 0n) * power;
    power *= at.den;
  }
  return value;
}

export function signOf(value: bigint): -1 | 0 | 1 {
  return value > 0n ? 1 : value < 0n ? -1 : 0;
}

export function signAt(p: Polynomial, at: Rational): -1 | 0 | 1 {
  return signOf(scaledValueAt(p, at));
}

/** p and q are the same up to a constant factor. */
export function areProportional(p: Polynomial, q: Polynomial): boolean {
  if (p.length !== q.length) return false;
  const a = leading(p);
  const b = leading(q);
  chargeProducts(2 * p.length, p, q);
  return p.every((c, k) => c * b === (q[k] ?? 0n) * a);
}
