import type { Expr } from './expression.ts';
import { numberFrom } from './read-numbers.ts';
import { type Context, numberOf, type Reader } from './reader.ts';
import { isDigit } from './scanner.ts';

/** An argument as TeX takes it: a braced group, or the next single digit, letter or command. */
export function readArgument(reader: Reader, change?: Partial<Context>): Expr {
  const { token } = reader;
  switch (token.kind) {
    case '{':
      return readGroup(reader, change);
    case 'number': {
      const digit = reader.takeDigit();
      return { ...numberFrom(digit), span: reader.span(digit.start) };
    }
    case 'letter':
    case 'e':
    case 'i':
      return reader.inside(() => reader.grammar.atoms.letter!(reader), { side: 'argument' });
    case 'infinity':
    case 'frac':
    case 'sqrt':
    case 'binom':
    case '(':
      return reader.inside(reader.grammar.atoms[token.kind]!, change);
    default:
      return reader.fail('missing-argument', ['{']);
  }
}

function readGroup(reader: Reader, change?: Partial<Context>): Expr {
  reader.next();
  if (reader.is('}')) reader.fail('missing-operand', ['number', 'letter']);
  const expr = reader.inside(reader.grammar.sum, change);
  reader.expect('}', 'missing-bracket', '}');
  return expr;
}

/** The exponent or bound after `^` or `_`. */
export function readExponent(reader: Reader): Expr {
  if (reader.is('number') && isDigit(reader.source.charCodeAt(reader.token.start + 1)))
    reader.flags.add('power-digits');
  if (reader.is('-') || reader.is('+')) reader.fail('missing-bracket', ['{']);
  return readArgument(reader);
}

/** The letter after a `_`, in canonical spelling: `_1`, `_{max}`; empty where there is none. */
export function readSubscript(reader: Reader): string {
  if (!reader.is('_')) return '';
  reader.next();
  const { token } = reader;
  if (token.kind === '{') {
    let depth = 0;
    do {
      if (reader.is('{')) depth += 1;
      if (reader.is('}')) depth -= 1;
      if (reader.is('end-of-line')) reader.fail('missing-bracket', ['}']);
      reader.next();
    } while (depth > 0);
    return subscript(reader, reader.source.slice(token.start + 1, reader.lastEnd - 1));
  }
  if (token.kind === 'number') return `_${reader.takeDigit().text}`;
  if (
    token.kind === 'letter' ||
    token.kind === 'e' ||
    token.kind === 'i' ||
    token.kind === 'infinity' ||
    token.kind === 'text'
  ) {
    reader.next();
    return subscript(reader, reader.source.slice(token.start, token.end));
  }
  return reader.fail('missing-argument', ['letter', 'number']);
}

/** Styles, braces and blanks go; a blank that ends a command stays. */
const SUBSCRIPT_LAYOUT =
  /\\(?:text|mathrm|mathit|operatorname|textrm|mbox)(?![a-zA-Z]) *|(\\[a-zA-Z]+)\s+(?=[a-zA-Z])|[{}\s]|\\[,;:! ]/g;

function subscript(reader: Reader, raw: string): string {
  const text = raw.replace(SUBSCRIPT_LAYOUT, (_, command: string | undefined) => (command ? `${command} ` : ''));
  if (!/^(?:[\w,+\-' ]|\\[a-zA-Z])+$/.test(text)) reader.fail('missing-argument', ['letter', 'number']);
  return text.length === 1 ? `_${text}` : `_{${text}}`;
}

/** A letter that a calculus sign names: the x of dx, the k of a sum. */
export function readName(reader: Reader): string {
  const { token } = reader;
  if (token.kind !== 'letter' && token.kind !== 'i') return reader.fail('missing-argument', ['letter']);
  reader.next();
  return token.text + (reader.is('_') ? readSubscript(reader) : '');
}

/** The number 1 where nothing is written, such as the integrand of `\int dx`. */
export function unwrittenOne(reader: Reader, start: number): Expr {
  return numberOf(reader.span(start), 1n);
}
