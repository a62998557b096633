import type { Expr, SetExpr, Span } from './expression.ts';
import { readList } from './read-arguments.ts';
import {
  ahead,
  bracesAreBrackets,
  enclosed,
  expect,
  fail,
  groupAhead,
  inside,
  is,
  negated,
  next,
  numberOf,
  OUTSIDE,
  peek,
  skip,
  span,
  start,
  sum,
  takeAll,
  token,
} from './reader.ts';
import type { Token } from './tokens.ts';

type Named = Extract<SetExpr, { readonly kind: 'reals' }>['kind'];

/** Sets joined by union, intersection and "without"; two different joins need brackets. */
export const readSet = (): SetExpr => {
  const from = start;
  const parts = [readSimpleSet()];
  const [first] = parts;
  const join = token.text;
  while (is('U') && token.text === join && (join !== 'without' || !parts[1])) {
    next();
    parts.push(readSimpleSet());
  }
  if (is('U')) fail('joins');
  if (!parts[1]) return first!;
  const place = span(from);
  if (join === 'without') return { kind: join, from: first!, removed: parts[1], span: place };
  return { kind: join === 'union' ? join : 'intersection', parts, span: place };
};

const readSimpleSet = (): SetExpr => {
  const from = start;
  if (is('([]')) return readBracketed();
  if (is('R')) return readNamedSet(next());
  if (takeAll(/sz/y)) return { kind: 'empty', span: span(from) };
  expect('s', 'set');
  const items = inside(readList);
  expect('z', is('|') ? 'finite' : 'z');
  return { kind: 'finite', items, span: span(from) };
};

/** An interval, or a bracket around sets. */
const readBracketed = (): SetExpr => {
  if (!is('(') || /[,;]/.test(groupAhead().inner)) return readInterval();
  next();
  return enclosed(')', readSet);
};

/** A set with a name; `\R^+` and its like are intervals. */
const readNamedSet = ({ text, start: from }: Token): SetExpr => {
  const mark = text === 'reals' ? ahead(/[_^](?:\{[+-]\}|[+-])/y) : '';
  if (!mark) return { kind: text as Named, span: span(from) };
  const { start, end } = peek(mark[3] ? 2 : 1);
  const zero = numberOf({ start, end }, 0n);
  skip(mark.length);
  const isPositive = mark.includes('+');
  return interval(isPositive ? zero : null, isPositive ? null : zero, false, false, span(from));
};

const interval = (
  from: Expr | null,
  to: Expr | null,
  fromClosed: boolean,
  toClosed: boolean,
  place: Span,
): SetExpr => ({ kind: 'interval', from, to, fromClosed, toClosed, span: place });

/** `(a,b]`, `[a;b]` and `]a,b[`. */
export const readInterval = (): SetExpr => {
  const open = next();
  const readEnds = () => {
    const left = sum();
    expect(',;', 'interval');
    return [left, sum()] as const;
  };
  const [left, right] = inside(readEnds, { ...OUTSIDE, reversed: true });
  const close = expect(')][');
  const below = negated(left);
  const from = below && isInfinite(below) ? null : left;
  const to = isInfinite(right) ? null : right;
  return interval(from, to, open.kind === '[' && !!from, close.kind === ']' && !!to, span(open.start));
};

/** Infinity, also with a plus before it. */
const isInfinite = (expr: Expr): boolean => {
  const [term, more] = expr.kind === 'sum' ? expr.terms : [];
  if (term?.sign === 'plus' && !more) return isInfinite(term.expr);
  return expr.kind === 'constant' && expr.name === 'infinity';
};

/** `[1,2)`, `(-1,3]`, `]a,b[` or a named set at the start of a line: a bare set. */
export const startsSet = (): boolean => {
  if (is('sR]')) return !bracesAreBrackets();
  if (!is('([')) return false;
  const { inner, end } = groupAhead();
  if (!/^[^,;]*[,;][^,;]*$/.test(inner)) return false;
  return ahead(is('[') ? /[^\]$]|\][$U]/y : /\]|[^$][$U]/y, end) !== '';
};
