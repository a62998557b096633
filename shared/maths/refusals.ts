import type { Complaint, ReadError, ReadErrorCode, Refusal } from './expression.ts';
import { READ_LIMITS } from './reader.ts';

type Expectation = readonly [code: ReadErrorCode, ...expected: readonly string[]];

type Expectations = readonly (readonly [fits: RegExp, ...Expectation])[];

/** What each complaint of the reader means: the code of the error, and what was expected. */
const EXPECTATIONS: Partial<Record<string, Expectation>> = {
  characters: ['too-long', String(READ_LIMITS.characters)],
  levels: ['too-deep'],
  nodes: ['too-many-nodes'],
  line: ['empty', 'number', 'letter'],
  number: ['missing-operand', 'number', 'letter'],
  operand: ['missing-operand', 'number', 'letter', '('],
  argument: ['missing-argument', 'number', 'letter', '('],
  group: ['missing-argument', '{'],
  several: ['missing-argument', '('],
  below: ['missing-argument', '_'],
  bound: ['missing-operand', '_'],
  choose: ['missing-operand', 'C'],
  letter: ['missing-argument', 'letter'],
  subscript: ['missing-argument', 'letter', 'number'],
  scripts: ['extra-bracket'],
  factorial: ['extra-bracket', '('],
  relation: ['bad-relation', '='],
  side: ['bad-relation', 'number', 'letter'],
  set: ['bad-set', '\\{', '(', '[', '\\R'],
  finite: ['bad-set', '\\}'],
  interval: ['bad-set', ','],
  digits: ['bad-number'],
  decimal: ['bad-number', ','],
  dot: ['bad-number', '\\dot'],
  repeating: ['bad-number', '\\overline{3}'],
  digit: ['bad-number', '{'],
  product: ['bad-number', '*'],
  dx: ['bad-integral', 'dx'],
  integral: ['bad-integral'],
  series: ['bad-series'],
  limit: ['bad-limit', '_{x\\to 0}'],
  to: ['bad-limit', '\\to'],
  order: ['bad-derivative'],
  derivative: ['bad-derivative', '\\frac{d}{dx}'],
  matrix: ['unknown-command', 'pmatrix'],
  rows: ['ragged-matrix'],
  joins: ['mixed-joins', '('],
  cases: ['piecewise'],
  text: ['text'],
  z: ['missing-bracket', '\\}'],
  '⌋': ['missing-bracket', '\\rfloor'],
  '⌉': ['missing-bracket', '\\rceil'],
  '|]': ['missing-bracket', '\\right|'],
  ')][': ['missing-bracket', ')', ']'],
};

/** The kind of token that stands where the line should have ended says best what is wrong. */
const AT_END: Expectations = [
  [/[)\]}z⌋⌉E›&]/, 'extra-bracket'],
  [/\|/, 'missing-bracket', '|'],
  [/[TV]/, 'text'],
  [/⇒/, 'bad-relation', '='],
  [/^/, 'missing-operand', '+', '='],
];

/** For what is not known, what stands there. */
const UNKNOWN: Expectations = [
  [/^\\mathbb(?![a-z])/, 'unknown-command', '\\R'],
  [/^\\not(?![a-z])/, 'unknown-command', '\\ne'],
  [/^\\(?:vec|overrightarrow|hat|tilde|mathbf|bm|boldsymbol)(?![a-z])/, 'unknown-command', 'letter'],
  [/^\\/, 'unknown-command'],
  [/^/, 'unknown-character'],
];

/** Why a line was refused, for those who show it: the code of the error, what stands there and what was expected. */
export const explainRefusal = ({ complaint, span, tex }: Refusal): ReadError => {
  const found = tex.slice(span.start, span.end);
  const [code, ...expected] = expectationOf(complaint, found);
  return { code, span, found, expected };
};

/** Words in the place of maths, in a `\text` or plainly typed. */
const WORDS = /^(?:\\(?:text|mbox|textrm|textnormal)(?![a-z])|(?:no|all|always|let) ?)/i;

const expectationOf = (complaint: Complaint, found: string): Expectation => {
  const [word = '', detail] = complaint.split(' ');
  if (word === 'end') return firstThatFits(AT_END, detail ?? '');
  if (word === 'known') return firstThatFits(UNKNOWN, found);
  if (/^(?:operand|argument)$/.test(word) && WORDS.test(found)) return ['text'];
  const expectation: Expectation = EXPECTATIONS[word] ?? ['missing-bracket', word];
  return detail === undefined ? expectation : [...expectation, detail];
};

const firstThatFits = (expectations: Expectations, what: string): Expectation => {
  const [, ...expectation] = expectations.find(([fits]) => fits.test(what))!;
  return expectation;
};
