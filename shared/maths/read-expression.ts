import type { Expr, ProductExpr, QuotientExpr, Term, TermSign } from './expression.ts';
import { readExponent, readScripts } from './read-arguments.ts';
import { mixedNumber } from './read-numbers.ts';
import { numberOf, outer, type Read, READ_LIMITS, type Reader } from './reader.ts';

const SIGNS: Partial<Record<string, TermSign>> = { '+': 'plus', '-': 'minus', '±': 'plusminus', '∓': 'minusplus' };

/** Terms joined by signs. */
export function readSum(reader: Reader): Expr {
  const { start, kind } = reader.token;
  const terms: Term[] = [];
  const addTerm = (sign: TermSign, expr: Expr, from: number) =>
    terms.push({ sign, expr, span: { start: from, end: reader.lastEnd } });
  if (!SIGNS[kind]) addTerm('plus', readProduct(reader), start);
  for (;;) {
    const sign = SIGNS[reader.token.kind];
    // After `\int\frac{dx}{x}` the integrand is over.
    if (!sign || (reader.context.dx === 'ends' && reader.variable !== null)) break;
    const from = reader.next().start;
    addTerm(sign, readSigned(reader, readProduct), from);
  }
  const isBare = terms.length === 1 && !SIGNS[kind];
  return withBar(reader, isBare ? terms[0]!.expr : { kind: 'sum', terms, span: reader.span(start) }, start);
}

/** A second sign, as in `3--2` and `2\cdot-3`, makes a term of its own. */
export function readSigned(reader: Reader, read: Read): Expr {
  const { start, kind } = reader.token;
  const sign = SIGNS[kind];
  if (!sign) return read(reader);
  const expr = reader.deeper(() => {
    reader.next();
    return readSigned(reader, read);
  });
  const span = reader.span(start);
  return { kind: 'sum', terms: [{ sign, expr, span }], span };
}

/** `F|_a^b` without a `\left.`: the whole sum is meant, or only its last term. */
function withBar(reader: Reader, expr: Expr, start: number): Expr {
  if (!reader.is('|') || !reader.barIsScripted() || reader.context.bars > 0) return expr;
  const isSum = expr.kind === 'sum' && expr.terms.length > 1 && reader.choose('evaluated');
  reader.next();
  if (!isSum) return readEvaluation(reader, expr, start);
  const last = expr.terms[expr.terms.length - 1]!;
  const operand = readEvaluation(reader, last.expr, last.expr.span.start);
  const term = { ...last, expr: operand, span: { start: last.span.start, end: reader.lastEnd } };
  return { ...expr, terms: [...expr.terms.slice(0, -1), term], span: reader.span(start) };
}

/** The `_a^b` after an evaluation bracket or bar; the bracket itself was taken. */
export function readEvaluation(reader: Reader, operand: Expr, start: number): Expr {
  const [lower, upper] = readScripts(reader, readBound, readBound);
  const to = upper ?? lower ?? reader.fail('missing-operand _');
  const variable = lower?.variable ?? to.variable;
  const from = upper && lower && lower.value;
  return { kind: 'evaluated', operand, variable, from, to: to.value, span: reader.span(start) };
}

interface Bound {
  readonly variable: string | null;
  readonly value: Expr;
}

function readBound(reader: Reader): Bound {
  const variable = reader.ahead(/\{a=/y) ? reader.peek(1).text : null;
  if (variable === null) return { variable, value: readExponent(reader) };
  reader.skip(3);
  return { variable, value: reader.enclosed('}', reader.grammar.sum) };
}

/** Factors and divisions, from left to right. */
export function readProduct(reader: Reader, first?: Expr): Expr {
  const run = startRun(first ? outer(first).start : reader.token.start);
  addFactor(reader, run, first ?? readFactor(reader));
  for (;;) {
    const { kind, gap } = reader.token;
    if (reader.take('*×')) {
      if (reader.context.dx === 'ends' && reader.atDifferential()) return productOf(reader, run);
      addFactor(reader, run, readSigned(reader, readFactor), kind === '*' ? 'dot' : 'times');
    } else if (reader.is('/÷:')) divide(reader, run, kind === '/' ? 'slash' : 'divide');
    else if (reader.takeAll(/\{\}/y)) continue;
    else if (!opensInnerBar(reader) && !reader.startsFactor()) return productOf(reader, run);
    else if (reader.context.dx === 'held' && reader.atDifferential()) takeDifferential(reader);
    else addFactor(reader, run, readFactor(reader), 'implicit', gap);
  }
}

/** `|a|b|c|`: the second bar may also open an inner pair. */
function opensInnerBar(reader: Reader): boolean {
  const after = reader.peek(1).kind;
  return (
    reader.is('|') &&
    reader.token.side === '' &&
    reader.context.bars === 1 &&
    after !== '|' &&
    reader.grammar.atoms[after] !== undefined &&
    reader.choose('bars')
  );
}

/** The d and the letter after it. */
export function takeDifferential(reader: Reader): void {
  reader.next();
  reader.variable = reader.next().text;
}

function readFactor(reader: Reader): Expr {
  const { token } = reader;
  if (reader.context.dx !== 'held' || !reader.atDifferential()) return reader.grammar.power(reader);
  takeDifferential(reader);
  return reader.startsFactor() ? readFactor(reader) : numberOf(reader.span(token.start), 1n);
}

type Join = ProductExpr['joins'][number];

/** One product while it is read: factors so far, folded into a quotient at each division. */
export interface Run {
  readonly start: number;
  factors: Expr[];
  joins: Join[];
  divisions: number;
  /** The last division, which what stands directly after it may or may not belong to. */
  divided: Expr | null;
}

export function startRun(start: number): Run {
  return { start, factors: [], joins: [], divisions: 0, divided: null };
}

/** `gap`: a space parts the factor from the one before it. */
export function addFactor(reader: Reader, run: Run, expr: Expr, join: Join = 'implicit', gap = false): void {
  const { factors, joins } = run;
  const last = factors[factors.length - 1];
  if (last && join === 'implicit') {
    const mixed = gap ? null : mixedNumber(reader, last, expr);
    if (mixed) {
      factors[factors.length - 1] = mixed;
      return;
    }
    if (last === run.divided) reader.flags.add('slash-product');
    if (expr.kind === 'number' && last.kind === 'number' && !expr.bracketed && !last.bracketed) {
      reader.fail('bad-number *', expr.span);
    }
  }
  if (last) joins.push(join);
  if (expr.kind === 'product' && !expr.bracketed) {
    factors.push(...expr.factors);
    joins.push(...expr.joins);
  } else factors.push(expr);
}

/** The run as one expression. */
export function productOf(reader: Reader, { factors, joins, start }: Run): Expr {
  return factors.length === 1 ? factors[0]! : { kind: 'product', factors, joins, span: reader.span(start) };
}

function divide(reader: Reader, run: Run, written: QuotientExpr['written']): void {
  run.divisions += 1;
  if (run.divisions + reader.depth > READ_LIMITS.levels) reader.fail('too-deep');
  const numerator = productOf(reader, run);
  reader.next();
  const first = readSigned(reader, readFactor);
  const denominator = takesMore(reader, first) ? readJuxtaposed(reader, first) : first;
  run.divided = { kind: 'quotient', numerator, denominator, written, span: reader.span(run.start) };
  run.factors = [run.divided];
  run.joins = [];
}

/** `1/2x`: does what stands beside the divisor belong to it? */
function takesMore(reader: Reader, divisor: Expr): boolean {
  if (!reader.startsFactor()) return false;
  return (reader.is('F') && !reader.token.gap && divisor.kind === 'number') || reader.choose('slash');
}

/** All that stands directly beside the divisor, read as one product. */
function readJuxtaposed(reader: Reader, first: Expr): Expr {
  const run = startRun(outer(first).start);
  addFactor(reader, run, first);
  while (reader.startsFactor()) {
    const { gap } = reader.token;
    addFactor(reader, run, readFactor(reader), 'implicit', gap);
  }
  return productOf(reader, run);
}
