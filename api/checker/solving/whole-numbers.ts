import { floor, rational } from '../numbers/rational.ts';
import { enclose, rationalNumber, type RealNumber } from './real-number.ts';
import { openIf, simplify, type RealSet } from './real-set.ts';
import { Unsettled } from './unsettled.ts';

const mostNumbers = 500n;

/** The largest whole number that is not above a point. */
function floorOf(point: RealNumber): bigint {
  if (point.kind === 'rational') return floor(point.value);
  const ball = enclose(point, 160);
  const [low, high] = [(ball.mid - ball.rad) >> 160n, (ball.mid + ball.rad) >> 160n];
  if (low !== high) throw new Unsettled('not-settled');
  return low;
}

function isWholePoint(point: RealNumber): boolean {
  return point.kind === 'rational' && point.value.den === 1n;
}

/**
 * The whole numbers of a set, in one form for equal sets: single points, and rays that begin at a whole number. Throws
 * Unsettled for very long stretches.
 */
export function wholeNumbersOf(set: RealSet): RealSet {
  const found = new Set<bigint>();
  let leftEnd: bigint | null = null;
  let rightStart: bigint | null = null;
  set.points.forEach((point, k) => {
    if (set.at[k] && isWholePoint(point)) found.add(floorOf(point));
  });
  set.between.forEach((inside, k) => {
    if (!inside) return;
    const [low, high] = [set.points[k - 1], set.points[k]];
    const first = low ? floorOf(low) + 1n : null;
    const last = high ? (isWholePoint(high) ? floorOf(high) - 1n : floorOf(high)) : null;
    if (first === null) leftEnd = last;
    else if (last === null) rightStart = first;
    else addRange(found, first, last);
  });
  if (set.between.length === 1) return set;
  return withRays(found, leftEnd, rightStart, set);
}

function addRange(found: Set<bigint>, first: bigint, last: bigint): void {
  if (last - first > mostNumbers) throw new Unsettled('limit');
  for (let n = first; n <= last; n += 1n) found.add(n);
}

/** Numbers next to a ray belong to it. */
function withRays(found: Set<bigint>, leftEnd: bigint | null, rightStart: bigint | null, set: RealSet): RealSet {
  let [left, right] = [leftEnd, rightStart];
  while (left !== null && found.delete(left + 1n)) left += 1n;
  while (right !== null && found.delete(right - 1n)) right -= 1n;
  const numbers = [...found].sort((a, b) => (a < b ? -1 : 1));
  const all = [...(left === null ? [] : [left]), ...numbers, ...(right === null ? [] : [right])];
  return simplify({
    points: all.map((n) => rationalNumber(rational(n))),
    at: all.map(() => true),
    between: [left !== null, ...all.map((_, k) => k === all.length - 1 && right !== null)],
    reached: set.reached,
    ...openIf(set),
  });
}
