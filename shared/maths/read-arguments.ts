import type { Complaint, Expr } from './expression.ts';
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
import { source } from './tokens.ts';

const ARGUMENT: Context = { ...OUTSIDE, side: 'argument' };

/** An argument as TeX takes it: a braced group, or the next single digit, letter or command. */
export const readArgument = (within?: Context): Expr => {
  if (kind === '{') {
    next();
    if (is('}')) fail('number');
    return enclosed('}', sum, within);
  }
  if (kind === '0') {
    const digit = takeDigit();
    return numberOf(span(digit.start), BigInt(digit.text));
  }
  if (!is('aeioFrC(')) fail('group');
  return inside(readAtom, is('aei') ? ARGUMENT : within);
};

/** The exponent or bound after `^` or `_`. */
export const readExponent = (): Expr => {
  if (is('0') && /\d/.test(source[start + 1] ?? '')) flag('power-digits');
  if (is('-+')) fail('{');
  return readArgument();
};

/** Takes the token as the beginning of what its kind stands for. */
export const readAtom = (): Expr => atoms[kind]!(next());

/** What is set below and above a sign, in either order and each at most once. */
export const readScripts = <Below, Above>(
  readBelow: Read<Below>,
  readAbove: Read<Above>,
): readonly [below: Below | null, above: Above | null] => {
  let below: Below | null = null;
  let above: Above | null = null;
  while (kind === '_' || kind === '^') {
    const isBelow = next().kind === '_';
    if (isBelow ? below : above) fail('scripts');
    if (isBelow) below = readBelow();
    else above = readAbove();
  }
  return [below, above];
};

/** Expressions parted by commas or semicolons, up to the bracket that closes them. */
export const readItems = (close: TokenKind, complaint?: Complaint): Expr[] =>
  enclosed(close, readList, holding(), complaint);

/** Expressions parted by commas or semicolons. */
export const readList = (): Expr[] => {
  const items = [];
  do items.push(sum());
  while (take(',;'));
  return items;
};

/** The letter after a `_`, in canonical spelling: `_1`, `_{max}`; empty where there is none. */
export const readSubscript = (): string => {
  if (kind !== '_') return '';
  next();
  if (is('0')) return `_${takeDigit().text}`;
  const from = start;
  let depth = 0;
  if (!is('{aeioT')) fail('subscript');
  do {
    if (is('$')) fail('}');
    if (is('{')) depth += 1;
    if (next().kind === '}') depth -= 1;
  } while (depth > 0);
  const text = source
    .slice(from, lastEnd)
    .replace(SUBSCRIPT_LAYOUT, (_, command: string | undefined) => (command ? `${command} ` : ''));
  if (!/^(?:[\w,+\-' ]|\\[a-zA-Z])+$/.test(text)) fail('subscript');
  return text[1] ? `_{${text}}` : `_${text}`;
};

/** Styles, braces and blanks go; a blank that ends a command stays. */
const SUBSCRIPT_LAYOUT =
  /\\(?:text|mathrm|mathit|operatorname|textrm|mbox)(?![a-zA-Z]) *|(\\[a-zA-Z]+)\s+(?=[a-zA-Z])|[{}\s]|\\[,;:! ]/g;

/** A letter that a calculus sign names: the x of dx, the k of a sum. */
export const readName = (): string => expect('ai', 'letter').text + readSubscript();
