import type { Expr } from './expression.ts';
import { readArgument, readAtom, readItems } from './read-arguments.ts';
import { isDivided, readEvaluation } from './read-expression.ts';
import { readPower } from './read-power.ts';
import {
  ahead,
  atoms,
  context,
  enclosed,
  expect,
  fail,
  holding,
  inside,
  is,
  kind,
  lastEnd,
  next,
  numberOf,
  OUTSIDE,
  peek,
  type Read,
  span,
  sum,
  take,
  token,
} from './reader.ts';
import { source, type Token } from './tokens.ts';

/** `(..)`, the row of values `(1,2)`, `\{[..]..\}` and `[..]_a^b`. */
export const readBracket = ({ kind: open, start }: Token): Expr => {
  const items = readItems(open === '(' ? ')' : open === '[' ? ']' : 'z');
  const [only, more] = items;
  if (more) return { kind: 'matrix', rows: [items], span: span(start) };
  if (open === '[' && ahead(/_|\^._/y)) return readEvaluation(only!, start);
  return { ...only!, bracketed: { start, end: lastEnd } };
};

/** `\left. F \right|_a^b`. */
export const readOpenBracket = ({ start }: Token): Expr => {
  const operand = inside(sum, { ...OUTSIDE, bars: 1 });
  expect('|]');
  return readEvaluation(operand, start);
};

/** A braced group in the place of a factor: displayed without brackets, so it may not hide a sum within a product. */
export const readBraces = ({ start }: Token): Expr => {
  const before = peek(-2).kind;
  if (take('}')) return take('_^') ? readChoose(start) : readPower();
  const expr = enclosed('}', sum, holding());
  const isLoose = (expr.kind === 'sum' && !expr.bracketed) || isDivided(expr);
  const around = before + kind;
  if (isLoose && around !== '||' && !ALONE.test(around)) fail('(', { start, end: lastEnd });
  return expr;
};

/** The kinds before and after a group that stands alone. */
const ALONE = /^[${}()[\]sz,;&N=<≈∈VTBE]{2}$/;

/** `{}_nC_r` or `{}^nC_r`: the number of ways to choose r of n. */
const readChoose = (start: number): Expr => {
  const top = readArgument();
  if (token.text !== 'C') fail('choose');
  next();
  expect('_', 'below');
  return { kind: 'binomial', top, bottom: readArgument(), span: span(start) };
};

/** `|..|`: the absolute value. */
export const readBars = ({ start }: Token): Expr => {
  const args = [inside(sum, { ...OUTSIDE, bars: context.bars + 1 })];
  if (token.side === 'l') fail('|');
  expect('|');
  return { kind: 'call', name: 'abs', args, span: span(start) };
};

/** `\lfloor..\rfloor` and its like. */
export const readFenced = ({ start, text }: Token): Expr => {
  const name = text === 'floor' ? 'floor' : 'ceil';
  return { kind: 'call', name, args: [enclosed(name === 'floor' ? '⌋' : '⌉', sum)], span: span(start) };
};

export const readOverline = ({ start }: Token): Expr => ({
  kind: 'call',
  name: 'conj',
  args: [readArgument()],
  span: span(start),
});

export const readRoot = ({ start, text }: Token): Expr => {
  const degree = take('[') ? enclosed(']', sum, { ...OUTSIDE, reversed: true }) : null;
  const isTyped = text === '' && atoms[kind] && !is('({');
  return { kind: 'root', degree, radicand: isTyped ? inside(readAtom) : readArgument(), span: span(start) };
};

export const readFraction = ({ text, start, end }: Token): Expr => {
  const [top, bottom] = text.split('⁄').map((digits) => /\d/.test(digits) && numberOf({ start, end }, BigInt(digits)));
  return {
    kind: 'quotient',
    numerator: (bottom && top) || readArgument(holding()),
    denominator: bottom || readArgument(),
    written: 'fraction',
    span: span(start),
  };
};

export const readBinomial = ({ start }: Token): Expr => ({
  kind: 'binomial',
  top: readArgument(),
  bottom: readArgument(),
  span: span(start),
});

/** A matrix or determinant; an expression given case by case is not read. */
export const readMatrix = (open: Token): Expr => {
  const { start, text } = open;
  if (!/^(?:[pbBv]|small)?matrix$|^array$/.test(text)) fail(text === 'cases' ? text : 'matrix', open);
  const rows = inside(() => readRows(readRow));
  readEnd(text);
  const width = rows[0]!.length;
  const place = span(start);
  if (rows.some((row) => row.length !== width)) fail(`rows ${width}`, place);
  const bar = /^\\begin\s*{array}\s*{([lcr]*)\|[lcr]+}/.exec(source.slice(start))?.[1]?.length;
  const matrix: Expr = { kind: 'matrix', rows, ...(bar && { bar }), span: place };
  return text === 'vmatrix' ? { kind: 'call', name: 'det', args: [matrix], span: place } : matrix;
};

const readRow = (): Expr[] => {
  const row = [];
  do row.push(sum());
  while (take('&'));
  return row;
};

/** The `\end` of an environment. */
export const readEnd = (environment: string): void => {
  expect(token.text === environment ? 'E' : '', `\\end{${environment}}`);
};

/** The rows of an environment; a last one may be empty. */
export const readRows = <Row>(readOne: Read<Row>): Row[] => {
  const rows: Row[] = [];
  do {
    if (is('E') && rows[0]) break;
    rows.push(readOne());
  } while (take('N'));
  return rows;
};
