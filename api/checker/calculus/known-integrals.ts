import type { Expr } from '../../../shared/maths/expression.ts';
import type { CheckContext } from '../context.ts';
import { signOfCoefficient } from './series-ring.ts';
import { divExprs, isZeroExpr, mulExprs, negateExpr, numberOf, piExpr, sqrtExpr } from './build.ts';
import { factorise, polynomialIn } from './integrand.ts';
import { infinitySign } from './limit.ts';

/** The integral of c exp(-a x^2) over the whole line or half of it: DLMF 7.2.1, 7.7.1. */
export function knownIntegral(
  { integrand, variable, from, to }: Extract<Expr, { kind: 'integral' }>,
  context: CheckContext,
): Expr | null {
  const parts = from && to ? [from, to].map((end) => (isZeroExpr(end) ? 0 : infinitySign(end))) : [];
  const [low, high] = parts;
  if (low === undefined || high === undefined || low === null || high === null || low >= high) return null;
  const { coef, factors } = factorise(integrand, variable);
  const [only] = factors;
  const exponent =
    factors.length === 1 && only?.base.kind === 'call' && only.base.name === 'exp' ? only.base.args[0] : undefined;
  const coefs = exponent && polynomialIn(exponent, variable);
  const [constant, linear, square] = coefs ?? [];
  if (coefs?.length !== 3 || !constant || !linear || !square || !isZeroExpr(constant) || !isZeroExpr(linear))
    return null;
  if (signOfCoefficient(square, context) >= 0) return null;
  return mulExprs(coef, numberOf(high - low, 2), sqrtExpr(divExprs(piExpr, negateExpr(square))));
}
