import type { Expr, FunctionName } from './expression.ts';
import { namesIn } from './names-in.ts';
import { readArgument, readExponent, readScripts } from './read-arguments.ts';
import { readItems } from './read-atoms.ts';
import { addFactor, productOf, startRun } from './read-expression.ts';
import { isMinusOne, readPowerSign } from './read-power.ts';
import { numberOf, outer, type Reader } from './reader.ts';

const CIRCULAR = /^(?:sin|cos|tan|cot|sec|csc)$/;
const HYPERBOLIC = /^(?:sin|cos|tan)h$/;

/** A named function with its power and its argument, bracketed or not. */
export function readFunction(reader: Reader): Expr {
  const token = reader.next();
  const { start } = token;
  let name = token.text;
  let power = reader.is('^²') ? readPowerSign(reader) : null;
  if (power && isMinusOne(power)) {
    if (!CIRCULAR.test(name) && !HYPERBOLIC.test(name)) reader.fail('missing-bracket (', token);
    reader.flags.add('inverse-function');
    name = (CIRCULAR.test(name) ? 'arc' : 'ar') + name;
    power = null;
  }
  const args = /^(?:gcd|lcm|min|max)$/.test(name) ? readSeveral(reader) : [readFunctionArgument(reader)];
  return raised(reader, { kind: 'call', name: name as FunctionName, args, span: reader.span(start) }, power);
}

function raised(reader: Reader, base: Expr, exponent: Expr | null): Expr {
  return exponent ? { kind: 'power', base, exponent, span: reader.span(base.span.start) } : base;
}

export function readLog(reader: Reader): Expr {
  const token = reader.next();
  const { start, text } = token;
  const [below, power] = readScripts(reader, readArgument, readExponent);
  const base = text === 'lb' ? numberOf(token, 2n) : below;
  if (base !== below && below) reader.fail('extra-bracket', below.span);
  if (power && isMinusOne(power)) reader.fail('missing-bracket (', token);
  if (!base && text === 'log') reader.flags.add('log-base');
  const argument = readFunctionArgument(reader);
  return raised(reader, { kind: 'log', base, argument, span: reader.span(start) }, power);
}

function readSeveral(reader: Reader): Expr[] {
  if (!reader.is('(⦃')) reader.fail('missing-argument (');
  return readItems(reader, reader.next().kind === '(' ? ')' : '⦄', 'missing-bracket )');
}

/** The argument of a function: what its brackets hold, or what stands directly beside it. */
function readFunctionArgument(reader: Reader): Expr {
  const { kind } = reader.token;
  if (kind === '(' || (kind === '[' && reader.startsFactor())) return reader.grammar.atoms[kind]!(reader);
  return reader.ahead(/\{[^}]/y) ? readGroupArgument(reader) : reader.deeper(readBeside);
}

/** `\sin{2x}`: the group counts as written, so it may hold no bare sum. */
function readGroupArgument(reader: Reader): Expr {
  const { start } = reader.token;
  const expr = readArgument(reader);
  if (expr.kind === 'sum' && expr.terms.length > 1 && !expr.bracketed) {
    reader.fail('missing-bracket (', { start, end: reader.lastEnd });
  }
  return expr;
}

function readBeside(reader: Reader): Expr {
  const { start, kind } = reader.token;
  if (reader.take('-')) {
    const expr = readBeside(reader);
    const span = reader.span(start);
    return { kind: 'sum', terms: [{ sign: 'minus', expr, span }], span };
  }
  if (!reader.startsFactor()) reader.fail(reader.is('T') ? 'text' : 'missing-argument number letter (');
  const run = startRun(start);
  const { factors } = run;
  factors.push(reader.grammar.power(reader));
  const isFunction = FUNCTIONS.includes(kind);
  while (!isFunction && reader.startsFactor() && !reader.token.gap && !(reader.context.dx && reader.atDifferential())) {
    if (!joinsArgument(reader, factors)) break;
    addFactor(reader, run, reader.grammar.power(reader));
  }
  const argument = productOf(reader, run);
  if (factors.length > 1 && factors.some((factor) => factor.kind !== 'number' && !isSymbol(factor))) {
    reader.flags.add('function-argument');
  }
  return reader.is('/') ? readSlashed(reader, argument) : argument;
}

const FUNCTIONS = 'fl';

/** Does the next factor still belong to the argument? Letters and numbers do; for a bracket the author is asked. */
function joinsArgument(reader: Reader, factors: readonly Expr[]): boolean {
  const { kind, text } = reader.token;
  if ('fl∫∑∏L'.includes(kind)) return false;
  const hasLetter = factors.some(holdsLetter);
  const isExponential = text === 'e' && reader.peek(1).kind === '^';
  if ('a0e'.includes(kind) && !isExponential) {
    const isBlock = factors.some((factor) => holdsLetter(factor) && !isSymbol(factor));
    return !isBlock || reader.choose('argument');
  }
  return '(['.includes(kind) || isExponential || hasLetter ? reader.choose('argument') === hasLetter : true;
}

/** A letter or constant, or a power of one. */
function isSymbol(expr: Expr): boolean {
  if (expr.bracketed) return false;
  return expr.kind === 'letter' || expr.kind === 'constant' || (expr.kind === 'power' && isSymbol(expr.base));
}

function holdsLetter(expr: Expr): boolean {
  return namesIn(expr).size > 0;
}

/** `\sin x/2` is half the sine of x; the other way to read it is asked about. */
function readSlashed(reader: Reader, numerator: Expr): Expr {
  reader.flags.add('function-argument');
  if (!reader.choose('argument-slash')) return numerator;
  reader.next();
  const denominator = reader.grammar.power(reader);
  const span = reader.span(outer(numerator).start);
  return { kind: 'quotient', numerator, denominator, written: 'slash', span };
}
