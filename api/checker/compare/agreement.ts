import { bitLength } from '../numbers/rational.ts';
import { ballSign, magnitude } from '../numbers/ball.ts';
import { isKnown, isNonZero, subKnown, toBall } from '../values/arithmetic.ts';
import type { BallValue, KnownValue, Value } from '../values/value.ts';
import type { CheckContext } from '../context.ts';
import type { Point } from '../values/value.ts';
import { evaluatePair } from './pair.ts';
import type { Pair, PairValues } from './pair.ts';

/** How two values compare at one point. */
export type Agreement =
  /** Exactly the same number, or the same to at least 80 bits. */
  | 'same'
  /** Certainly apart. */
  | 'apart'
  | 'above-only'
  | 'below-only'
  | 'neither'
  /** The bits do not tell. */
  | 'blurred'
  | 'not-covered'
  | 'no-agreed-meaning'
  | 'limit';

const agreeingBits = 80;
export const precisions = [160, 420, 1_300] as const;

export interface PointResult {
  readonly agreement: Agreement;
  readonly values: PairValues;
  readonly bits: number;
}

/** Compares at a point, with more and more bits until they tell. */
export function compareAt(
  pair: Pair,
  point: Point,
  context: CheckContext,
  ladder: readonly number[] = precisions,
): PointResult {
  let result: PointResult | null = null;
  for (const bits of ladder) {
    const values = evaluatePair(pair, point, bits, context);
    result = { agreement: agreementOf(values.above, values.below, bits), values, bits };
    if (result.agreement !== 'blurred') return result;
  }
  if (result === null) throw new RangeError('a ladder of precisions without a step');
  return result;
}

export function agreementOf(above: Value, below: Value, bits: number): Agreement {
  if (isKnown(above) && isKnown(below)) return knownAgreement(above, below, bits);
  for (const value of [above, below]) if (value.kind === 'unknown' && value.reason !== 'precision') return value.reason;
  if (above.kind === 'unknown' || below.kind === 'unknown') return 'blurred';
  if (isKnown(above)) return 'above-only';
  return isKnown(below) ? 'below-only' : 'neither';
}

function knownAgreement(above: KnownValue, below: KnownValue, bits: number): Agreement {
  const difference = subKnown(above, below, bits);
  if (difference.kind === 'rational') return difference.value.num === 0n ? 'same' : 'apart';
  if (difference.kind !== 'ball') return 'apart';
  if (isNonZero(difference)) return 'apart';
  // No fraction is a multiple of pi, however close.
  if (above.kind !== 'ball' && below.kind !== 'ball') return 'blurred';
  const size = Math.max(sizeOf(toBall(above, bits)), sizeOf(toBall(below, bits)));
  const doubt = Math.max(bitLength(difference.re.rad), difference.im === null ? 0 : bitLength(difference.im.rad));
  // At high precision most of the bits have to agree, not only the first few.
  return size - doubt >= Math.max(agreeingBits, bits / 2) ? 'same' : 'blurred';
}

/** Bits of the larger part. */
function sizeOf(value: BallValue): number {
  const re = ballSign(value.re) === 0 ? 0 : bitLength(magnitude(value.re.mid));
  const im = value.im === null || ballSign(value.im) === 0 ? 0 : bitLength(magnitude(value.im.mid));
  return Math.max(re, im);
}
