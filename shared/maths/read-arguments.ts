import type { Expr } from './expression.ts';
import { numberFrom } from './read-numbers.ts';
import type { Context, Reader } from './reader.ts';

/** An argument as TeX takes it: a braced group, or the next single digit, letter or command. */
export function readArgument(reader: Reader, change?: Partial<Context>): Expr {
  const { sum, atoms } = reader.grammar;
  if (reader.take('{')) {
    if (reader.is('}')) reader.fail('missing-operand number letter');
    return reader.enclosed('}', sum, change);
  }
  if (reader.is('0')) {
    const digit = reader.takeDigit();
    return { ...numberFrom(digit), span: reader.span(digit.start) };
  }
  if (!reader.is('aei∞F√C(')) reader.fail('missing-argument {');
  return reader.inside(atoms[reader.token.kind]!, reader.is('aei') ? { side: 'argument' } : change);
}

/** The exponent or bound after `^` or `_`. */
export function readExponent(reader: Reader): Expr {
  if (reader.is('0') && /\d/.test(reader.source[reader.token.start + 1] ?? '')) reader.flags.add('power-digits');
  if (reader.is('-+')) reader.fail('missing-bracket {');
  return readArgument(reader);
}

/** What is set below and above a sign, in either order and each at most once. */
export function readScripts<Below, Above>(
  reader: Reader,
  readBelow: (reader: Reader) => Below,
  readAbove: (reader: Reader) => Above,
): readonly [below: Below | null, above: Above | null] {
  let below: Below | null = null;
  let above: Above | null = null;
  while (reader.is('_^')) {
    const isBelow = reader.next().kind === '_';
    if (isBelow ? below : above) reader.fail('extra-bracket');
    if (isBelow) below = readBelow(reader);
    else above = readAbove(reader);
  }
  return [below, above];
}

/** The letter after a `_`, in canonical spelling: `_1`, `_{max}`; empty where there is none. */
export function readSubscript(reader: Reader): string {
  if (!reader.take('_')) return '';
  const { token } = reader;
  if (reader.is('0')) return `_${reader.takeDigit().text}`;
  if (!reader.is('{aei∞T')) reader.fail('missing-argument letter number');
  let depth = 0;
  do {
    if (reader.is('{')) depth += 1;
    if (reader.is('}')) depth -= 1;
    if (reader.is('$')) reader.fail('missing-bracket }');
    reader.next();
  } while (depth > 0);
  const text = reader.source
    .slice(token.start, reader.lastEnd)
    .replace(SUBSCRIPT_LAYOUT, (_, command: string | undefined) => (command ? `${command} ` : ''));
  if (!/^(?:[\w,+\-' ]|\\[a-zA-Z])+$/.test(text)) reader.fail('missing-argument letter number');
  return text.length === 1 ? `_${text}` : `_{${text}}`;
}

/** Styles, braces and blanks go; a blank that ends a command stays. */
const SUBSCRIPT_LAYOUT =
  /\\(?:text|mathrm|mathit|operatorname|textrm|mbox)(?![a-zA-Z]) *|(\\[a-zA-Z]+)\s+(?=[a-zA-Z])|[{}\s]|\\[,;:! ]/g;

/** A letter that a calculus sign names: the x of dx, the k of a sum. */
export function readName(reader: Reader): string {
  if (!reader.is('ai')) reader.fail('missing-argument letter');
  return reader.next().text + readSubscript(reader);
}
