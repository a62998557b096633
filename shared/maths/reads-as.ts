import type { ReadError, ReadErrorCode, Reading, ReadingFlag, ReadSettings } from './expression.ts';
import { printLine } from './print.ts';
import { DEFAULT_READ_SETTINGS, readLine } from './read.ts';
import { explainRefusal } from './refusals.ts';
import { lineInWords } from './words.ts';

export interface ReadChoice {
  /** TeX that can be read in this one way only. */
  readonly tex: string;
  readonly words: string;
}

/** What the sheet shows beside a line that is being written. */
export type ReadsAs =
  | { readonly kind: 'silent'; readonly words: string }
  | { readonly kind: 'note'; readonly tex: string; readonly words: string; readonly flags: readonly ReadingFlag[] }
  | { readonly kind: 'ask'; readonly choices: readonly ReadChoice[]; readonly flags: readonly ReadingFlag[] }
  | { readonly kind: 'error'; readonly error: ReadError };

/** How a line is read, and whether the author needs to be told or asked. */
export function readsAs(tex: string, settings: ReadSettings = DEFAULT_READ_SETTINGS): ReadsAs {
  return showReading(readLine(tex, settings), settings.decimal);
}

/** The same for a reading that is there already, such as that of a line in its place behind others. */
export function showReading(reading: Reading, decimal: ReadSettings['decimal']): ReadsAs {
  if (!reading.ok) return { kind: 'error', error: explainRefusal(reading.refusal) };
  const { line, flags, alternatives } = reading;
  const words = lineInWords(line);
  const printed = printLine(line, decimal);
  if (alternatives.length > 0) {
    const others = alternatives.map((other) => ({
      tex: printLine(other, decimal),
      words: lineInWords(other),
    }));
    return { kind: 'ask', choices: [{ tex: printed, words }, ...others], flags };
  }
  return flags.length > 0 ? { kind: 'note', tex: printed, words, flags } : { kind: 'silent', words };
}

const NAMES: Partial<Record<string, string>> = {
  number: 'a number',
  letter: 'a letter',
  '(': 'an opening bracket',
  ')': 'a closing bracket “)”',
  '|': 'a closing bar “|”',
  '}': 'a closing brace',
  ']': 'a closing bracket “]”',
  '{': 'a group in braces',
  _: 'a lower bound',
  '^': 'an upper bound',
};

function list(expected: readonly string[]): string {
  const named = expected.map((item) => NAMES[item] ?? `“${item}”`);
  return named.length > 1 ? `${named.slice(0, -1).join(', ')} or ${named[named.length - 1]}` : (named[0] ?? '');
}

const ADVICE: Record<ReadErrorCode, (error: ReadError) => readonly [what: string, mend: string]> = {
  empty: () => ['The line is empty', 'Write the step, or delete the line'],
  'too-long': ({ expected }) => [
    'The line is too long',
    `Keep it under ${expected[0] ?? 'the limit of'} characters; use two lines`,
  ],
  'too-deep': () => ['Too many brackets or fractions stand inside each other', 'Split the step into smaller ones'],
  'too-many-nodes': () => ['The line has too many parts', 'Split the step into smaller ones'],
  'unknown-command': ({ found, expected }) => [
    `The command ${found} is not known here`,
    expected.length > 0 ? `Use ${list(expected)} instead` : 'Write it with the usual signs and functions',
  ],
  'unknown-character': ({ found }) => [
    `The character “${found}” has no meaning here`,
    'Delete it or write the sign you mean',
  ],
  'missing-operand': ({ expected }) => [
    'Something is missing',
    `Put ${list(expected)} there, or delete the sign that needs it`,
  ],
  'missing-bracket': ({ expected }) => [
    'A bracket is missing',
    `Add ${list(expected)} so that it is clear what belongs together`,
  ],
  'extra-bracket': ({ expected }) => [
    'This does not belong to anything',
    expected.length > 0
      ? `Use ${list(expected)} to show what you mean`
      : 'Delete it, or add what it should close or belong to',
  ],
  'missing-argument': ({ expected }) => ['What this applies to is missing', `Write ${list(expected)} after it`],
  'bad-relation': ({ expected }) => [
    'The statement is not complete',
    `Write ${list(expected)} there, with one statement on a line`,
  ],
  'bad-set': ({ expected }) => [
    'The set or interval cannot be read',
    `Write ${list(expected)} there, as in {2, 3} or (−1, 3]`,
  ],
  'bad-number': ({ expected }) => [
    'The number cannot be read',
    expected.length > 0 ? `Write ${list(expected)} there` : 'Write all of its digits',
  ],
  'bad-integral': ({ expected }) => ['The integral is not complete', `Write ${list(expected)} there`],
  'bad-limit': ({ expected }) => [
    'The limit is not complete',
    `Write below it what goes where, as in ${list(expected)}`,
  ],
  'bad-series': ({ expected }) => ['The sum or product is not complete', `Write ${list(expected)} with it`],
  'bad-derivative': ({ expected }) => ['The derivative cannot be read', `Write it as ${list(expected)}`],
  'ragged-matrix': ({ expected }) => [
    'The rows of the matrix differ in length',
    `Give each row ${expected[0] ?? 'as many'} entries`,
  ],
  'mixed-joins': () => ['Both “or” and “and” join the statements', 'Put brackets around the ones that belong together'],
  piecewise: () => [
    'An expression given case by case is not read',
    'Write each case as a step of its own, or as statements joined by “or”',
  ],
  text: ({ found }) => [
    `The words “${found.replace(/^\\[a-z]+\{|\}$/g, '').trim()}” are not read as maths`,
    'Put them into the reason beside the line',
  ],
};

/** An error in words for a student: what is wrong, where, and how to mend it. */
export function wordReadError(error: ReadError): string {
  const [what, mend] = ADVICE[error.code](error);
  return `${what}${placeOf(error)}. ${mend}.`;
}

function placeOf({ code, span, found }: ReadError): string {
  if (code === 'empty' || code === 'too-long') return '';
  if (found === '') return ' at the end of the line';
  if (found.startsWith('\\placeholder')) return ' in an empty box';
  const shown = found.length > 24 ? `${found.slice(0, 24)}…` : found;
  return code === 'unknown-command' || code === 'unknown-character' || code === 'text'
    ? ` (at character ${span.start + 1})`
    : `, at “${shown}” (character ${span.start + 1})`;
}
