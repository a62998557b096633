import type { ReadError, ReadErrorCode, ReadSettings } from './expression.ts';
import { type Entry, findEntry, findWord, type TokenKind } from './token-table.ts';

export const READ_LIMITS = { characters: 4000, levels: 60, nodes: 3000 } as const;

export interface Token {
  readonly kind: TokenKind;
  /** Digits, the letter or the function in its canonical spelling; the words of a `\text`. */
  text: string;
  start: number;
  readonly end: number;
  /** A spacing command such as `\,` stands before it. */
  readonly gap: boolean;
  /** Which of `\left` and `\right` sized it. */
  readonly side: Side;
}

type Side = '' | 'left' | 'right';

/** An error's code and, parted by blanks, what was expected. */
export type Complaint = ReadErrorCode | `${ReadErrorCode} ${string}`;

/** Thrown inside the reader only; `readLine` turns it into a value. */
export class ReadFailure {
  readonly error: ReadError;

  constructor(complaint: Complaint, start: number, end: number) {
    // The blank in `\to 0` parts nothing.
    const [code, ...expected] = complaint.split(/ (?!0)/);
    this.error = { code: code as ReadErrorCode, span: { start, end }, found: source.slice(start, end), expected };
  }
}

/** The line being read: one at a time, so its state is that of the module. */
export let source = '';
export let settings: ReadSettings;
export let tokens: Token[] = [];
/** The kinds of the tokens, one character each. */
export let kinds = '';
/** A run of four letters or more that names no function. */
export let hasLongRun = false;

let at = 0;
let gap = false;
let side: Side = '';
/** Closing braces that group nothing. */
let passedOver = new Set<number>();

/** Cuts a line into tokens; the last one is the end of the line. Throws a ReadFailure on what is no part of a line. */
export function tokenize(tex: string, how: ReadSettings): void {
  const most = READ_LIMITS.characters;
  source = tex.slice(0, most);
  settings = how;
  tokens = [];
  kinds = side = '';
  passedOver = new Set();
  hasLongRun = gap = false;
  at = 0;
  if (tex.length > most) refuse(`too-long ${most}`, most, tex.length);
  while (skipBlanks()) readToken();
  push('$', '', at);
}

export function refuse(complaint: Complaint, start: number, end = at): never {
  throw new ReadFailure(complaint, start, end);
}

function push(kind: TokenKind, text: string, start: number, end = at): void {
  tokens.push({ kind, text, start, end, gap, side });
  kinds += kind;
  gap = false;
  side = '';
}

/** Does the sticky pattern fit here? */
function sees(pattern: RegExp): boolean {
  pattern.lastIndex = at;
  return pattern.test(source);
}

/** Takes what fits the sticky pattern here; empty where nothing does. */
function take(pattern: RegExp): string {
  const start = at;
  if (sees(pattern)) at = pattern.lastIndex;
  return source.slice(start, at);
}

/** False at the end of the line. */
function skipBlanks(): boolean {
  take(/[ \t-\r]+/y);
  return at < source.length;
}

/** The braced text after a command, without its braces; a single character or command where there are none. */
function rawArgument(): string {
  skipBlanks();
  const start = at;
  if (!take(/\{/y)) return take(/\\(?:[a-zA-Z]+|[^])|[^]/y);
  for (let depth = 1; depth > 0;) {
    const piece = take(/\\?[^]/y);
    if (!piece) refuse('missing-bracket }', start);
    if (piece === '{') depth += 1;
    if (piece === '}') depth -= 1;
  }
  return source.slice(start + 1, at - 1);
}

function readToken(): void {
  const start = at;
  if (sees(/\\/y)) readCommand(start);
  else if (sees(/[a-zA-Z]/y)) readWords(start);
  else if (sees(/\.?\d/y)) readNumber(start);
  else if (passedOver.has(at)) at += 1;
  else readCharacter(start);
}

function readCharacter(start: number): void {
  const pair = source.slice(at, at + 2);
  const name = findEntry(pair) ? pair : source.charAt(at);
  const entry = findEntry(/\s/.test(name) ? '~' : name);
  const typed = entry ? '' : take(/[⁰¹²³⁴-⁹]+|[¼-¾⅓-⅞]/y).normalize('NFKD');
  if (typed) return push(typed.includes('⁄') ? 'F' : '²', typed, start);
  if (!entry) refuse('unknown-character', at, at + String.fromCodePoint(source.codePointAt(at)!).length);
  at += name.length;
  pushEntry(entry!, name, start);
}

function readCommand(start: number): void {
  const name = take(/\\(?:[a-zA-Z]+|[^]?)/y).slice(1);
  const entry = findEntry(/^[a-zA-Z]/.test(name) ? name : /^\s/.test(name) ? '~' : `\\${name}`);
  if (entry) pushEntry(entry, name, start);
  else if (SIZED.test(name)) readSized(name, start);
  else refuse('unknown-command', start);
}

/** `\left`, `\mright`, `\middle`, `\big`, `\Biggl` and their like. */
const SIZED = /^(?:m?(?:left|right)|middle|[bB]igg?[lrm]?)$/;

function pushEntry({ kind, text }: Entry, name: string, start: number): void {
  const act = ACTIONS[kind];
  if (act) act(start, name, kind);
  else push(kind, text, start);
}

/** What takes more than the command itself, or leaves no token. */
const ACTIONS: Partial<Record<TokenKind, (start: number, name: string, kind: TokenKind) => void>> = {
  S: () => {},
  '~': () => void (gap = true),
  h: rawArgument,
  T: (start) => push('T', rawArgument(), start),
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

function readAccent(start: number, name: string): void {
  const body = rawArgument().trim();
  if (!/^(?:\\?[a-zA-Z]|\\[a-zA-Z]+)$/.test(body)) refuse('unknown-command letter', start);
  push('a', `\\${name}{${body}}`, start);
}

function readEnvironment(start: number, _: string, kind: TokenKind): void {
  const environment = rawArgument();
  if (kind === 'B' && environment === 'array') rawArgument();
  push(kind, environment, start);
}

function readHole(start: number): void {
  take(/\s*\[[^\]]*\]/y);
  rawArgument();
  push('H', '', start);
}

/** A row may end in `\\[2pt]`. */
function readNewRow(start: number): void {
  take(/\[-?[\d.]+ *[a-z]{2}\]/y);
  push('N', '', start);
}

/** `\boxed{..}` and `\cancel{..}` only adorn what they hold: their braces are passed over. */
function readAdorned(): void {
  const from = at;
  rawArgument();
  if (source[at - 1] === '}') passedOver.add(at - 1);
  at = source[from] === '{' ? from + 1 : from;
}

function readSetLetter(start: number): void {
  const letter = rawArgument().trim();
  if (!/^[RZNQC]$/.test(letter)) refuse('unknown-command \\R', start);
  push('ℝ', letter, start);
}

function readNegated(start: number): void {
  skipBlanks();
  const sign = take(/=|\\in/y);
  if (!sign) refuse('unknown-command \\ne', start);
  push(sign === '=' ? '≠' : '∉', '', start);
}

/** `\left(`: the delimiter carries its side and the span of both. */
function readSized(name: string, start: number): void {
  skipBlanks();
  const sized = /left|l$/.test(name) ? 'left' : /right|r$/.test(name) ? 'right' : '';
  if (take(/\./y)) return push(sized === 'left' ? '‹' : '›', '', start);
  side = sized;
  const before = tokens.length;
  if (at < source.length) readToken();
  const token = tokens[before];
  if (!token || token.end !== at || !/[()[\]⦃⦄|⌈-⌋/]/.test(token.kind)) return refuse('missing-bracket (', start);
  token.start = start;
}

/** `\mathrm{..}` and `\operatorname{..}`: a function, an upright d, e or i, or one letter. */
function readStyled(start: number, style: string): void {
  take(/\*/y);
  const word = rawArgument().replace(/\s|\\[,;:! ]/g, '');
  const entry = findEntry(word);
  if (/^[ei]$/.test(word) && style !== 'mathit') push(word, word, start);
  else if (/^[a-zA-Z]$/.test(word)) push('a', word, start);
  else if (entry && /^[flL∨∧][a-zA-Z]/.test(entry.kind + word)) push(entry.kind, entry.text, start);
  else refuse('unknown-command', start);
}

const PHRASE = /(?:no (?:real )?solutions?|all real(?: numbers)?|always true)(?![a-z])|let(?= )/iy;
/** The short names are found before one more letter, as in `sinx`; any name before what it applies to. */
const SHORT = /^(?:sin|cos|tan|ln|log|sqrt)(?=.$)/;
/** These are words only where they stand alone. */
const ALONE = /^(?:or|and|pi|infinity)$/;

/** Letters typed without a backslash: a word that names a function or joins statements, else one letter each. */
function readWords(start: number): void {
  const phrase = take(PHRASE);
  if (phrase) return push('T', phrase.toLowerCase(), start);
  const run = take(/[a-zA-Z]+/y);
  for (let from = 0; from < run.length - 1 && from < 64; from += 1) {
    const rest = run.slice(from);
    const isWhole = from === 0 || (rest.length < 8 && !ALONE.test(rest) && sees(/[ \t-\r]*(?:[(^_\d]|\\left)/y));
    const name = isWhole && findWord(rest) ? rest : SHORT.exec(rest)?.[0];
    if (!name) continue;
    const middle = start + from;
    const { kind, text } = findWord(name)!;
    pushLetters(start, middle);
    push(kind, text, middle, middle + name.length);
    return pushLetters(middle + name.length, at);
  }
  if (run.length > 3) hasLongRun = true;
  pushLetters(start, at);
}

function pushLetters(from: number, to: number): void {
  for (let place = from; place < to; place += 1) push('a', source[place]!, place, place + 1);
}

/** A group of three digits, and the decimal mark where decimals follow, as the class writes them. */
const MARKS = {
  point: { group: /(?:\\,|\{,\})\d{3}(?!\d)/y, decimal: /(?:\.|\{\.\})(?=\d|\\(?:overline|dot|bar))/y },
  comma: { group: /(?:\\,|\.|\{\.\})\d{3}(?!\d)/y, decimal: /(?:,|\{,\})(?=\d|\\(?:overline|dot|bar))/y },
};

/**
 * A number, as `12`, `3.5` or `0.1(6)` in the token's text: digits that are displayed next to each other belong
 * together, so blanks between them do not count, and `{,}` or `\,` may group thousands.
 */
function readNumber(start: number): void {
  const { group, decimal } = MARKS[settings.decimal];
  let text = digits() || '0';
  for (let more = text.length < 4; more;) {
    const three = take(group).slice(-3);
    text += three;
    more = three !== '';
  }
  if (take(decimal)) {
    text += '.' + digits() + repeating();
    if (take(/\.\./y)) refuse('bad-number', start);
  } else if (take(/\.(?=\d)/y)) refuse('bad-number ,', start);
  push('0', text, start);
}

/** Digits up to the first other character; blanks are jumped over only when a digit follows. */
function digits(): string {
  return take(/(?:[ \t-\r]*\d)+/y).replace(/\s/g, '');
}

/** `\overline{36}`, `\dot3` or `\dot1 4\dot7` after the decimal point, as `(36)`. */
function repeating(): string {
  const start = at;
  const mark = take(/\\(?:overline|dot|bar)/y);
  if (!mark) return '';
  let period = rawArgument().trim();
  if (mark === '\\dot') {
    const between = digits();
    if (take(/\\dot/y)) period += between + rawArgument().trim();
    else if (between) refuse('bad-number \\dot', start);
  }
  if (!/^\d{1,200}$/.test(period)) refuse('bad-number \\overline{3}', start);
  return `(${period})`;
}
