import type { Expr } from './expression.ts';
import { namesIn } from './names-in.ts';
import { readExponent } from './read-arguments.ts';
import { readItems } from './read-atoms.ts';
import { readPrimes } from './read-letters.ts';
import { numberOf, outer, type Reader } from './reader.ts';

/** An atom with what is raised or set behind it: powers, factorials, degrees, primes. */
export function readPower(reader: Reader): Expr {
  const { token } = reader;
  const { start } = token;
  const atom = reader.grammar.atoms[token.kind];
  if (!atom || (token.kind === '|' && token.side === 'right')) return missingOperand(reader);
  let base = atom(reader);
  for (let powers = 0; reader.is("^!°'²");) {
    const { kind } = reader.token;
    if (kind === '^' && reader.context.side === 'limit' && readSide(reader)) break;
    if (kind === '!' && asksUnequal(reader)) break;
    if (token.kind === '{' && isOpen(base)) reader.fail('missing-bracket (', outer(base));
    if (kind === '^' || kind === '²') {
      if (powers++ > 0) reader.fail('missing-bracket (');
      base = readRaised(reader, base, start);
    } else if (kind === '!') base = readFactorial(reader, base, start);
    else if (reader.take('°')) base = { kind: 'call', name: 'degrees', args: [base], span: reader.span(start) };
    else base = readPrimed(reader, base, start);
  }
  return base;
}

/** `x!=3` is displayed as a factorial and typed by some for "not equal": the author is asked. */
function asksUnequal(reader: Reader): boolean {
  return reader.ahead(/!=/y) !== '' && reader.peek(1).start === reader.token.end && reader.choose('unequal');
}

export function missingOperand(reader: Reader): never {
  return reader.fail(reader.is('T') ? 'text' : 'missing-operand number letter (');
}

/** A braced group can be open on its right and still have something behind it. */
function isOpen({ kind, bracketed }: Expr): boolean {
  return !bracketed && !/^(?:number|letter|constant|root|matrix|binomial|quotient|apply)$/.test(kind);
}

function readRaised(reader: Reader, base: Expr, start: number): Expr {
  const mark = reader.ahead(/\^(?:\{[°⊤]\}|[°⊤])/y);
  if (mark) {
    reader.skip(mark.length);
    const name = mark.includes('⊤') ? 'transpose' : 'degrees';
    return { kind: 'call', name, args: [base], span: reader.span(start) };
  }
  if (reader.ahead(/\^(?:'|\{'+\})/y)) return readPrimed(reader, base, start);
  const isTyped = reader.is('²');
  if (reader.ahead(/\^\(/y)) reader.flags.add('power-digits');
  const exponent = readPowerSign(reader);
  if (isTyped) return { kind: 'power', base, exponent, span: reader.span(start) };
  if (base.kind === 'letter' && reader.functions.includes(base.name) && reader.is('(')) {
    return readFunctionPower(reader, base.name, exponent, start);
  }
  return callWithPower(reader, base, exponent, start) ?? { kind: 'power', base, exponent, span: reader.span(start) };
}

/** What stands raised: `^2`, `^{n+1}` or digits such as `²`. */
export function readPowerSign(reader: Reader): Expr {
  const { kind, text, start } = reader.next();
  if (kind === '²') return numberOf(reader.span(start), BigInt(text));
  return readExponent(reader);
}

/** `\sin(x)^2` is the square of the sine; the other way to read it is asked about. */
function callWithPower(reader: Reader, base: Expr, exponent: Expr, start: number): Expr | null {
  if (base.kind !== 'call' && base.kind !== 'log') return null;
  const argument = base.kind === 'log' ? base.argument : base.args[0]!;
  if (base.bracketed || argument.bracketed?.end !== base.span.end) return null;
  reader.flags.add('function-argument');
  if (!reader.choose('argument-power')) return null;
  const power: Expr = { kind: 'power', base: argument, exponent, span: reader.span(outer(argument).start) };
  const span = reader.span(start);
  return base.kind === 'log' ? { ...base, argument: power, span } : { ...base, args: [power], span };
}

/** `f^2(x)`, and `f^{-1}(x)` for the inverse, where f was introduced as a function. */
function readFunctionPower(reader: Reader, name: string, exponent: Expr, start: number): Expr {
  reader.next();
  const args = readItems(reader, ')');
  const span = reader.span(start);
  if (isMinusOne(exponent)) return { kind: 'apply', name: `${name}^{-1}`, primes: 0, args, span };
  return { kind: 'power', base: { kind: 'apply', name, primes: 0, args, span }, exponent, span };
}

export function isMinusOne(expr: Expr): boolean {
  const [term, more] = expr.kind === 'sum' ? expr.terms : [];
  const value = term?.expr;
  if (more || term?.sign !== 'minus' || value?.kind !== 'number') return false;
  return value.written === 'integer' && value.numerator === 1n;
}

/** `0^+` in a limit: notes the side and takes it. */
function readSide(reader: Reader): boolean {
  const mark = reader.ahead(/\^(?:\{[+-]\}|[+-](?=\}))/y);
  if (mark) reader.context.side = mark.includes('+') ? 'right' : 'left';
  reader.skip(mark.length);
  return mark !== '';
}

/** `x^2!` is the factorial of the power; the other way to read it is asked about. */
function readFactorial(reader: Reader, base: Expr, start: number): Expr {
  const mark = reader.next();
  if (reader.is('!')) reader.fail('extra-bracket (', { start: mark.start, end: reader.token.end });
  const isPower = base.kind === 'power' && !base.bracketed && reader.choose('factorial');
  if (!isPower) return { kind: 'factorial', operand: base, span: reader.span(start) };
  const span = reader.span(outer(base.exponent).start);
  return { ...base, exponent: { kind: 'factorial', operand: base.exponent, span }, span: reader.span(start) };
}

/** `(x^2+1)'`: the derivative by the only letter in it. */
function readPrimed(reader: Reader, base: Expr, start: number): Expr {
  const order = readPrimes(reader);
  const letters = namesIn(base);
  const [only] = letters;
  const variable = letters.has('x') ? 'x' : only;
  if (!variable || (letters.size > 1 && variable !== 'x')) {
    return reader.fail('bad-derivative \\frac{d}{dx}', outer(base));
  }
  return { kind: 'derivative', variable, order, partial: false, operand: base, span: reader.span(start) };
}
