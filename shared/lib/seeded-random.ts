/** A source of numbers in [0, 1) that gives the same numbers for the same seed on every machine. */
export type Random = () => number;

/** Mulberry32 over an FNV-1a hash of the seed: for shuffling, never for secrets. */
export function seededRandom(seed: string): Random {
  let state = 0x811c9dc5;
  for (let i = 0; i < seed.length; i += 1) state = Math.imul(state ^ seed.charCodeAt(i), 0x01000193);
  return () => {
    state = (state + 0x6d2b79f5) | 0;
    let mixed = Math.imul(state ^ (state >>> 15), 1 | state);
    mixed = (mixed + Math.imul(mixed ^ (mixed >>> 7), 61 | mixed)) ^ mixed;
    return ((mixed ^ (mixed >>> 14)) >>> 0) / 4_294_967_296;
  };
}

/** A copy in random order (Fisher and Yates). */
export function shuffled<T>(items: readonly T[], random: Random): T[] {
  const copy = [...items];
  for (let last = copy.length - 1; last > 0; last -= 1) {
    const other = Math.floor(random() * (last + 1));
    const moved = copy[last] as T;
    copy[last] = copy[other] as T;
    copy[other] = moved;
  }
  return copy;
}
