import type { Expr } from './expression.ts';
import {
  atoms,
  type Context,
  enclosed,
  expect,
  fail,
  flag,
  holding,
  inside,
  is,
  kind,
  lastEnd,
  next,
  numberOf,
  OUTSIDE,
  type Read,
  span,
  start,
  sum,
  take,
  takeDigit,
} from './reader.ts';
import type { TokenKind } from './token-table.ts';
import { type Complaint, source } from './tokens.ts';

const ARGUMENT: Context = { ...OUTSIDE, side: 'argument' };

/** An argument as TeX takes it: a braced group, or the next single digit, letter or command. */
export function readArgument(within?: Context): Expr {
  if (kind === '{') {
    next();
    if (is('}')) fail('missing-operand number letter');
    return enclosed('}', sum, within);
  }
  if (kind === '0') {
    const digit = takeDigit();
    return numberOf(span(digit.start), BigInt(digit.text));
  }
  if (!is('aei∞F√C(')) fail('missing-argument {');
  return inside(readAtom, is('aei') ? ARGUMENT : within);
}

/** The exponent or bound after `^` or `_`. */
export function readExponent(): Expr {
  if (is('0') && /\d/.test(source[start + 1] ?? '')) flag('power-digits');
  if (is('-+')) fail('missing-bracket {');
  return readArgument();
}

/** Takes the token as the beginning of what its kind stands for. */
export function readAtom(): Expr {
  return atoms[kind]!(next());
}

/** What is set below and above a sign, in either order and each at most once. */
export function readScripts<Below, Above>(
  readBelow: Read<Below>,
  readAbove: Read<Above>,
): readonly [below: Below | null, above: Above | null] {
  let below: Below | null = null;
  let above: Above | null = null;
  while (kind === '_' || kind === '^') {
    const isBelow = next().kind === '_';
    if (isBelow ? below : above) fail('extra-bracket');
    if (isBelow) below = readBelow();
    else above = readAbove();
  }
  return [below, above];
}

/** Expressions parted by commas or semicolons, up to the bracket that closes them. */
export function readItems(close: TokenKind, complaint?: Complaint): Expr[] {
  return enclosed(close, readList, holding(), complaint);
}

/** Expressions parted by commas or semicolons. */
export function readList(): Expr[] {
  const items = [];
  do items.push(sum());
  while (take(',;'));
  return items;
}

/** The letter after a `_`, in canonical spelling: `_1`, `_{max}`; empty where there is none. */
export function readSubscript(): string {
  if (kind !== '_') return '';
  next();
  if (is('0')) return `_${takeDigit().text}`;
  const from = start;
  let depth = 0;
  if (!is('{aei∞T')) fail('missing-argument letter number');
  do {
    if (is('$')) fail('missing-bracket }');
    if (is('{')) depth += 1;
    if (next().kind === '}') depth -= 1;
  } while (depth > 0);
  const text = source
    .slice(from, lastEnd)
    .replace(SUBSCRIPT_LAYOUT, (_, command: string | undefined) => (command ? `${command} ` : ''));
  if (!/^(?:[\w,+\-' ]|\\[a-zA-Z])+$/.test(text)) fail('missing-argument letter number');
  return text.length === 1 ? `_${text}` : `_{${text}}`;
}

/** Styles, braces and blanks go; a blank that ends a command stays. */
const SUBSCRIPT_LAYOUT =
  /\\(?:text|mathrm|mathit|operatorname|textrm|mbox)(?![a-zA-Z]) *|(\\[a-zA-Z]+)\s+(?=[a-zA-Z])|[{}\s]|\\[,;:! ]/g;

/** A letter that a calculus sign names: the x of dx, the k of a sum. */
export function readName(): string {
  return expect('ai', 'missing-argument letter').text + readSubscript();
}
