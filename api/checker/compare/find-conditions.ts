import type { CheckContext } from '../context.ts';
import type { Condition } from './comparison.ts';
import type { Pair } from './pair.ts';
import type { Region } from './points.ts';
import type { Samples } from './sampling.ts';

export interface FoundConditions {
  readonly excluded: readonly Condition[];
  readonly cancelled: readonly Condition[];
}

export function findConditions(_pair: Pair, _samples: Samples, _region: Region, _context: CheckContext): FoundConditions {
  return { excluded: [], cancelled: [] };
}
