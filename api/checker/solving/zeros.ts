import type { Graph } from '../values/graph.ts';
import type { SignMap } from './fraction-signs.ts';
import type { LineEnv } from './line-env.ts';
import type { RealNumber } from './real-number.ts';

/** Solves a part of the function: the recursion of the caller. */
export type SolvePart = (graph: Graph, env: LineEnv) => SignMap;

/** Zeros besides the breaks; open where there may be others. */
export interface Zeros {
  readonly points: readonly RealNumber[];
  readonly open: boolean;
  /** Whether each of the points is a zero wherever the function has a value. */
  readonly sure?: boolean;
  /** The sign of the function where it has values, for places at which its own digits do not tell. */
  readonly signAt?: (point: RealNumber) => -1 | 0 | 1 | null;
}
