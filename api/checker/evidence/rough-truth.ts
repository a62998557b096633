import type { Line, RelationSign } from '../../../shared/maths/expression.ts';
import { isFiniteNumber, isNear, type Complex } from './complex-double.ts';
import { estimate, type Place } from './estimate.ts';

/** Whether a line is true at a place, to the precision of doubles; null where that is not known. */
export function roughTruth(line: Line, at: Place): boolean | null {
  switch (line.kind) {
    case 'relation':
      return compare(estimate(line.left, at), line.sign, estimate(line.right, at));
    case 'chain': {
      const values = line.members.map((member) => estimate(member, at));
      return every(line.signs.map((sign, k) => compare(values[k] as Complex, sign, values[k + 1] as Complex)));
    }
    case 'all':
      return every(line.parts.map((part) => roughTruth(part, at)));
    case 'any': {
      const found = every(line.parts.map((part) => negate(roughTruth(part, at))));
      return negate(found);
    }
    default:
      return null;
  }
}

function every(parts: readonly (boolean | null)[]): boolean | null {
  if (parts.includes(false)) return false;
  return parts.includes(null) ? null : true;
}

function negate(truth: boolean | null): boolean | null {
  return truth === null ? null : !truth;
}

function compare(a: Complex, sign: RelationSign, b: Complex): boolean | null {
  if (!isFiniteNumber(a) || !isFiniteNumber(b)) return false;
  if (sign === '=') return isNear(a, b);
  if (sign === '!=') return !isNear(a, b);
  if (sign === 'approx' || a.im !== 0 || b.im !== 0) return null;
  if (isNear(a, b)) return sign === '<=' || sign === '>=';
  return sign === '<' || sign === '<=' ? a.re < b.re : a.re > b.re;
}
