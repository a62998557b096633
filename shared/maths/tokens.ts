import type { ReadSettings } from './expression.ts';
import { commandName, isDigit, isLetter, Scanner } from './scanner.ts';
import { readNumber } from './token-number.ts';
import {
  CHARACTERS,
  COMMANDS,
  functionOf,
  GREEK_CHARACTERS,
  LETTER_STYLES,
  RAISED_DIGITS,
  SKIPPED,
  SPACES,
  VULGAR_FRACTIONS,
  type TokenKind,
} from './token-table.ts';
import { readWords } from './token-words.ts';

/** Cuts a line into tokens; the last one is `end-of-line`. Throws a ReadFailure on what is no part of a line. */
export function tokenize(source: string, settings: ReadSettings): Scanner {
  const scanner = new Scanner(source, settings);
  for (;;) {
    scanner.skipBlanks();
    if (scanner.at >= source.length) break;
    readToken(scanner);
  }
  scanner.push('end-of-line', '', source.length);
  return scanner;
}

function readToken(scanner: Scanner): void {
  const { source, at } = scanner;
  const code = source.charCodeAt(at);
  if (code === 92) return readCommand(scanner);
  if (isDigit(code) || (code === 46 && isDigit(source.charCodeAt(at + 1)))) return readNumber(scanner);
  if (isLetter(code)) return readWords(scanner);
  readCharacter(scanner);
}

function readCharacter(scanner: Scanner): void {
  const { source, at } = scanner;
  const char = source[at] ?? '';
  const pair = source.slice(at, at + 2);
  const double = PAIRS.get(pair);
  if (double) {
    scanner.at += 2;
    return scanner.push(double, pair, at);
  }
  scanner.at += 1;
  if (char === '}' && scanner.passedOver.has(at)) return;
  if (char === '~' || char === '\u00a0' || char === '\u2009') {
    scanner.gap = true;
    return;
  }
  if (char === '$') return;
  const kind = CHARACTERS.get(char);
  if (kind) return scanner.push(kind, kind === 'number-set' ? (SET_LETTERS.get(char) ?? '') : char, at);
  const greek = GREEK_CHARACTERS.get(char);
  if (greek) return scanner.push('letter', greek, at);
  const fraction = VULGAR_FRACTIONS.get(char);
  if (fraction) return scanner.push('frac', fraction, at);
  if (RAISED.has(char)) {
    let digits = '';
    for (scanner.at = at; RAISED.has(source[scanner.at] ?? ''); scanner.at += 1) {
      digits += RAISED.get(source[scanner.at] ?? '');
    }
    return scanner.push('raised', digits, at);
  }
  scanner.at += source.codePointAt(at)! > 0xffff ? 1 : 0;
  scanner.fail('unknown-character', at, scanner.at);
}

const PAIRS = new Map<string, TokenKind>([
  ['<=', '<='],
  ['>=', '>='],
  [':=', ':='],
  ['**', '^'],
  ['->', 'to'],
  ['=>', 'implies'],
  ['==', '='],
]);
const SET_LETTERS = new Map([
  ['ℝ', 'R'],
  ['ℤ', 'Z'],
  ['ℕ', 'N'],
  ['ℚ', 'Q'],
  ['ℂ', 'C'],
]);
const RAISED = new Map([...RAISED_DIGITS].map((char, digit) => [char, String(digit)]));

/** `\left`, `\mright`, `\middle`, `\big`, `\Biggl` and their like. */
const SIZED = /^(m?(left|right)|middle|(big|Big|bigg|Bigg)[lrm]?)$/;

function readCommand(scanner: Scanner): void {
  const { source, at } = scanner;
  const name = commandName(source, at + 1);
  scanner.at += 1 + name.length;
  if (name === '') return scanner.fail('unknown-command', at, source.length);
  if (SIZED.test(name)) return readSized(scanner, name);
  const kind = COMMANDS.get(name);
  if (kind !== undefined) return pushCommand(scanner, kind, name, at);
  if (SPACES.has(name) || name.trim() === '') {
    scanner.gap = true;
    return;
  }
  if (name === '!' || SKIPPED.has(name)) return;
  if (LETTER_STYLES.has(name)) return readStyled(scanner, name, at);
  if (TRANSPARENT.has(name)) return openTransparent(scanner);
  if (name === 'mathbb') return pushSet(scanner, at);
  if (name === 'differentialD') return scanner.push('letter', 'd', at);
  if (name === 'not') return readNegated(scanner, at);
  if (name === 'hspace' || name === 'mspace') return void scanner.rawArgument();
  scanner.fail('unknown-command', at, scanner.at);
}

const TRANSPARENT = new Set(['boxed', 'fbox', 'cancel', 'bcancel', 'xcancel', 'underline']);

/** `\boxed{..}` and `\cancel{..}` only adorn what they hold: their braces are passed over. */
function openTransparent(scanner: Scanner): void {
  const from = scanner.at;
  scanner.rawArgument();
  if (scanner.source[scanner.at - 1] === '}') scanner.passedOver.add(scanner.at - 1);
  scanner.at = scanner.source[from] === '{' ? from + 1 : from;
}

function pushCommand(scanner: Scanner, kind: TokenKind, name: string, start: number): void {
  switch (kind) {
    case 'letter':
      return scanner.push('letter', '\\' + name, start);
    case 'function':
      return scanner.push('function', functionOf(name) ?? name, start);
    case 'text':
      return scanner.push('text', scanner.rawArgument(), start);
    case 'accent':
      return pushAccent(scanner, name, start);
    case 'begin':
    case 'end': {
      const environment = scanner.rawArgument();
      if (kind === 'begin' && environment === 'array') scanner.rawArgument();
      return scanner.push(kind, environment, start);
    }
    case 'hole':
      scanner.skipBlanks();
      if (scanner.source[scanner.at] === '[') {
        const close = scanner.source.indexOf(']', scanner.at);
        if (close > 0) scanner.at = close + 1;
      }
      scanner.rawArgument();
      return scanner.push('hole', '', start);
    case 'newline':
      return pushNewline(scanner, start);
    default:
      return scanner.push(kind, kind === 'number-set' ? name.slice(0, 1).toUpperCase() : name, start);
  }
}

function pushAccent(scanner: Scanner, name: string, start: number): void {
  const body = scanner.rawArgument().trim();
  if (!/^(\\[a-zA-Z]+|[a-zA-Z])$/.test(body)) scanner.fail('unknown-command', start, scanner.at, ['letter']);
  scanner.push('letter', `\\${name}{${body}}`, start);
}

function pushNewline(scanner: Scanner, start: number): void {
  const spacing = /^\[-?[\d.]+ *[a-z]{2}\]/.exec(scanner.source.slice(scanner.at, scanner.at + 16));
  if (spacing) scanner.at += spacing[0].length;
  scanner.push('newline', '', start);
}

function pushSet(scanner: Scanner, start: number): void {
  const letter = scanner.rawArgument().trim();
  if (!'RZNQC'.includes(letter) || letter.length !== 1) scanner.fail('unknown-command', start, scanner.at, ['\\R']);
  scanner.push('number-set', letter, start);
}

function readNegated(scanner: Scanner, start: number): void {
  scanner.skipBlanks();
  const rest = scanner.source.slice(scanner.at, scanner.at + 4);
  const [length, kind]: [number, TokenKind] = rest.startsWith('=')
    ? [1, '!=']
    : rest.startsWith('\\in')
      ? [3, 'notin']
      : [0, '!='];
  if (length === 0) scanner.fail('unknown-command', start, scanner.at, ['\\ne']);
  scanner.at += length;
  scanner.push(kind, '', start);
}

/** `\left(`: the delimiter carries its side and the span of both. */
function readSized(scanner: Scanner, name: string): void {
  const start = scanner.at - 1 - name.length;
  scanner.skipBlanks();
  const side = /left|l$/.test(name) ? 'left' : /right|r$/.test(name) ? 'right' : '';
  if (scanner.source[scanner.at] === '.') {
    scanner.at += 1;
    return scanner.push(side === 'left' ? 'open.' : 'close.', '', start);
  }
  scanner.side = side;
  const before = scanner.tokens.length;
  if (scanner.at < scanner.source.length) readToken(scanner);
  const token = scanner.tokens[before];
  if (!token || token.end !== scanner.at || !DELIMITERS.has(token.kind)) {
    return scanner.fail('missing-bracket', start, scanner.at, ['(']);
  }
  token.start = start;
}

const DELIMITERS = new Set<TokenKind>([
  '(',
  ')',
  '[',
  ']',
  'set(',
  'set)',
  '|',
  'floor(',
  'floor)',
  'ceil(',
  'ceil)',
  '/',
]);

/** `\mathrm{..}` and `\operatorname{..}`: a function, an upright d, e or i, or one letter. */
function readStyled(scanner: Scanner, style: string, start: number): void {
  if (scanner.source[scanner.at] === '*') scanner.at += 1;
  const word = scanner.rawArgument().replace(/\s|\\[,;:! ]/g, '');
  if ((word === 'e' || word === 'i') && style !== 'mathit') return scanner.push(word, word, start);
  if (/^[a-zA-Z]$/.test(word)) return scanner.push('letter', word, start);
  const kind = COMMANDS.get(word);
  if (kind && /^[a-zA-Z]+$/.test(word) && STYLED_KINDS.has(kind)) return pushCommand(scanner, kind, word, start);
  scanner.fail('unknown-command', start, scanner.at);
}

const STYLED_KINDS = new Set<TokenKind>(['function', 'log', 'log2', 'exp', 'lim', 'or', 'and']);
