import type { Expr, FunctionName } from '../../../shared/maths/expression.ts';
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
  sqrtExpr,
  subExprs,
  wherever,
} from './build.ts';

const two = numberOf(2);

function square(expr: Expr): Expr {
  return powExprs(expr, two);
}

function inverse(expr: Expr): Expr {
  return divExprs(oneExpr, expr);
}

/**
 * The derivative of a named function at u, null where there is none to be had. It has a value only where the function is
 * differentiable: a logarithm's keeps the condition that 1/u would lose. DLMF 4.19-4.40.
 */
export function slopeOf(name: FunctionName, u: Expr, isReal: boolean): Expr | null {
  const of = (other: FunctionName): Expr => callOf(other, u);
  switch (name) {
    case 'sin':
      return of('cos');
    case 'cos':
      return negateExpr(of('sin'));
    case 'tan':
      return inverse(square(of('cos')));
    case 'cot':
      return negateExpr(inverse(square(of('sin'))));
    case 'sec':
      return mulExprs(of('sec'), of('tan'));
    case 'csc':
      return negateExpr(mulExprs(of('csc'), of('cot')));
    case 'arcsin':
      return inverse(sqrtExpr(subExprs(oneExpr, square(u))));
    case 'arccos':
      return negateExpr(inverse(sqrtExpr(subExprs(oneExpr, square(u)))));
    case 'arctan':
      return inverse(addExprs(oneExpr, square(u)));
    case 'arccot':
      return negateExpr(inverse(addExprs(oneExpr, square(u))));
    case 'sinh':
      return of('cosh');
    case 'cosh':
      return of('sinh');
    case 'tanh':
      return inverse(square(of('cosh')));
    case 'coth':
      return negateExpr(inverse(square(of('sinh'))));
    case 'sech':
      return negateExpr(mulExprs(of('sech'), of('tanh')));
    case 'csch':
      return negateExpr(mulExprs(of('csch'), of('coth')));
    case 'arsinh':
      return inverse(sqrtExpr(addExprs(square(u), oneExpr)));
    case 'arcosh':
      return inverse(mulExprs(sqrtExpr(subExprs(u, oneExpr)), sqrtExpr(addExprs(u, oneExpr))));
    case 'ln':
      return wherever(callOf('ln', u), inverse(u));
    case 'artanh':
      return wherever(callOf('artanh', u), inverse(subExprs(oneExpr, square(u))));
    case 'exp':
      return of('exp');
    case 'degrees':
      return divExprs(piExpr, numberOf(180));
    default:
      return isReal ? realSlopeOf(name, u) : null;
  }
}

/** Functions that have a derivative over the real numbers only. */
function realSlopeOf(name: FunctionName, u: Expr): Expr | null {
  switch (name) {
    case 'arcsec':
      return inverse(mulExprs(callOf('abs', u), sqrtExpr(subExprs(square(u), oneExpr))));
    case 'arccsc':
      return negateExpr(inverse(mulExprs(callOf('abs', u), sqrtExpr(subExprs(square(u), oneExpr)))));
    case 'abs':
      return divExprs(u, callOf('abs', u));
    case 'sign':
      return mulExprs(numberOf(0), inverse(u));
    default:
      return null;
  }
}
