import type { Line } from './expression.ts';
import { readName } from './read-arguments.ts';
import type { Reader } from './reader.ts';
import type { Token } from './scanner.ts';

const NONE = /^(there (is|are) )?(has )?no (real |valid )?(solutions?|roots?)( exists?)?$|^never true$|^(no|never)$/;
const ALWAYS = /^(true )?(for )?(all|any|every)( real| values of)*( numbers?)?$|^(is )?always true$/;
const ALWAYS_LETTER = /^(?:true )?(?:for )?(?:all|any|every)(?: real| values of| numbers?)* ([a-z])$/i;
const LET = /^(let|put|set|define|where)$/;

/** "no solution", "all real x" and definitions, in a `\text` or as plain words; null where none begins here. */
export function readSentence(reader: Reader): Line | null {
  const { token } = reader;
  if (token.kind === 'forall') return readAlways(reader);
  if (token.kind !== 'text') return null;
  const words = normal(token);
  const named = ALWAYS_LETTER.exec(words);
  if (named) {
    reader.next();
    return { kind: 'always', letter: named[1] ?? null, span: reader.span(token.start) };
  }
  const lower = words.toLowerCase();
  if (NONE.test(lower)) {
    reader.next();
    return { kind: 'none', span: reader.span(token.start) };
  }
  if (ALWAYS.test(lower)) return readAlways(reader);
  if (!LET.test(lower)) return reader.fail('text', []);
  reader.next();
  return readLet(reader, token.start);
}

function normal(token: Token): string {
  return token.text.replace(/[\s,.:~]+|\\[,;: ]/g, ' ').trim();
}

/** The letter after "all real", where one is written. */
function readAlways(reader: Reader): Line {
  const { start } = reader.next();
  const letter = reader.is('letter') ? readName(reader) : null;
  if (reader.is('in') && reader.peek(1).kind === 'number-set') {
    reader.next();
    reader.next();
  }
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
    reader.expect(')', 'missing-bracket', ')');
  }
  if (!reader.take('=') && !reader.take(':=')) reader.fail('bad-relation', ['=']);
  const value = reader.grammar.sum(reader);
  return { kind: 'definition', name, params, value, span: reader.span(start) };
}

/** The name that `f(x) = ..` introduces; null where the line is an ordinary statement. */
export function startsDefinition(reader: Reader): string | null {
  const { token } = reader;
  if (token.kind !== 'letter' || reader.functions.includes(token.text) || reader.peek(1).kind !== '(') return null;
  const param = reader.peek(2);
  if (param.kind !== 'letter' || param.text === token.text) return null;
  let at = 3;
  while (reader.peek(at).kind === ',' && reader.peek(at + 1).kind === 'letter') at += 2;
  if (reader.peek(at).kind !== ')' || reader.peek(at + 1).kind !== '=') return null;
  if ('fghFGH'.includes(token.text) || token.text === '\\phi' || token.text === '\\psi') return token.text;
  if (!'xt'.includes(param.text) || 'abckmnxt'.includes(token.text)) return null;
  for (let ahead = at + 2; ; ahead += 1) {
    const { kind, text } = reader.peek(ahead);
    if (kind === 'end-of-line') return null;
    if (kind === 'letter' && text === param.text) return reader.choose('definition') ? null : token.text;
  }
}
