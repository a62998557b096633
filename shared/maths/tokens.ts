import type { ReadError, ReadErrorCode, ReadSettings } from './expression.ts';
import { type Entry, findEntry, findWord, type TokenKind } from './token-table.ts';

export interface Token {
  readonly kind: TokenKind;
  /** Digits, the letter or the function in its canonical spelling; the words of a `\text`. */
  text: string;
  start: number;
  readonly end: number;
  /** A spacing command such as `\,` stands before it. */
  readonly gap: boolean;
  /** `l` where `\left` sized it, `r` where `\right` did. */
  readonly side: string;
}

/** An error's code and, parted by blanks, what was expected. */
export type Complaint = ReadErrorCode | `${ReadErrorCode} ${string}`;

/** Most characters of a line. */
export const MOST_CHARACTERS = 4000;

/** Why the line was refused: what `refuse` threw last, never thrown beyond the reader. */
export let refusal: ReadError;

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
let side = '';
/** Where the `\left` or its like begins that sizes the next token; null where there is none. */
let sized: number | null = null;
/** Closing braces that group nothing. */
let passedOver: number[];

/** Cuts a line into tokens; the last one is the end of the line. Refuses what is no part of a line. */
export function tokenize(tex: string, how: ReadSettings): void {
  source = tex.slice(0, MOST_CHARACTERS);
  settings = how;
  tokens = [];
  kinds = side = '';
  sized = null;
  passedOver = [];
  hasLongRun = gap = false;
  at = 0;
  if (tex.length > MOST_CHARACTERS) refuse(`too-long ${MOST_CHARACTERS}`, MOST_CHARACTERS, tex.length);
  while (skipBlanks()) readToken();
  push('$', '', at);
}

/** Ends the reading: what is wrong from one place to another, and what was expected there. */
export function refuse(complaint: Complaint, start: number, end = at): never {
  // The blank in `\to 0` parts nothing.
  const [code, ...expected] = complaint.split(/ (?!0)/);
  throw (refusal = { code: code as ReadErrorCode, span: { start, end }, found: source.slice(start, end), expected });
}

function push(kind: TokenKind, text: string, start: number, end = at): void {
  if (sized !== null && !/[()[\]⦃⦄|⌈-⌋/‹›]/.test(kind)) refuse('missing-bracket (', sized);
  tokens.push({ kind, text, start: sized ?? start, end, gap, side });
  kinds += kind;
  gap = false;
  side = '';
  sized = null;
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
  for (;;) {
    const code = source.charCodeAt(at);
    // A blank, or one of the controls from tab to return.
    if (code !== 32 && !(code > 8 && code < 14)) return at < source.length;
    at += 1;
  }
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
  if (isLetter(source.charCodeAt(at))) readWords(start);
  else if (isDigit(at) || (source[at] === '.' && isDigit(at + 1))) readNumber(start);
  else if (source[at] === '}' && passedOver.includes(at)) at += 1;
  else readSign(start);
}

function isLetter(code: number): boolean {
  return (code > 64 && code < 91) || (code > 96 && code < 123);
}

function isDigit(place: number): boolean {
  const code = source.charCodeAt(place);
  return code > 47 && code < 58;
}

/** `\left`, `\mright`, `\middle`, `\big`, `\Biggl` and their like. */
const SIZED = /^\\(?:m?(l)eft|m?(r)ight|middle|[bB]igg?(?:([lr])|m)?)$/;

const SIGN = /\\(?:[a-zA-Z]+|[^]?)|\*\*|[=<>:]=|[=-]>|[⁰¹²³⁴-⁹]+|[^]/uy;

/** A command, or a sign of one or two characters. */
function readSign(start: number): void {
  const char = source[start]!;
  const isPair = '=>*'.includes(source.charAt(at + 1));
  const name = isPair || char === '\\' || char > '~' ? take(SIGN) : source[at++]!;
  const entry = findEntry(name) ?? (/^\\?\s/.test(name) ? findEntry('~') : undefined);
  if (entry) return readEntry(entry, name, start);
  const sides = SIZED.exec(name);
  const typed = name.normalize('NFKD');
  if (sides) readSized(sides.slice(1).join(''), start);
  else if (/^[⁰¹²³⁴-⁹]/.test(name)) push('²', typed, start);
  else if (/^[¼-¾⅓-⅞]/.test(name)) push('F', typed, start);
  else refuse(name.startsWith('\\') ? 'unknown-command' : 'unknown-character', start);
}

/** What may stand before the argument of a command. */
const OPTIONS: Partial<Record<TokenKind, RegExp>> = {
  H: /\s*\[[^\]]*\]/y,
  M: /\*/y,
  N: /\[-?[\d.]+ *[a-z]{2}\]/y,
};

/** What the argument of a command has to be, and what is said where it is not. */
const ARGUMENTS: Partial<Record<TokenKind, readonly [RegExp, Complaint]>> = {
  A: [/^(?:\\?[a-zA-Z]|\\[a-zA-Z]+)$/, 'unknown-command letter'],
  D: [/^[RZNQC]$/, 'unknown-command \\R'],
  n: [/^(?:=|\\in)$/, 'unknown-command \\ne'],
};

function readEntry({ kind, text }: Entry, name: string, start: number): void {
  if (!'hABDEHMNSTXn~'.includes(kind)) return push(kind, text, start);
  const options = OPTIONS[kind];
  if (options) take(options);
  const argument = 'NSX~'.includes(kind) ? '' : rawArgument().trim();
  const must = ARGUMENTS[kind];
  if (must && !must[0].test(argument)) refuse(must[1], start);
  switch (kind) {
    case 'S':
    case 'h':
      return;
    case '~':
      gap = true;
      return;
    case 'X':
      return passOver();
    case 'M':
      return readStyled(argument, name, start);
    case 'A':
      return push('a', `${name}{${argument}}`, start);
    case 'D':
      return push('ℝ', argument, start);
    case 'n':
      return push(argument === '=' ? '≠' : '∉', '', start);
  }
  if (kind === 'B' && argument === 'array') rawArgument();
  push(kind, argument, start);
}

/** `\boxed{..}` and `\cancel{..}` only adorn what they hold: their braces are passed over. */
function passOver(): void {
  const from = at;
  rawArgument();
  if (source[at - 1] === '}') passedOver.push(at - 1);
  at = source[from] === '{' ? from + 1 : from;
}

/** `\left(`: the delimiter carries its side and the span of both. */
function readSized(found: string, start: number): void {
  skipBlanks();
  sized = start;
  if (take(/\./y)) push(found === 'l' ? '‹' : '›', '', start);
  else side = found;
}

/** `\mathrm{..}` and `\operatorname{..}`: a function, an upright d, e or i, or one letter. */
function readStyled(argument: string, style: string, start: number): void {
  const word = argument.replace(/\s|\\[,;:! ]/g, '');
  const entry = findEntry(`\\${word}`);
  if (/^[ei]$/.test(word) && style !== '\\mathit') push(word, word, start);
  else if (/^[a-zA-Z]$/.test(word)) push('a', word, start);
  else if (entry && 'flL∨∧'.includes(entry.kind)) push(entry.kind, entry.text, start);
  else refuse('unknown-command', start);
}

const PHRASE = /(?:no (?:real )?solutions?|all real(?: numbers)?|always true)(?![a-z])|let(?= )/iy;
/** The short names are found before one more letter, as in `sinx`; any name before what it applies to. */
const SHORT = /^(?:sin|cos|tan|ln|log|sqrt)(?=.$)/;
/** These are words only where they stand alone. */
const ALONE = /^(?:or|and|pi|infinity)$/;

/** Letters typed without a backslash: a word that names a function or joins statements, else one letter each. */
function readWords(start: number): void {
  do at += 1;
  while (isLetter(source.charCodeAt(at)));
  const end = at;
  // `\frac lg` is l over g: without braces a fraction takes single letters.
  if (end === start + 1 || (/[FC]$/.test(kinds) && !tokens[tokens.length - 1]!.text.includes('⁄'))) {
    at = start + 1;
    return push('a', source[start]!, start);
  }
  at = start;
  const phrase = take(PHRASE);
  if (phrase) return push('T', phrase.toLowerCase(), start);
  at = end;
  for (let from = start; from < end - 1 && from < start + 64; from += 1) {
    const rest = source.slice(from, end);
    const isWhole = from === start || (!ALONE.test(rest) && sees(/\s*(?:[(^_\d]|\\left)/y));
    const name = isWhole && findWord(rest) ? rest : SHORT.exec(rest)?.[0];
    if (!name) continue;
    const { kind, text } = findWord(name)!;
    const behind = from + name.length;
    pushLetters(start, from);
    push(kind, text, from, behind);
    return pushLetters(behind, end);
  }
  if (end > start + 3) hasLongRun = true;
  pushLetters(start, end);
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
