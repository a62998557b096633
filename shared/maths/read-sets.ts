import type { Expr, SetExpr } from './expression.ts';
import { groupAhead } from './look-ahead.ts';
import { readList } from './read-arguments.ts';
import {
  ahead,
  enclosed,
  expect,
  fail,
  inside,
  is,
  kind,
  next,
  numberOf,
  OUTSIDE,
  peek,
  skip,
  span,
  start,
  sum,
  take,
  takeAll,
} from './reader.ts';

const NUMBER_SETS: Partial<Record<string, 'reals' | 'integers' | 'naturals' | 'rationals' | 'complex'>> = {
  R: 'reals',
  Z: 'integers',
  N: 'naturals',
  Q: 'rationals',
  C: 'complex',
  I: 'integers',
};

/** Sets joined by union, intersection and "without"; two different joins need brackets. */
export function readSet(): SetExpr {
  const from = start;
  const parts = [readSimpleSet()];
  const [first] = parts;
  const join = kind;
  if (!is('∪∩∖')) return first!;
  while ((join !== '∖' || parts.length < 2) && take(join)) parts.push(readSimpleSet());
  if (is('∪∩∖')) fail('mixed-joins (');
  const place = span(from);
  if (join === '∖') return { kind: 'without', from: first!, removed: parts[1]!, span: place };
  return { kind: join === '∪' ? 'union' : 'intersection', parts, span: place };
}

function readSimpleSet(): SetExpr {
  const from = start;
  if (is('([]')) return readBracketed();
  if (is('ℝ')) return readNumberSet();
  if (take('∅') || takeAll(/⦃⦄/y)) return { kind: 'empty', span: span(from) };
  expect('⦃', 'bad-set \\{ ( [ \\R');
  const items = inside(readList);
  expect('⦄', is('|') ? 'bad-set \\}' : 'missing-bracket \\}');
  return { kind: 'finite', items, span: span(from) };
}

/** An interval, or a bracket around sets. */
function readBracketed(): SetExpr {
  if (!is('(') || /[,;]/.test(groupAhead().inner)) return readInterval();
  next();
  return enclosed(')', readSet);
}

function readNumberSet(): SetExpr {
  const { text, start: from } = next();
  const mark = text === 'R' ? ahead(/[_^](?:\{[+-]\}|[+-])/y) : '';
  if (!mark) return { kind: NUMBER_SETS[text] ?? 'reals', span: span(from) };
  const sign = peek(mark.length > 2 ? 2 : 1);
  const zero = numberOf({ start: sign.start, end: sign.end }, 0n);
  skip(mark.length);
  const isPositive = mark.includes('+');
  return {
    kind: 'interval',
    from: isPositive ? zero : null,
    to: isPositive ? null : zero,
    fromClosed: false,
    toClosed: false,
    span: span(from),
  };
}

/** `(a,b]`, `[a;b]` and `]a,b[`. */
export function readInterval(): SetExpr {
  const open = next();
  const readEnds = () => {
    const left = sum();
    expect(',;', 'bad-set ,');
    return [left, sum()] as const;
  };
  const [left, right] = inside(readEnds, { ...OUTSIDE, reversed: true });
  const close = expect(')][', 'missing-bracket ) ]');
  const from = isInfinite(left, 'minus') ? null : left;
  const to = isInfinite(right, 'plus') ? null : right;
  return {
    kind: 'interval',
    from,
    to,
    fromClosed: open.kind === '[' && from !== null,
    toClosed: close.kind === ']' && to !== null,
    span: span(open.start),
  };
}

function isInfinite(expr: Expr, sign: 'plus' | 'minus'): boolean {
  if (expr.kind === 'constant') return expr.name === 'infinity' && sign === 'plus';
  const [term, more] = expr.kind === 'sum' ? expr.terms : [];
  return !more && term?.sign === sign && isInfinite(term.expr, 'plus');
}

/** `[1,2)`, `(-1,3]`, `]a,b[` or a number set at the start of a line: a bare set. */
export function startsSet(): boolean {
  if (is('⦃∅ℝ]')) return true;
  if (!is('([')) return false;
  const { inner, end } = groupAhead();
  if (!/^[^,;]*[,;][^,;]*$/.test(inner)) return false;
  return ahead(is('[') ? /[^\]$]|\][$∪∩∖]/y : /\]|[^$][$∪∩∖]/y, end) !== '';
}
