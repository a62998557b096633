/** Numbers strictly between two ends, denser towards them; infinite ends are followed over many scales. */
export function positionsBetween(low: number, high: number, waves: number): number[] {
  const finite = Number.isFinite(low) && Number.isFinite(high);
  const positions = finite ? insideFinite(low, high, waves) : insideInfinite(low, high);
  return positions.filter((x) => x > low && x < high).sort((a, b) => a - b);
}

function insideFinite(low: number, high: number, waves: number): number[] {
  const width = high - low;
  const count = Math.min(4000, 40 + Math.ceil(waves * 16));
  const positions = Array.from({ length: count }, (_, k) => low + (width * (k + 0.4931)) / count);
  for (let k = 6; k < 24; k += 1) {
    const near = width * 2 ** -k;
    positions.push(low + near, high - near);
  }
  return positions;
}

function insideInfinite(low: number, high: number): number[] {
  const positions: number[] = [];
  for (let k = -12; k <= 15; k += 0.25) {
    // No power of two times a short root: those are where zeros lie in school work.
    const far = 2 ** k * 1.0137;
    if (Number.isFinite(low)) positions.push(low + far);
    else if (Number.isFinite(high)) positions.push(high - far);
    else positions.push(far, -far);
  }
  if (!Number.isFinite(low) && !Number.isFinite(high)) positions.push(0.0123);
  return positions;
}

/** Where a sampled function changes sign, and where it comes close to zero without changing it. */
export interface Crossing {
  readonly kind: 'crossing' | 'touching';
  readonly low: number;
  readonly high: number;
}

/** Places without a value are noise or overflow: the function has values all along between its breaks. */
export function findCrossings(f: (x: number) => number, positions: readonly number[]): Crossing[] {
  const found: Crossing[] = [];
  const known = positions.map((x) => ({ x, value: f(x) })).filter(({ value }) => !Number.isNaN(value));
  for (let k = 0; k + 1 < known.length; k += 1) {
    const [before, here, next] = [known[k - 1], known[k], known[k + 1]];
    if (!here || !next) continue;
    const [b, c] = [here.value, next.value];
    if (b !== 0 && c !== 0 && Math.sign(b) === -Math.sign(c))
      found.push({ kind: 'crossing', low: here.x, high: next.x });
    else if (before && isLowest(before.value, b, c)) found.push({ kind: 'touching', low: before.x, high: next.x });
  }
  return found;
}

function isLowest(a: number, b: number, c: number): boolean {
  if (b === 0) return a !== 0 && c !== 0;
  // Where doubles do not change any more the function runs level, as exponentials far out: nothing is touched there.
  const flat = 1e-12 * Math.abs(b);
  if (Math.abs(a - b) <= flat && Math.abs(c - b) <= flat) return false;
  return Math.abs(b) <= Math.abs(a) && Math.abs(b) <= Math.abs(c) && Math.sign(a) === Math.sign(c);
}

/** The place of a change of sign, by halving; where rounding hides the sign it is found. */
export function placeOfCrossing(f: (x: number) => number, low: number, high: number): number {
  let [a, b] = [low, high];
  const below = Math.sign(f(a));
  for (let k = 0; k < 80; k += 1) {
    const middle = (a + b) / 2;
    const sign = Math.sign(f(middle));
    if (Number.isNaN(sign) || sign === 0 || middle === a || middle === b) return middle;
    if (sign === below) a = middle;
    else b = middle;
  }
  return (a + b) / 2;
}

/** The place of the smallest size in an interval, by golden section, and the size there; noise counts as zero. */
export function smallestSize(f: (x: number) => number, low: number, high: number): { at: number; size: number } {
  const golden = (Math.sqrt(5) - 1) / 2;
  const size = (x: number): number => Math.abs(f(x)) || 0;
  let [a, b] = [low, high];
  let x = b - golden * (b - a);
  let y = a + golden * (b - a);
  let fx = size(x);
  let fy = size(y);
  for (let k = 0; k < 60; k += 1) {
    if (fx < fy) {
      [b, y, fy] = [y, x, fx];
      x = b - golden * (b - a);
      fx = size(x);
    } else {
      [a, x, fx] = [x, y, fy];
      y = a + golden * (b - a);
      fy = size(y);
    }
  }
  return fx < fy ? { at: x, size: fx } : { at: y, size: fy };
}
