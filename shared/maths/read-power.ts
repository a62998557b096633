import type { Expr } from './expression.ts';
import { namesIn } from './names-in.ts';
import { readAtom, readExponent, readItems, readSubscript } from './read-arguments.ts';
import {
  ahead,
  atoms,
  bracesAreBrackets,
  choose,
  context,
  fail,
  flag,
  functions,
  is,
  kind,
  negated,
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
export const readPower = (): Expr => {
  const from = start;
  const isGroup = kind === '{';
  if (!atoms[kind] || (kind === '|' && token.side === 'r') || (kind === 's' && !bracesAreBrackets())) fail('operand');
  let base = readAtom();
  let hasPower = false;
  while (is("^!°'2")) {
    if (is('^') && context.side === 'limit' && readSide()) break;
    if (is('!') && asksUnequal()) break;
    if (isGroup && isOpen(base)) fail('(', outer(base));
    if (is('^2')) {
      if (hasPower) fail('(');
      hasPower = true;
    }
    base = readBehind(base, from);
  }
  return base;
};

const readBehind = (base: Expr, from: number): Expr => {
  const behind = peek(1).kind;
  if (kind === '^' && !"°⊤'".includes(behind === '{' ? peek(2).kind : behind)) return readRaised(base, from);
  const mark = takeAll(/°|\^(?:\{[°⊤]\}|[°⊤])/y);
  if (mark) return { kind: 'call', name: mark.includes('⊤') ? 'transpose' : 'degrees', args: [base], span: span(from) };
  if (is('!')) return readFactorial(base, from);
  const order = readPrimes();
  return order > 0 ? readPrimed(base, order, from) : readRaised(base, from);
};

/** `x!=3` is displayed as a factorial and typed by some for "not equal": the author is asked. */
const asksUnequal = (): boolean => ahead(/!=/y) !== '' && peek(1).start === token.end && choose('unequal');

/** A braced group can be open on its right and still have something behind it. */
const isOpen = ({ kind: what, bracketed }: Expr): boolean =>
  !bracketed && !/^(?:number|letter|constant|root|matrix|binomial|quotient|apply)$/.test(what);

const readRaised = (base: Expr, from: number): Expr => {
  const isTyped = is('2');
  if (!isTyped && peek(1).kind === '(') flag('power-digits');
  const exponent = readPowerSign();
  // `x^2_1` is displayed as the square of x_1.
  if (base.kind === 'letter' && is('_') && !base.name.includes('_')) {
    const name = base.name + readSubscript();
    return { kind: 'power', base: { ...base, name, span: span(from) }, exponent, span: span(from) };
  }
  if (!isTyped && base.kind === 'letter' && functions.includes(base.name) && is('(')) {
    return readFunctionPower(base.name, exponent, from);
  }
  return (isTyped ? null : callWithPower(base, exponent, from)) ?? { kind: 'power', base, exponent, span: span(from) };
};

/** What stands raised: `^2`, `^{n+1}` or digits such as `²`. */
export const readPowerSign = (): Expr => {
  const sign = next();
  return sign.kind === '2' ? numberOf(span(sign.start), BigInt(sign.text)) : readExponent();
};

/** `\sin(x)^2` is the square of the sine; the other way to read it is asked about. */
const callWithPower = (base: Expr, exponent: Expr, from: number): Expr | null => {
  if (base.kind !== 'call' && base.kind !== 'log') return null;
  const argument = base.kind === 'log' ? base.argument : base.args[0]!;
  if (base.bracketed || argument.bracketed?.end !== base.span.end) return null;
  flag('function-argument');
  if (!choose('power')) return null;
  const power: Expr = { kind: 'power', base: argument, exponent, span: span(outer(argument).start) };
  const place = span(from);
  return base.kind === 'log' ? { ...base, argument: power, span: place } : { ...base, args: [power], span: place };
};

/** `f^2(x)`, and `f^{-1}(x)` for the inverse, where f was introduced as a function. */
const readFunctionPower = (name: string, exponent: Expr, from: number): Expr => {
  next();
  const args = readItems(')');
  const place = span(from);
  // f^{(3)}(x) is the third derivative.
  const isOrder =
    exponent.bracketed && exponent.kind === 'number' && exponent.denominator === 1n && exponent.numerator < 10n;
  const isInverse = isMinusOne(exponent);
  const call: Expr = {
    kind: 'apply',
    name: isInverse ? `${name}^{-1}` : name,
    primes: isOrder ? Number(exponent.numerator) : 0,
    args,
    span: place,
  };
  return isOrder || isInverse ? call : { kind: 'power', base: call, exponent, span: place };
};

export const isMinusOne = (expr: Expr): boolean => {
  const value = negated(expr);
  return value?.kind === 'number' && value.written === 'integer' && value.numerator === 1n;
};

/** `0^+` in a limit: notes the side and takes it. */
const readSide = (): boolean => {
  const mark = takeAll(/\^(?:\{[+-]\}|[+-](?=\}))/y);
  if (mark) context.side = mark.includes('+') ? 'right' : 'left';
  return mark !== '';
};

/** `x^2!` is the factorial of the power; the other way to read it is asked about. */
const readFactorial = (base: Expr, from: number): Expr => {
  const mark = next();
  if (is('!')) fail('factorial', { start: mark.start, end: token.end });
  if (base.kind !== 'power' || base.bracketed || !choose('factorial')) {
    return { kind: 'factorial', operand: base, span: span(from) };
  }
  const operand = base.exponent;
  const exponent: Expr = { kind: 'factorial', operand, span: span(outer(operand).start) };
  return { ...base, exponent, span: span(from) };
};

/** Counts `'`, `''` and `^{\prime}`. */
export const readPrimes = (): number => (is("'^") ? takeAll(/(?:\^?'|\^\{'+\})+/y).split("'").length - 1 : 0);

/** `(x^2+1)'`: the derivative by the only letter in it. */
const readPrimed = (base: Expr, order: number, from: number): Expr => {
  const letters = namesIn(base);
  const [only] = letters;
  const variable = letters.has('x') ? 'x' : only;
  if (!variable || (letters.size > 1 && variable !== 'x')) fail('derivative', outer(base));
  return { kind: 'derivative', variable, order, partial: false, operand: base, span: span(from) };
};
