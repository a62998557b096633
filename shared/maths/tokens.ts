import type { ReadSettings } from './expression.ts';
import { BLANKS, isLetter, Scanner } from './scanner.ts';
import { readNumber } from './token-number.ts';
import { type Entry, findEntry } from './token-table.ts';
import { readWords } from './token-words.ts';

/** Cuts a line into tokens; the last one is the end of the line. Throws a ReadFailure on what is no part of a line. */
export function tokenize(source: string, settings: ReadSettings): Scanner {
  const scanner = new Scanner(source, settings);
  for (;;) {
    scanner.take(BLANKS);
    if (scanner.at >= source.length) break;
    readToken(scanner);
  }
  scanner.push('$', '', source.length);
  return scanner;
}

function readToken(scanner: Scanner): void {
  const { source, at } = scanner;
  if (source[at] === '\\') readCommand(scanner);
  else if (isLetter(source.charCodeAt(at))) readWords(scanner);
  else if (/^\.?\d/.test(source.slice(at, at + 2))) readNumber(scanner);
  else readCharacter(scanner);
}

function readCharacter(scanner: Scanner): void {
  const { source, at } = scanner;
  if (scanner.passedOver.has(at)) return void (scanner.at += 1);
  const pair = source.slice(at, at + 2);
  const name = findEntry(pair) ? pair : source.charAt(at);
  const entry = findEntry(name);
  if (entry) {
    scanner.at += name.length;
    return pushEntry(scanner, entry, name, at);
  }
  const raised = scanner.take(/[⁰¹²³⁴-⁹]+/y);
  if (raised) return scanner.push('²', raised.normalize('NFKD'), at);
  const fraction = scanner.take(/[¼-¾⅓-⅞]/y);
  if (fraction) return scanner.push('F', fraction.normalize('NFKD'), at);
  if (scanner.take(/[\u00a0\u2009]/y)) scanner.gap = true;
  else scanner.fail('unknown-character', at, at + String.fromCodePoint(source.codePointAt(at)!).length);
}

/** `\left`, `\mright`, `\middle`, `\big`, `\Biggl` and their like. */
const SIZED = /^(?:m?(?:left|right)|middle|[bB]igg?[lrm]?)$/;

function readCommand(scanner: Scanner): void {
  const start = scanner.at;
  const name = scanner.take(COMMAND).slice(1);
  const entry = findEntry(/^[a-zA-Z]/.test(name) ? name : /^\s/.test(name) ? '~' : `\\${name}`);
  if (entry) pushEntry(scanner, entry, name, start);
  else if (SIZED.test(name)) readSized(scanner, name, start);
  else scanner.fail('unknown-command', start);
}

const COMMAND = /\\(?:[a-zA-Z]+|[^]?)/y;

function pushEntry(scanner: Scanner, { kind, text }: Entry, name: string, start: number): void {
  const act = ACTIONS[kind];
  if (act) act(scanner, start, name, kind);
  else scanner.push(kind, text, start);
}

/** What takes more than the command itself, or leaves no token. */
const ACTIONS: Partial<Record<string, (scanner: Scanner, start: number, name: string, kind: string) => void>> = {
  S: () => {},
  '~': (scanner) => void (scanner.gap = true),
  h: (scanner) => void scanner.rawArgument(),
  T: (scanner, start) => scanner.push('T', scanner.rawArgument(), start),
  A: readAccent,
  B: readEnvironment,
  E: readEnvironment,
  H: readHole,
  N: readNewRow,
  M: readStyled,
  X: readAdorned,
  D: readSetLetter,
  n: readNegated,
};

function readAccent(scanner: Scanner, start: number, name: string): void {
  const body = scanner.rawArgument().trim();
  if (!/^\\?[a-zA-Z]$|^\\[a-zA-Z]+$/.test(body)) scanner.fail('unknown-command letter', start);
  scanner.push('a', `\\${name}{${body}}`, start);
}

function readEnvironment(scanner: Scanner, start: number, _: string, kind: string): void {
  const environment = scanner.rawArgument();
  if (kind === 'B' && environment === 'array') scanner.rawArgument();
  scanner.push(kind, environment, start);
}

function readHole(scanner: Scanner, start: number): void {
  scanner.take(/\s*\[[^\]]*\]/y);
  scanner.rawArgument();
  scanner.push('H', '', start);
}

/** A row may end in `\\[2pt]`. */
function readNewRow(scanner: Scanner, start: number): void {
  scanner.take(/\[-?[\d.]+ *[a-z]{2}\]/y);
  scanner.push('N', '', start);
}

/** `\boxed{..}` and `\cancel{..}` only adorn what they hold: their braces are passed over. */
function readAdorned(scanner: Scanner): void {
  const from = scanner.at;
  scanner.rawArgument();
  if (scanner.source[scanner.at - 1] === '}') scanner.passedOver.add(scanner.at - 1);
  scanner.at = scanner.source[from] === '{' ? from + 1 : from;
}

function readSetLetter(scanner: Scanner, start: number): void {
  const letter = scanner.rawArgument().trim();
  if (!/^[RZNQC]$/.test(letter)) scanner.fail('unknown-command \\R', start);
  scanner.push('ℝ', letter, start);
}

function readNegated(scanner: Scanner, start: number): void {
  scanner.take(BLANKS);
  const sign = scanner.take(/=|\\in/y);
  if (!sign) scanner.fail('unknown-command \\ne', start);
  scanner.push(sign === '=' ? '≠' : '∉', '', start);
}

/** `\left(`: the delimiter carries its side and the span of both. */
function readSized(scanner: Scanner, name: string, start: number): void {
  scanner.take(BLANKS);
  const side = /left|l$/.test(name) ? 'left' : /right|r$/.test(name) ? 'right' : '';
  if (scanner.take(/\./y)) return scanner.push(side === 'left' ? '‹' : '›', '', start);
  scanner.side = side;
  const before = scanner.tokens.length;
  if (scanner.at < scanner.source.length) readToken(scanner);
  const token = scanner.tokens[before];
  if (!token || token.end !== scanner.at || !'()[]⦃⦄|⌊⌋⌈⌉/'.includes(token.kind)) {
    return scanner.fail('missing-bracket (', start);
  }
  token.start = start;
}

/** `\mathrm{..}` and `\operatorname{..}`: a function, an upright d, e or i, or one letter. */
function readStyled(scanner: Scanner, start: number, style: string): void {
  scanner.take(/\*/y);
  const word = scanner.rawArgument().replace(/\s|\\[,;:! ]/g, '');
  const entry = findEntry(word);
  if (/^[ei]$/.test(word) && style !== 'mathit') scanner.push(word, word, start);
  else if (/^[a-zA-Z]$/.test(word)) scanner.push('a', word, start);
  else if (entry && 'flL∨∧'.includes(entry.kind) && /^[a-zA-Z]+$/.test(word))
    scanner.push(entry.kind, entry.text, start);
  else scanner.fail('unknown-command', start);
}
