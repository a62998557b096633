import type { Expr, Line, RelationSign } from './expression.ts';
import { readEnd, readRows } from './read-atoms.ts';
import { joinParts, type Join, type Part } from './read-joins.ts';
import { readSet, startsSet } from './read-sets.ts';
import { readSentence, startsDefinition } from './read-sentences.ts';
import {
  ahead,
  bracesAreBrackets,
  choose,
  enclosed,
  fail,
  flag,
  flip,
  groupAhead,
  inside,
  introduce,
  is,
  kind,
  next,
  peek,
  skip,
  span,
  start,
  sum,
  take,
  takeAll,
  token,
} from './reader.ts';

const RELATIONS = '=<';

/** All that one line says. */
export const readWholeLine = (): Line => {
  // An arrow or "so" before a line says only that it follows; `\(` only that maths begins.
  while (is('⇒p') || (is('T') && CONNECTIVE.test(token.text))) next();
  if (is('$')) fail('line');
  const line = is(RELATIONS) ? readContinuation() : readStatements();
  takeAll(END_MARKS);
  if (!is('$')) fail(`end ${kind}`);
  return line;
};

/** Marks of the sentence that a line ends, inside and outside of `\)`. */
const END_MARKS = /[.,;]?(?:q[.,;]?)?(?=\$)/y;

const CONNECTIVE = /^(?:|so|hence|thus|therefore|then|i e|and so|that is)$/i;

/** Statements joined by or, and, commas; also the content of a `cases` block. */
export const readStatements = (): Line => {
  const from = start;
  const parts: Part[] = [];
  for (let join: Join | null = 'and'; join; join = takeJoin()) parts.push({ line: readStatement(), join });
  return joinParts(parts, from);
};

const takeJoin = (): Join | null => {
  if (is('$') || ahead(END_MARKS)) return null;
  const { text } = token;
  const isOr = /^or$/i.test(text);
  const isComma = is(',;');
  if (isOr || /^(?:and|where|for|with|if)$/i.test(text)) {
    next();
    return isOr ? 'or' : 'and';
  }
  if (!isComma && (!is('T') || text)) return null;
  next();
  return takeJoin() ?? (isComma ? 'comma' : null);
};

const readStatement = (): Line => {
  const from = start;
  const sentence = readSentence();
  if (sentence) return sentence;
  if (
    is('B')
      ? token.text === 'cases'
      : is('s') && peek(1).kind === 'B' && /^(?:cases|array|matrix|aligned)$/.test(peek(1).text)
  ) {
    return readBlock();
  }
  if (is('(') && /[=<∈]/.test(groupAhead().inner)) return readGroup(')');
  if (is('s') && ahead(/sa(?:∈R)?[|:]/y)) return readGroup('z');
  // `S=\{2\}`: the set of solutions under the name that some give it.
  if (is('a') && /^[SL]$/.test(token.text) && ((ahead(/a=s/y) && !bracesAreBrackets(2)) || peek(2).text === 'empty'))
    skip(2);
  if (startsSet()) return readBareSet();
  const name = is('a') ? startsDefinition() : null;
  if (name) introduce(name);
  const line = readRelations(sum(), from);
  return name ? asDefinition(line) : line;
};

/** `(x>1 and x<2) or ..`, a bracket that holds a relation; `\{x\in\R\mid x>2\}` says what its condition says. */
const readGroup = (close: ')' | 'z'): Line => {
  const from = start;
  if (close === 'z') while (!is('|:')) next();
  next();
  return { ...enclosed(close, readStatements), span: span(from) };
};

/** `f(x) = ..` introduces f; a chain is left as it is. */
const asDefinition = (line: Line): Line => {
  if (line.kind !== 'relation' || line.left.kind !== 'apply') return line;
  const params = line.left.args.map((arg) => (arg.kind === 'letter' ? arg.name : ''));
  return { kind: 'definition', name: line.left.name, params, value: line.right, span: line.span };
};

const readRelations = (left: Expr, from: number): Line => {
  if (is('∈') || (left.kind === 'letter' && ahead(/=s[^B]/y) && !bracesAreBrackets(1))) {
    const negated = next().text === '!';
    return { kind: 'membership', letter: left, set: readSet(), negated, span: span(from) };
  }
  if (take('d')) {
    const value = sum();
    if (left.kind !== 'letter') fail('relation', left.span);
    return { kind: 'definition', name: left.name, params: [], value, span: span(from) };
  }
  const members = [left];
  const signs = readMembers(members);
  const [sign, more] = signs;
  const place = span(from);
  if (!sign) return { kind: 'expression', expr: left, span: place };
  if (more) return { kind: 'chain', members, signs, span: place };
  return { kind: 'relation', left, sign, right: members[1]!, span: place };
};

/** Signs and what follows each; the members are added to those given. */
const readMembers = (members: Expr[]): RelationSign[] => {
  const signs: RelationSign[] = [];
  for (;;) {
    const isTyped = flip === 'unequal' && ahead(/!=/y);
    if (!isTyped && !is(RELATIONS)) return signs;
    signs.push(isTyped ? '!=' : (token.text as RelationSign));
    skip(isTyped ? 2 : 1);
    if (is(RELATIONS)) fail('side');
    members.push(sum());
  }
};

const readContinuation = (): Line => {
  const from = start;
  flag('continues');
  const members: Expr[] = [];
  const signs = readMembers(members);
  return { kind: 'continuation', members, signs, span: span(from) };
};

/** `\begin{cases} .. \end{cases}` or a left brace before an array: one statement a row. */
const readBlock = (): Line => {
  const from = start;
  const isBraced = take('s');
  const environment = next().text;
  const lines = inside(() => readRows(readRow));
  const line = joinParts(
    lines.map((row) => ({ line: row, join: 'comma' })),
    from,
  );
  readEnd(environment);
  if (isBraced) take('›z');
  return line;
};

/** One row; alignment marks around its relation are layout only. */
const readRow = (): Line => {
  take('&');
  const from = start;
  const left = sum();
  const isParted = take('&') || is(',T');
  const sign = token.text as RelationSign;
  // `x & x>0`: an expression for each case is no statement.
  if (!is('=<∈')) fail(isParted ? 'cases' : 'relation');
  let line;
  if (ahead(/[=<]&/y)) {
    skip(2);
    line = { kind: 'relation', left, sign, right: sum(), span: span(from) } as const;
  } else line = readRelations(left, from);
  take(',;.');
  return line;
};

const readBareSet = (): Line => {
  const from = start;
  const isOther = is('([') && choose('interval');
  if (isOther && is('(')) return readRelations(sum(), from);
  const set = readSet();
  if (set.kind === 'empty') return { kind: 'none', span: set.span };
  return { kind: 'membership', letter: null, set, negated: false, span: span(from) };
};
