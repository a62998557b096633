/** Arithmetic modulo primes below 2^26, exact in doubles. */

const sieveStart = 66_060_288;
const windowSize = 1_040_000;

/** Primes of 26 bits, all 1 mod 4 so that a square root of -1 exists. */
export const primes: Float64Array = sievePrimes(sieveStart, windowSize, 4);

/** Primes of 25 and 26 bits, all 1 mod 720 so that the roots of unity of order 720 exist. */
export const cyclotomicPrimes: Float64Array = sievePrimes(17_000_640, 50_000_000, 720);

/** The primes p = 1 mod `step` from `start` (a multiple of step) on, by the sieve of Eratosthenes. */
function sievePrimes(start: number, size: number, step: number): Float64Array {
  const count = Math.floor(size / step);
  const composite = new Uint8Array(count);
  for (const q of smallPrimes(8_200)) {
    if (step % q === 0) continue;
    // start + 1 + step k = 0 mod q
    const offset = (start + 1) % q;
    let k = 0;
    while ((offset + step * k) % q !== 0) k += 1;
    for (; k < count; k += q) composite[k] = 1;
  }
  const found: number[] = [];
  for (let k = 0; k < count; k += 1) if (composite[k] === 0) found.push(start + 1 + step * k);
  return Float64Array.from(found);
}

function smallPrimes(limit: number): number[] {
  const composite = new Uint8Array(limit);
  const found: number[] = [];
  for (let n = 2; n < limit; n += 1) {
    if (composite[n] === 1) continue;
    found.push(n);
    for (let k = n * n; k < limit; k += n) composite[k] = 1;
  }
  return found;
}

export function mulMod(a: number, b: number, p: number): number {
  const product = a * b;
  const rest = product - Math.floor(product / p) * p;
  return rest < 0 ? rest + p : rest >= p ? rest - p : rest;
}

export function addMod(a: number, b: number, p: number): number {
  const sum = a + b;
  return sum >= p ? sum - p : sum;
}

export function negateMod(a: number, p: number): number {
  return a === 0 ? 0 : p - a;
}

/** For an exponent from 0 to 2^53. */
export function powMod(base: number, exponent: number, p: number): number {
  let result = 1;
  let square = base;
  for (let rest = exponent; rest > 0; rest = Math.floor(rest / 2)) {
    if (rest % 2 === 1) result = mulMod(result, square, p);
    square = mulMod(square, square, p);
  }
  return result;
}

/** The inverse of a number that is not 0 modulo p. */
export function inverseMod(a: number, p: number): number {
  let [r0, r1] = [p, a];
  let [t0, t1] = [0, 1];
  while (r1 !== 0) {
    const quotient = Math.floor(r0 / r1);
    [r0, r1] = [r1, r0 - quotient * r1];
    [t0, t1] = [t1, t0 - quotient * t1];
  }
  return t0 < 0 ? t0 + p : t0;
}

export function bigMod(value: bigint, p: number): number {
  const small = Number(value);
  const rest = Number.isSafeInteger(small) ? small % p : Number(value % BigInt(p));
  return rest < 0 ? rest + p : rest;
}

/** A square root where there is one, else null (Tonelli-Shanks). */
export function sqrtMod(a: number, p: number): number | null {
  if (a === 0) return 0;
  if (powMod(a, (p - 1) / 2, p) !== 1) return null;
  let odd = p - 1;
  let twos = 0;
  while (odd % 2 === 0) [odd, twos] = [odd / 2, twos + 1];
  let c = powMod(nonResidue(p), odd, p);
  let t = powMod(a, odd, p);
  let root = powMod(a, (odd + 1) / 2, p);
  for (let m = twos; t !== 1;) {
    let k = 0;
    for (let s = t; s !== 1; k += 1) s = mulMod(s, s, p);
    const b = powMod(c, 2 ** (m - k - 1), p);
    m = k;
    c = mulMod(b, b, p);
    t = mulMod(t, c, p);
    root = mulMod(root, b, p);
  }
  return root;
}

function nonResidue(p: number): number {
  let n = 2;
  while (powMod(n, (p - 1) / 2, p) === 1) n += 1;
  return n;
}

/** A square root of -1 for a prime that is 1 mod 4. */
export function imaginaryMod(p: number): number {
  const known = imaginaryUnits.get(p);
  if (known !== undefined) return known;
  const unit = powMod(nonResidue(p), (p - 1) / 4, p);
  imaginaryUnits.set(p, unit);
  return unit;
}

/** By prime: at most as many as the tables of primes hold. */
const imaginaryUnits = new Map<number, number>();
