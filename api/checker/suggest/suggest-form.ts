import type { Expr } from '../../../shared/maths/expression.ts';
import { lettersOf } from '../../../shared/maths/letters.ts';
import { childrenOf, countNodes } from '../../../shared/maths/walk.ts';
import { askNerdamer } from './ask-nerdamer.ts';
import { fromNerdamer, toNerdamer } from './nerdamer-text.ts';

/** With more letters or terms it takes longer than an answer is worth. */
const mostNodes = 24;

/** What an outside library would make of an expression: a guess, to be confirmed by the checker before it is shown. */
export function suggestForm(expr: Expr, want: 'expand' | 'factor'): Expr | null {
  const isSmall = lettersOf(expr).length === 1 && countNodes(expr) <= mostNodes && isRational(expr);
  const asked = isSmall ? toNerdamer(expr) : null;
  const answer = asked && askNerdamer(`${want}(${asked.text})`);
  return asked && answer ? fromNerdamer(answer, asked.names) : null;
}

/** A guess at an antiderivative, for products of a power and one function of a x + b; to be confirmed by deriving it. */
export function suggestAntiderivative(integrand: Expr, by: string): Expr | null {
  const isSimple = lettersOf(integrand).every((name) => name === by) && hasKnownShape(integrand, by);
  const asked = isSimple ? toNerdamer(integrand) : null;
  const answer = asked && askNerdamer(`integrate(${asked.text}, ${asked.names.get(by) ?? 'x'})`);
  return asked && answer ? fromNerdamer(answer, asked.names) : null;
}

function isRational(expr: Expr): boolean {
  const isOperation = ['number', 'letter', 'sum', 'product', 'quotient', 'power'].includes(expr.kind);
  return isOperation && childrenOf(expr).every(isRational);
}

/** Only integrals that the library is known to end on: the others can keep it busy for minutes. */
function hasKnownShape(integrand: Expr, by: string): boolean {
  const factors = (integrand.kind === 'product' ? integrand.factors : [integrand]).filter((factor) =>
    lettersOf(factor).includes(by),
  );
  const functions = factors.filter((factor) => !isPower(factor));
  return factors.length <= 2 && functions.length === 1 && functions.every(isFunctionOfLinear);
}

function isPower(factor: Expr): boolean {
  if (factor.kind === 'letter') return true;
  return (
    factor.kind === 'power' &&
    factor.base.kind === 'letter' &&
    factor.exponent.kind === 'number' &&
    factor.exponent.numerator <= 3n
  );
}

function isFunctionOfLinear(factor: Expr): boolean {
  if (factor.kind === 'power')
    return factor.base.kind === 'constant' && factor.base.name === 'e' && isLinear(factor.exponent);
  return factor.kind === 'call' && ['sin', 'cos', 'exp', 'ln'].includes(factor.name) && factor.args.every(isLinear);
}

function isLinear(expr: Expr): boolean {
  if (expr.kind === 'letter' || expr.kind === 'number') return true;
  if (expr.kind === 'sum') return expr.terms.every((term) => isLinear(term.expr));
  return (
    expr.kind === 'product' &&
    expr.factors.length === 2 &&
    expr.factors[0]?.kind === 'number' &&
    expr.factors[1]?.kind === 'letter'
  );
}
