import type { Expr, FunctionName } from './expression.ts';
import { namesIn } from './names-in.ts';
import { readArgument, readAtom, readExponent, readItems, readScripts } from './read-arguments.ts';
import { addFactor, productOf, startRun } from './read-expression.ts';
import { isMinusOne, readPower, readPowerSign } from './read-power.ts';
import {
  ahead,
  atDifferential,
  choose,
  context,
  deeper,
  expect,
  fail,
  flag,
  is,
  lastEnd,
  next,
  numberOf,
  outer,
  peek,
  span,
  start,
  startsFactor,
  take,
  token,
} from './reader.ts';
import type { Token } from './tokens.ts';

const CIRCULAR = /^(?:sin|cos|tan|cot|sec|csc)$/;
const HYPERBOLIC = /^(?:sin|cos|tan)h$/;

/** A named function with its power and its argument, bracketed or not. */
export function readFunction(head: Token): Expr {
  let name = head.text;
  let power = is('^²') ? readPowerSign() : null;
  if (power && isMinusOne(power)) {
    if (!CIRCULAR.test(name) && !HYPERBOLIC.test(name)) fail('missing-bracket (', head);
    flag('inverse-function');
    name = (CIRCULAR.test(name) ? 'arc' : 'ar') + name;
    power = null;
  }
  const args = /^(?:gcd|lcm|min|max)$/.test(name) ? readSeveral() : [readFunctionArgument()];
  return raised({ kind: 'call', name: name as FunctionName, args, span: span(head.start) }, power);
}

function raised(base: Expr, exponent: Expr | null): Expr {
  return exponent ? { kind: 'power', base, exponent, span: span(base.span.start) } : base;
}

export function readLog(head: Token): Expr {
  const { start: from, text } = head;
  const [below, power] = readScripts(readArgument, readExponent);
  const base = text === 'lb' ? numberOf({ start: from, end: head.end }, 2n) : below;
  if (base !== below && below) fail('extra-bracket', below.span);
  if (power && isMinusOne(power)) fail('missing-bracket (', head);
  if (!base && text === 'log') flag('log-base');
  const argument = readFunctionArgument();
  return raised({ kind: 'log', base, argument, span: span(from) }, power);
}

function readSeveral(): Expr[] {
  return readItems(expect('(⦃', 'missing-argument (').kind === '(' ? ')' : '⦄', 'missing-bracket )');
}

/** The argument of a function: what its brackets hold, or what stands directly beside it. */
function readFunctionArgument(): Expr {
  if (is('(') || (is('[') && startsFactor())) return readAtom();
  return ahead(/\{[^}]/y) ? readGroupArgument() : deeper(readBeside);
}

/** `\sin{2x}`: the group counts as written, so it may hold no bare sum. */
function readGroupArgument(): Expr {
  const from = start;
  const expr = readArgument();
  if (expr.kind === 'sum' && expr.terms.length > 1 && !expr.bracketed) {
    fail('missing-bracket (', { start: from, end: lastEnd });
  }
  return expr;
}

function readBeside(): Expr {
  const from = start;
  if (take('-')) {
    const expr = readBeside();
    const place = span(from);
    return { kind: 'sum', terms: [{ sign: 'minus', expr, span: place }], span: place };
  }
  if (!startsFactor()) fail(is('T') ? 'text' : 'missing-argument number letter (');
  const isFunction = is('fl');
  const run = startRun(readPower());
  const { factors } = run;
  while (!isFunction && startsFactor() && !token.gap && !(context.dx && atDifferential())) {
    if (!joinsArgument(factors)) break;
    addFactor(run, readPower());
  }
  const argument = productOf(run, from);
  if (factors.length > 1 && factors.some((factor) => factor.kind !== 'number' && !isSymbol(factor))) {
    flag('function-argument');
  }
  return is('/') ? readSlashed(argument) : argument;
}

/** Does the next factor still belong to the argument? Letters and numbers do; for a bracket the author is asked. */
function joinsArgument(factors: readonly Expr[]): boolean {
  if (is('fl∫∑∏L')) return false;
  const hasLetter = factors.some(holdsLetter);
  const isExponential = token.text === 'e' && peek(1).kind === '^';
  if (is('a0e') && !isExponential) {
    const isBlock = factors.some((factor) => holdsLetter(factor) && !isSymbol(factor));
    return !isBlock || choose('argument');
  }
  return is('([') || isExponential || hasLetter ? choose('argument') === hasLetter : true;
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
function readSlashed(numerator: Expr): Expr {
  flag('function-argument');
  if (!choose('argument-slash')) return numerator;
  next();
  return {
    kind: 'quotient',
    numerator,
    denominator: readPower(),
    written: 'slash',
    span: span(outer(numerator).start),
  };
}
