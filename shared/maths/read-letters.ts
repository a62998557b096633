import type { ConstantExpr, Expr } from './expression.ts';
import { readItems, readSubscript } from './read-arguments.ts';
import { readPlainDerivative } from './read-derivatives.ts';
import { readPrimes } from './read-power.ts';
import { ahead, bound, choose, context, flag, functions, is, next, span, token } from './reader.ts';
import { settings, type Token } from './tokens.ts';

/** Letters that are likely to name a function even where none was introduced. */
const USUAL_FUNCTIONS = /^[fghFGH]$/;

/** A letter with its subscript, primes and, for a function of the derivation's own, its arguments. */
export const readLetter = (letter: Token): Expr => {
  const { text, start, end } = letter;
  const isArgument = context.side === 'argument';
  const derivative = text === 'd' && !isArgument ? readPlainDerivative(start) : null;
  if (derivative) return derivative;
  const name = isArgument ? text : text + readSubscript();
  const primes = isArgument ? 0 : readPrimes();
  const isFunction = functions.includes(name);
  const isUsual = is('(') && USUAL_FUNCTIONS.test(name);
  if (primes > 0 || (isFunction && is('('))) {
    // `y'(x)` and `y'(0)` are calls; `y'(x+1)` is a product unless y was introduced as a function.
    const isCall = is('(') && (isFunction || isUsual || ahead(/\([a0]\)/y));
    if (isCall && !isFunction) flag('unknown-function');
    const args = isCall && next() ? readItems(')') : [];
    return { kind: 'apply', name, primes, args, span: span(start) };
  }
  if (isUsual && !token.gap) flag('unknown-function');
  const place = span(start);
  if (name === '\\pi') return { kind: 'constant', name: 'pi', span: place };
  if (name === 'e' || (name === 'i' && end === start + 1 && isUnit())) return { kind: 'constant', name, span: place };
  return { kind: 'letter', name, span: place };
};

/** A free i, not written as `\mathit{i}`, is the unit in a task on complex numbers; in a real one the author is asked. */
const isUnit = (): boolean => {
  if (bound.includes('i')) return false;
  if (settings.numbers === 'complex') return true;
  flag('imaginary-unit');
  return choose('unit');
};

export const readConstant = ({ text, start }: Token): Expr => ({
  kind: 'constant',
  name: text as ConstantExpr['name'],
  span: span(start),
});
