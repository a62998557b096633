import type { CheckContext } from '../context.ts';
import type { Point } from '../values/value.ts';
import { compareAt, precisions } from './agreement.ts';
import type { Agreement, PointResult } from './agreement.ts';
import { isInside } from './pair.ts';
import type { Pair } from './pair.ts';

/** What trying many points has shown. */
export interface Samples {
  readonly counts: Readonly<Record<Agreement, number>>;
  /** A point where the lines are certainly apart. */
  readonly apart: { readonly point: Point; readonly bits: number } | null;
  /** Points where only one line has a value, for the conditions. */
  readonly aboveOnly: readonly Sample[];
  readonly belowOnly: readonly Sample[];
  /** Points where both have a value. */
  readonly common: readonly Sample[];
  /** Whether a point inside both domains was found, and inside the domain of the line above. */
  readonly inside: boolean;
  readonly insideAbove: boolean;
}

export interface Sample {
  readonly point: Point;
  readonly result: PointResult;
}

const kept = 8;
const mostBlurred = 4;
const coarse = [160] as const;

export interface SampleLimits {
  /** Stop after so many agreements. */
  readonly agreements: number;
  /** False as long as points remain that must be tried. */
  readonly mayStop?: () => boolean;
}

/** Tries points until the lines are apart at one or agree at enough of them. */
export function takeSamples(pair: Pair, points: Iterable<Point>, context: CheckContext, limits: SampleLimits): Samples {
  const counts: Record<Agreement, number> = {
    same: 0,
    apart: 0,
    'above-only': 0,
    'below-only': 0,
    neither: 0,
    blurred: 0,
    'not-covered': 0,
    'no-agreed-meaning': 0,
    limit: 0,
  };
  const aboveOnly: Sample[] = [];
  const belowOnly: Sample[] = [];
  const common: Sample[] = [];
  let inside = false;
  let insideAbove = false;
  const samples = (apart: Samples['apart']): Samples => ({
    counts,
    apart,
    aboveOnly,
    belowOnly,
    common,
    inside,
    insideAbove,
  });
  for (const point of points) {
    // Where many points stay blurred at every precision, more of them tell nothing.
    const result = compareAt(pair, point, context, counts.blurred < mostBlurred ? precisions : coarse);
    if (counts.blurred > 6 * mostBlurred && counts.same === 0) return samples(null);
    const { agreement, values, bits } = result;
    counts[agreement] += 1;
    if (agreement === 'apart') return samples({ point, bits });
    if (agreement === 'above-only' && aboveOnly.length < kept) aboveOnly.push({ point, result });
    if (agreement === 'below-only' && belowOnly.length < kept) belowOnly.push({ point, result });
    if (agreement === 'above-only' || agreement === 'same') {
      insideAbove ||= isInside(pair.needsAbove, pair, values.all, bits);
    }
    if (agreement !== 'same') continue;
    if (common.length < kept) common.push({ point, result });
    inside ||= isInside(pair.needsAbove, pair, values.all, bits) && isInside(pair.needsBelow, pair, values.all, bits);
    if (counts.same >= limits.agreements && inside && (limits.mayStop?.() ?? true)) return samples(null);
  }
  return samples(null);
}
