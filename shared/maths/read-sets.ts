import type { Expr, SetExpr } from './expression.ts';
import { groupAhead } from './look-ahead.ts';
import { readList } from './read-atoms.ts';
import { numberOf, type Reader } from './reader.ts';

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
  const parts = [readSimpleSet(reader)];
  const [first] = parts;
  const join = reader.token.kind;
  if (!'∪∩∖'.includes(join)) return first!;
  while (reader.take(join) && (join !== '∖' || parts.length < 2)) parts.push(readSimpleSet(reader));
  if (reader.is('∪∩∖')) reader.fail('mixed-joins (');
  const span = reader.span(start);
  if (join === '∖') return { kind: 'without', from: first!, removed: parts[1]!, span };
  return { kind: join === '∪' ? 'union' : 'intersection', parts, span };
}

function readSimpleSet(reader: Reader): SetExpr {
  const { start } = reader.token;
  if (reader.is('([]')) return readBracketed(reader);
  if (reader.is('ℝ')) return readNumberSet(reader);
  if (reader.take('∅') || reader.takeAll(/⦃⦄/y)) return { kind: 'empty', span: reader.span(start) };
  if (!reader.take('⦃')) reader.fail('bad-set \\{ ( [ \\R');
  const items = reader.inside(readList);
  reader.expect('⦄', reader.is('|') ? 'bad-set \\}' : 'missing-bracket \\}');
  return { kind: 'finite', items, span: reader.span(start) };
}

/** An interval, or a bracket around sets. */
function readBracketed(reader: Reader): SetExpr {
  if (!reader.is('(') || /[,;]/.test(groupAhead(reader).inner)) return readInterval(reader);
  reader.next();
  return reader.enclosed(')', readSet);
}

function readNumberSet(reader: Reader): SetExpr {
  const { text, start } = reader.next();
  const mark = text === 'R' ? reader.ahead(/[_^](?:\{[+-]\}|[+-])/y) : '';
  if (!mark) return { kind: NUMBER_SETS[text] ?? 'reals', span: reader.span(start) };
  const zero = numberOf(reader.peek(mark.length > 2 ? 2 : 1), 0n);
  reader.skip(mark.length);
  const isPositive = mark.includes('+');
  return {
    kind: 'interval',
    from: isPositive ? zero : null,
    to: isPositive ? null : zero,
    fromClosed: false,
    toClosed: false,
    span: reader.span(start),
  };
}

/** `(a,b]`, `[a;b]` and `]a,b[`. */
export function readInterval(reader: Reader): SetExpr {
  const open = reader.next();
  const readEnds = () => {
    const left = reader.grammar.sum(reader);
    if (!reader.take(',;')) reader.fail('bad-set ,');
    return [left, reader.grammar.sum(reader)] as const;
  };
  const [left, right] = reader.inside(readEnds, { reversed: true });
  if (!reader.is(')][')) reader.fail('missing-bracket ) ]');
  const close = reader.next();
  const from = isInfinite(left, 'minus') ? null : left;
  const to = isInfinite(right, 'plus') ? null : right;
  return {
    kind: 'interval',
    from,
    to,
    fromClosed: open.kind === '[' && from !== null,
    toClosed: close.kind === ']' && to !== null,
    span: reader.span(open.start),
  };
}

function isInfinite(expr: Expr, sign: 'plus' | 'minus'): boolean {
  if (expr.kind === 'constant') return expr.name === 'infinity' && sign === 'plus';
  const [term, more] = expr.kind === 'sum' ? expr.terms : [];
  return !more && term?.sign === sign && isInfinite(term.expr, 'plus');
}

/** `[1,2)`, `(-1,3]`, `]a,b[` or a number set at the start of a line: a bare set. */
export function startsSet(reader: Reader): boolean {
  if (reader.is('⦃∅ℝ]')) return true;
  if (!reader.is('([')) return false;
  const { inner, end } = groupAhead(reader);
  const isSquare = reader.is('[');
  if (!/^[^,;]*[,;][^,;]*$/.test(inner)) return false;
  return reader.ahead(isSquare ? /[^\]$]|\][$∪∩∖]/y : /\]|[^$][$∪∩∖]/y, end) !== '';
}
