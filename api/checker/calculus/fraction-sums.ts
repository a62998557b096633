import type { Expr } from '../../../shared/maths/expression.ts';
import * as Q from '../numbers/rational.ts';
import type { Rational } from '../numbers/rational.ts';
import {
  addExprs,
  callOf,
  divExprs,
  mulExprs,
  negateExpr,
  numberOf,
  oneExpr,
  piExpr,
  powExprs,
  rationalExpr,
  sqrtExpr,
  subExprs,
  zeroExpr,
} from './build.ts';
import type { Pole } from './partial-fractions.ts';

/** What is known of the number that is raised to the index: 1, -1, or less than 1 in size and of this sign. */
export type Ratio = 'one' | 'minus-one' | 'positive' | 'negative' | 'small';

const mostSkipped = 40n;

/**
 * The sum of coef r^k / (k + shift)^order over all poles, from k = `start` on; null where it is not in the tables: values
 * of the zeta function (DLMF 25.6.1), logarithms and inverse tangents (DLMF 4.6.1, 4.24.3). Simple poles at r = 1 are
 * summed by the digamma function (DLMF 5.4.14 and 5.4.15), whose common part cancels where their coefficients do.
 */
export function sumOfPoles(poles: readonly Pole[], ratio: Expr, kind: Ratio, start: bigint): Expr | null {
  if (kind === 'one') {
    const total = poles.reduce((sum, { order, coef }) => (order === 1 ? Q.add(sum, coef) : sum), Q.zero);
    if (!Q.isZero(total)) return null;
  }
  const parts = poles.map((pole) => sumOfPole(pole, ratio, kind, start));
  return parts.every((part) => part !== null) ? addExprs(...(parts as Expr[])) : null;
}

function sumOfPole({ shift, order, coef }: Pole, ratio: Expr, kind: Ratio, start: bigint): Expr | null {
  const first = Q.add(Q.rational(start), shift);
  const isHalf = first.den === 2n;
  if (first.den > 2n || Q.sign(first) <= 0 || Q.floor(first) > mostSkipped) return null;
  // Every sum is that from 1, or from 1/2, on, less its first terms; r^k is r^j or r^(j - 1/2) times r^moved.
  const whole = isHalf ? sumFromHalf(order, ratio, kind) : sumFromOne(order, ratio, kind);
  if (!whole) return null;
  const least = isHalf ? Q.rational(1, 2) : Q.one;
  const before: Expr[] = [zeroExpr];
  for (let j = least; Q.compare(j, first) < 0; j = Q.add(j, Q.one)) {
    const power = powExprs(ratio, rationalExpr(isHalf ? Q.sub(j, least) : j));
    before.push(divExprs(Q.isZero(Q.sub(j, least)) && isHalf ? oneExpr : power, rationalExpr(Q.pow(j, order))));
  }
  const moved = Q.negate(isHalf ? Q.sub(shift, least) : shift);
  const scale = Q.isZero(moved) ? oneExpr : powExprs(ratio, rationalExpr(moved));
  return mulExprs(rationalExpr(coef), scale, subExprs(whole, addExprs(...before)));
}

/** The sum of r^j / j^order from j = 1 on; for order and r equal to 1 without the part that all such sums share. */
function sumFromOne(order: number, ratio: Expr, kind: Ratio): Expr | null {
  if (order === 1) {
    if (kind === 'one') return zeroExpr;
    return negateExpr(callOf('ln', subExprs(oneExpr, ratio)));
  }
  const value = zeta(order);
  if (!value || (kind !== 'one' && kind !== 'minus-one')) return null;
  return kind === 'one' ? value : mulExprs(rationalExpr(Q.sub(Q.rational(2n, 2n ** BigInt(order)), Q.one)), value);
}

/** The sum of r^i / (i + 1/2)^order from i = 0 on. */
function sumFromHalf(order: number, ratio: Expr, kind: Ratio): Expr | null {
  const two = numberOf(2);
  if (kind === 'one') {
    if (order === 1) return mulExprs(two, callOf('ln', two));
    const value = zeta(order);
    return value && mulExprs(numberOf(2n ** BigInt(order) - 1n), value);
  }
  if (kind === 'minus-one') {
    if (order === 1) return divExprs(piExpr, two);
    return order === 3 ? divExprs(powExprs(piExpr, numberOf(3)), numberOf(4)) : null;
  }
  if (order !== 1 || kind === 'small') return null;
  const root = sqrtExpr(kind === 'negative' ? negateExpr(ratio) : ratio);
  return mulExprs(two, divExprs(callOf(kind === 'negative' ? 'arctan' : 'artanh', root), root));
}

const zetas: ReadonlyMap<number, Rational> = new Map([
  [2, Q.rational(1, 6)],
  [4, Q.rational(1, 90)],
  [6, Q.rational(1, 945)],
]);

function zeta(order: number): Expr | null {
  const part = zetas.get(order);
  return part ? mulExprs(rationalExpr(part), powExprs(piExpr, numberOf(order))) : null;
}
