import type { Expr } from './expression.ts';
import { readSubscript } from './read-arguments.ts';
import { readItems } from './read-atoms.ts';
import { readPlainDerivative } from './read-derivatives.ts';
import { takeDifferential } from './read-expression.ts';
import type { Reader } from './reader.ts';

/** A letter with its subscript, primes and, for a function of the derivation's own, its arguments. */
export function readLetter(reader: Reader): Expr {
  const { token, context } = reader;
  if (context.holdsDifferential && reader.atDifferential()) {
    takeDifferential(reader);
    return {
      kind: 'number',
      numerator: 1n,
      denominator: 1n,
      written: 'integer',
      decimals: 0,
      span: reader.span(token.start),
    };
  }
  const derivative = token.text === 'd' ? readPlainDerivative(reader) : null;
  if (derivative) return derivative;
  reader.next();
  const name = token.text + (context.side !== 'argument' && reader.is('_') ? readSubscript(reader) : '');
  const primes = context.side === 'argument' ? 0 : readPrimes(reader);
  const isFunction = reader.functions.includes(name);
  if (primes > 0 || (isFunction && reader.is('('))) return readApplied(reader, name, primes, token.start, isFunction);
  if ('fghFGH'.includes(name) && reader.is('(') && !reader.token.gap) reader.flags.add('unknown-function');
  const span = reader.span(token.start);
  if (name === '\\pi') return { kind: 'constant', name: 'pi', span };
  if (name === 'e') return { kind: 'constant', name: 'e', span };
  if (name === 'i' && token.end === token.start + 1 && !reader.bound.includes('i') && isUnit(reader))
    return { kind: 'constant', name: 'i', span };
  return { kind: 'letter', name, span };
}

/** A free i, not written as `\mathit{i}`, is the unit in a task on complex numbers; in a real one the author is asked. */
function isUnit(reader: Reader): boolean {
  if (reader.settings.numbers === 'complex') return true;
  reader.flags.add('imaginary-unit');
  return reader.choose('unit');
}

export function readConstant(reader: Reader): Expr {
  const { kind, start } = reader.next();
  const name = kind === 'infinity' ? 'infinity' : kind === 'e' ? 'e' : 'i';
  return { kind: 'constant', name, span: reader.span(start) };
}

/** Counts `'`, `''` and `^{\prime}`. */
export function readPrimes(reader: Reader): number {
  let primes = 0;
  for (;;) {
    if (reader.take("'")) primes += 1;
    else if (reader.is('^') && reader.peek(1).kind === "'") reader.next();
    else if (reader.is('^') && reader.peek(1).kind === '{' && reader.peek(2).kind === "'") {
      reader.next();
      reader.next();
      while (reader.take("'")) primes += 1;
      reader.expect('}', 'missing-bracket', '}');
    } else return primes;
  }
}

function readApplied(reader: Reader, name: string, primes: number, start: number, isFunction: boolean): Expr {
  const isCall = reader.is('(') && (isFunction || 'fghFGH'.includes(name) || hasPlainArgument(reader));
  if (!isCall) return { kind: 'apply', name, primes, args: [], span: reader.span(start) };
  if (!isFunction) reader.flags.add('unknown-function');
  reader.next();
  const args = readItems(reader);
  reader.expect(')', 'missing-bracket', ')');
  return { kind: 'apply', name, primes, args, span: reader.span(start) };
}

/** `y'(x)` and `y'(0)` are calls; `y'(x+1)` is a product unless y was introduced as a function. */
function hasPlainArgument(reader: Reader): boolean {
  const { kind } = reader.peek(1);
  return (kind === 'letter' || kind === 'number') && reader.peek(2).kind === ')';
}
