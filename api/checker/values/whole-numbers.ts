import { magnitude } from '../numbers/ball.ts';
import { charge } from '../numbers/work.ts';
import * as Q from '../numbers/rational.ts';
import { fromRational, isExactZero, isReal, oneValue, toBall, undefinedValue, unknown } from './arithmetic.ts';
import type { Field } from './field.ts';
import { signOf } from './powers.ts';
import type { KnownValue, Value } from './value.ts';

const largestFactorial = 3_000n;

/** The whole number that a value is, null where it is none, 'unknown' where the bits do not tell. */
function wholeOf(value: KnownValue, field: Field): bigint | null | 'unknown' {
  if (value.kind === 'rational') return Q.isWhole(value.value) ? value.value.num : null;
  if (value.kind !== 'ball') return null;
  if (value.im !== null) return 'unknown';
  const scale = BigInt(field.bits);
  const low = (value.re.mid - value.re.rad) >> scale;
  const high = (value.re.mid + value.re.rad) >> scale;
  const isBetween =
    low === high && ((magnitude(value.re.mid) >> scale) << scale) + value.re.rad < magnitude(value.re.mid);
  return isBetween ? null : 'unknown';
}

export function factorialOf(a: KnownValue, field: Field): Value {
  const n = wholeOf(a, field);
  if (n === 'unknown') return unknown('precision');
  if (n === null || n < 0n) return undefinedValue;
  if (n > largestFactorial) return unknown('limit');
  let product = 1n;
  const count = Number(n);
  charge(count / 4 + count ** 2 / 4_000);
  for (let k = 2n; k <= n; k += 1n) product *= k;
  return fromRational({ num: product, den: 1n });
}

/** n (n-1) ... (n-k+1) / k! for a whole k, zero for a negative one. */
export function binomialOf(a: KnownValue, b: KnownValue, field: Field): Value {
  const k = wholeOf(b, field);
  if (k === 'unknown') return unknown('precision');
  if (k === null) return undefinedValue;
  if (a.kind !== 'rational') return unknown('not-covered');
  if (k < 0n) return Q.isWhole(a.value) && a.value.num >= 0n ? fromRational(Q.zero) : unknown('no-agreed-meaning');
  if (k > largestFactorial) return unknown('limit');
  if (Q.isWhole(a.value)) return fromRational({ num: wholeBinomial(a.value.num, k), den: 1n });
  let result = Q.one;
  for (let j = 0n; j < k; j += 1n) {
    result = Q.mul(result, Q.div(Q.sub(a.value, { num: j, den: 1n }), { num: j + 1n, den: 1n }));
  }
  return fromRational(result);
}

/** Each factor leaves a whole number, also for a negative n: no fraction has to be brought to lowest terms. */
function wholeBinomial(n: bigint, k: bigint): bigint {
  const count = Number(k);
  charge(count / 2 + (count ** 2 * Q.bitLength(n)) / 4_000);
  let result = 1n;
  for (let j = 0n; j < k; j += 1n) result = (result * (n - j)) / (j + 1n);
  return result;
}

/** The whole number at or below a (`up`: at or above). */
export function floorOf(a: KnownValue, up: boolean, field: Field): Value {
  if (!isReal(a)) return undefinedValue;
  if (a.kind === 'rational') {
    const low = Q.floor(a.value);
    return fromRational({ num: up && !Q.isWhole(a.value) ? low + 1n : low, den: 1n });
  }
  const ball = toBall(a, field.bits).re;
  const scale = BigInt(field.bits);
  const low = (ball.mid - ball.rad) >> scale;
  const high = (ball.mid + ball.rad) >> scale;
  const touches = (ball.mid - ball.rad - 1n) >> scale !== low;
  if (low !== high || touches) return unknown('precision');
  return fromRational({ num: up ? low + 1n : low, den: 1n });
}

export function divisorOf(args: readonly KnownValue[], multiple: boolean, field: Field): Value {
  let result: bigint | null = null;
  for (const arg of args) {
    const n = wholeOf(arg, field);
    if (n === 'unknown') return unknown('precision');
    if (n === null) return undefinedValue;
    result = result === null ? magnitude(n) : multiple ? Q.lcm(result, n) : Q.gcd(result, n);
  }
  return result === null ? undefinedValue : fromRational({ num: result, den: 1n });
}

/** -1, 0 or 1. */
export function signValueOf(a: KnownValue): Value {
  if (isExactZero(a)) return fromRational(Q.zero);
  const known = isReal(a) ? signOf(a) : null;
  if (known === null) return unknown(isReal(a) ? 'precision' : 'not-covered');
  return known > 0 ? oneValue : fromRational(Q.minusOne);
}
