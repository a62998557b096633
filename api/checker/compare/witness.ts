import type { CheckContext } from '../context.ts';
import { valueTex } from '../values/value-tex.ts';
import type { Point } from '../values/value.ts';
import { agreementOf } from './agreement.ts';
import type { Witness } from './comparison.ts';
import { evaluatePair } from './pair.ts';
import type { Pair } from './pair.ts';

/** The values at a point where the lines are apart, computed anew with more bits; null should they not be apart. */
export function witnessAt(pair: Pair, point: Point, bits: number, context: CheckContext): Witness | null {
  const finer = bits + 128;
  const { above, below } = evaluatePair(pair, point, finer, context);
  if (agreementOf(above, below, finer) !== 'apart') return null;
  const at = new Map([...point].filter(([name]) => pair.names.includes(name)));
  const atTex: Record<string, string> = {};
  for (const [name, value] of at) atTex[name] = valueTex(value, finer);
  return { at, atTex, above: valueTex(above, finer), below: valueTex(below, finer) };
}
