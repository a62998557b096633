import type { Expr } from './expression.ts';
import { readArgument, readAtom, readItems } from './read-arguments.ts';
import { readEvaluation } from './read-expression.ts';
import { readPower } from './read-power.ts';
import {
  ahead,
  atoms,
  context,
  enclosed,
  expect,
  fail,
  holding,
  index,
  inside,
  is,
  kind,
  lastEnd,
  next,
  numberOf,
  OUTSIDE,
  span,
  sum,
  take,
  token,
} from './reader.ts';
import { kinds, type Token } from './tokens.ts';

/** `(..)`, the row of values `(1,2)`, and `[..]_a^b`. */
export function readBracket(open: Token): Expr {
  const isRound = open.kind === '(';
  const items = readItems(isRound ? ')' : ']');
  const [only, more] = items;
  if (more) return { kind: 'matrix', rows: [items], span: span(open.start) };
  if (!isRound && ahead(/_|\^._/y)) return readEvaluation(only!, open.start);
  return { ...only!, bracketed: { start: open.start, end: lastEnd } };
}

/** `\left. F \right|_a^b`. */
export function readOpenBracket({ start }: Token): Expr {
  const operand = inside(sum, { ...OUTSIDE, bars: 1 });
  expect('|]', 'missing-bracket \\right|');
  return readEvaluation(operand, start);
}

/** A braced group in the place of a factor: displayed without brackets, so it may not hide a sum within a product. */
export function readBraces({ start }: Token): Expr {
  const before = kinds[index - 2] ?? '$';
  if (take('}')) return take('_') ? readChoose(start) : readPower();
  const expr = enclosed('}', sum, holding());
  const isLoose = !expr.bracketed && (expr.kind === 'sum' || (expr.kind === 'quotient' && expr.written !== 'fraction'));
  const around = before + kind;
  if (isLoose && around !== '||' && !ALONE.test(around)) fail('missing-bracket (', { start, end: lastEnd });
  return expr;
}

/** The kinds before and after a group that stands alone. */
const ALONE = /^[${}()[\]⦃⦄,;&N=<>≤≥≠≈∈∨∧TBE]{2}$/;

/** `{}_nC_r`: the number of ways to choose r of n. */
function readChoose(start: number): Expr {
  const top = readArgument();
  if (token.text !== 'C') fail('missing-operand C');
  next();
  expect('_', 'missing-argument _');
  return { kind: 'binomial', top, bottom: readArgument(), span: span(start) };
}

/** `|..|`: the absolute value. */
export function readBars({ start }: Token): Expr {
  const args = [inside(sum, { ...OUTSIDE, bars: context.bars + 1 })];
  if (token.side === 'l') fail('missing-bracket |');
  expect('|');
  return { kind: 'call', name: 'abs', args, span: span(start) };
}

/** `\lfloor..\rfloor` and its like. */
export function readFenced({ start, kind: open }: Token): Expr {
  const isFloor = open === '⌊';
  const name = isFloor ? 'floor' : 'ceil';
  const args = [enclosed(isFloor ? '⌋' : '⌉', sum, OUTSIDE, `missing-bracket \\r${name}`)];
  return { kind: 'call', name, args, span: span(start) };
}

export function readOverline({ start }: Token): Expr {
  return { kind: 'call', name: 'conj', args: [readArgument()], span: span(start) };
}

export function readRoot({ start, text }: Token): Expr {
  const degree = take('[') ? enclosed(']', sum, { ...OUTSIDE, reversed: true }) : null;
  const isTyped = text === '' && atoms[kind] && !is('({');
  return { kind: 'root', degree, radicand: isTyped ? inside(readAtom) : readArgument(), span: span(start) };
}

export function readFraction(sign: Token): Expr {
  const [top = '', bottom] = sign.text.split('⁄');
  const numerator = bottom ? digitsIn(sign, top) : readArgument(holding());
  const denominator = bottom ? digitsIn(sign, bottom) : readArgument();
  return { kind: 'quotient', numerator, denominator, written: 'fraction', span: span(sign.start) };
}

/** One of the two numbers of a fraction that is a single sign. */
function digitsIn({ start, end }: Token, digits: string): Expr {
  return numberOf({ start, end }, BigInt(digits));
}

export function readBinomial({ start }: Token): Expr {
  return { kind: 'binomial', top: readArgument(), bottom: readArgument(), span: span(start) };
}

/** A matrix or determinant; an expression given case by case is not read. */
export function readMatrix(open: Token): Expr {
  const { start, text } = open;
  if (text === 'cases') fail('piecewise', open);
  if (!/^([pbBv]|small)?matrix$|^array$/.test(text)) fail('unknown-command pmatrix', open);
  const rows = inside(readRows);
  readEnd(text);
  const width = rows[0]?.length;
  const place = span(start);
  if (rows.some((row) => row.length !== width)) fail(`ragged-matrix ${width}`, place);
  const matrix: Expr = { kind: 'matrix', rows, span: place };
  return text === 'vmatrix' ? { kind: 'call', name: 'det', args: [matrix], span: place } : matrix;
}

/** The `\end` of an environment. */
export function readEnd(environment: string): void {
  expect(token.text === environment ? 'E' : '', `missing-bracket \\end{${environment}}`);
}

function readRows(): Expr[][] {
  const rows: Expr[][] = [];
  do {
    if (is('E') && rows.length > 0) break;
    const row = [];
    do row.push(sum());
    while (take('&'));
    rows.push(row);
  } while (take('N'));
  return rows;
}
