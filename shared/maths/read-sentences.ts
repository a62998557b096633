import type { Line } from './expression.ts';
import { readName } from './read-arguments.ts';
import {
  ahead,
  choose,
  expect,
  fail,
  functions,
  index,
  is,
  lastEnd,
  next,
  peek,
  span,
  sum,
  take,
  takeAll,
  token,
} from './reader.ts';
import { tokens } from './tokens.ts';

const NONE = /^(there (is|are) )?(has )?no (real |valid )?(solutions?|roots?)( exists?)?$|^never true$|^(no|never)$/i;
const ALWAYS =
  /^(?:(?:true )?(?:for )?(?:all|any|every)(?: real| values of| numbers?)*(?: ([a-z]))?|(?:is )?always true)$/i;

/** "no solution", "all real x" and definitions, in a `\text` or as plain words; null where none begins here. */
export const readSentence = (): Line | null => {
  if (!is('T∀')) return null;
  const { text, start } = next();
  const always = ALWAYS.exec(text);
  if (always) return readAlways(start, always[1]);
  if (NONE.test(text)) return { kind: 'none', span: span(start) };
  if (!/^(?:let|put|set|define|where)$/i.test(text)) fail('text', { start, end: lastEnd });
  return readLet(start);
};

/** The letter of "all real x", where one is written. */
const readAlways = (start: number, named?: string): Line => {
  const letter = named ?? (is('a') ? readName() : null);
  if (!named) takeAll(/∈R/y);
  return { kind: 'always', letter, span: span(start) };
};

const readLet = (start: number): Line => {
  const isFunction = peek(1).kind === '(';
  const name = readName();
  const params: string[] = [];
  if (isFunction) {
    next();
    do params.push(readName());
    while (take(','));
    expect(')');
  }
  expect('=d', 'relation');
  return { kind: 'definition', name, params, value: sum(), span: span(start) };
};

/** The name that `f(x) = ..` introduces; null where the line is an ordinary statement. */
export const startsDefinition = (): string | null => {
  const { text } = token;
  const { length } = ahead(/a\(a(?:,a)*\)=/y);
  const param = peek(2).text;
  if (!length || param === text || functions.includes(text)) return null;
  if (/^(?:[fghFGH]|\\phi|\\psi)$/.test(text)) return text;
  if (!/^[xt]$/.test(param) || /^[abckmnxt]$/.test(text)) return null;
  const isUsed = tokens.slice(index + length).some((other) => other.kind === 'a' && other.text === param);
  return isUsed && !choose('definition') ? text : null;
};
