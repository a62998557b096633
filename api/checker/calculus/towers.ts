import type { Expr } from '../../../shared/maths/expression.ts';
import { sameExpr } from '../../../shared/maths/same.ts';
import { childrenOf, mapExpr } from '../../../shared/maths/walk.ts';
import { compareExpressions } from '../compare/compare-expressions.ts';
import type { CheckContext } from '../context.ts';
import { addExprs, divExprs, letterOf, mulExprs, numberOf, oneExpr, powExprs, rationalOf } from './build.ts';
import { isFree, linearIn } from './integrand.ts';
import { substitute } from './substitute.ts';

const farthest = 20n;

interface Factorial {
  readonly slope: bigint;
  readonly constant: bigint;
}

/**
 * The expression without its factorials (a n + b)! and powers c^(a n + b), where these cancel: with n! = (n-1)! n and
 * c^(n+1) = c c^n it does not depend on what is left of them. Null where it has none, or they do not cancel.
 */
export function withoutTowers(expr: Expr, letter: string, context: CheckContext): Expr | null {
  const least = new Map<bigint, bigint>();
  for (const { slope, constant } of factorialsIn(expr, letter)) {
    const known = least.get(slope);
    if (known === undefined || constant < known) least.set(slope, constant);
  }
  const bases: Expr[] = [];
  const names = new Set<string>();
  const standIn = (name: string): Expr => {
    names.add(name);
    return letterOf(name);
  };
  const opened = mapExpr(expr, (node) => {
    const factorial = factorialOf(node, letter);
    const lowest = factorial && least.get(factorial.slope);
    if (node.kind === 'factorial' && factorial && lowest !== undefined && lowest !== null) {
      if (factorial.constant - lowest > farthest) return node;
      const factors: Expr[] = [standIn(`z_{${factorial.slope}}`)];
      const start = addExprs(node.operand, numberOf(lowest - factorial.constant));
      for (let j = 1n; j <= factorial.constant - lowest; j += 1n) factors.push(addExprs(start, numberOf(j)));
      return mulExprs(...factors);
    }
    const linear = node.kind === 'power' && isFree(node.base, letter) ? linearIn(node.exponent, letter) : null;
    const slope = linear && rationalOf(linear.slope);
    if (node.kind !== 'power' || !linear || slope?.den !== 1n) return node;
    let at = bases.findIndex((base) => sameExpr(base, node.base));
    if (at < 0) at = bases.push(node.base) - 1;
    return mulExprs(powExprs(standIn(`w_{${at}}`), numberOf(slope.num)), powerOf(node.base, linear.constant));
  });
  if (names.size === 0) return null;
  const plain = [...names].reduce((part, name) => substitute(part, name, oneExpr), opened);
  return compareExpressions(opened, plain, context).kind === 'equal' ? plain : null;
}

/** The next term over this one. */
export function ratioOfTerms(expr: Expr, letter: string, context: CheckContext): Expr | null {
  const next = substitute(expr, letter, addExprs(letterOf(letter), oneExpr));
  return withoutTowers(divExprs(next, expr), letter, context);
}

export function hasFactorial(expr: Expr, letter: string): boolean {
  if (expr.kind === 'factorial' && !isFree(expr, letter)) return true;
  return childrenOf(expr).some((part) => hasFactorial(part, letter));
}

function powerOf(base: Expr, exponent: Expr): Expr {
  const value = rationalOf(exponent);
  return value?.num === 0n ? oneExpr : powExprs(base, exponent);
}

function factorialsIn(expr: Expr, letter: string): Factorial[] {
  const own = factorialOf(expr, letter);
  return own ? [own] : childrenOf(expr).flatMap((part) => factorialsIn(part, letter));
}

function factorialOf(expr: Expr, letter: string): Factorial | null {
  if (expr.kind !== 'factorial' || isFree(expr, letter)) return null;
  const linear = linearIn(expr.operand, letter);
  const [slope, constant] = [linear?.slope, linear?.constant].map((part) => (part ? rationalOf(part) : null));
  if (slope?.den !== 1n || constant?.den !== 1n || slope.num < 1n) return null;
  return { slope: slope.num, constant: constant.num };
}
