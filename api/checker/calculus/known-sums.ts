import type { Expr } from '../../../shared/maths/expression.ts';
import { sameExpr } from '../../../shared/maths/same.ts';
import * as Q from '../numbers/rational.ts';
import {
  addExprs,
  callOf,
  divExprs,
  letterOf,
  mulExprs,
  numberOf,
  oneExpr,
  piExpr,
  powExprs,
  rationalExpr,
  rationalOf,
  subExprs,
  zeroExpr,
} from './build.ts';
import { factorise, isFree, linearIn } from './integrand.ts';
import { substitute } from './substitute.ts';

const mostSkipped = 40n;

/**
 * Infinite sums that no table of differences gives: c/k^2 and c/k^4 (DLMF 25.6.1), and c x^k/k!, the series of the
 * exponential function (DLMF 4.2.19).
 */
export function knownInfiniteSum(body: Expr, index: string, from: Expr): Expr | null {
  const start = rationalOf(from);
  if (!start || start.den !== 1n) return null;
  return zetaSum(body, index, start.num) ?? exponentialSum(body, index, start.num);
}

function zetaSum(body: Expr, index: string, start: bigint): Expr | null {
  const { coef, factors } = factorise(body, index);
  const [only] = factors;
  if (factors.length !== 1 || only?.base.kind !== 'letter' || start < 1n || start > mostSkipped) return null;
  const order = Q.equals(only.times, Q.rational(-2)) ? 2 : Q.equals(only.times, Q.rational(-4)) ? 4 : null;
  if (order === null) return null;
  const whole =
    order === 2
      ? divExprs(powExprs(piExpr, numberOf(2)), numberOf(6))
      : divExprs(powExprs(piExpr, numberOf(4)), numberOf(90));
  return mulExprs(coef, subExprs(whole, firstTerms(powExprs(letterOf(index), numberOf(-order)), index, 1n, start)));
}

/** The terms from `low` up to, not including, `high`. */
function firstTerms(body: Expr, index: string, low: bigint, high: bigint): Expr {
  const parts: Expr[] = [zeroExpr];
  for (let k = low; k < high; k += 1n) parts.push(substitute(body, index, rationalExpr({ num: k, den: 1n })));
  return addExprs(...parts);
}

function exponentialSum(body: Expr, index: string, start: bigint): Expr | null {
  if (body.kind !== 'quotient' || body.denominator.kind !== 'factorial' || start < 0n || start > mostSkipped)
    return null;
  if (!sameExpr(body.denominator.operand, letterOf(index))) return null;
  const { coef, base } = powerOfIndex(body.numerator, index) ?? {};
  if (!coef || !base) return null;
  const one = (k: bigint): Expr => {
    let product = 1n;
    for (let j = 2n; j <= k; j += 1n) product *= j;
    return divExprs(k === 0n ? oneExpr : powExprs(base, numberOf(k)), numberOf(product));
  };
  const parts: Expr[] = [zeroExpr];
  for (let k = 0n; k < start; k += 1n) parts.push(one(k));
  return mulExprs(coef, subExprs(callOf('exp', base), addExprs(...parts)));
}

/** c x^k, with c and x free of k; (-1)^k and 2^k among the factors belong to x. */
function powerOfIndex(expr: Expr, index: string): { coef: Expr; base: Expr } | null {
  if (isFree(expr, index)) return { coef: expr, base: oneExpr };
  if (expr.kind === 'product') {
    const parts = expr.factors.map((factor) => powerOfIndex(factor, index));
    if (parts.includes(null)) return null;
    const known = parts as { coef: Expr; base: Expr }[];
    return { coef: mulExprs(...known.map(({ coef }) => coef)), base: mulExprs(...known.map(({ base }) => base)) };
  }
  const linear = expr.kind === 'power' && isFree(expr.base, index) ? linearIn(expr.exponent, index) : null;
  if (expr.kind !== 'power' || !linear) return null;
  return { coef: powExprs(expr.base, linear.constant), base: powExprs(expr.base, linear.slope) };
}
