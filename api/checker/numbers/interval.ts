/**
 * Intervals of doubles with outward rounding. Only + - * / and the square root are used, which IEEE 754 fixes to the last
 * bit: an interval is the same on every machine.
 */
export interface Interval {
  readonly lo: number;
  readonly hi: number;
}

const unit = 2 ** -52;
const smallest = 5e-324;

function down(x: number): number {
  return x - Math.abs(x) * unit - smallest;
}

function up(x: number): number {
  return x + Math.abs(x) * unit + smallest;
}

/** Ends without meaning, as infinity minus infinity, leave the end open. */
function between(lo: number, hi: number): Interval {
  return { lo: Number.isNaN(lo) ? -Infinity : lo, hi: Number.isNaN(hi) ? Infinity : hi };
}

export const wholeInterval: Interval = { lo: -Infinity, hi: Infinity };

export function pointInterval(x: number): Interval {
  return { lo: x, hi: x };
}

/** An interval that holds a number which a double is the nearest one to. */
export function aroundDouble(x: number): Interval {
  return between(down(x), up(x));
}

/** 1 or -1 where all of the interval has that sign, 0 where that is not so. */
export function intervalSign({ lo, hi }: Interval): -1 | 0 | 1 {
  return lo > 0 ? 1 : hi < 0 ? -1 : 0;
}

export function addIntervals(a: Interval, b: Interval): Interval {
  return between(down(a.lo + b.lo), up(a.hi + b.hi));
}

export function negateInterval(a: Interval): Interval {
  return { lo: -a.hi, hi: -a.lo };
}

/** Zero times infinity is zero: an infinite end stands for numbers without bound, not for infinity. */
function times(x: number, y: number): number {
  return x === 0 || y === 0 ? 0 : x * y;
}

export function mulIntervals(a: Interval, b: Interval): Interval {
  const [p, q, r, s] = [times(a.lo, b.lo), times(a.lo, b.hi), times(a.hi, b.lo), times(a.hi, b.hi)];
  const [lo, hi] = [Math.min(p, q, r, s), Math.max(p, q, r, s)];
  return between(lo === 0 ? 0 : down(lo), hi === 0 ? 0 : up(hi));
}

/** Everything where the divisor may be zero, but for a divisor of one sign that reaches up to zero. */
export function divIntervals(a: Interval, b: Interval): Interval {
  if (b.lo < 0 && b.hi > 0) return wholeInterval;
  if (b.lo === 0 && b.hi === 0) return wholeInterval;
  const lo = b.hi === 0 ? -Infinity : 1 / b.hi;
  const hi = b.lo === 0 ? Infinity : 1 / b.lo;
  return mulIntervals(a, between(lo === 0 ? 0 : down(lo), hi === 0 ? 0 : up(hi)));
}

/** A whole power, exponent not negative. */
export function powInterval(a: Interval, exponent: number): Interval {
  if (exponent === 0) return { lo: 1, hi: 1 };
  if (exponent % 2 === 0 && a.lo < 0) {
    const size = a.hi > 0 ? { lo: 0, hi: Math.max(-a.lo, a.hi) } : negateInterval(a);
    return powInterval(size, exponent);
  }
  if (a.lo < 0) return between(-powerOf(-a.lo, exponent, up), endPower(a.hi, exponent));
  return between(powerOf(a.lo, exponent, down), powerOf(a.hi, exponent, up));
}

function endPower(x: number, exponent: number): number {
  return x < 0 ? -powerOf(-x, exponent, down) : powerOf(x, exponent, up);
}

/** x^n for x >= 0, rounded at every step to one side. */
function powerOf(x: number, exponent: number, round: (x: number) => number): number {
  let [result, square] = [1, x];
  for (let rest = exponent; rest > 0; rest = Math.floor(rest / 2)) {
    if (rest % 2 === 1) result = Math.max(0, round(times(result, square)));
    if (rest > 1) square = Math.max(0, round(times(square, square)));
  }
  return Number.isNaN(result) ? Infinity : result;
}

/** The n-th root of a number that is not negative; null for a negative interval. */
export function rootInterval(a: Interval, degree: number): Interval | null {
  if (a.hi < 0) return null;
  const lo = Math.max(0, a.lo);
  if (degree === 2) return between(Math.max(0, down(Math.sqrt(lo))), up(Math.sqrt(a.hi)));
  const high = a.hi === 0 ? 0 : expInterval(divIntervals(lnOf(a.hi), pointInterval(degree))).hi;
  const low = lo === 0 ? 0 : expInterval(divIntervals(lnOf(lo), pointInterval(degree))).lo;
  return between(low, high);
}

const ln2High = 0.6931471803691238;
const ln2Low = 1.9082149292705877e-10;
const relative = 1e-14;

/** e^x, the Taylor series after taking out powers of two (ln 2 in two parts, Cody & Waite); error below 10^-14. */
function expOf(x: number): Interval {
  if (x > 709) return { lo: 8e307, hi: Infinity };
  if (x < -740) return { lo: 0, hi: 1e-320 };
  const k = Math.round(x / (ln2High + ln2Low));
  const r = x - k * ln2High - k * ln2Low;
  let sum = 1;
  for (let n = 16; n >= 1; n -= 1) sum = 1 + (sum * r) / n;
  const value = k < -1000 ? sum * 2 ** -1000 * 2 ** (k + 1000) : sum * 2 ** k;
  return { lo: Math.max(0, value * (1 - relative) - smallest), hi: value * (1 + relative) + smallest };
}

export function expInterval(a: Interval): Interval {
  return { lo: expOf(a.lo).lo, hi: expOf(a.hi).hi };
}

/** ln x = k ln 2 + 2 artanh((m-1)/(m+1)) for x = m 2^k, m between the roots of 1/2 and 2; error below 10^-14. */
function lnOf(x: number): Interval {
  if (x <= 0) return { lo: -Infinity, hi: -Infinity };
  if (x === Infinity) return { lo: 709, hi: Infinity };
  let [m, k] = [x, 0];
  for (; m >= 2 ** 32; m /= 2 ** 32) k += 32;
  for (; m < 2 ** -32; m *= 2 ** 32) k -= 32;
  for (; m > Math.SQRT2; m /= 2) k += 1;
  for (; m < Math.SQRT1_2; m *= 2) k -= 1;
  const s = (m - 1) / (m + 1);
  let sum = 0;
  for (let n = 25; n >= 1; n -= 2) sum = sum * s * s + 1 / n;
  const value = 2 * s * sum + k * ln2Low + k * ln2High;
  const error = relative * (Math.abs(value) + Math.abs(k)) + smallest;
  return { lo: value - error, hi: value + error };
}

/** ln of the positive part; null where there is none. */
export function lnInterval(a: Interval): Interval | null {
  if (a.hi <= 0) return null;
  return { lo: a.lo <= 0 ? -Infinity : lnOf(a.lo).lo, hi: lnOf(a.hi).hi };
}

const quarterHigh = 1.5707963267341256;
const quarterLow = 6.077100506506192e-11;
const wholeTurn = 6.283185307179586;
const largestAngle = 1e6;
const circularError = 1e-9;

/** cos x by its Taylor series after taking out quarter turns; error below 10^-9 for |x| up to 10^6. */
function cosOf(x: number): number {
  const k = Math.round(x / (wholeTurn / 4));
  const r = x - k * quarterHigh - k * quarterLow;
  const isOdd = ((k % 2) + 2) % 2 === 1;
  let [sum, term] = isOdd ? [r, r] : [1, 1];
  for (let n = isOdd ? 2 : 1; n < 22; n += 2) {
    term = (-term * r * r) / (n * (n + 1));
    sum += term;
  }
  const turn = ((k % 4) + 4) % 4;
  return turn === 0 || turn === 3 ? sum : -sum;
}

export function cosInterval(a: Interval): Interval {
  if (!(a.hi - a.lo < wholeTurn) || Math.max(-a.lo, a.hi) > largestAngle) return { lo: -1, hi: 1 };
  const [p, q] = [cosOf(a.lo), cosOf(a.hi)];
  const turns = wholeTurn / 2;
  const first = Math.ceil((a.lo - circularError) / turns);
  const last = Math.floor((a.hi + circularError) / turns);
  let [lo, hi] = [Math.min(p, q) - circularError, Math.max(p, q) + circularError];
  for (let k = first; k <= last; k += 1) {
    if (k % 2 === 0) hi = 1;
    else lo = -1;
  }
  return { lo: Math.max(-1, lo), hi: Math.min(1, hi) };
}

export function sinInterval(a: Interval): Interval {
  return cosInterval(addIntervals(a, { lo: -1.5707963267948968, hi: -1.5707963267948963 }));
}

/** arctan x, the argument halved until the series is short; error below 10^-13. */
function arctanOf(x: number): number {
  if (!Number.isFinite(x)) return x > 0 ? wholeTurn / 4 : -wholeTurn / 4;
  let r = x;
  let scale = 1;
  for (; Math.abs(r) > 0.1; scale *= 2) {
    // Beyond 10^150 the square overflows: the half of the angle is then an eighth of a turn.
    r = Math.abs(r) > 1e150 ? Math.sign(r) : r / (1 + Math.sqrt(1 + r * r));
  }
  let sum = 0;
  for (let n = 27; n >= 1; n -= 2) sum = 1 / n - sum * r * r;
  return scale * r * sum;
}

export function arctanInterval(a: Interval): Interval {
  const [lo, hi] = [arctanOf(a.lo), arctanOf(a.hi)];
  return { lo: lo - Math.abs(lo) * 1e-13 - smallest, hi: hi + Math.abs(hi) * 1e-13 + smallest };
}

/** arcsin x = 2 arctan(x / (1 + sqrt(1 - x^2))) on the part of the interval within -1 and 1. */
export function arcsinInterval(a: Interval): Interval | null {
  if (a.lo > 1 || a.hi < -1) return null;
  const at = (x: number): number => 2 * arctanOf(x / (1 + Math.sqrt(1 - x * x)));
  const [lo, hi] = [at(Math.max(-1, a.lo)), at(Math.min(1, a.hi))];
  // Close to 1 the square root loses half of the digits of what is below it.
  return { lo: lo - 1e-7, hi: hi + 1e-7 };
}
