import type { Expr } from './expression.ts';
import { readArgument } from './read-arguments.ts';
import { readEvaluation } from './read-expression.ts';
import { numberFrom } from './read-numbers.ts';
import type { Reader } from './reader.ts';

/** `(..)`, the row of values `(1,2)`, and `[..]_a^b`. */
export function readBracket(reader: Reader): Expr {
  const { start, kind } = reader.next();
  const items = readItems(reader, kind === '(' ? ')' : ']');
  const [only] = items;
  if (!only || items.length > 1) return { kind: 'matrix', rows: [items], span: reader.span(start) };
  const isScripted = kind === '[' && reader.ahead(/_|\^._/y);
  return isScripted ? readEvaluation(reader, only, start) : { ...only, bracketed: { start, end: reader.lastEnd } };
}

/** Expressions parted by commas or semicolons, up to the bracket that closes them. */
export function readItems(reader: Reader, close: string, complaint?: `missing-bracket ${string}`): Expr[] {
  return reader.enclosed(close, readList, reader.holding(), complaint);
}

/** Expressions parted by commas or semicolons. */
export function readList(reader: Reader): Expr[] {
  const items = [];
  do items.push(reader.grammar.sum(reader));
  while (reader.take(',;'));
  return items;
}

/** `\left. F \right|_a^b`. */
export function readOpenBracket(reader: Reader): Expr {
  const { start } = reader.next();
  const operand = reader.inside(reader.grammar.sum, { bars: 1 });
  if (!reader.take('|]')) reader.fail('missing-bracket \\right|');
  return readEvaluation(reader, operand, start);
}

/** A braced group in the place of a factor: displayed without brackets, so it may not hide a sum within a product. */
export function readBraces(reader: Reader): Expr {
  const before = reader.kinds[reader.index - 1] ?? '$';
  const { start } = reader.next();
  if (reader.take('}')) return reader.take('_') ? readChoose(reader, start) : reader.grammar.power(reader);
  const expr = reader.enclosed('}', reader.grammar.sum, reader.holding());
  const isLoose = !expr.bracketed && (expr.kind === 'sum' || (expr.kind === 'quotient' && expr.written !== 'fraction'));
  const around = before + reader.token.kind;
  if (isLoose && around !== '||' && !ALONE.test(around)) {
    reader.fail('missing-bracket (', { start, end: reader.lastEnd });
  }
  return expr;
}

/** The kinds before and after a group that stands alone. */
const ALONE = /^[${}()[\]⦃⦄,;&N=<>≤≥≠≈∈∨∧TBE]{2}$/;

/** `{}_nC_r`: the number of ways to choose r of n. */
function readChoose(reader: Reader, start: number): Expr {
  const top = readArgument(reader);
  if (reader.token.text !== 'C') reader.fail('missing-operand C');
  reader.next();
  reader.expect('_', 'missing-argument _');
  return { kind: 'binomial', top, bottom: readArgument(reader), span: reader.span(start) };
}

/** `|..|`: the absolute value. */
export function readBars(reader: Reader): Expr {
  const { start } = reader.next();
  const args = [reader.inside(reader.grammar.sum, { bars: reader.context.bars + 1 })];
  if (reader.token.side === 'left') reader.fail('missing-bracket |');
  reader.expect('|');
  return { kind: 'call', name: 'abs', args, span: reader.span(start) };
}

/** `\lfloor..\rfloor` and its like. */
export function readFenced(reader: Reader): Expr {
  const { start, kind } = reader.next();
  const isFloor = kind === '⌊';
  const name = isFloor ? 'floor' : 'ceil';
  const args = [reader.enclosed(isFloor ? '⌋' : '⌉', reader.grammar.sum, {}, `missing-bracket \\r${name}`)];
  return { kind: 'call', name, args, span: reader.span(start) };
}

export function readOverline(reader: Reader): Expr {
  const { start } = reader.next();
  return { kind: 'call', name: 'conj', args: [readArgument(reader)], span: reader.span(start) };
}

export function readRoot(reader: Reader): Expr {
  const { start, text } = reader.next();
  const degree = reader.take('[') ? reader.enclosed(']', reader.grammar.sum, { reversed: true }) : null;
  const atom = reader.grammar.atoms[reader.token.kind] ?? readArgument;
  const radicand = text === '' && !reader.is('({') ? reader.inside(atom) : readArgument(reader);
  return { kind: 'root', degree, radicand, span: reader.span(start) };
}

export function readFraction(reader: Reader): Expr {
  const { start, end, text } = reader.next();
  const [top = '', bottom] = text.split('⁄');
  const numerator = bottom ? numberFrom({ text: top, start, end }) : readArgument(reader, reader.holding());
  const denominator = bottom ? numberFrom({ text: bottom, start, end }) : readArgument(reader);
  return { kind: 'quotient', numerator, denominator, written: 'fraction', span: reader.span(start) };
}

export function readBinomial(reader: Reader): Expr {
  const { start } = reader.next();
  return { kind: 'binomial', top: readArgument(reader), bottom: readArgument(reader), span: reader.span(start) };
}

/** A matrix or determinant; an expression given case by case is not read. */
export function readMatrix(reader: Reader): Expr {
  const token = reader.next();
  const { start, text } = token;
  if (text === 'cases') reader.fail('piecewise', token);
  if (!/^([pbBv]|small)?matrix$|^array$/.test(text)) reader.fail('unknown-command pmatrix', token);
  const rows = reader.inside(readRows);
  readEnd(reader, text);
  const width = rows[0]?.length;
  const span = reader.span(start);
  if (rows.some((row) => row.length !== width)) reader.fail(`ragged-matrix ${width}`, span);
  const matrix: Expr = { kind: 'matrix', rows, span };
  return text === 'vmatrix' ? { kind: 'call', name: 'det', args: [matrix], span: reader.span(start) } : matrix;
}

/** The `\end` of an environment. */
export function readEnd(reader: Reader, environment: string): void {
  if (reader.token.text !== environment || !reader.take('E')) reader.fail(`missing-bracket \\end{${environment}}`);
}

function readRows(reader: Reader): Expr[][] {
  const rows: Expr[][] = [];
  do {
    if (reader.is('E') && rows.length > 0) break;
    const row = [];
    do row.push(reader.grammar.sum(reader));
    while (reader.take('&'));
    rows.push(row);
  } while (reader.take('N'));
  return rows;
}
