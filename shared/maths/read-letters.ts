import type { Expr } from './expression.ts';
import { readSubscript } from './read-arguments.ts';
import { readItems } from './read-atoms.ts';
import { readPlainDerivative } from './read-derivatives.ts';
import { takeDifferential } from './read-expression.ts';
import { numberOf, type Reader } from './reader.ts';

/** Letters that are likely to name a function even where none was introduced. */
const USUAL_FUNCTIONS = /^[fghFGH]$/;

/** A letter with its subscript, primes and, for a function of the derivation's own, its arguments. */
export function readLetter(reader: Reader): Expr {
  const { token, context } = reader;
  const { start } = token;
  if (context.dx === 'held' && reader.atDifferential()) {
    takeDifferential(reader);
    return numberOf(reader.span(start), 1n);
  }
  const derivative = token.text === 'd' ? readPlainDerivative(reader) : null;
  if (derivative) return derivative;
  reader.next();
  const isArgument = context.side === 'argument';
  const name = token.text + (isArgument ? '' : readSubscript(reader));
  const primes = isArgument ? 0 : readPrimes(reader);
  const isFunction = reader.functions.includes(name);
  if (primes > 0 || (isFunction && reader.is('('))) return readApplied(reader, name, primes, start, isFunction);
  if (USUAL_FUNCTIONS.test(name) && reader.is('(') && !reader.token.gap) reader.flags.add('unknown-function');
  const span = reader.span(start);
  if (name === '\\pi') return { kind: 'constant', name: 'pi', span };
  if (name === 'e' || (name === 'i' && token.end === start + 1 && isUnit(reader)))
    return { kind: 'constant', name, span };
  return { kind: 'letter', name, span };
}

/** A free i, not written as `\mathit{i}`, is the unit in a task on complex numbers; in a real one the author is asked. */
function isUnit(reader: Reader): boolean {
  if (reader.bound.includes('i')) return false;
  if (reader.settings.numbers === 'complex') return true;
  reader.flags.add('imaginary-unit');
  return reader.choose('unit');
}

export function readConstant(reader: Reader): Expr {
  const { kind, start } = reader.next();
  const name = kind === 'e' || kind === 'i' ? kind : 'infinity';
  return { kind: 'constant', name, span: reader.span(start) };
}

const PRIMES = /(?:\^?'|\^\{'+\})+/y;

/** Counts `'`, `''` and `^{\prime}`. */
export function readPrimes(reader: Reader): number {
  const marks = reader.ahead(PRIMES);
  if (!marks) return 0;
  reader.skip(marks.length);
  return marks.split("'").length - 1;
}

function readApplied(reader: Reader, name: string, primes: number, start: number, isFunction: boolean): Expr {
  // `y'(x)` and `y'(0)` are calls; `y'(x+1)` is a product unless y was introduced as a function.
  const isCall = reader.is('(') && (isFunction || USUAL_FUNCTIONS.test(name) || reader.ahead(/\([a0]\)/y));
  if (isCall && !isFunction) reader.flags.add('unknown-function');
  const args = isCall && reader.next() ? readItems(reader, ')') : [];
  return { kind: 'apply', name, primes, args, span: reader.span(start) };
}
