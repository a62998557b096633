import type { Expr, Line, RelationSign } from './expression.ts';
import { groupAhead } from './look-ahead.ts';
import { readEnd } from './read-atoms.ts';
import { joinParts, type Join, type Part } from './read-joins.ts';
import { readInterval, readSet, startsSet } from './read-sets.ts';
import { readSentence, startsDefinition } from './read-sentences.ts';
import type { Reader } from './reader.ts';

const RELATIONS: Partial<Record<string, RelationSign>> = {
  '=': '=',
  '<': '<',
  '>': '>',
  '≤': '<=',
  '≥': '>=',
  '≠': '!=',
  '≈': 'approx',
};

/** All that one line says. */
export function readWholeLine(reader: Reader): Line {
  // An arrow or "so" before a line says only that it follows.
  while (reader.is('⇒') || CONNECTIVE.test(wordsOf(reader))) reader.next();
  if (reader.is('$')) reader.fail('empty number letter');
  const line = RELATIONS[reader.token.kind] ? readContinuation(reader) : readStatements(reader);
  reader.takeAll(/\.(?=\$)/y);
  if (!reader.is('$')) unexpected(reader);
  return line;
}

const CONNECTIVE = /^T(?:|so|hence|thus|therefore|then|i\.e\.|and so|that is)$/;

/** The words of a `\text` after a T; empty for other tokens. */
function wordsOf({ token }: Reader): string {
  return token.kind === 'T'
    ? 'T' +
        token.text
          .toLowerCase()
          .replace(/[\s,:~]+/g, ' ')
          .trim()
    : '';
}

function unexpected(reader: Reader): never {
  if (reader.is(')]}⦄⌋⌉E›&')) return reader.fail('extra-bracket');
  if (reader.is('|')) return reader.fail('missing-bracket |');
  if (reader.is('T∨∧')) return reader.fail('text');
  return reader.fail(reader.is('⇒') ? 'bad-relation =' : 'missing-operand + =');
}

/** Statements joined by or, and, commas; also the content of a `cases` block. */
export function readStatements(reader: Reader): Line {
  const { start } = reader.token;
  const parts: Part[] = [];
  for (let join: Join | null = 'and'; join; join = takeJoin(reader)) parts.push({ line: readStatement(reader), join });
  return parts.length === 1 ? parts[0]!.line : joinParts(reader, parts, start);
}

function takeJoin(reader: Reader): Join | null {
  const words = wordsOf(reader);
  const isOr = reader.is('∨') || words === 'Tor';
  const isAnd = reader.is('∧') || /^T(?:and|where|for|with|if)$/.test(words);
  const isComma = reader.is(',;');
  if (!isOr && !isAnd && !isComma && words !== 'T') return null;
  reader.next();
  if (isOr || isAnd) return isOr ? 'or' : 'and';
  return takeJoin(reader) ?? (isComma ? 'comma' : null);
}

function readStatement(reader: Reader): Line {
  const { start } = reader.token;
  const sentence = readSentence(reader);
  if (sentence) return sentence;
  if (startsBlock(reader)) return readBlock(reader);
  if (reader.is('(') && /[=<>≤≥≠≈∈∉]/.test(groupAhead(reader).inner)) return readGroup(reader, ')');
  if (reader.ahead(/⦃a(?:∈ℝ)?[|:]/y)) return readGroup(reader, '⦄');
  // `S=\{2\}`: the set of solutions under the name that some give it.
  if (/^[SL]$/.test(reader.token.text) && reader.ahead(/a=[⦃∅]/y)) reader.skip(2);
  if (startsSet(reader)) return readBareSet(reader);
  const name = startsDefinition(reader);
  const before = reader.functions;
  if (name) reader.functions = [...before, name];
  const left = reader.grammar.sum(reader);
  reader.functions = before;
  const line = readRelations(reader, left, start);
  return name ? asDefinition(line) : line;
}

/** `(x>1 and x<2) or ..`, a bracket that holds a relation; `\{x\in\R\mid x>2\}` says what its condition says. */
function readGroup(reader: Reader, close: ')' | '⦄'): Line {
  const { start } = reader.next();
  if (close === '⦄') while (!reader.is('|:')) reader.next();
  if (close === '⦄') reader.next();
  const line = reader.enclosed(close, readStatements, {}, `missing-bracket ${close === ')' ? ')' : '\\}'}`);
  return { ...line, span: reader.span(start) };
}

/** `f(x) = ..` introduces f; a chain is left as it is. */
function asDefinition(line: Line): Line {
  if (line.kind !== 'relation' || line.left.kind !== 'apply') return line;
  const params = line.left.args.map((arg) => (arg.kind === 'letter' ? arg.name : ''));
  return { kind: 'definition', name: line.left.name, params, value: line.right, span: line.span };
}

function readRelations(reader: Reader, left: Expr, start: number): Line {
  const isSolution = left.kind === 'letter' && reader.ahead(/=⦃[^B]/y);
  if (isSolution || reader.is('∈∉')) {
    const negated = reader.next().kind === '∉';
    const set = readSet(reader);
    return { kind: 'membership', letter: left, set, negated, span: reader.span(start) };
  }
  if (reader.take('≔')) {
    const value = reader.grammar.sum(reader);
    if (left.kind !== 'letter') return reader.fail('bad-relation =', left.span);
    return { kind: 'definition', name: left.name, params: [], value, span: reader.span(start) };
  }
  const members = [left];
  const signs = readMembers(reader, members);
  const span = reader.span(start);
  const [sign, more] = signs;
  if (!sign) return { kind: 'expression', expr: left, span };
  if (more) return { kind: 'chain', members, signs, span };
  return { kind: 'relation', left, sign, right: members[1]!, span };
}

/** Signs and what follows each; the members are added to those given. */
function readMembers(reader: Reader, members: Expr[]): RelationSign[] {
  const signs: RelationSign[] = [];
  for (;;) {
    const isTyped = reader.flip === 'unequal' && reader.ahead(/!=/y);
    const sign = isTyped ? '!=' : RELATIONS[reader.token.kind];
    if (!sign) return signs;
    reader.skip(isTyped ? 2 : 1);
    if (RELATIONS[reader.token.kind]) reader.fail('bad-relation number letter');
    signs.push(sign);
    members.push(reader.grammar.sum(reader));
  }
}

function readContinuation(reader: Reader): Line {
  const { start } = reader.token;
  reader.flags.add('continues');
  const members: Expr[] = [];
  const signs = readMembers(reader, members);
  return { kind: 'continuation', members, signs, span: reader.span(start) };
}

function startsBlock(reader: Reader): boolean {
  if (reader.is('B')) return reader.token.text === 'cases';
  return reader.ahead(/⦃B/y) !== '' && /^(?:cases|array|matrix|aligned)$/.test(reader.peek(1).text);
}

/** `\begin{cases} .. \end{cases}` or a left brace before an array: one statement a row. */
function readBlock(reader: Reader): Line {
  const { start } = reader.token;
  const isBraced = reader.take('⦃');
  const environment = reader.next().text;
  const line = reader.inside(() => {
    const parts: Part[] = [];
    do {
      if (reader.is('E') && parts.length > 0) break;
      reader.take('&');
      parts.push({ line: readRow(reader), join: 'comma' });
      reader.take(',;');
    } while (reader.take('N'));
    return parts.length === 1 ? parts[0]!.line : joinParts(reader, parts, start);
  });
  readEnd(reader, environment);
  if (isBraced) reader.take('›⦄');
  return line;
}

/** One row; alignment marks around its relation are layout only. */
function readRow(reader: Reader): Line {
  const { start } = reader.token;
  const left = reader.grammar.sum(reader);
  const isParted = reader.take('&') || reader.is(',T');
  const relation = RELATIONS[reader.token.kind];
  // `x & x>0`: an expression for each case is no statement.
  if (!relation && !reader.is('∈∉')) reader.fail(isParted ? 'piecewise' : 'bad-relation =');
  if (!reader.ahead(/.&/y)) return readRelations(reader, left, start);
  reader.skip(2);
  if (!relation) return reader.fail('bad-relation =');
  return { kind: 'relation', left, sign: relation, right: reader.grammar.sum(reader), span: reader.span(start) };
}

function readBareSet(reader: Reader): Line {
  const { start } = reader.token;
  const isOther = reader.is('([') && reader.choose('interval');
  if (isOther && reader.is('(')) return readRelations(reader, reader.grammar.sum(reader), start);
  const set = reader.is('[') && !isOther ? readInterval(reader) : readSet(reader);
  if (set.kind === 'empty') return { kind: 'none', span: set.span };
  return { kind: 'membership', letter: null, set, negated: false, span: reader.span(start) };
}
