import type { Expr, ProductExpr, Term, TermSign } from './expression.ts';
import { readExponent, readScripts } from './read-arguments.ts';
import { mixedNumber } from './read-numbers.ts';
import { readPower } from './read-power.ts';
import {
  ahead,
  atDifferential,
  atoms,
  barIsScripted,
  checkDepth,
  choose,
  context,
  deeper,
  depth,
  enclosed,
  fail,
  flag,
  is,
  kind,
  lastEnd,
  next,
  numberOf,
  peek,
  type Read,
  skip,
  span,
  start,
  startsFactor,
  sum,
  takeAll,
  takeDifferential,
  token,
  variable,
} from './reader.ts';

const SIGNS: Partial<Record<string, TermSign>> = { '+': 'plus', '-': 'minus', '±': 'plusminus', '∓': 'minusplus' };

/** Terms joined by signs. */
export function readSum(): Expr {
  const from = start;
  const isBare = !SIGNS[kind];
  const terms: Term[] = [];
  do {
    const place = start;
    const sign = SIGNS[kind];
    if (sign) next();
    const expr = readSigned(readProduct);
    terms.push({ sign: sign ?? 'plus', expr, span: { start: place, end: lastEnd } });
    // After `\int\frac{dx}{x}` the integrand is over.
  } while (SIGNS[kind] && (context.dx !== 'ends' || variable === null));
  const expr: Expr = isBare && !terms[1] ? terms[0]!.expr : { kind: 'sum', terms, span: span(from) };
  return is('|') && context.bars === 0 && barIsScripted() ? readBar(expr, from) : expr;
}

/** A second sign, as in `3--2` and `2\cdot-3`, makes a term of its own. */
export function readSigned(read: Read): Expr {
  const from = start;
  const sign = SIGNS[kind];
  if (!sign) return read();
  next();
  const expr = deeper(() => readSigned(read));
  const place = span(from);
  return { kind: 'sum', terms: [{ sign, expr, span: place }], span: place };
}

/** `F|_a^b` without a `\left.`: the whole sum is meant, or only its last term. */
function readBar(expr: Expr, from: number): Expr {
  const isLast = expr.kind === 'sum' && expr.terms.length > 1 && choose('evaluated');
  next();
  if (!isLast) return readEvaluation(expr, from);
  const last = expr.terms[expr.terms.length - 1]!;
  const operand = readEvaluation(last.expr, last.expr.span.start);
  const term = { ...last, expr: operand, span: { start: last.span.start, end: lastEnd } };
  return { ...expr, terms: [...expr.terms.slice(0, -1), term], span: span(from) };
}

/** The `_a^b` after an evaluation bracket or bar; the bracket itself was taken. */
export function readEvaluation(operand: Expr, from: number): Expr {
  const [lower, upper] = readScripts(readBound, readBound);
  const to = upper ?? lower ?? fail('missing-operand _');
  return {
    kind: 'evaluated',
    operand,
    variable: lower?.variable ?? to.variable,
    from: upper && lower && lower.value,
    to: to.value,
    span: span(from),
  };
}

interface Bound {
  readonly variable: string | null;
  readonly value: Expr;
}

function readBound(): Bound {
  if (!ahead(/\{a=/y)) return { variable: null, value: readExponent() };
  const { text } = peek(1);
  skip(3);
  return { variable: text, value: enclosed('}', sum) };
}

/** Factors and divisions, from left to right. */
export function readProduct(from = start, first = readFactor()): Expr {
  let run = startRun(first);
  let levels = depth;
  for (;;) {
    const { gap } = token;
    switch (kind) {
      case '$':
      case ')':
      case '+':
      case '-':
      case '=':
        return productOf(run, from);
      case '*':
      case '×': {
        const join = next().kind === '*' ? 'dot' : 'times';
        if (context.dx === 'ends' && atDifferential()) return productOf(run, from);
        addFactor(run, readSigned(readFactor), join);
        continue;
      }
      case '/':
      case '÷':
      case ':': {
        levels += 1;
        checkDepth(levels);
        const numerator = productOf(run, from);
        const written = next().kind === '/' ? 'slash' : 'divide';
        run = startRun({ kind: 'quotient', numerator, denominator: readDivisor(), written, span: span(from) });
        continue;
      }
      case '{':
        if (takeAll(/\{\}/y)) continue;
        break;
      case '|':
        if (!opensInnerBar() && !startsFactor()) return productOf(run, from);
        break;
      default:
        if (!startsFactor()) return productOf(run, from);
    }
    if (context.dx === 'held' && atDifferential()) takeDifferential();
    else addFactor(run, readFactor(), 'implicit', gap);
  }
}

/** `|a|b|c|`: the second bar may also open an inner pair. */
function opensInnerBar(): boolean {
  const after = peek(1).kind;
  return token.side === '' && context.bars === 1 && after !== '|' && atoms[after] !== undefined && choose('bars');
}

function readFactor(): Expr {
  if (context.dx !== 'held' || !atDifferential()) return readPower();
  const from = start;
  takeDifferential();
  return startsFactor() ? readFactor() : numberOf(span(from), 1n);
}

type Join = ProductExpr['joins'][number];

/** One product while it is read. */
export interface Run {
  readonly factors: Expr[];
  readonly joins: Join[];
}

export function startRun(first: Expr): Run {
  return first.kind === 'product' && !first.bracketed
    ? { factors: [...first.factors], joins: [...first.joins] }
    : { factors: [first], joins: [] };
}

/** `gap`: a space parts the factor from the one before it. */
export function addFactor({ factors, joins }: Run, expr: Expr, join: Join = 'implicit', gap = false): void {
  const last = factors.pop()!;
  if (join === 'implicit') {
    const mixed = gap ? null : mixedNumber(last, expr);
    if (mixed) return void factors.push(mixed);
    if (isDivided(last)) flag('slash-product');
    if (expr.kind === 'number' && last.kind === 'number' && !expr.bracketed && !last.bracketed) {
      fail('bad-number *', expr.span);
    }
  }
  factors.push(last);
  joins.push(join);
  if (expr.kind === 'product' && !expr.bracketed) {
    factors.push(...expr.factors);
    joins.push(...expr.joins);
  } else factors.push(expr);
}

/** Written with a sign of division, so that what stands directly after it may or may not belong to it. */
function isDivided(expr: Expr): boolean {
  return expr.kind === 'quotient' && expr.written !== 'fraction' && !expr.bracketed;
}

/** The run as one expression. */
export function productOf({ factors, joins }: Run, from: number): Expr {
  return factors.length === 1 ? factors[0]! : { kind: 'product', factors, joins, span: span(from) };
}

/** `1/2x`: the divisor with what stands directly beside it, where that belongs to it. */
function readDivisor(): Expr {
  const from = start;
  const first = readSigned(readFactor);
  if (!startsFactor() || !((is('F') && !token.gap && first.kind === 'number') || choose('slash'))) return first;
  const run = startRun(first);
  do {
    const { gap } = token;
    addFactor(run, readFactor(), 'implicit', gap);
  } while (startsFactor());
  return productOf(run, from);
}
