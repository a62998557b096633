import type { CheckContext } from '../context.ts';
import { maximumBits } from '../numbers/elementary.ts';
import * as Q from '../numbers/rational.ts';
import type { Point } from '../values/value.ts';
import { compareAt } from './agreement.ts';
import type { PointResult } from './agreement.ts';
import type { Pair } from './pair.ts';

const leastBits = 1_000;
const steepNames: ReadonlySet<string> = new Set(['exp', 'sinh', 'cosh', 'tanh', 'coth', 'sech', 'csch']);

/**
 * The precision at which agreement means something: terms as small as the numbers written in the lines can make them,
 * such as 10^-60 or e^-200, have to show. Null where that is out of reach.
 */
function confirmingBits(pair: Pair): number | null {
  let bits = leastBits;
  let steep = false;
  let sizes = 0;
  pair.nodes.forEach((node, index) => {
    if (pair.needed[index] !== 1) return;
    if (node.op === 'number') {
      bits += 2 * (Q.bitLength(node.value.num) + Q.bitLength(node.value.den) - 2);
      sizes += Math.min(Math.abs(Q.toNumber(node.value)), maximumBits);
    }
    if (node.op === 'power') bits += 4 * Math.min(Math.abs(node.exponent), maximumBits);
    steep ||= node.op === 'pow' || (node.op === 'call' && steepNames.has(node.name));
  });
  if (steep) bits += Math.ceil(3 * sizes);
  return bits > maximumBits - 1_000 ? null : bits;
}

/** Compares once more with many bits; null where not enough of them are to be had. */
export function confirmAt(pair: Pair, point: Point, context: CheckContext): PointResult | null {
  const bits = confirmingBits(pair);
  return bits === null ? null : compareAt(pair, point, context, [bits]);
}
