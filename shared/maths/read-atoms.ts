import type { Expr, FunctionName, MatrixExpr } from './expression.ts';
import { readArgument } from './read-arguments.ts';
import { readEvaluation } from './read-expression.ts';
import { numberFrom } from './read-numbers.ts';
import type { Reader } from './reader.ts';
import type { TokenKind } from './token-table.ts';

/** `(..)`, and the row of values `(1,2)`. */
export function readBracket(reader: Reader): Expr {
  const { token } = reader;
  reader.next();
  const items = readItems(reader);
  reader.expect(token.kind === '(' ? ')' : ']', 'missing-bracket', token.kind === '(' ? ')' : ']');
  const scripted = token.kind === '[' && (reader.is('_') || (reader.is('^') && reader.peek(2).kind === '_'));
  if (items.length > 1) return { kind: 'matrix', rows: [items], span: reader.span(token.start) };
  const bracketed = { start: token.start, end: reader.lastEnd };
  const expr = { ...items[0]!, bracketed };
  return scripted ? readEvaluation(reader, items[0]!, token.start) : expr;
}

/** Expressions parted by commas or semicolons, within a bracket that was opened. */
export function readItems(reader: Reader): Expr[] {
  const { context } = reader;
  return reader.inside(
    () => {
      const items = [reader.grammar.sum(reader)];
      while (reader.take(',') || reader.take(';')) items.push(reader.grammar.sum(reader));
      return items;
    },
    { holdsDifferential: context.endsAtDifferential || context.holdsDifferential },
  );
}

/** `\left. F \right|_a^b`. */
export function readOpenBracket(reader: Reader): Expr {
  const { token } = reader;
  reader.next();
  const operand = reader.inside(reader.grammar.sum, { bars: 1 });
  if (!reader.is('|') && !reader.is(']')) reader.fail('missing-bracket', ['\\right|']);
  reader.next();
  return readEvaluation(reader, operand, token.start);
}

/** A braced group in the place of a factor: displayed without brackets, so it may not hide a sum within a product. */
export function readBraces(reader: Reader): Expr {
  const before = reader.tokens[reader.index - 1]?.kind;
  const { token } = reader;
  const { context } = reader;
  reader.next();
  if (reader.is('}')) {
    reader.next();
    if (reader.is('_')) return readChoose(reader, token.start);
    return reader.grammar.power(reader);
  }
  const expr = reader.inside(reader.grammar.sum, {
    holdsDifferential: context.endsAtDifferential || context.holdsDifferential,
  });
  reader.expect('}', 'missing-bracket', '}');
  const isLoose = !expr.bracketed && (expr.kind === 'sum' || (expr.kind === 'quotient' && expr.written !== 'fraction'));
  const isBarred = before === '|' && reader.token.kind === '|';
  if (isLoose && !isBarred && !(standsAlone(before) && standsAlone(reader.token.kind))) {
    reader.fail('missing-bracket', ['('], { start: token.start, end: reader.lastEnd });
  }
  return expr;
}

const ALONE = new Set<TokenKind>([
  'end-of-line',
  '{',
  '}',
  '(',
  ')',
  '[',
  ']',
  'set(',
  'set)',
  ',',
  ';',
  '&',
  'newline',
  '=',
  '<',
  '>',
  '<=',
  '>=',
  '!=',
  'approx',
  'in',
  'or',
  'and',
  'text',
  'begin',
  'end',
]);

function standsAlone(kind: TokenKind | undefined): boolean {
  return kind === undefined || ALONE.has(kind);
}

/** `{}_nC_r`: the number of ways to choose r of n. */
function readChoose(reader: Reader, start: number): Expr {
  reader.next();
  const top = readArgument(reader);
  if (reader.token.text !== 'C') reader.fail('missing-operand', ['C']);
  reader.next();
  reader.expect('_', 'missing-argument', '_');
  const bottom = readArgument(reader);
  return { kind: 'binomial', top, bottom, span: reader.span(start) };
}

/** `|..|`: the absolute value. */
export function readBars(reader: Reader): Expr {
  const start = reader.next().start;
  const argument = reader.inside(reader.grammar.sum, { bars: reader.context.bars + 1 });
  if (!reader.is('|') || reader.token.side === 'left') reader.fail('missing-bracket', ['|']);
  reader.next();
  return { kind: 'call', name: 'abs', args: [argument], span: reader.span(start) };
}

/** `\lfloor..\rfloor` and its like. */
export function readFenced(reader: Reader): Expr {
  const { start, kind } = reader.next();
  const name: FunctionName = kind === 'floor(' ? 'floor' : 'ceil';
  const argument = reader.inside(reader.grammar.sum);
  reader.expect(name === 'floor' ? 'floor)' : 'ceil)', 'missing-bracket', name === 'floor' ? '\\rfloor' : '\\rceil');
  return { kind: 'call', name, args: [argument], span: reader.span(start) };
}

export function readOverline(reader: Reader): Expr {
  const { start } = reader.next();
  const argument = readArgument(reader);
  return { kind: 'call', name: 'conj', args: [argument], span: reader.span(start) };
}

export function readRoot(reader: Reader): Expr {
  const { start, text } = reader.next();
  let degree: Expr | null = null;
  if (reader.take('[')) {
    degree = reader.inside(reader.grammar.sum, { reversed: true });
    reader.expect(']', 'missing-bracket', ']');
  }
  if (text === '√' && !reader.is('(') && !reader.is('{')) {
    const radicand = reader.grammar.atoms[reader.token.kind];
    if (!radicand) return reader.fail('missing-operand', ['(']);
    return { kind: 'root', degree, radicand: reader.inside(radicand), span: reader.span(start) };
  }
  const radicand = readArgument(reader);
  return { kind: 'root', degree, radicand, span: reader.span(start) };
}

export function readFraction(reader: Reader): Expr {
  const token = reader.next();
  const { context } = reader;
  const span = () => reader.span(token.start);
  if (token.text.includes('/')) {
    const [top = '', bottom = ''] = token.text.split('/');
    const part = (text: string) => numberFrom({ text, start: token.start, end: token.end });
    return { kind: 'quotient', numerator: part(top), denominator: part(bottom), written: 'fraction', span: span() };
  }
  const numerator = readArgument(reader, {
    holdsDifferential: context.endsAtDifferential || context.holdsDifferential,
  });
  const denominator = readArgument(reader);
  return { kind: 'quotient', numerator, denominator, written: 'fraction', span: span() };
}

export function readBinomial(reader: Reader): Expr {
  const { start } = reader.next();
  const top = readArgument(reader);
  const bottom = readArgument(reader);
  return { kind: 'binomial', top, bottom, span: reader.span(start) };
}

const MATRICES = new Set(['pmatrix', 'bmatrix', 'matrix', 'array', 'smallmatrix', 'vmatrix', 'Bmatrix']);

export function readMatrix(reader: Reader): Expr {
  const token = reader.next();
  if (!MATRICES.has(token.text)) reader.fail('unknown-command', ['pmatrix'], token);
  const rows = reader.inside(() => readRows(reader));
  if (!reader.is('end') || reader.token.text !== token.text) reader.fail('missing-bracket', [`\\end{${token.text}}`]);
  reader.next();
  const width = rows[0]?.length ?? 0;
  const matrix: MatrixExpr = { kind: 'matrix', rows, span: reader.span(token.start) };
  if (rows.some((row) => row.length !== width)) reader.fail('ragged-matrix', [String(width)], matrix.span);
  if (token.text !== 'vmatrix') return matrix;
  return { kind: 'call', name: 'det', args: [matrix], span: reader.span(token.start) };
}

function readRows(reader: Reader): Expr[][] {
  const rows: Expr[][] = [];
  do {
    if (reader.is('end') && rows.length > 0) break;
    const row = [reader.grammar.sum(reader)];
    while (reader.take('&')) row.push(reader.grammar.sum(reader));
    rows.push(row);
  } while (reader.take('newline'));
  return rows;
}
