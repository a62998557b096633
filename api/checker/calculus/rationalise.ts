import type { Expr } from '../../../shared/maths/expression.ts';
import { sameExpr } from '../../../shared/maths/same.ts';
import { childrenOf, mapExpr } from '../../../shared/maths/walk.ts';
import * as Q from '../numbers/rational.ts';
import type { Rational } from '../numbers/rational.ts';
import { divExprs, letterOf, mulExprs, numberOf, powExprs, rationalExpr, rationalOf, subExprs } from './build.ts';
import { isFree, linearIn } from './integrand.ts';
import { freshLetter, substitute } from './substitute.ts';

interface Root {
  readonly base: Expr;
  readonly times: Rational;
}

const highestDegree = 12n;

/**
 * An integrand with roots of one linear expression, in u with u^m = that expression; `root` is u in the letter. Null where
 * there is no such root, or others besides.
 */
export function withoutRoots(expr: Expr, letter: string): { integrand: Expr; letter: string; root: Expr } | null {
  const roots = rootsIn(expr, letter);
  const [first] = roots;
  const linear = first && linearIn(first.base, letter);
  if (!first || !linear || !roots.every(({ base }) => sameExpr(base, first.base))) return null;
  const degree = roots.reduce((total, { times }) => Q.lcm(total, times.den), 1n);
  if (degree > highestDegree) return null;
  const fresh = freshLetter(new Set());
  const u = letterOf(fresh);
  const back = divExprs(subExprs(powExprs(u, numberOf(degree)), linear.constant), linear.slope);
  const plain = mapExpr(expr, (node) => {
    const root = rootOf(node, letter);
    return root ? powExprs(u, rationalExpr(Q.mul(root.times, Q.rational(degree)))) : node;
  });
  const slope = divExprs(mulExprs(numberOf(degree), powExprs(u, numberOf(degree - 1n))), linear.slope);
  const integrand = mulExprs(substitute(plain, letter, back), slope);
  return { integrand, letter: fresh, root: powExprs(first.base, numberOf(1, degree)) };
}

function rootsIn(expr: Expr, letter: string): Root[] {
  const own = rootOf(expr, letter);
  return own ? [own] : childrenOf(expr).flatMap((part) => rootsIn(part, letter));
}

/** A broken power of something linear. */
function rootOf(expr: Expr, letter: string): Root | null {
  if (expr.kind === 'root') {
    const degree = expr.degree ? rationalOf(expr.degree) : Q.rational(2);
    const isPlain = degree?.den === 1n && degree.num > 1n && linearIn(expr.radicand, letter) !== null;
    return degree && isPlain && !isFree(expr, letter) ? { base: expr.radicand, times: Q.div(Q.one, degree) } : null;
  }
  if (expr.kind !== 'power' || isFree(expr.base, letter) || !linearIn(expr.base, letter)) return null;
  const times = rationalOf(expr.exponent);
  return times && times.den > 1n ? { base: expr.base, times } : null;
}
