import type { CheckContext } from '../context.ts';
import { isKnown, subKnown, toBall } from '../values/arithmetic.ts';
import { usualDigits, valueTex } from '../values/value-tex.ts';
import type { Point, Value } from '../values/value.ts';
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
  return { at, atTex, ...shownApart(above, below, finer) };
}

/** As few digits as show that the values differ. */
function shownApart(above: Value, below: Value, bits: number): { above: string; below: string } {
  let digits = usualDigits;
  while (digits < mostDigits && decimals(above, bits, digits) === decimals(below, bits, digits)) digits += 3;
  const shown = { above: valueTex(above, bits, digits), below: valueTex(below, bits, digits) };
  if (digits < mostDigits || !isKnown(above) || !isKnown(below)) return shown;
  // Closer than anybody wants to read: the one as the other and the difference.
  const difference = valueTex(subKnown(above, below, bits), bits);
  const usual = valueTex(below, bits);
  return { above: `${usual}${difference.startsWith('-') ? '' : '+'}${difference}`, below: usual };
}

function decimals(value: Value, bits: number, digits: number): string {
  return isKnown(value) ? valueTex(toBall(value, bits), bits, digits) : '';
}

const mostDigits = 60;
