import type { Line } from './expression.ts';
import { readName } from './read-arguments.ts';
import type { Reader } from './reader.ts';

const NONE = /^(there (is|are) )?(has )?no (real |valid )?(solutions?|roots?)( exists?)?$|^never true$|^(no|never)$/i;
const ALWAYS =
  /^(?:(?:true )?(?:for )?(?:all|any|every)(?: real| values of| numbers?)*(?: ([a-z]))?|(?:is )?always true)$/i;

/** "no solution", "all real x" and definitions, in a `\text` or as plain words; null where none begins here. */
export function readSentence(reader: Reader): Line | null {
  const { kind, text, start } = reader.token;
  if (!reader.take('T∀')) return null;
  const words = text.replace(/[\s,.:~]+|\\[,;: ]/g, ' ').trim();
  const always = kind === '∀' ? [] : ALWAYS.exec(words);
  if (always) return readAlways(reader, start, always[1]);
  if (NONE.test(words)) return { kind: 'none', span: reader.span(start) };
  if (/^(let|put|set|define|where)$/i.test(words)) return readLet(reader, start);
  return reader.fail('text', { start, end: reader.lastEnd });
}

/** The letter of "all real x", where one is written. */
function readAlways(reader: Reader, start: number, named?: string): Line {
  const letter = named ?? (reader.is('a') ? readName(reader) : null);
  if (!named) reader.takeAll(/∈ℝ/y);
  return { kind: 'always', letter, span: reader.span(start) };
}

function readLet(reader: Reader, start: number): Line {
  const isFunction = reader.peek(1).kind === '(';
  const name = readName(reader);
  const params: string[] = [];
  if (isFunction) {
    reader.next();
    do params.push(readName(reader));
    while (reader.take(','));
    reader.expect(')');
  }
  if (!reader.take('=≔')) reader.fail('bad-relation =');
  const value = reader.grammar.sum(reader);
  return { kind: 'definition', name, params, value, span: reader.span(start) };
}

/** The name that `f(x) = ..` introduces; null where the line is an ordinary statement. */
export function startsDefinition(reader: Reader): string | null {
  const { text } = reader.token;
  const { length } = reader.ahead(/a\(a(?:,a)*\)=/y);
  const param = reader.peek(2).text;
  if (!length || param === text || reader.functions.includes(text)) return null;
  if (/^(?:[fghFGH]|\\phi|\\psi)$/.test(text)) return text;
  if (!/^[xt]$/.test(param) || /^[abckmnxt]$/.test(text)) return null;
  const rest = reader.tokens.slice(reader.index + length);
  const isUsed = rest.some((token) => token.kind === 'a' && token.text === param);
  return isUsed && !reader.choose('definition') ? text : null;
}
