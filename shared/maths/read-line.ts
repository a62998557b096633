import type { Expr, Line, RelationSign } from './expression.ts';
import { joinParts, type Join, type Part } from './read-joins.ts';
import { readInterval, readSet, startsSet } from './read-sets.ts';
import { readSentence, startsDefinition } from './read-sentences.ts';
import type { Reader } from './reader.ts';
import type { TokenKind } from './token-table.ts';

const RELATIONS: Partial<Record<TokenKind, RelationSign>> = {
  '=': '=',
  '<': '<',
  '>': '>',
  '<=': '<=',
  '>=': '>=',
  '!=': '!=',
  approx: 'approx',
};

/** All that one line says. */
export function readWholeLine(reader: Reader): Line {
  skipConnectives(reader);
  if (reader.is('end-of-line')) reader.fail('empty', ['number', 'letter']);
  const line = RELATIONS[reader.token.kind] ? readContinuation(reader) : readStatements(reader);
  if (reader.is('.') && reader.peek(1).kind === 'end-of-line') reader.next();
  if (!reader.is('end-of-line')) unexpected(reader);
  return line;
}

/** An arrow or "so" before a line says only that it follows. */
function skipConnectives(reader: Reader): void {
  while (reader.is('implies') || (reader.is('text') && CONNECTIVES.has(wordsOf(reader)))) reader.next();
}

const CONNECTIVES = new Set(['', 'so', 'hence', 'thus', 'therefore', 'then', 'i.e.', 'and so', 'that is']);

function wordsOf(reader: Reader): string {
  return reader.token.text
    .toLowerCase()
    .replace(/[\s,:~]+/g, ' ')
    .trim();
}

function unexpected(reader: Reader): never {
  const { kind } = reader.token;
  if (CLOSERS.has(kind)) return reader.fail('extra-bracket', []);
  if (kind === '|') return reader.fail('missing-bracket', ['|']);
  if (kind === 'text' || kind === 'or' || kind === 'and') return reader.fail('text', []);
  if (kind === 'implies') return reader.fail('bad-relation', ['=']);
  return reader.fail('missing-operand', ['+', '=']);
}

const CLOSERS = new Set<TokenKind>([')', ']', '}', 'set)', 'floor)', 'ceil)', 'end', 'close.', '&']);

/** Statements joined by or, and, commas; also the content of a `cases` block. */
export function readStatements(reader: Reader): Line {
  const { start } = reader.token;
  const first = readStatement(reader);
  let join = takeJoin(reader);
  if (!join) return first;
  const parts: Part[] = [{ line: first, join: 'and' }];
  while (join) {
    parts.push({ line: readStatement(reader), join });
    join = takeJoin(reader);
  }
  return joinParts(reader, parts, start);
}

function takeJoin(reader: Reader): Join | null {
  const { kind } = reader.token;
  if (kind === 'or' || kind === 'and') {
    reader.next();
    return kind;
  }
  if (kind === 'text') return takeWordJoin(reader);
  if (kind !== ',' && kind !== ';') return null;
  reader.next();
  return takeJoin(reader) ?? 'comma';
}

function takeWordJoin(reader: Reader): Join | null {
  const words = wordsOf(reader);
  const join =
    words === 'or'
      ? 'or'
      : words === 'and' || words === 'where' || words === 'for' || words === 'with' || words === 'if'
        ? 'and'
        : null;
  if (join || words === '') reader.next();
  return words === '' ? takeJoin(reader) : join;
}

function readStatement(reader: Reader): Line {
  const { start } = reader.token;
  const sentence = readSentence(reader);
  if (sentence) return sentence;
  if (startsBlock(reader)) return readBlock(reader);
  if (startsGroup(reader)) return readGroup(reader);
  if (startsSetBuilder(reader)) return readSetBuilder(reader);
  if (namesSolutions(reader)) {
    reader.next();
    reader.next();
  }
  if (startsSet(reader)) return readBareSet(reader);
  const name = startsDefinition(reader);
  const before = reader.functions;
  if (name) reader.functions = [...before, name];
  const left = reader.grammar.sum(reader);
  reader.functions = before;
  const line = readRelations(reader, left, start);
  return name ? asDefinition(line) : line;
}

/** `S=\{2\}`: the set of solutions under the name that some give it. */
function namesSolutions(reader: Reader): boolean {
  const after = reader.peek(2).kind;
  return (
    (reader.token.text === 'S' || reader.token.text === 'L') &&
    reader.peek(1).kind === '=' &&
    (after === 'set(' || after === 'empty')
  );
}

/** `\{x\in\R\mid x>2\}` says what its condition says. */
function startsSetBuilder(reader: Reader): boolean {
  if (!reader.is('set(') || reader.peek(1).kind !== 'letter') return false;
  const bar = reader.peek(reader.peek(2).kind === 'in' && reader.peek(3).kind === 'number-set' ? 4 : 2).kind;
  return bar === '|' || bar === ':';
}

function readSetBuilder(reader: Reader): Line {
  const { start } = reader.next();
  while (!reader.is('|') && !reader.is(':')) reader.next();
  reader.next();
  const line = reader.inside(readStatements);
  reader.expect('set)', 'missing-bracket', '\\}');
  return { ...line, span: reader.span(start) };
}

/** `f(x) = ..` introduces f; a chain is left as it is. */
function asDefinition(line: Line): Line {
  if (line.kind !== 'relation' || line.left.kind !== 'apply') return line;
  const params = line.left.args.map((arg) => (arg.kind === 'letter' ? arg.name : ''));
  return { kind: 'definition', name: line.left.name, params, value: line.right, span: line.span };
}

function readRelations(reader: Reader, left: Expr, start: number): Line {
  if (reader.is('in') || reader.is('notin')) {
    const negated = reader.next().kind === 'notin';
    const set = readSet(reader);
    return { kind: 'membership', letter: left, set, negated, span: reader.span(start) };
  }
  if (reader.is('=') && left.kind === 'letter' && reader.peek(1).kind === 'set(' && reader.peek(2).kind !== 'begin') {
    reader.next();
    return { kind: 'membership', letter: left, set: readSet(reader), negated: false, span: reader.span(start) };
  }
  if (reader.take(':=')) {
    const value = reader.grammar.sum(reader);
    if (left.kind !== 'letter') return reader.fail('bad-relation', ['='], left.span);
    return { kind: 'definition', name: left.name, params: [], value, span: reader.span(start) };
  }
  const members = [left];
  const signs = readMembers(reader, members);
  if (signs.length === 0) return { kind: 'expression', expr: left, span: reader.span(start) };
  if (signs.length > 1) return { kind: 'chain', members, signs, span: reader.span(start) };
  return { kind: 'relation', left, sign: signs[0]!, right: members[1]!, span: reader.span(start) };
}

function readMembers(reader: Reader, members: Expr[]): RelationSign[] {
  const signs: RelationSign[] = [];
  for (;;) {
    const isTyped = reader.is('!') && reader.flip === 'unequal' && reader.peek(1).kind === '=';
    const sign = isTyped ? '!=' : RELATIONS[reader.token.kind];
    if (!sign) return signs;
    if (isTyped) reader.next();
    reader.next();
    if (RELATIONS[reader.token.kind]) reader.fail('bad-relation', ['number', 'letter']);
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
  const at = reader.is('set(') ? 1 : 0;
  const token = reader.peek(at);
  return (
    token.kind === 'begin' &&
    (token.text === 'cases' ||
      (at === 1 && (token.text === 'array' || token.text === 'matrix' || token.text === 'aligned')))
  );
}

/** `\begin{cases} .. \end{cases}` or a left brace before an array: one statement a row. */
function readBlock(reader: Reader): Line {
  const { start } = reader.token;
  const braced = reader.take('set(');
  const environment = reader.next().text;
  const line = reader.inside(() => {
    const parts: Part[] = [];
    do {
      if (reader.is('end') && parts.length > 0) break;
      reader.take('&');
      parts.push({ line: readRow(reader), join: 'comma' });
      if (!reader.take(',')) reader.take(';');
    } while (reader.take('newline'));
    return parts.length === 1 ? parts[0]!.line : joinParts(reader, parts, start);
  });
  if (!reader.is('end') || reader.token.text !== environment) reader.fail('missing-bracket', [`\\end{${environment}}`]);
  reader.next();
  if (braced && !reader.take('close.') && reader.is('set)')) reader.next();
  return line;
}

/** One row; alignment marks before its relation are layout only. */
function readRow(reader: Reader): Line {
  const { start } = reader.token;
  const left = reader.grammar.sum(reader);
  reader.take('&');
  if (!RELATIONS[reader.token.kind] && !reader.is('in') && !reader.is('notin')) reader.fail('bad-relation', ['=']);
  const sign = reader.peek(1).kind === '&' ? reader.token.kind : null;
  if (!sign) return readRelations(reader, left, start);
  const relation = RELATIONS[sign];
  reader.next();
  reader.next();
  if (!relation) return reader.fail('bad-relation', ['=']);
  return { kind: 'relation', left, sign: relation, right: reader.grammar.sum(reader), span: reader.span(start) };
}

/** `(x>1 and x<2) or ..`: a bracket that holds a relation. */
function startsGroup(reader: Reader): boolean {
  if (!reader.is('(')) return false;
  let depth = 0;
  for (let at = 0; ; at += 1) {
    const { kind } = reader.peek(at);
    if (kind === '(' || kind === '{' || kind === 'set(') depth += 1;
    if (kind === ')' || kind === '}' || kind === 'set)') depth -= 1;
    if (depth === 0 || kind === 'end-of-line') return false;
    if (depth === 1 && (RELATIONS[kind] || kind === 'in' || kind === 'notin')) return true;
  }
}

function readGroup(reader: Reader): Line {
  const { start } = reader.next();
  const line = reader.inside(readStatements);
  reader.expect(')', 'missing-bracket', ')');
  return { ...line, span: reader.span(start) };
}

function readBareSet(reader: Reader): Line {
  const { token } = reader;
  const isPoint = token.kind === '(' && reader.choose('interval');
  if (isPoint) return readRelations(reader, reader.grammar.sum(reader), token.start);
  const set = token.kind === '[' && !reader.choose('interval') ? readInterval(reader) : readSet(reader);
  if (set.kind === 'empty') return { kind: 'none', span: set.span };
  return { kind: 'membership', letter: null, set, negated: false, span: reader.span(token.start) };
}
