/** One side of the pairing: what somebody has already, and how much they may have in the end. */
export interface Place {
  readonly load: number;
  readonly most: number;
}

export interface PairingInput {
  readonly reviewers: readonly Place[];
  readonly authors: readonly Place[];
  /** What pairing the two costs, from 0 to 100 000; null: they are never paired. */
  readonly cost: (reviewer: number, author: number) => number | null;
}

/** `[reviewer, author]` as indices into the input. */
export type IndexPair = readonly [number, number];

/** More than all pair costs together, so that evenness always comes first. */
const UNEVENNESS = 100_000_000;

interface Arc {
  readonly to: number;
  readonly cost: number;
  room: number;
  /** Index of the arc back, in the list of `to`. */
  readonly back: number;
}

/**
 * As many pairs as there can be; among those the most even loads on both sides (least sum of squares, so authors
 * differ by at most one wherever that is possible); among those the least cost.
 * A flow of least cost by shortest augmenting paths, each place's next unit costing more than its last.
 */
export function pairEvenly(input: PairingInput): IndexPair[] {
  const { reviewers, authors } = input;
  const source = reviewers.length + authors.length;
  const sink = source + 1;
  const arcs: Arc[][] = Array.from({ length: sink + 1 }, () => []);
  const connect = (from: number, to: number, cost: number) => {
    const forth = arcs[from] as Arc[];
    const back = arcs[to] as Arc[];
    forth.push({ to, cost, room: 1, back: back.length });
    back.push({ to: from, cost: -cost, room: 0, back: forth.length - 1 });
  };
  reviewers.forEach(({ load, most }, r) => {
    for (let unit = load; unit < most; unit += 1) connect(source, r, UNEVENNESS * (2 * unit + 1));
  });
  authors.forEach(({ load, most }, a) => {
    for (let unit = load; unit < most; unit += 1) connect(reviewers.length + a, sink, UNEVENNESS * (2 * unit + 1));
  });
  reviewers.forEach((_, r) => {
    authors.forEach((__, a) => {
      const cost = input.cost(r, a);
      if (cost !== null) connect(r, reviewers.length + a, cost);
    });
  });
  while (augment(arcs, source, sink));
  return readPairs(arcs, reviewers.length, authors.length);
}

/** Sends one unit along the cheapest path; false when there is none. Costs may be negative, so labels are corrected by a queue. */
function augment(arcs: readonly Arc[][], source: number, sink: number): boolean {
  const distance = new Float64Array(arcs.length).fill(Infinity);
  const reachedBy: (readonly [number, number] | null)[] = arcs.map(() => null);
  const waiting = new Uint8Array(arcs.length);
  const queue = [source];
  distance[source] = 0;
  for (let head = 0; head < queue.length; head += 1) {
    const node = queue[head] as number;
    waiting[node] = 0;
    const list = arcs[node] as Arc[];
    for (let i = 0; i < list.length; i += 1) {
      const { to, cost, room } = list[i] as Arc;
      const through = (distance[node] as number) + cost;
      if (room === 0 || through >= (distance[to] as number)) continue;
      distance[to] = through;
      reachedBy[to] = [node, i];
      if (!waiting[to]) queue.push(to);
      waiting[to] = 1;
    }
  }
  if (distance[sink] === Infinity) return false;
  for (let node = sink; node !== source;) {
    const [from, i] = reachedBy[node] as readonly [number, number];
    const arc = (arcs[from] as Arc[])[i] as Arc;
    arc.room -= 1;
    ((arcs[node] as Arc[])[arc.back] as Arc).room += 1;
    node = from;
  }
  return true;
}

function readPairs(arcs: readonly Arc[][], reviewers: number, authors: number): IndexPair[] {
  const pairs: IndexPair[] = [];
  for (let r = 0; r < reviewers; r += 1) {
    for (const { to, room } of arcs[r] as Arc[]) {
      if (to >= reviewers && to < reviewers + authors && room === 0) pairs.push([r, to - reviewers]);
    }
  }
  return pairs;
}
