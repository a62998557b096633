import type { Complaint, ReadSettings, Refusal } from './expression.ts';
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

/** Most characters of a line. */
export const MOST_CHARACTERS = 4000;

/** Why the line was refused: what `refuse` threw last, never thrown beyond the reader. */
export let refusal: Refusal;

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
export const tokenize = (tex: string, how: ReadSettings): void => {
  source = tex.slice(0, MOST_CHARACTERS);
  settings = how;
  tokens = [];
  passedOver = [];
  kinds = side = '';
  sized = null;
  hasLongRun = gap = false;
  at = 0;
  if (tex.length > MOST_CHARACTERS) refuse('characters', MOST_CHARACTERS, tex.length);
  while (skipBlanks()) readToken();
  push('$', '', at);
};

/** Ends the reading: what was expected from one place to another. */
export const refuse: (complaint: Complaint, start: number, end?: number) => never = (complaint, start, end = at) => {
  throw (refusal = { complaint, span: { start, end }, tex: source });
};

const push = (kind: TokenKind, text: string, start: number, end = at): void => {
  if (sized !== null && !/[()[\]sz|⌈-⌋/‹›]/.test(kind)) refuse('(', sized);
  tokens.push({ kind, text, start: sized ?? start, end, gap, side });
  kinds += kind;
  gap = false;
  side = '';
  sized = null;
};

/** Does the sticky pattern fit here? */
const sees = (pattern: RegExp): boolean => {
  pattern.lastIndex = at;
  return pattern.test(source);
};

/** Takes what fits the sticky pattern here; empty where nothing does. */
const take = (pattern: RegExp): string => {
  const start = at;
  if (sees(pattern)) at = pattern.lastIndex;
  return source.slice(start, at);
};

/** False at the end of the line. */
const skipBlanks = (): boolean => {
  for (;;) {
    const code = source.charCodeAt(at);
    // A blank, or one of the controls from tab to return.
    if (code !== 32 && !(code > 8 && code < 14)) return at < source.length;
    at += 1;
  }
};

/** A command or a single character. */
const PIECE = /\\(?:[a-zA-Z]+|[^])|[^]/y;

/** The braced text after a command, without its braces; a single character or command where there are none. */
const rawArgument = (): string => {
  skipBlanks();
  const start = at;
  let depth = 0;
  do {
    const piece = take(PIECE);
    if (!piece && depth > 0) refuse('}', start);
    if (piece === '{') depth += 1;
    if (piece === '}') depth -= 1;
  } while (depth > 0);
  return source[start] === '{' ? source.slice(start + 1, at - 1) : source.slice(start, at);
};

const readToken = (): void => {
  const start = at;
  if (isLetter(source.charCodeAt(at))) readWords(start);
  else if (isDigit(at) || (source[at] === '.' && isDigit(at + 1))) readNumber(start);
  else if (passedOver.includes(at)) at += 1;
  else readSign(start);
};

const isLetter = (code: number): boolean => (code > 64 && code < 91) || (code > 96 && code < 123);

const isDigit = (place: number): boolean => {
  const code = source.charCodeAt(place);
  return code > 47 && code < 58;
};

/** `\left`, `\mright`, `\middle`, `\big`, `\Biggl` and their like. */
const SIZED = /^\\(?:m?(l)eft|m?(r)ight|middle|[bB]igg?(?:([lr])|m)?)$/;

const SIGN = /\\(?:[a-zA-Z]+|[^]?)|\*\*|[=<>:]=|[=-]>|[⁰¹²³⁴-⁹]+|[^]/uy;

/** A command, or a sign of one or two characters. */
const readSign = (start: number): void => {
  const char = source[start]!;
  const isPair = '=>*'.includes(source.charAt(at + 1));
  const name = isPair || char === '\\' || char > '~' ? take(SIGN) : source[at++]!;
  const entry = findEntry(name) ?? (/^\\?\s/.test(name) ? findEntry('~') : undefined);
  if (entry) return readEntry(entry, name, start);
  const sides = SIZED.exec(name);
  const typed = name.normalize('NFKD');
  if (sides) readSized(sides.slice(1).join(''), start);
  else if (/^[⁰¹²³⁴-⁹]/.test(name)) push('2', typed, start);
  else if (/^[¼-¾⅓-⅞]/.test(name)) push('F', typed, start);
  else refuse('known', start);
};

/** What may stand before the argument of a command. */
const OPTIONS: Partial<Record<TokenKind, RegExp>> = {
  H: /\s*\[[^\]]*\]/y,
  M: /\*/y,
  N: /\[-?[\d.]+ *[a-z]{2}\]/y,
};

const readEntry = ({ kind, text }: Entry, name: string, start: number): void => {
  if (!'hABDEHMNSTXnv~'.includes(kind)) return push(kind, text, start);
  const options = OPTIONS[kind];
  if (options) take(options);
  const argument = 'NSXv~'.includes(kind) ? '' : rawArgument().trim();
  switch (kind) {
    case 'S':
    case 'h':
      return;
    case '~':
      gap = true;
      return;
    case 'X':
      return passOver();
    case 'v':
      return splitGroup(text, start);
    case 'M':
      return readStyled(argument, name, start);
    case 'D':
      return pushMeant(`\\${argument}`, 'R', start);
    case 'n':
      return pushMeant(name + argument, '<∈', start);
    case 'T':
      return push('T', argument.replace(/[\s,.:~]+|\\[,;: ]/g, ' ').trim(), start);
    case 'A':
      if (!/^\\?[a-zA-Z]$|^\\[a-zA-Z]+$/.test(argument)) refuse('known', start);
      return push('a', `${name}{${argument}}`, start);
  }
  if (kind === 'B' && argument === 'array') rawArgument();
  push(kind, argument, start);
};

/** `\boxed{..}` and `\cancel{..}` only adorn what they hold: their braces are passed over. */
const passOver = (): void => {
  const from = at;
  rawArgument();
  if (source[at - 1] === '}') passedOver.push(at - 1);
  at = source[from] === '{' ? from + 1 : from;
};

/** `{n\over k}` becomes `\frac{n}{k}`, and so for binomials: the sign goes before the group that it parts in two. */
const splitGroup = (sign: TokenKind, start: number): void => {
  let open = tokens.length;
  let depth = 0;
  do {
    open -= 1;
    if (kinds[open] === '}') depth += 1;
    if (kinds[open] === '{') depth -= 1;
  } while (open >= 0 && depth >= 0);
  const brace = tokens[open];
  if (!brace || brace.text === SPLIT) refuse('known', start);
  tokens.splice(open, 0, { ...brace, kind: sign, end: brace.start });
  kinds = kinds.slice(0, open) + sign + kinds.slice(open);
  push('}', '', start);
  push('{', SPLIT, start);
};

/** The text of a brace that stands for an `\over`: a group is parted only once. */
const SPLIT = 'over';

/** `\left(`: the delimiter carries its side and the span of both. */
const readSized = (found: string, start: number): void => {
  skipBlanks();
  sized = start;
  if (take(/\./y)) push(found === 'l' ? '‹' : '›', '', start);
  else side = found;
};

/** A sign that is written with two commands, such as `\not\in`; it has to be of one of these kinds. */
const pushMeant = (name: string, some: string, start: number): void => {
  const entry = findEntry(name);
  if (!entry || !some.includes(entry.kind)) refuse('known', start);
  push(entry.kind, entry.text, start);
};

/** `\mathrm{..}` and `\operatorname{..}`: a function, an upright d, e or i, or one letter. */
const readStyled = (argument: string, style: string, start: number): void => {
  const word = argument.replace(/\s|\\[,;:! ]/g, '');
  if (/^[ei]$/.test(word) && style !== '\\mathit') push(word, word, start);
  else if (/^[a-zA-Z]$/.test(word)) push('a', word, start);
  else pushMeant(`\\${word}`, 'flLV', start);
};

const PHRASE = /(?:no (?:real )?solutions?|all real(?: numbers)?|always true)(?![a-z])|let(?= )/iy;
/** The short names are found before one more letter, as in `sinx`; any name before what it applies to. */
const SHORT = /^(?:sin|cos|tan|ln|log|sqrt)(?=.$)/;
/** These are words only where they stand alone. */
const ALONE = /^(?:or|and|pi|infinity)$/;

/** Letters typed without a backslash: a word that names a function or joins statements, else one letter each. */
const readWords = (start: number): void => {
  do at += 1;
  while (isLetter(source.charCodeAt(at)));
  const end = at;
  // `\frac lg` is l over g: without braces a fraction takes single letters.
  if (end === start + 1 || (/[FC]$/.test(kinds) && !tokens.at(-1)!.text.includes('⁄'))) {
    at = start + 1;
    return push('a', source[start]!, start);
  }
  at = start;
  const phrase = take(PHRASE);
  if (phrase) return push('T', phrase, start);
  at = end;
  for (let from = start; from < end - 1 && from < start + 64; from += 1) {
    const rest = source.slice(from, end);
    const isWhole = from === start || (!ALONE.test(rest) && sees(/\s*(?:[(^_\d]|\\left)/y));
    const name = isWhole && findWord(rest) ? rest : SHORT.exec(rest)?.[0];
    if (!name) continue;
    const { kind, text } = findWord(name)!;
    pushLetters(start, from);
    push(kind, text, from, from + name.length);
    return pushLetters(from + name.length, end);
  }
  if (end > start + 3) hasLongRun = true;
  pushLetters(start, end);
};

const pushLetters = (from: number, to: number): void => {
  for (let place = from; place < to; place += 1) push('a', source[place]!, place, place + 1);
};

/** A group of three digits, and the decimal mark where decimals follow, as the class writes them. */
const MARKS = {
  point: { group: /(?:\\,|\{,\})\d{3}(?!\d)/y, decimal: /(?:\.|\{\.\})(?=\d|\\(?:overline|dot|bar))/y },
  comma: { group: /(?:\\,|\.|\{\.\})\d{3}(?!\d)/y, decimal: /(?:,|\{,\})(?=\d|\\(?:overline|dot|bar))/y },
};

/**
 * A number, as `12`, `3.5` or `0.1(6)` in the token's text: digits that are displayed next to each other belong
 * together, so blanks between them do not count, and `{,}` or `\,` may group thousands.
 */
const readNumber = (start: number): void => {
  const { group, decimal } = MARKS[settings.decimal];
  let text = digits() || '0';
  for (let more = text.length < 4; more;) {
    const three = take(group).slice(-3);
    text += three;
    more = three !== '';
  }
  if (take(decimal)) {
    text += '.' + digits() + repeating();
    if (take(/\.\./y)) refuse('digits', start);
  } else if (take(/\.(?=\d)/y)) refuse('decimal', start);
  push('0', text, start);
};

/** Digits up to the first other character; blanks are jumped over only when a digit follows. */
const digits = (): string => take(/(?:[ \t-\r]*\d)+/y).replace(/\s/g, '');

/** `\overline{36}`, `\dot3` or `\dot1 4\dot7` after the decimal point, as `(36)`. */
const repeating = (): string => {
  const start = at;
  const mark = take(/\\(?:overline|dot|bar)/y);
  if (!mark) return '';
  let period = rawArgument().trim();
  if (mark === '\\dot') {
    const between = digits();
    if (take(/\\dot/y)) period += between + rawArgument().trim();
    else if (between) refuse('dot', start);
  }
  if (!/^\d{1,200}$/.test(period)) refuse('repeating', start);
  return `(${period})`;
};
