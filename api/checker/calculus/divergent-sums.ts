import type { Expr } from '../../../shared/maths/expression.ts';
import { lettersOf } from '../../../shared/maths/letters.ts';
import { compareExpressions } from '../compare/compare-expressions.ts';
import type { CheckContext } from '../context.ts';
import * as Q from '../numbers/rational.ts';
import { Unsettled } from '../solving/unsettled.ts';
import { addExprs, infinityExpr, negateExpr, noValueExpr, zeroExpr } from './build.ts';
import { leadBeyond, sequenceLimits, type LimitValue } from './limit.ts';
import { signOfCoefficient } from './series-ring.ts';

/**
 * What an infinite sum without a finite value comes to: an infinity, or no value where the terms do not tend to 0 and change
 * their sign. Terms of one sign that tend to 0 are compared with 1/k and 1/(k ln k). Null for all others.
 */
export function divergentSum(body: Expr, index: string, context: CheckContext): Expr | null {
  if (context.numbers === 'complex' || lettersOf(body).some((name) => name !== index)) return null;
  try {
    const limits = sequenceLimits(body, index, context);
    const sign = signOfTotal(limits, context);
    if (sign !== 'zero') return sign === 0 ? noValueExpr : infinite(sign);
    const lead = limits.length === 1 ? leadBeyond(body, index, context) : null;
    if (!lead || lead.scale.growth.length > 0) return null;
    const order = Q.compare(lead.scale.p, Q.one);
    if (order > 0 || (order === 0 && lead.scale.q < -1)) return null;
    return infinite(signOfCoefficient(lead.coef, context));
  } catch (cause) {
    if (cause instanceof Unsettled) return null;
    throw cause;
  }
}

function infinite(sign: -1 | 0 | 1): Expr | null {
  if (sign === 0) return null;
  return sign > 0 ? infinityExpr : negateExpr(infinityExpr);
}

/** The sign of the sum of neighbouring terms far out; 'zero' where all terms tend to 0, 0 where only their sum may. */
function signOfTotal(limits: readonly LimitValue[], context: CheckContext): -1 | 0 | 1 | 'zero' {
  const infinite = limits.flatMap((limit) => (limit.kind === 'infinite' ? [limit.sign] : []));
  if (infinite.length > 0) return infinite.every((sign) => sign === infinite[0]) ? (infinite[0] as 1 | -1) : 0;
  const values = limits.map((limit) => (limit.kind === 'finite' ? limit.value : zeroExpr));
  if (values.every((value) => compareExpressions(value, zeroExpr, context).kind === 'equal')) return 'zero';
  return signOfCoefficient(addExprs(...values), context);
}
