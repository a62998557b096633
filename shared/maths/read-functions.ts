import type { Expr, FunctionName } from './expression.ts';
import { namesIn } from './names-in.ts';
import { readArgument, readAtom, readExponent, readItems, readScripts } from './read-arguments.ts';
import { addFactor, productOf, signed, startRun } from './read-expression.ts';
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

/** The functions whose inverse `^{-1}` names: circular, or hyperbolic with an h. */
const INVERTIBLE = /^(?:sin|cos|tan|cot|sec|csc|(?:sin|cos|tan)h)$/;

/** A named function with its power and its argument, bracketed or not. */
export const readFunction = (head: Token): Expr => {
  let name = head.text;
  let power = is('^2') ? readPowerSign() : null;
  if (power && isMinusOne(power)) {
    if (!INVERTIBLE.test(name)) fail('(', head);
    flag('inverse-function');
    name = (name[3] ? 'ar' : 'arc') + name;
    power = null;
  }
  const args = /^(?:gcd|lcm|min|max)$/.test(name) ? readSeveral() : [readFunctionArgument()];
  return raised({ kind: 'call', name: name as FunctionName, args, span: span(head.start) }, power);
};

const raised = (base: Expr, exponent: Expr | null): Expr =>
  exponent ? { kind: 'power', base, exponent, span: span(base.span.start) } : base;

export const readLog = (head: Token): Expr => {
  const [below, power] = readScripts(readArgument, readExponent);
  const base = head.text === 'lb' ? numberOf({ start: head.start, end: head.end }, 2n) : below;
  if (base !== below && below) fail('scripts', below.span);
  if (power && isMinusOne(power)) fail('(', head);
  if (!base && head.text === 'log') flag('log-base');
  return raised({ kind: 'log', base, argument: readFunctionArgument(), span: span(head.start) }, power);
};

const readSeveral = (): Expr[] => readItems(expect('(s', 'several').kind === '(' ? ')' : 'z', ')');

/** The argument of a function: what its brackets hold, or what stands directly beside it. */
const readFunctionArgument = (): Expr => {
  if (is('(') || (is('[') && startsFactor())) return readAtom();
  return ahead(/\{[^}]/y) ? readGroupArgument() : deeper(readBeside);
};

/** `\sin{2x}`: the group counts as written, so it may hold no bare sum. */
const readGroupArgument = (): Expr => {
  const from = start;
  const expr = readArgument();
  if (expr.kind === 'sum' && expr.terms[1] && !expr.bracketed) fail('(', { start: from, end: lastEnd });
  return expr;
};

const readBeside = (): Expr => {
  const from = start;
  if (take('-')) return signed('minus', from, readBeside());
  if (!startsFactor()) fail('argument');
  const isFunction = is('fl');
  const run = startRun(readPower());
  const { factors } = run;
  while (!isFunction && startsFactor() && !token.gap && !(context.dx && atDifferential()) && joinsArgument(factors))
    addFactor(run, readPower());
  const argument = productOf(run, from);
  if (factors[1] && factors.some((factor) => factor.kind !== 'number' && !isSymbol(factor))) flag('function-argument');
  return is('/') && token.text === 'slash' ? readSlashed(argument) : argument;
};

/** Does the next factor still belong to the argument? Letters and numbers do; for a bracket the author is asked. */
const joinsArgument = (factors: readonly Expr[]): boolean => {
  if (is('fl∫∑L')) return false;
  const hasLetter = factors.some(holdsLetter);
  const isExponential = token.text === 'e' && peek(1).kind === '^';
  if (is('a0e') && !isExponential) {
    return !factors.some((factor) => holdsLetter(factor) && !isSymbol(factor)) || choose('argument');
  }
  return is('([') || isExponential || hasLetter ? choose('argument') === hasLetter : true;
};

/** A letter or constant, or a power of one. */
const isSymbol = (expr: Expr): boolean =>
  !expr.bracketed &&
  (expr.kind === 'letter' || expr.kind === 'constant' || (expr.kind === 'power' && isSymbol(expr.base)));

const holdsLetter = (expr: Expr): boolean => namesIn(expr).size > 0;

/** `\sin x/2` is half the sine of x; the other way to read it is asked about. */
const readSlashed = (numerator: Expr): Expr => {
  flag('function-argument');
  if (!choose('quotient')) return numerator;
  next();
  return {
    kind: 'quotient',
    numerator,
    denominator: readPower(),
    written: 'slash',
    span: span(outer(numerator).start),
  };
};
