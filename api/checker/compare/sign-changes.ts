import type { DoubleFunction } from '../solving/double-evaluator.ts';

/** Distances from zero at which a function is tried: evenly where people look, then by powers of ten. */
const distances: readonly number[] = [
  1e-13, 1e-9, 1e-6, 1e-4, 1e-3, 1e-2, 0.05, 0.1, 0.2, 0.35, 0.5, 1, 1.5, 2, 2.5, 3, 3.5, 4, 4.5, 5, 5.5, 6, 6.5, 7,
  7.5, 8, 8.5, 9, 9.5, 10, 11.5, 13, 15, 17, 20, 25, 30, 40, 50, 70, 100, 200, 300, 600, 1e3, 3e3, 1e4, 3e4, 1e5, 1e6,
  1e7, 1e8, 1e9, 1e10, 1e12, 1e14, 1e16,
];
const mostOnASide = 3;
const halvings = 50;
const narrowings = 60;
/** A least size below this share of its neighbours' may be zero. */
const touching = 1e-6;

/**
 * Where a function of doubles changes its sign or comes down to zero, the places nearest to zero first on both sides of
 * it. Places to look at, nothing more: some may be missing.
 */
export function signChanges(f: DoubleFunction): number[] {
  return [...changesAlong(f, 1), ...changesAlong(f, -1)];
}

interface Tried {
  readonly x: number;
  readonly y: number;
}

function changesAlong(f: DoubleFunction, side: 1 | -1): number[] {
  const found: number[] = [];
  let before: Tried | null = null;
  let known: Tried | null = null;
  let last: Tried = { x: 0, y: f(0) };
  for (const distance of distances) {
    if (found.length >= mostOnASide) break;
    const next: Tried = { x: side * distance, y: f(side * distance) };
    if (!Number.isNaN(last.y)) known = last;
    // A sum that is as good as zero has no value in doubles.
    else if (known !== null && known.y * next.y < 0) found.push(bisect(f, known, next));
    if (Number.isNaN(last.y) !== Number.isNaN(next.y)) found.push(...changesNearEdge(f, last, next));
    else found.push(...changesBetween(f, before, last, next));
    before = Number.isNaN(last.y) ? null : last;
    last = next;
  }
  return found;
}

function changesBetween(f: DoubleFunction, before: Tried | null, last: Tried, next: Tried): number[] {
  if (next.y === 0) return [next.x];
  if (last.y * next.y < 0) return [bisect(f, last, next)];
  if (before === null || !isSmaller(last, before) || !isSmaller(last, next) || before.y * next.y < 0) return [];
  return changesAtLeast(f, before, next);
}

function isSmaller(a: Tried, b: Tried): boolean {
  return Math.abs(a.y) <= Math.abs(b.y);
}

/** Between two places of one sign, with a smaller size between them: down to the least size, by golden sections. */
function changesAtLeast(f: DoubleFunction, from: Tried, to: Tried): number[] {
  const ratio = (Math.sqrt(5) - 1) / 2;
  let [low, high] = [from.x, to.x];
  let a: Tried = at(f, high - ratio * (high - low));
  let b: Tried = at(f, low + ratio * (high - low));
  for (let k = 0; k < narrowings; k += 1) {
    for (const tried of [a, b]) {
      if (tried.y * from.y < 0) return [bisect(f, from, tried), bisect(f, tried, to)];
    }
    if (isSmaller(a, b)) {
      high = b.x;
      b = a;
      a = at(f, high - ratio * (high - low));
    } else {
      low = a.x;
      a = b;
      b = at(f, low + ratio * (high - low));
    }
  }
  const largest = Math.max(Math.abs(from.y), Math.abs(to.y));
  return Math.abs(a.y) < touching * largest || Number.isNaN(a.y) ? [a.x] : [];
}

function at(f: DoubleFunction, x: number): Tried {
  return { x, y: f(x) };
}

/** One of the two places has no value: the edge between them is approached by powers of ten. */
function changesNearEdge(f: DoubleFunction, a: Tried, b: Tried): number[] {
  let [inside, outside] = Number.isNaN(a.y) ? [b, a.x] : [a, b.x];
  const far = inside;
  for (let k = 0; k < halvings; k += 1) {
    const middle = at(f, (inside.x + outside) / 2);
    if (Number.isNaN(middle.y)) outside = middle.x;
    else inside = middle;
  }
  const found: number[] = [];
  let last = far;
  for (let k = 1; k <= 15; k += 2) {
    const next = at(f, inside.x + (far.x - inside.x) * 10 ** -k);
    if (last.y * next.y < 0) found.push(bisect(f, last, next));
    last = next;
  }
  return found;
}

function bisect(f: DoubleFunction, from: Tried, to: Tried): number {
  let [low, high] = [from.x, to.x];
  for (let k = 0; k < halvings; k += 1) {
    // Far from each other, places are halved by their size.
    const isWide = low * high > 0 && (low / high > 4 || high / low > 4);
    const middle = isWide ? Math.sign(low) * Math.sqrt(low * high) : (low + high) / 2;
    if (f(middle) * from.y > 0) low = middle;
    else high = middle;
  }
  return (low + high) / 2;
}
