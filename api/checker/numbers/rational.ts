import { charge, chargeProduct, costOfProduct } from './work.ts';

/** A fraction in lowest terms with a positive denominator. */
export interface Rational {
  readonly num: bigint;
  readonly den: bigint;
}

export const zero: Rational = { num: 0n, den: 1n };
export const one: Rational = { num: 1n, den: 1n };
export const minusOne: Rational = { num: -1n, den: 1n };

export function gcd(a: bigint, b: bigint): bigint {
  let x = a < 0n ? -a : a;
  let y = b < 0n ? -b : b;
  if (x < y) [x, y] = [y, x];
  if (y > middling) [x, y] = shortened(x, y);
  let steps = 0;
  while (y !== 0n) {
    [x, y] = [y, x % y];
    steps += 1;
  }
  charge(steps / 8);
  return x;
}

const middling = 1n << 96n;
const longNumber = 1n << 256n;

function isLong(value: bigint): boolean {
  return value > longNumber || value < -longNumber;
}

/** Two numbers x >= y with the same greatest common divisor, of which y is not above middling. */
function shortened(a: bigint, b: bigint): [bigint, bigint] {
  let [x, y] = [a, b];
  let length = bitLength(x);
  while (y > middling) {
    const step = lehmerStep(x, y, length);
    charge(1.5 + length / 800);
    if (step === null) {
      [x, y] = [y, x % y];
      chargeProduct(length);
      length = bitLength(x);
    } else [x, y, length] = step;
  }
  return [x, y];
}

/**
 * Many steps of Euclid's algorithm at once on about 48 leading bits of x >= y, exact in doubles (Lehmer 1938; Knuth, The
 * Art of Computer Programming 2, 4.5.2, Algorithm L); null where not even one is certain. `length` is the bit length of x
 * or next to it, and so is the third number that is answered.
 */
function lehmerStep(x: bigint, y: bigint, length: number): [bigint, bigint, number] | null {
  const shift = BigInt(length - 48);
  let [u, v] = [Number(x >> shift), Number(y >> shift)];
  let [a, b, c, d] = [1, 0, 0, 1];
  while (v + c !== 0 && v + d !== 0) {
    const q = Math.floor((u + a) / (v + c));
    if (q !== Math.floor((u + b) / (v + d))) break;
    [a, c] = [c, a - q * c];
    [b, d] = [d, b - q * d];
    [u, v] = [v, u - q * v];
  }
  if (b === 0) return null;
  const next = length - 48 + Math.ceil(Math.log2(u + 1));
  return [BigInt(a) * x + BigInt(b) * y, BigInt(c) * x + BigInt(d) * y, next];
}

export function lcm(a: bigint, b: bigint): bigint {
  if (a === 0n || b === 0n) return 0n;
  const product = (a / gcd(a, b)) * b;
  return product < 0n ? -product : product;
}

/** Lowest terms; throws a RangeError for a denominator of zero. */
export function rational(num: bigint | number, den: bigint | number = 1n): Rational {
  let n = BigInt(num);
  let d = BigInt(den);
  if (d === 0n) throw new RangeError('a denominator of zero');
  if (d === 1n) return whole(n);
  if (d < 0n) [n, d] = [-n, -d];
  const common = gcd(n, d);
  return common === 1n ? { num: n, den: d } : { num: n / common, den: d / common };
}

/** A whole number that was worked out, its length counted as work. */
function whole(num: bigint): Rational {
  if (isLong(num)) chargeProduct(bitLength(num));
  return { num, den: 1n };
}

export function add(a: Rational, b: Rational): Rational {
  if (a.den === 1n && b.den === 1n) return whole(a.num + b.num);
  return rational(a.num * b.den + b.num * a.den, a.den * b.den);
}

export function negate(a: Rational): Rational {
  return { num: -a.num, den: a.den };
}

export function sub(a: Rational, b: Rational): Rational {
  return add(a, negate(b));
}

export function mul(a: Rational, b: Rational): Rational {
  if (a.den === 1n && b.den === 1n) return whole(a.num * b.num);
  return rational(a.num * b.num, a.den * b.den);
}

/** Throws a RangeError when b is zero. */
export function div(a: Rational, b: Rational): Rational {
  return rational(a.num * b.den, a.den * b.num);
}

/** Throws a RangeError for zero to a negative power; 0^0 is 1 here, callers rule on it. */
export function pow(a: Rational, exponent: number): Rational {
  chargeProduct((bitLength(a.num) + bitLength(a.den) - 2) * Math.abs(exponent));
  if (exponent >= 0) return { num: a.num ** BigInt(exponent), den: a.den ** BigInt(exponent) };
  return rational(a.den ** BigInt(-exponent), a.num ** BigInt(-exponent));
}

export function compare(a: Rational, b: Rational): -1 | 0 | 1 {
  if (a.den === 1n && b.den === 1n) return a.num < b.num ? -1 : a.num > b.num ? 1 : 0;
  const left = a.num * b.den;
  if (isLong(left)) chargeProduct(2 * bitLength(left));
  const right = b.num * a.den;
  return left < right ? -1 : left > right ? 1 : 0;
}

export function equals(a: Rational, b: Rational): boolean {
  return a.num === b.num && a.den === b.den;
}

export function isZero(a: Rational): boolean {
  return a.num === 0n;
}

export function isWhole(a: Rational): boolean {
  return a.den === 1n;
}

export function sign(a: Rational): -1 | 0 | 1 {
  return a.num < 0n ? -1 : a.num > 0n ? 1 : 0;
}

export function absolute(a: Rational): Rational {
  return a.num < 0n ? negate(a) : a;
}

/** The largest whole number that is not above a. */
export function floor(a: Rational): bigint {
  const quotient = a.num / a.den;
  return a.num < 0n && quotient * a.den !== a.num ? quotient - 1n : quotient;
}

/** The nearest double; exact for fractions that a double can hold. */
export function toNumber(a: Rational): number {
  const direct = Number(a.num) / Number(a.den);
  if (Number.isFinite(direct) && (direct !== 0 || a.num === 0n)) return direct;
  const shift = BigInt(bitLength(a.num) - bitLength(a.den) - 64);
  const scaled = shift >= 0n ? a.num / (a.den << shift) : (a.num << -shift) / a.den;
  return Number(scaled) * 2 ** Number(shift);
}

const double = new Float64Array(1);
const halves = new Int32Array(double.buffer);
/** Where the half of a double with its exponent is. */
const upper = new Uint8Array(Int32Array.of(1).buffer)[0] === 1 ? 1 : 0;

/** The length of the size of a number in bits, 0 for zero. */
export function bitLength(value: bigint): number {
  if (value === 0n) return 0;
  const size = Math.abs(Number(value));
  if (size < Infinity) {
    double[0] = size;
    const exponent = ((halves[upper] ?? 0) >> 20) - 1023;
    // Only a power of two may be what a number just below it was rounded to.
    if (size < 9_007_199_254_740_992 || ((halves[upper] ?? 0) & 0xfffff) !== 0 || halves[1 - upper] !== 0)
      return exponent + 1;
    return (value < 0n ? -value : value) >> BigInt(exponent) === 0n ? exponent : exponent + 1;
  }
  const digits = (value < 0n ? -value : value).toString(16);
  return digits.length * 4 - Math.clz32(Number.parseInt(digits[0] ?? '0', 16)) + 28;
}

/** The largest whole r with r^degree <= value, for value >= 0 and degree >= 1. */
export function wholeRoot(value: bigint, degree: number): bigint {
  if (value < 2n || degree === 1) return value;
  const n = BigInt(degree);
  const length = bitLength(value);
  let guess = 1n << BigInt(Math.ceil(length / degree));
  for (;;) {
    charge(1 + 5 * costOfProduct(length));
    const next = ((n - 1n) * guess + value / guess ** (n - 1n)) / n;
    if (next >= guess) return guess;
    guess = next;
  }
}

/** The exact real root where it is a fraction, else null. */
export function exactRoot(a: Rational, degree: number): Rational | null {
  if (a.num < 0n) {
    if (degree % 2 === 0) return null;
    const positive = exactRoot(negate(a), degree);
    return positive && negate(positive);
  }
  const num = wholeRoot(a.num, degree);
  chargeProduct(bitLength(a.num));
  if (num ** BigInt(degree) !== a.num) return null;
  const den = wholeRoot(a.den, degree);
  return den ** BigInt(degree) === a.den ? { num, den } : null;
}

export function toTex(a: Rational): string {
  if (a.den === 1n) return a.num.toString();
  const digits = `\\frac{${a.num < 0n ? -a.num : a.num}}{${a.den}}`;
  return a.num < 0n ? `-${digits}` : digits;
}
