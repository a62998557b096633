import { isBlank, isDigit, isLetter, type Scanner } from './scanner.ts';
import { COMMANDS, functionOf, type TokenKind } from './token-table.ts';

/** Letters typed without a backslash: a word that names a function or joins statements, else one letter each. */
export function readWords(scanner: Scanner): void {
  const { source, at: start } = scanner;
  let end = start + 1;
  while (isLetter(source.charCodeAt(end))) end += 1;
  if (end === start + 1) return pushLetters(scanner, end);
  if (readPhrase(scanner)) return;
  const run = source.slice(start, end);
  const whole = wordKind(run);
  if (whole) return pushWord(scanner, whole, run);
  const [from, length] = findFunction(run, source, end);
  if (length > 0) {
    pushLetters(scanner, start + from);
    const name = run.slice(from, from + length);
    pushWord(scanner, wordKind(name) ?? 'function', name);
    return pushLetters(scanner, end);
  }
  if (run.length > 3) scanner.longRun = true;
  pushLetters(scanner, end);
}

function pushLetters(scanner: Scanner, end: number): void {
  while (scanner.at < end) {
    const start = scanner.at;
    scanner.at += 1;
    scanner.push('letter', scanner.source.slice(start, start + 1), start);
  }
}

function pushWord(scanner: Scanner, kind: TokenKind, word: string): void {
  const start = scanner.at;
  scanner.at += word.length;
  const text = kind === 'function' ? (functionOf(word) ?? word) : kind === 'letter' ? '\\' + word : word;
  scanner.push(kind, text, start);
}

const WORD_KINDS = new Set<TokenKind>(['function', 'log', 'log2', 'exp', 'sqrt', 'or', 'and']);
const PLAIN_WORDS = new Map<string, TokenKind>([
  ['or', 'or'],
  ['and', 'and'],
  ['pi', 'letter'],
  ['infinity', 'infinity'],
]);

function wordKind(word: string): TokenKind | undefined {
  const plain = PLAIN_WORDS.get(word);
  if (plain) return plain;
  const kind = COMMANDS.get(word);
  if (kind === undefined || word === 'lb') return undefined;
  return WORD_KINDS.has(kind) || (kind === 'letter' && word.length > 3 && word !== 'hbar') ? kind : undefined;
}

/** Where in a run of letters a function stands: `xsin(`, `sinx`. */
function findFunction(run: string, source: string, end: number): [number, number] {
  let after = end;
  while (isBlank(source.charCodeAt(after))) after += 1;
  const opens =
    '(^_'.includes(source[after] ?? ' ') || source.startsWith('\\left', after) || isDigit(source.charCodeAt(after));
  for (let from = 0; from < run.length - 1 && from < 64; from += 1) {
    const rest = run.slice(from);
    if (rest.length <= 7 && opens && wordKind(rest) && !PLAIN_WORDS.has(rest)) return [from, rest.length];
    const head = rest.slice(0, -1);
    if (SHORT.has(head)) return [from, head.length];
  }
  return [0, 0];
}

const SHORT = new Set(['sin', 'cos', 'tan', 'ln', 'log', 'sqrt']);
const PHRASES = [
  'no real solutions',
  'no real solution',
  'no solutions',
  'no solution',
  'all real numbers',
  'all real',
  'always true',
  'let ',
];

function readPhrase(scanner: Scanner): boolean {
  const { source, at: start } = scanner;
  if (!'nalNAL'.includes(source[start] ?? '')) return false;
  const lower = source.slice(start, start + 20).toLowerCase();
  const phrase = PHRASES.find((words) => lower.startsWith(words));
  if (phrase === undefined || (isLetter(source.charCodeAt(start + phrase.length)) && phrase !== 'let ')) return false;
  scanner.at += phrase.trimEnd().length;
  scanner.push('text', phrase.trimEnd(), start);
  return true;
}

/** Would these letters, printed side by side, be read as a word? */
export function hidesWord(letters: string): boolean {
  for (let from = 0; from < letters.length; from += 1) {
    for (let to = from + 2; to <= Math.min(letters.length, from + 8); to += 1) {
      const part = letters.slice(from, to);
      if (wordKind(part) || PHRASES.some((phrase) => phrase.trim() === part)) return true;
    }
  }
  return false;
}
