import type { Expr } from './expression.ts';
import { namesIn } from './names-in.ts';
import { readExponent } from './read-arguments.ts';
import { readItems } from './read-atoms.ts';
import { readPrimes } from './read-letters.ts';
import { outer, type Reader } from './reader.ts';

/** An atom with what is raised or set behind it: powers, factorials, degrees, primes. */
export function readPower(reader: Reader): Expr {
  const { token } = reader;
  const atom = reader.grammar.atoms[token.kind];
  if (!atom) return missingOperand(reader);
  if (token.kind === '|' && token.side === 'right') return missingOperand(reader);
  let base = atom(reader);
  let powers = 0;
  for (;;) {
    const { kind } = reader.token;
    if (kind !== '^' && kind !== '!' && kind !== 'degree' && kind !== "'" && kind !== 'raised') return base;
    if (kind === '^' && reader.context.side === 'limit' && readSide(reader)) return base;
    if (kind === '!' && asksUnequal(reader)) return base;
    if (isOpen(base, token.kind)) reader.fail('missing-bracket', ['('], outer(base));
    if (kind === '^' || kind === 'raised') {
      if (powers++ > 0) reader.fail('missing-bracket', ['('], reader.token);
      base = kind === '^' ? readCaret(reader, base, token.start) : readRaised(reader, base, token.start);
    } else if (kind === '!') base = readFactorial(reader, base, token.start);
    else if (kind === 'degree') {
      reader.next();
      base = { kind: 'call', name: 'degrees', args: [base], span: reader.span(token.start) };
    } else base = readPrimed(reader, base, token.start);
  }
}

/** `x!=3` is displayed as a factorial and typed by some for "not equal": the author is asked. */
function asksUnequal(reader: Reader): boolean {
  const after = reader.peek(1);
  return after.kind === '=' && after.start === reader.token.end && reader.choose('unequal');
}

function missingOperand(reader: Reader): never {
  return reader.is('text') ? reader.fail('text', []) : reader.fail('missing-operand', ['number', 'letter', '(']);
}

/** Only a braced group can be open on its right and still have something behind it. */
function isOpen(base: Expr, kind: string): boolean {
  if (kind !== '{' || base.bracketed) return false;
  return !['number', 'letter', 'constant', 'root', 'matrix', 'binomial', 'quotient', 'apply'].includes(base.kind);
}

function readCaret(reader: Reader, base: Expr, start: number): Expr {
  reader.next();
  const inner = reader.is('{') ? reader.peek(1).kind : reader.token.kind;
  const isWhole = !reader.is('{') || reader.peek(2).kind === '}';
  if ((inner === 'degree' || inner === 'top') && isWhole) {
    const braced = reader.take('{');
    reader.next();
    if (braced) reader.next();
    return { kind: 'call', name: inner === 'top' ? 'transpose' : 'degrees', args: [base], span: reader.span(start) };
  }
  if (inner === "'") {
    reader.rewind(reader.index - 1);
    return readPrimed(reader, base, start);
  }
  if (reader.is('(')) reader.flags.add('power-digits');
  const exponent = readExponent(reader);
  if (base.kind === 'letter' && reader.functions.includes(base.name) && reader.is('(')) {
    return readFunctionPower(reader, base.name, exponent, start);
  }
  const operand = callWithPower(reader, base, exponent, start);
  return operand ?? { kind: 'power', base, exponent, span: reader.span(start) };
}

/** `\sin(x)^2` is the square of the sine; the other way to read it is asked about. */
function callWithPower(reader: Reader, base: Expr, exponent: Expr, start: number): Expr | null {
  if (base.kind !== 'call' && base.kind !== 'log') return null;
  const argument = base.kind === 'log' ? base.argument : base.args[0]!;
  if (base.bracketed || !argument.bracketed || argument.bracketed.end !== base.span.end) return null;
  reader.flags.add('function-argument');
  if (!reader.choose('argument-power')) return null;
  const power: Expr = { kind: 'power', base: argument, exponent, span: reader.span(outer(argument).start) };
  const span = reader.span(start);
  return base.kind === 'log' ? { ...base, argument: power, span } : { ...base, args: [power], span };
}

/** `f^2(x)`, and `f^{-1}(x)` for the inverse, where f was introduced as a function. */
function readFunctionPower(reader: Reader, name: string, exponent: Expr, start: number): Expr {
  reader.next();
  const args = readItems(reader);
  reader.expect(')', 'missing-bracket', ')');
  const span = reader.span(start);
  if (isMinusOne(exponent)) return { kind: 'apply', name: `${name}^{-1}`, primes: 0, args, span };
  return { kind: 'power', base: { kind: 'apply', name, primes: 0, args, span }, exponent, span };
}

export function isMinusOne(expr: Expr): boolean {
  if (expr.kind !== 'sum' || expr.terms.length !== 1) return false;
  const [term] = expr.terms;
  const value = term?.expr;
  return term?.sign === 'minus' && value?.kind === 'number' && value.written === 'integer' && value.numerator === 1n;
}

function readRaised(reader: Reader, base: Expr, start: number): Expr {
  const token = reader.next();
  const span = reader.span(token.start);
  const exponent: Expr = {
    kind: 'number',
    numerator: BigInt(token.text),
    denominator: 1n,
    written: 'integer',
    decimals: 0,
    span,
  };
  return { kind: 'power', base, exponent, span: reader.span(start) };
}

/** `0^+` in a limit: notes the side and takes it. */
function readSide(reader: Reader): boolean {
  const braced = reader.peek(1).kind === '{';
  const sign = reader.peek(braced ? 2 : 1).kind;
  if ((sign !== '+' && sign !== '-') || (braced && reader.peek(3).kind !== '}')) return false;
  if (!braced && reader.peek(2).kind !== '}') return false;
  for (let count = braced ? 4 : 2; count > 0; count -= 1) reader.next();
  reader.context.side = sign === '+' ? 'right' : 'left';
  return true;
}

/** `x^2!` is the factorial of the power; the other way to read it is asked about. */
function readFactorial(reader: Reader, base: Expr, start: number): Expr {
  const mark = reader.next();
  if (reader.is('!')) reader.fail('extra-bracket', ['('], { start: mark.start, end: reader.token.end });
  if (base.kind === 'power' && !base.bracketed && reader.choose('factorial')) {
    const operand: Expr = { kind: 'factorial', operand: base.exponent, span: reader.span(outer(base.exponent).start) };
    return { ...base, exponent: operand, span: reader.span(start) };
  }
  return { kind: 'factorial', operand: base, span: reader.span(start) };
}

/** `(x^2+1)'`: the derivative by the only letter in it. */
function readPrimed(reader: Reader, base: Expr, start: number): Expr {
  const order = readPrimes(reader);
  const variable = soleLetter(base);
  if (variable === null) return reader.fail('bad-derivative', ['\\frac{d}{dx}'], outer(base));
  return { kind: 'derivative', variable, order, partial: false, operand: base, span: reader.span(start) };
}

function soleLetter(expr: Expr): string | null {
  const letters = namesIn(expr);
  if (letters.has('x')) return 'x';
  const [only = null] = letters;
  return letters.size === 1 ? only : null;
}
