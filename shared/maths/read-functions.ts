import type { Expr, FunctionName } from './expression.ts';
import { namesIn } from './names-in.ts';
import { readArgument, readExponent } from './read-arguments.ts';
import { readItems } from './read-atoms.ts';
import { mixedNumber } from './read-numbers.ts';
import { isMinusOne } from './read-power.ts';
import { numberOf, outer, type Reader } from './reader.ts';

const INVERSES: Partial<Record<string, FunctionName>> = {
  sin: 'arcsin',
  cos: 'arccos',
  tan: 'arctan',
  cot: 'arccot',
  sec: 'arcsec',
  csc: 'arccsc',
  sinh: 'arsinh',
  cosh: 'arcosh',
  tanh: 'artanh',
};
const SEVERAL = new Set(['gcd', 'lcm', 'min', 'max']);

/** A named function with its power and its argument, bracketed or not. */
export function readFunction(reader: Reader): Expr {
  const token = reader.next();
  let name = token.text as FunctionName;
  let power = reader.is('^') || reader.is('raised') ? readPowerOfFunction(reader) : null;
  if (power && isMinusOne(power)) {
    const inverse = INVERSES[name];
    if (!inverse) return reader.fail('missing-bracket', ['('], token);
    reader.flags.add('inverse-function');
    name = inverse;
    power = null;
  }
  const args = SEVERAL.has(name) ? readSeveral(reader) : [readFunctionArgument(reader)];
  const call: Expr = { kind: 'call', name, args, span: reader.span(token.start) };
  return power ? { kind: 'power', base: call, exponent: power, span: reader.span(token.start) } : call;
}

/** `\exp x`, a function in its own right. */
export function readExp(reader: Reader): Expr {
  const token = reader.next();
  const args = [readFunctionArgument(reader)];
  return { kind: 'call', name: 'exp', args, span: reader.span(token.start) };
}

export function readLog(reader: Reader): Expr {
  const token = reader.next();
  let base: Expr | null = token.kind === 'log2' ? numberOf(token, 2n) : null;
  let power: Expr | null = null;
  while (reader.is('_') || reader.is('^')) {
    if (reader.is('_')) {
      if (base) reader.fail('extra-bracket', []);
      reader.next();
      base = readArgument(reader);
    } else {
      if (power) reader.fail('extra-bracket', []);
      power = readPowerOfFunction(reader);
      if (isMinusOne(power)) reader.fail('missing-bracket', ['('], token);
    }
  }
  if (!base && token.text === 'log') reader.flags.add('log-base');
  const argument = readFunctionArgument(reader);
  const log: Expr = { kind: 'log', base, argument, span: reader.span(token.start) };
  return power ? { kind: 'power', base: log, exponent: power, span: reader.span(token.start) } : log;
}

function readPowerOfFunction(reader: Reader): Expr {
  const token = reader.next();
  if (token.kind === 'raised') return numberOf(reader.span(token.start), BigInt(token.text));
  return readExponent(reader);
}

function readSeveral(reader: Reader): Expr[] {
  const close = reader.is('(') ? ')' : reader.is('set(') ? 'set)' : null;
  if (!close) return reader.fail('missing-argument', ['(']);
  reader.next();
  const items = readItems(reader);
  reader.expect(close, 'missing-bracket', ')');
  return items;
}

/** The argument of a function: what its brackets hold, or what stands directly beside it. */
export function readFunctionArgument(reader: Reader): Expr {
  if (reader.is('(') || (reader.is('[') && reader.startsFactor()))
    return reader.grammar.atoms[reader.token.kind]!(reader);
  if (reader.is('{') && reader.peek(1).kind !== '}') return readGroupArgument(reader);
  reader.enter();
  const expr = readBeside(reader);
  reader.leave();
  return expr;
}

/** `\sin{2x}`: the group counts as written, so it may hold no bare sum. */
function readGroupArgument(reader: Reader): Expr {
  const { token } = reader;
  const expr = readArgument(reader);
  if (expr.kind === 'sum' && expr.terms.length > 1 && !expr.bracketed) {
    reader.fail('missing-bracket', ['('], { start: token.start, end: reader.lastEnd });
  }
  return expr;
}

function readBeside(reader: Reader): Expr {
  const { token } = reader;
  if (token.kind === '-') {
    reader.next();
    const expr = readBeside(reader);
    const span = reader.span(token.start);
    return { kind: 'sum', terms: [{ sign: 'minus', expr, span }], span };
  }
  const factors = [readFirst(reader)];
  const isFunction = FUNCTIONS.has(token.kind);
  while (!isFunction && reader.startsFactor() && !reader.token.gap && !differentialFollows(reader)) {
    if (!joinsArgument(reader, factors)) break;
    const factor = reader.grammar.power(reader);
    const last = factors[factors.length - 1]!;
    if (last.kind === 'number' && factor.kind === 'number' && !factor.bracketed)
      reader.fail('bad-number', ['*'], factor.span);
    const mixed = mixedNumber(reader, last, factor);
    if (mixed) factors[factors.length - 1] = mixed;
    else factors.push(factor);
  }
  const argument: Expr =
    factors.length === 1
      ? factors[0]!
      : { kind: 'product', factors, joins: factors.slice(1).map(() => 'implicit'), span: reader.span(token.start) };
  if (factors.length > 1 && factors.some((factor) => factor.kind !== 'number' && !isSymbol(factor))) {
    reader.flags.add('function-argument');
  }
  return reader.is('/') ? readSlashed(reader, argument) : argument;
}

const FUNCTIONS = new Set(['function', 'log', 'log2', 'exp']);

function readFirst(reader: Reader): Expr {
  if (!reader.startsFactor()) {
    return reader.fail(reader.is('text') ? 'text' : 'missing-argument', ['number', 'letter', '(']);
  }
  return reader.grammar.power(reader);
}

function differentialFollows(reader: Reader): boolean {
  const { context } = reader;
  return (context.endsAtDifferential || context.holdsDifferential) && reader.is('letter') && reader.atDifferential();
}

/** Does the next factor still belong to the argument? Letters and numbers do; for a bracket the author is asked. */
function joinsArgument(reader: Reader, factors: readonly Expr[]): boolean {
  const { kind } = reader.token;
  if (FUNCTIONS.has(kind) || CALCULUS.has(kind)) return false;
  const hasLetter = factors.some(holdsLetter);
  const isBlock = factors.some((factor) => factor.kind !== 'letter' && holdsLetter(factor) && !isSymbol(factor));
  const isExponential = (kind === 'e' || reader.token.text === 'e') && reader.peek(1).kind === '^';
  const isPlain = (kind === 'letter' || kind === 'number' || kind === 'e') && !isExponential;
  if (isPlain) return isBlock ? reader.choose('argument') : true;
  if (kind === '(' || kind === '[' || isExponential || hasLetter) {
    return reader.choose('argument') ? hasLetter : !hasLetter;
  }
  return true;
}

const CALCULUS = new Set(['int', 'sum', 'prod', 'lim']);

/** A letter or constant, or a power of one. */
function isSymbol(expr: Expr): boolean {
  if (expr.bracketed) return false;
  return expr.kind === 'letter' || expr.kind === 'constant' || (expr.kind === 'power' && isSymbol(expr.base));
}

function holdsLetter(expr: Expr): boolean {
  return namesIn(expr).size > 0;
}

/** `\sin x/2` is half the sine of x; the other way to read it is asked about. */
function readSlashed(reader: Reader, argument: Expr): Expr {
  reader.flags.add('function-argument');
  if (!reader.choose('argument-slash')) return argument;
  reader.next();
  const denominator = reader.grammar.power(reader);
  const span = reader.span(outer(argument).start);
  return { kind: 'quotient', numerator: argument, denominator, written: 'slash', span };
}
