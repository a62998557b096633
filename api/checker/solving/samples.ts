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

export function findCrossings(f: (x: number) => number, positions: readonly number[]): Crossing[] {
  const found: Crossing[] = [];
  const values = positions.map(f);
  for (let k = 0; k + 1 < positions.length; k += 1) {
    const [a, b, c] = [values[k - 1] ?? Number.NaN, values[k] as number, values[k + 1] as number];
    const [x, y] = [positions[k] as number, positions[k + 1] as number];
    if (Number.isNaN(b)) continue;
    if (b !== 0 && c !== 0 && Math.sign(b) === -Math.sign(c)) found.push({ kind: 'crossing', low: x, high: y });
    else if (b === 0 && a !== 0 && c !== 0) found.push({ kind: 'touching', low: positions[k - 1] ?? x, high: y });
    else if (Math.abs(b) <= Math.abs(a) && Math.abs(b) <= Math.abs(c) && Math.sign(a) === Math.sign(c)) {
      found.push({ kind: 'touching', low: positions[k - 1] as number, high: y });
    }
  }
  return found;
}

/** The place of the smallest size in an interval, by golden section, and the size there. */
export function smallestSize(f: (x: number) => number, low: number, high: number): { at: number; size: number } {
  const golden = (Math.sqrt(5) - 1) / 2;
  let [a, b] = [low, high];
  let x = b - golden * (b - a);
  let y = a + golden * (b - a);
  let fx = Math.abs(f(x));
  let fy = Math.abs(f(y));
  for (let k = 0; k < 60; k += 1) {
    if (fx < fy || Number.isNaN(fy)) {
      [b, y, fy] = [y, x, fx];
      x = b - golden * (b - a);
      fx = Math.abs(f(x));
    } else {
      [a, x, fx] = [x, y, fy];
      y = a + golden * (b - a);
      fy = Math.abs(f(y));
    }
  }
  return fx < fy ? { at: x, size: fx } : { at: y, size: fy };
}
