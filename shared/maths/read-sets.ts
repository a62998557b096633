import type { Expr, SetExpr } from './expression.ts';
import type { Reader } from './reader.ts';
import type { TokenKind } from './token-table.ts';

const NUMBER_SETS: Partial<Record<string, 'reals' | 'integers' | 'naturals' | 'rationals' | 'complex'>> = {
  R: 'reals',
  Z: 'integers',
  N: 'naturals',
  Q: 'rationals',
  C: 'complex',
  I: 'integers',
};

/** Sets joined by union, intersection and "without"; two different joins need brackets. */
export function readSet(reader: Reader): SetExpr {
  const { start } = reader.token;
  const first = readSimpleSet(reader);
  const join = reader.token.kind;
  if (join === 'setminus') {
    reader.next();
    const removed = readSimpleSet(reader);
    if (isJoin(reader.token.kind)) reader.fail('mixed-joins', ['(']);
    return { kind: 'without', from: first, removed, span: reader.span(start) };
  }
  if (join !== 'cup' && join !== 'cap') return first;
  const parts = [first];
  while (reader.take(join)) parts.push(readSimpleSet(reader));
  if (isJoin(reader.token.kind)) reader.fail('mixed-joins', ['(']);
  return { kind: join === 'cup' ? 'union' : 'intersection', parts, span: reader.span(start) };
}

function isJoin(kind: TokenKind): boolean {
  return kind === 'cup' || kind === 'cap' || kind === 'setminus';
}

function readSimpleSet(reader: Reader): SetExpr {
  const { token } = reader;
  switch (token.kind) {
    case 'set(':
      return readFinite(reader);
    case 'empty':
      reader.next();
      return { kind: 'empty', span: reader.span(token.start) };
    case 'number-set':
      return readNumberSet(reader);
    case '(':
    case '[':
    case ']':
      return token.kind === '(' && !hasComma(reader, 1) ? readGrouped(reader) : readInterval(reader);
    default:
      return reader.fail('bad-set', ['\\{', '(', '[', '\\R']);
  }
}

function readGrouped(reader: Reader): SetExpr {
  reader.next();
  const set = reader.inside(readSet);
  reader.expect(')', 'missing-bracket', ')');
  return set;
}

function readFinite(reader: Reader): SetExpr {
  const { start } = reader.next();
  if (reader.take('set)')) return { kind: 'empty', span: reader.span(start) };
  const items = reader.inside(() => {
    const read: Expr[] = [];
    do read.push(reader.grammar.sum(reader));
    while (reader.take(',') || reader.take(';'));
    return read;
  });
  reader.expect('set)', reader.is('|') ? 'bad-set' : 'missing-bracket', '\\}');
  return { kind: 'finite', items, span: reader.span(start) };
}

function readNumberSet(reader: Reader): SetExpr {
  const { text, start } = reader.next();
  const signed = (reader.is('^') || reader.is('_')) && signAfter(reader);
  if (text === 'R' && signed) {
    const braced = reader.peek(1).kind === '{';
    const sign = reader.peek(braced ? 2 : 1);
    for (let count = braced ? 4 : 2; count > 0; count -= 1) reader.next();
    const zero: Expr = {
      kind: 'number',
      numerator: 0n,
      denominator: 1n,
      written: 'integer',
      decimals: 0,
      span: { start: sign.start, end: sign.end },
    };
    const open = { fromClosed: false, toClosed: false, span: reader.span(start) } as const;
    return sign.kind === '+'
      ? { kind: 'interval', from: zero, to: null, ...open }
      : { kind: 'interval', from: null, to: zero, ...open };
  }
  return { kind: NUMBER_SETS[text] ?? 'reals', span: reader.span(start) };
}

function signAfter(reader: Reader): boolean {
  const { kind } = reader.peek(reader.peek(1).kind === '{' ? 2 : 1);
  return kind === '+' || kind === '-';
}

/** `(a,b]`, `[a;b]` and `]a,b[`. */
export function readInterval(reader: Reader): SetExpr {
  const open = reader.next();
  const ends = reader.inside(
    () => {
      const from = reader.grammar.sum(reader);
      if (!reader.take(',') && !reader.take(';')) reader.fail('bad-set', [',']);
      return { from, to: reader.grammar.sum(reader) };
    },
    { reversed: true },
  );
  const close = reader.token.kind;
  if (close !== ')' && close !== ']' && close !== '[') reader.fail('missing-bracket', [')', ']']);
  reader.next();
  const from = isInfinite(ends.from, 'minus') ? null : ends.from;
  const to = isInfinite(ends.to, 'plus') ? null : ends.to;
  return {
    kind: 'interval',
    from,
    to,
    fromClosed: open.kind === '[' && from !== null,
    toClosed: close === ']' && to !== null,
    span: reader.span(open.start),
  };
}

function isInfinite(expr: Expr, sign: 'plus' | 'minus'): boolean {
  if (expr.kind === 'constant') return expr.name === 'infinity' && sign === 'plus';
  if (expr.kind !== 'sum' || expr.terms.length !== 1) return false;
  const [term] = expr.terms;
  return term?.sign === sign && term.expr.kind === 'constant' && term.expr.name === 'infinity';
}

/** Is there a comma directly within the bracket that opens here? Bounded by the length of the line. */
export function hasComma(reader: Reader, ahead: number): boolean {
  let depth = 0;
  for (let at = ahead; ; at += 1) {
    const { kind } = reader.peek(at);
    if (kind === 'end-of-line') return false;
    if (depth === 0 && (kind === ',' || kind === ';')) return true;
    if (OPENING.has(kind)) depth += 1;
    if (CLOSING.has(kind)) depth -= 1;
    if (depth < 0) return false;
  }
}

const OPENING = new Set<TokenKind>(['(', '[', '{', 'set(', 'floor(', 'ceil(']);
const CLOSING = new Set<TokenKind>([')', ']', '}', 'set)', 'floor)', 'ceil)']);

/** `[1,2)`, `(-1,3]`, `]a,b[` or a number set at the start of a line: a bare set. */
export function startsSet(reader: Reader): boolean {
  const { kind } = reader.token;
  if (kind === 'set(' || kind === 'empty' || kind === 'number-set' || kind === ']') return true;
  if (kind !== '(' && kind !== '[') return false;
  let depth = 0;
  let commas = 0;
  for (let at = 0; ; at += 1) {
    const inner = reader.peek(at).kind;
    if (inner === 'end-of-line') return false;
    if (depth === 1 && (inner === ',' || inner === ';')) commas += 1;
    if (OPENING.has(inner)) depth += 1;
    if (CLOSING.has(inner)) depth -= 1;
    if (depth > 0) continue;
    const after = reader.peek(at + 1).kind;
    return commas === 1 && (after === 'end-of-line' || isJoin(after) || (inner === ']') !== (kind === '['));
  }
}
