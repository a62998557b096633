import type { Expr, FunctionName } from '../../../shared/maths/expression.ts';
import {
  callOf,
  divExprs,
  mulExprs,
  negateExpr,
  oneExpr,
  powExprs,
  rationalOf,
  subExprs,
  addExprs,
  wherever,
} from './build.ts';
import { isFree } from './integrand.ts';

const inverses: Partial<Record<FunctionName, FunctionName>> = {
  sin: 'arcsin',
  cos: 'arccos',
  tan: 'arctan',
  sinh: 'arsinh',
  exp: 'ln',
  ln: 'exp',
};

/**
 * The letter from `expr = value`, by the principal value that a substitution such as x = 2 sin t means; null where the
 * letter occurs more than once or under what has no such inverse.
 */
export function solvedFor(expr: Expr, letter: string, value: Expr): Expr | null {
  switch (expr.kind) {
    case 'letter':
      return expr.name === letter ? value : null;
    case 'sum':
      return fromSum(expr, letter, value);
    case 'product': {
      const moving = expr.factors.filter((factor) => !isFree(factor, letter));
      const [only] = moving;
      const rest = mulExprs(...expr.factors.filter((factor) => factor !== only));
      return only && moving.length === 1 ? solvedFor(only, letter, divExprs(value, rest)) : null;
    }
    case 'quotient':
      if (isFree(expr.denominator, letter)) return solvedFor(expr.numerator, letter, mulExprs(value, expr.denominator));
      return isFree(expr.numerator, letter)
        ? solvedFor(expr.denominator, letter, divExprs(expr.numerator, value))
        : null;
    case 'power': {
      if (expr.base.kind === 'constant' && expr.base.name === 'e')
        return solvedFor(expr.exponent, letter, callOf('ln', value));
      const times = rationalOf(expr.exponent);
      return times && times.num > 0n
        ? solvedFor(expr.base, letter, powExprs(value, divExprs(oneExpr, expr.exponent)))
        : null;
    }
    case 'root':
      return expr.degree === null ? solvedFor(expr.radicand, letter, mulExprs(value, value)) : null;
    case 'call':
      return fromCall(expr, letter, value);
    default:
      return null;
  }
}

function fromSum(expr: Extract<Expr, { kind: 'sum' }>, letter: string, value: Expr): Expr | null {
  const moving = expr.terms.filter((term) => !isFree(term.expr, letter));
  const [only] = moving;
  if (!only || moving.length > 1 || expr.terms.some(({ sign }) => sign !== 'plus' && sign !== 'minus')) return null;
  const rest = expr.terms
    .filter((term) => term !== only)
    .map((t) => (t.sign === 'minus' ? negateExpr(t.expr) : t.expr));
  const left = subExprs(value, addExprs(...rest));
  return solvedFor(only.expr, letter, only.sign === 'minus' ? negateExpr(left) : left);
}

function fromCall(expr: Extract<Expr, { kind: 'call' }>, letter: string, value: Expr): Expr | null {
  const [argument] = expr.args;
  if (!argument || expr.args.length !== 1) return null;
  // The angle lies in the first quadrant: which other one is meant where the secant is negative is not agreed on.
  if (expr.name === 'sec')
    return solvedFor(argument, letter, wherever(callOf('ln', value), callOf('arccos', divExprs(oneExpr, value))));
  const inverse = inverses[expr.name];
  return inverse ? solvedFor(argument, letter, callOf(inverse, value)) : null;
}
