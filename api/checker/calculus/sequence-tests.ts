import type { Expr } from '../../../shared/maths/expression.ts';
import { lettersOf } from '../../../shared/maths/letters.ts';
import type { CheckContext } from '../context.ts';
import * as Q from '../numbers/rational.ts';
import { Unsettled } from '../solving/unsettled.ts';
import { callOf, mulExprs, oneExpr, subExprs } from './build.ts';
import { leadBeyond, sequenceLimits } from './limit.ts';
import { signOfCoefficient } from './series-ring.ts';
import { byParity } from './turns.ts';
import { ratioOfTerms } from './towers.ts';

/** Whether the sum of the terms without their signs is certainly finite: by the ratio of neighbours, or by powers of 1/k. */
export function convergesAbsolutely(body: Expr, index: string, context: CheckContext): boolean {
  if (lettersOf(body).some((name) => name !== index) || context.numbers === 'complex') return false;
  return attempt(() => {
    const ratio = ratioOfTerms(body, index, context);
    const limits = ratio ? sequenceLimits(callOf('abs', ratio), index, context) : [];
    const isSmall = limits.every((limit) => {
      if (limit.kind !== 'finite') return false;
      return signOfCoefficient(subExprs(oneExpr, mulExprs(limit.value, limit.value)), context) > 0;
    });
    if (limits.length > 0 && isSmall) return true;
    return (byParity(body, index, context) ?? [body]).every((part) => {
      const lead = leadBeyond(part, index, context);
      return lead !== null && lead.scale.growth.length === 0 && Q.compare(lead.scale.p, Q.one) > 0;
    });
  });
}

/** Whether the power series with these factors certainly has a value near zero: the ratio of neighbours is bounded. */
export function hasRadius(coefficient: Expr, index: string, context: CheckContext): boolean {
  return attempt(() => {
    const ratio = ratioOfTerms(coefficient, index, context);
    const limits = ratio ? sequenceLimits(callOf('abs', ratio), index, context) : [];
    if (limits.length > 0) return limits.every((limit) => limit.kind === 'finite');
    const lead = leadBeyond(coefficient, index, context);
    return lead !== null && lead.scale.growth.length === 0;
  });
}

function attempt(test: () => boolean): boolean {
  try {
    return test();
  } catch (cause) {
    if (cause instanceof Unsettled) return false;
    throw cause;
  }
}
