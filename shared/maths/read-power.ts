import type { Expr } from './expression.ts';
import { namesIn } from './names-in.ts';
import { readAtom, readExponent, readItems } from './read-arguments.ts';
import {
  ahead,
  atoms,
  choose,
  context,
  fail,
  flag,
  functions,
  is,
  kind,
  next,
  numberOf,
  outer,
  peek,
  span,
  start,
  takeAll,
  token,
} from './reader.ts';

/** An atom with what is raised or set behind it: powers, factorials, degrees, primes. */
export function readPower(): Expr {
  const from = start;
  const isGroup = kind === '{';
  if (!atoms[kind] || (kind === '|' && token.side === 'r')) return missingOperand();
  let base = readAtom();
  let hasPower = false;
  while (is("^!°'²")) {
    if (is('^') && context.side === 'limit' && readSide()) break;
    if (is('!') && asksUnequal()) break;
    if (isGroup && isOpen(base)) fail('missing-bracket (', outer(base));
    if (is('^²')) {
      if (hasPower) fail('missing-bracket (');
      hasPower = true;
    }
    base = readBehind(base, from);
  }
  return base;
}

function readBehind(base: Expr, from: number): Expr {
  const behind = peek(1).kind;
  if (is('^') && !"°⊤'".includes(behind === '{' ? peek(2).kind : behind)) return readRaised(base, from);
  const mark = takeAll(/°|\^(?:\{[°⊤]\}|[°⊤])/y);
  if (mark) return { kind: 'call', name: mark.includes('⊤') ? 'transpose' : 'degrees', args: [base], span: span(from) };
  if (is('!')) return readFactorial(base, from);
  const order = readPrimes();
  return order > 0 ? readPrimed(base, order, from) : readRaised(base, from);
}

/** `x!=3` is displayed as a factorial and typed by some for "not equal": the author is asked. */
function asksUnequal(): boolean {
  return ahead(/!=/y) !== '' && peek(1).start === token.end && choose('unequal');
}

export function missingOperand(): never {
  return fail(is('T') ? 'text' : 'missing-operand number letter (');
}

/** A braced group can be open on its right and still have something behind it. */
function isOpen({ kind: what, bracketed }: Expr): boolean {
  return !bracketed && !/^(?:number|letter|constant|root|matrix|binomial|quotient|apply)$/.test(what);
}

function readRaised(base: Expr, from: number): Expr {
  const isTyped = is('²');
  if (!isTyped && peek(1).kind === '(') flag('power-digits');
  const exponent = readPowerSign();
  if (!isTyped && base.kind === 'letter' && functions.includes(base.name) && is('(')) {
    return readFunctionPower(base.name, exponent, from);
  }
  return (isTyped ? null : callWithPower(base, exponent, from)) ?? { kind: 'power', base, exponent, span: span(from) };
}

/** What stands raised: `^2`, `^{n+1}` or digits such as `²`. */
export function readPowerSign(): Expr {
  const sign = next();
  return sign.kind === '²' ? numberOf(span(sign.start), BigInt(sign.text)) : readExponent();
}

/** `\sin(x)^2` is the square of the sine; the other way to read it is asked about. */
function callWithPower(base: Expr, exponent: Expr, from: number): Expr | null {
  if (base.kind !== 'call' && base.kind !== 'log') return null;
  const argument = base.kind === 'log' ? base.argument : base.args[0]!;
  if (base.bracketed || argument.bracketed?.end !== base.span.end) return null;
  flag('function-argument');
  if (!choose('argument-power')) return null;
  const power: Expr = { kind: 'power', base: argument, exponent, span: span(outer(argument).start) };
  const place = span(from);
  return base.kind === 'log' ? { ...base, argument: power, span: place } : { ...base, args: [power], span: place };
}

/** `f^2(x)`, and `f^{-1}(x)` for the inverse, where f was introduced as a function. */
function readFunctionPower(name: string, exponent: Expr, from: number): Expr {
  next();
  const args = readItems(')');
  const place = span(from);
  // f^{(3)}(x) is the third derivative.
  if (exponent.bracketed && exponent.kind === 'number' && exponent.denominator === 1n && exponent.numerator < 10n)
    return { kind: 'apply', name, primes: Number(exponent.numerator), args, span: place };
  if (isMinusOne(exponent)) return { kind: 'apply', name: `${name}^{-1}`, primes: 0, args, span: place };
  return { kind: 'power', base: { kind: 'apply', name, primes: 0, args, span: place }, exponent, span: place };
}

export function isMinusOne(expr: Expr): boolean {
  const [term, more] = expr.kind === 'sum' ? expr.terms : [];
  const value = term?.expr;
  if (more || term?.sign !== 'minus' || value?.kind !== 'number') return false;
  return value.written === 'integer' && value.numerator === 1n;
}

/** `0^+` in a limit: notes the side and takes it. */
function readSide(): boolean {
  const mark = takeAll(/\^(?:\{[+-]\}|[+-](?=\}))/y);
  if (mark) context.side = mark.includes('+') ? 'right' : 'left';
  return mark !== '';
}

/** `x^2!` is the factorial of the power; the other way to read it is asked about. */
function readFactorial(base: Expr, from: number): Expr {
  const mark = next();
  if (is('!')) fail('extra-bracket (', { start: mark.start, end: token.end });
  const isPower = base.kind === 'power' && !base.bracketed && choose('factorial');
  if (!isPower) return { kind: 'factorial', operand: base, span: span(from) };
  const place = span(outer(base.exponent).start);
  return { ...base, exponent: { kind: 'factorial', operand: base.exponent, span: place }, span: span(from) };
}

/** Counts `'`, `''` and `^{\prime}`. */
export function readPrimes(): number {
  return is("'^") ? takeAll(/(?:\^?'|\^\{'+\})+/y).split("'").length - 1 : 0;
}

/** `(x^2+1)'`: the derivative by the only letter in it. */
function readPrimed(base: Expr, order: number, from: number): Expr {
  const letters = namesIn(base);
  const [only] = letters;
  const variable = letters.has('x') ? 'x' : only;
  if (!variable || (letters.size > 1 && variable !== 'x')) {
    return fail('bad-derivative \\frac{d}{dx}', outer(base));
  }
  return { kind: 'derivative', variable, order, partial: false, operand: base, span: span(from) };
}
