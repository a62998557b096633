import { bitLength, rational, type Rational } from '../numbers/rational.ts';
import { charge } from '../numbers/work.ts';
import { derivePolynomial, leading, scaledValueAt, signAt, signOf, type Polynomial } from './polynomial.ts';
import { Unsettled } from './unsettled.ts';

/** One real root: `low` = `high` where it is a fraction, else the root lies strictly between them. */
export interface RootInterval {
  readonly low: Rational;
  readonly high: Rational;
}

/** Additions of numbers of 512 bits that the roots of one polynomial may take. */
const mostAdditions = 500_000;

interface Work {
  left: number;
}

function spend(work: Work, count: number, bits: number): void {
  work.left -= count * (1 + bits / 512);
  charge(0.15 * count * (1 + bits / 512));
  if (work.left < 0) throw new Unsettled('limit');
}

/** p(x + 1) by repeated addition. */
function shiftByOne(p: Polynomial, work: Work): bigint[] {
  const result = [...p];
  spend(work, (p.length * p.length) / 2, Math.max(bitLength(leading(p)), bitLength(p[0] ?? 0n)) + p.length);
  for (let i = 0; i < result.length - 1; i += 1) {
    for (let j = result.length - 2; j >= i; j -= 1) result[j] = (result[j] ?? 0n) + (result[j + 1] ?? 0n);
  }
  return result;
}

function signChanges(p: readonly bigint[]): number {
  let changes = 0;
  let last = 0;
  for (const c of p) {
    const s = signOf(c);
    if (s !== 0 && last !== 0 && s !== last) changes += 1;
    if (s !== 0) last = s;
  }
  return changes;
}

/** Descartes bound on the roots strictly between 0 and 1. */
function boundInUnit(p: Polynomial, work: Work): number {
  return signChanges(shiftByOne([...p].reverse(), work));
}

/** 2^n p(x / 2). */
function halve(p: Polynomial): bigint[] {
  const n = BigInt(p.length - 1);
  return p.map((c, k) => c << (n - BigInt(k)));
}

/** A power of two above the size of every root (Cauchy's bound). */
function rootBoundBits(p: Polynomial): number {
  const lead = leading(p) < 0n ? -leading(p) : leading(p);
  let most = 0n;
  for (const c of p.slice(0, -1)) {
    const size = c < 0n ? -c : c;
    if (size > most) most = size;
  }
  return (most / lead + 2n).toString(2).length;
}

/** Isolates the roots in (0, 1) of a square-free p by bisection with Descartes' rule; ends for every square-free p. */
function isolateInUnit(start: Polynomial, work: Work): { numerator: bigint; bits: number; exact: boolean }[] {
  const found: { numerator: bigint; bits: number; exact: boolean }[] = [];
  const open: { p: Polynomial; numerator: bigint; bits: number }[] = [{ p: start, numerator: 0n, bits: 0 }];
  for (let job = open.pop(); job; job = open.pop()) {
    const bound = boundInUnit(job.p, work);
    if (bound === 0) continue;
    if (bound === 1) {
      found.push({ numerator: job.numerator, bits: job.bits, exact: false });
      continue;
    }
    const left = halve(job.p);
    let right: Polynomial = shiftByOne(left, work);
    if (right[0] === 0n) {
      found.push({ numerator: 2n * job.numerator + 1n, bits: job.bits + 1, exact: true });
      right = right.slice(1);
    }
    open.push({ p: left, numerator: 2n * job.numerator, bits: job.bits + 1 });
    open.push({ p: right, numerator: 2n * job.numerator + 1n, bits: job.bits + 1 });
  }
  return found;
}

/** The roots above zero of p, as roots of `whole`, which may be zero at zero as well. */
function positiveRoots(p: Polynomial, whole: Polynomial, work: Work): RootInterval[] {
  const bits = BigInt(rootBoundBits(p));
  const scaled = p.map((c, k) => c << (bits * BigInt(k)));
  return isolateInUnit(scaled, work).map(({ numerator, bits: depth, exact }) => {
    const scale = 1n << BigInt(depth);
    const low = rational(numerator << bits, scale);
    return exact ? { low, high: low } : toRoot(whole, { low, high: rational((numerator + 1n) << bits, scale) }, work);
  });
}

/** Halves until the interval is narrower than 1 / leading, where at most one fraction can be a root, and tries that one. */
function toRoot(p: Polynomial, interval: RootInterval, work: Work): RootInterval {
  const lead = leading(p) < 0n ? -leading(p) : leading(p);
  const bits = Math.max(bitLength(lead), bitLength(p[0] ?? 0n));
  let { low, high } = interval;
  if (signAt(p, low) === 0) low = nudge(p, low, high);
  if (signAt(p, high) === 0) high = nudge(p, high, low);
  let current: RootInterval = { low, high };
  while (
    (current.high.num * current.low.den - current.low.num * current.high.den) * lead >=
    current.low.den * current.high.den
  ) {
    // The sign at the middle, and a fraction brought to lowest terms.
    spend(work, 8 * p.length * (1 + bits / 2000), bits * p.length);
    current = halveInterval(p, current);
    if (current.low === current.high) return current;
  }
  const candidate = rational(ceiling(current.low.num * lead, current.low.den), lead);
  return signAt(p, candidate) === 0 ? { low: candidate, high: candidate } : current;
}

/** An end that is itself another root moves towards the other end until the sign is that of the inside. */
function nudge(p: Polynomial, end: Rational, other: Rational): Rational {
  const slope = signOf(scaledValueAt(derivePolynomial(p), end));
  const inward = end.num * other.den < other.num * end.den ? slope : -slope;
  let step = rational(other.num * end.den - end.num * other.den, end.den * other.den * 2n);
  for (;;) {
    const moved = rational(end.num * step.den + step.num * end.den, end.den * step.den);
    if (signAt(p, moved) === inward) return moved;
    step = rational(step.num, step.den * 2n);
  }
}

function ceiling(num: bigint, den: bigint): bigint {
  const quotient = num / den;
  return num > 0n && quotient * den !== num ? quotient + 1n : quotient;
}

/** Half of an interval with different signs of p at its ends. */
function halveInterval(p: Polynomial, { low, high }: RootInterval): RootInterval {
  const middle = rational(low.num * high.den + high.num * low.den, 2n * low.den * high.den);
  const sign = signAt(p, middle);
  if (sign === 0) return { low: middle, high: middle };
  return sign === signAt(p, low) ? { low: middle, high } : { low, high: middle };
}

/**
 * All real roots of a square-free polynomial, smallest first; fractions are found exactly. Throws Unsettled where that is
 * too much work.
 */
export function isolateRealRoots(p: Polynomial): RootInterval[] {
  if (p.length <= 1) return [];
  if (p.length === 2) {
    const root = rational(-(p[0] ?? 0n), p[1] ?? 1n);
    return [{ low: root, high: root }];
  }
  const work: Work = { left: mostAdditions };
  const roots: RootInterval[] = [];
  let rest = p;
  if (rest[0] === 0n) {
    const none = rational(0n);
    roots.push({ low: none, high: none });
    rest = rest.slice(1);
  }
  roots.push(...positiveRoots(rest, p, work));
  const mirror = (q: Polynomial): Polynomial => q.map((c, k) => (k % 2 === 0 ? c : -c));
  for (const root of positiveRoots(mirror(rest), mirror(p), work)) {
    roots.push({ low: negated(root.high), high: negated(root.low) });
  }
  return roots
    .map((root) =>
      root.low.num === root.high.num && root.low.den === root.high.den ? { low: root.low, high: root.low } : root,
    )
    .sort((a, b) =>
      a.low.num * b.low.den < b.low.num * a.low.den ? -1 : a.low.num * b.low.den > b.low.num * a.low.den ? 1 : 0,
    );
}

function negated(a: Rational): Rational {
  return { num: -a.num, den: a.den };
}
