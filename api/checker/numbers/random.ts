/** Whole numbers from 0 up to (not including) a bound, the same on every machine for the same seed. */
export type Random = (bound: number) => number;

/** Mulberry32, public domain by Tommy Ettinger. */
export function createRandom(seed: number): Random {
  let state = seed >>> 0;
  return (bound) => {
    state = (state + 0x6d2b79f5) >>> 0;
    let t = state;
    t = Math.imul(t ^ (t >>> 15), t | 1);
    t ^= t + Math.imul(t ^ (t >>> 7), t | 61);
    return Math.floor((((t ^ (t >>> 14)) >>> 0) / 4_294_967_296) * bound);
  };
}
