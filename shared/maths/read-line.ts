import type { Expr, Line, RelationSign } from './expression.ts';
import { groupAhead } from './look-ahead.ts';
import { readEnd } from './read-atoms.ts';
import { joinParts, type Join, type Part } from './read-joins.ts';
import { readInterval, readSet, startsSet } from './read-sets.ts';
import { readSentence, startsDefinition } from './read-sentences.ts';
import {
  ahead,
  choose,
  enclosed,
  fail,
  flag,
  flip,
  functions,
  inside,
  is,
  kind,
  next,
  OUTSIDE,
  peek,
  skip,
  span,
  start,
  sum,
  take,
  takeAll,
  token,
  withFunctions,
} from './reader.ts';

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
export function readWholeLine(): Line {
  // An arrow or "so" before a line says only that it follows.
  while (is('⇒') || (is('T') && CONNECTIVE.test(wordsOf()))) next();
  if (is('$')) fail('empty number letter');
  const line = RELATIONS[kind] ? readContinuation() : readStatements();
  takeAll(/\.(?=\$)/y);
  if (is(')]}⦄⌋⌉E›&')) fail('extra-bracket');
  if (is('|')) fail('missing-bracket |');
  if (is('T∨∧')) fail('text');
  if (!is('$')) fail(is('⇒') ? 'bad-relation =' : 'missing-operand + =');
  return line;
}

const CONNECTIVE = /^T(?:|so|hence|thus|therefore|then|i\.e\.|and so|that is)$/;

/** The words of a `\text` after a T; empty for other tokens. */
function wordsOf(): string {
  return is('T')
    ? 'T' +
        token.text
          .toLowerCase()
          .replace(/[\s,:~]+/g, ' ')
          .trim()
    : '';
}

/** Statements joined by or, and, commas; also the content of a `cases` block. */
export function readStatements(): Line {
  const from = start;
  const parts: Part[] = [];
  for (let join: Join | null = 'and'; join; join = takeJoin()) parts.push({ line: readStatement(), join });
  return joinParts(parts, from);
}

function takeJoin(): Join | null {
  if (kind === '$') return null;
  const words = wordsOf();
  const isOr = is('∨') || words === 'Tor';
  const isAnd = is('∧') || /^T(?:and|where|for|with|if)$/.test(words);
  const isComma = is(',;');
  if (!isOr && !isAnd && !isComma && words !== 'T') return null;
  next();
  if (isOr || isAnd) return isOr ? 'or' : 'and';
  return takeJoin() ?? (isComma ? 'comma' : null);
}

function readStatement(): Line {
  const from = start;
  const sentence = readSentence();
  if (sentence) return sentence;
  if (is('B⦃') && startsBlock()) return readBlock();
  if (is('(') && /[=<>≤≥≠≈∈∉]/.test(groupAhead().inner)) return readGroup(')');
  if (is('⦃') && ahead(/⦃a(?:∈ℝ)?[|:]/y)) return readGroup('⦄');
  // `S=\{2\}`: the set of solutions under the name that some give it.
  if (is('a') && /^[SL]$/.test(token.text) && ahead(/a=[⦃∅]/y)) skip(2);
  if (startsSet()) return readBareSet();
  const name = is('a') ? startsDefinition() : null;
  const line = readRelations(name ? withFunctions([...functions, name], sum) : sum(), from);
  return name ? asDefinition(line) : line;
}

/** `(x>1 and x<2) or ..`, a bracket that holds a relation; `\{x\in\R\mid x>2\}` says what its condition says. */
function readGroup(close: ')' | '⦄'): Line {
  const from = start;
  if (close === '⦄') while (!is('|:')) next();
  next();
  const line = enclosed(close, readStatements, OUTSIDE, `missing-bracket ${close === ')' ? ')' : '\\}'}`);
  return { ...line, span: span(from) };
}

/** `f(x) = ..` introduces f; a chain is left as it is. */
function asDefinition(line: Line): Line {
  if (line.kind !== 'relation' || line.left.kind !== 'apply') return line;
  const params = line.left.args.map((arg) => (arg.kind === 'letter' ? arg.name : ''));
  return { kind: 'definition', name: line.left.name, params, value: line.right, span: line.span };
}

function readRelations(left: Expr, from: number): Line {
  if (is('∈∉') || (is('=') && left.kind === 'letter' && ahead(/=⦃[^B]/y))) {
    const negated = next().kind === '∉';
    return { kind: 'membership', letter: left, set: readSet(), negated, span: span(from) };
  }
  if (take('≔')) {
    const value = sum();
    if (left.kind !== 'letter') return fail('bad-relation =', left.span);
    return { kind: 'definition', name: left.name, params: [], value, span: span(from) };
  }
  const members = [left];
  const signs = readMembers(members);
  const [sign, more] = signs;
  const place = span(from);
  if (!sign) return { kind: 'expression', expr: left, span: place };
  if (more) return { kind: 'chain', members, signs, span: place };
  return { kind: 'relation', left, sign, right: members[1]!, span: place };
}

/** Signs and what follows each; the members are added to those given. */
function readMembers(members: Expr[]): RelationSign[] {
  const signs: RelationSign[] = [];
  for (;;) {
    const isTyped = flip === 'unequal' && ahead(/!=/y);
    const sign = isTyped ? '!=' : RELATIONS[kind];
    if (!sign) return signs;
    skip(isTyped ? 2 : 1);
    if (RELATIONS[kind]) fail('bad-relation number letter');
    signs.push(sign);
    members.push(sum());
  }
}

function readContinuation(): Line {
  const from = start;
  flag('continues');
  const members: Expr[] = [];
  const signs = readMembers(members);
  return { kind: 'continuation', members, signs, span: span(from) };
}

function startsBlock(): boolean {
  if (is('B')) return token.text === 'cases';
  return ahead(/⦃B/y) !== '' && /^(?:cases|array|matrix|aligned)$/.test(peek(1).text);
}

/** `\begin{cases} .. \end{cases}` or a left brace before an array: one statement a row. */
function readBlock(): Line {
  const from = start;
  const isBraced = take('⦃');
  const environment = next().text;
  const parts = inside(readRows);
  const line = joinParts(parts, from);
  readEnd(environment);
  if (isBraced) take('›⦄');
  return line;
}

function readRows(): Part[] {
  const parts: Part[] = [];
  do {
    if (is('E') && parts.length > 0) break;
    take('&');
    parts.push({ line: readRow(), join: 'comma' });
    take(',;');
  } while (take('N'));
  return parts;
}

/** One row; alignment marks around its relation are layout only. */
function readRow(): Line {
  const from = start;
  const left = sum();
  const isParted = take('&') || is(',T');
  const relation = RELATIONS[kind];
  // `x & x>0`: an expression for each case is no statement.
  if (!relation && !is('∈∉')) fail(isParted ? 'piecewise' : 'bad-relation =');
  if (!ahead(/.&/y)) return readRelations(left, from);
  skip(2);
  if (!relation) return fail('bad-relation =');
  return { kind: 'relation', left, sign: relation, right: sum(), span: span(from) };
}

function readBareSet(): Line {
  const from = start;
  const isOther = is('([') && choose('interval');
  if (isOther && is('(')) return readRelations(sum(), from);
  const set = is('[') && !isOther ? readInterval() : readSet();
  if (set.kind === 'empty') return { kind: 'none', span: set.span };
  return { kind: 'membership', letter: null, set, negated: false, span: span(from) };
}
