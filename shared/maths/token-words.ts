import type { Scanner } from './scanner.ts';
import { type Entry, findEntry } from './token-table.ts';

const PHRASE = /(?:no (?:real )?solutions?|all real(?: numbers)?|always true)(?![a-z])|let(?= )/iy;
const LETTERS = /[a-zA-Z]+/y;
/** The short names are found before one more letter, as in `sinx`; any name before what it applies to. */
const SHORT = /^(?:sin|cos|tan|ln|log|sqrt)(?=.$)/;
const OPENS = /[ \t-\r]*(?:[(^_\d]|\\left)/y;
/** These are words only where they stand alone. */
const ALONE = /^(?:or|and|pi|infinity)$/;

/** Letters typed without a backslash: a word that names a function or joins statements, else one letter each. */
export function readWords(scanner: Scanner): void {
  const { source, at: start } = scanner;
  const phrase = scanner.take(PHRASE);
  if (phrase) return scanner.push('T', phrase.toLowerCase(), start);
  const run = scanner.take(LETTERS);
  if (run.length === 1) return scanner.push('a', run, start);
  OPENS.lastIndex = scanner.at;
  const opens = OPENS.test(source);
  for (let from = 0; from < run.length - 1 && from < 64; from += 1) {
    const rest = run.slice(from);
    const isWhole = from === 0 || (opens && rest.length < 8 && !ALONE.test(rest));
    const name = isWhole && wordEntry(rest) ? rest : SHORT.exec(rest)?.[0];
    if (!name) continue;
    const at = start + from;
    const { kind, text } = wordEntry(name)!;
    pushLetters(scanner, start, at);
    scanner.push(kind, text, at, at + name.length);
    return pushLetters(scanner, at + name.length, scanner.at);
  }
  if (run.length > 3) scanner.longRun = true;
  pushLetters(scanner, start, scanner.at);
}

function pushLetters(scanner: Scanner, from: number, to: number): void {
  for (let at = from; at < to; at += 1) scanner.push('a', scanner.source[at]!, at, at + 1);
}

/** Functions, roots, or, and; pi and longer Greek letters; infinity. All else needs its backslash. */
const WORD = /^(?:[fl√∨∧](?!lb$)|api$|a(?!hbar).{4}|∞infinity)/;

function wordEntry(word: string): Entry | undefined {
  const entry = findEntry(word);
  return entry && WORD.test(entry.kind + word) ? entry : undefined;
}

/** Would these letters, printed side by side, be read as a word? */
export function hidesWord(letters: string): boolean {
  for (let from = 0; from < letters.length; from += 1) {
    for (let to = from + 2; to <= Math.min(letters.length, from + 8); to += 1) {
      const part = letters.slice(from, to);
      if (part === 'let' || wordEntry(part)) return true;
    }
  }
  return false;
}
