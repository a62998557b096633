import type { Expr, ProductExpr, Term, TermSign } from './expression.ts';
import { readExponent, readScripts } from './read-arguments.ts';
import { mixedNumber } from './read-numbers.ts';
import { readPower } from './read-power.ts';
import {
  ahead,
  atDifferential,
  atoms,
  barIsScripted,
  behindDifferential,
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

/** Terms joined by signs. */
export const readSum = (): Expr => {
  const from = start;
  const isBare = !hasSign();
  const terms: Term[] = [];
  do {
    const place = start;
    const sign = takeSign() ?? 'plus';
    terms.push({ sign, expr: readSigned(readProduct), span: { start: place, end: lastEnd } });
    // After `\int\frac{dx}{x}` the integrand is over.
  } while (hasSign() && (context.dx !== 'ends' || variable === null));
  const expr: Expr = isBare && !terms[1] ? terms[0]!.expr : { kind: 'sum', terms, span: span(from) };
  return kind === '|' && context.bars === 0 && barIsScripted() ? readBar(expr, from) : expr;
};

const hasSign = (): boolean => kind === '+' || kind === '-' || kind === '±';

const takeSign = (): TermSign | null => (hasSign() ? (next().text as TermSign) : null);

/** A second sign, as in `3--2` and `2\cdot-3`, makes a term of its own. */
export const readSigned = (read: Read): Expr => {
  const from = start;
  const sign = takeSign();
  return sign
    ? signed(
        sign,
        from,
        deeper(() => readSigned(read)),
      )
    : read();
};

/** One term with its sign as an expression of its own, that ends here. */
export const signed = (sign: TermSign, from: number, expr: Expr): Expr => {
  const place = span(from);
  return { kind: 'sum', terms: [{ sign, expr, span: place }], span: place };
};

/** `F|_a^b` without a `\left.`: the whole sum is meant, or only its last term. */
const readBar = (expr: Expr, from: number): Expr => {
  const isLast = expr.kind === 'sum' && expr.terms[1] && choose('evaluated');
  next();
  if (!isLast) return readEvaluation(expr, from);
  const last = expr.terms.at(-1)!;
  const operand = readEvaluation(last.expr, last.expr.span.start);
  const term = { ...last, expr: operand, span: { start: last.span.start, end: lastEnd } };
  return { ...expr, terms: [...expr.terms.slice(0, -1), term], span: span(from) };
};

/** The `_a^b` after an evaluation bracket or bar; the bracket itself was taken. */
export const readEvaluation = (operand: Expr, from: number): Expr => {
  const [lower, upper] = readScripts(readBound, readBound);
  const to = upper ?? lower ?? fail('bound');
  return {
    kind: 'evaluated',
    operand,
    variable: lower?.variable ?? to.variable,
    from: upper && lower && lower.value,
    to: to.value,
    span: span(from),
  };
};

interface Bound {
  readonly variable: string | null;
  readonly value: Expr;
}

const readBound = (): Bound => {
  if (!ahead(/\{a=/y)) return { variable: null, value: readExponent() };
  const variable = peek(1).text;
  skip(3);
  return { variable, value: enclosed('}', sum) };
};

/** Factors and divisions, from left to right. */
export const readProduct = (from = start, first = readFactor()): Expr => {
  let run = startRun(first);
  let levels = depth;
  for (;;) {
    const { gap } = token;
    if (is('$)+-=')) return productOf(run, from);
    if (kind === '*') {
      const join = next().text as Join;
      if (context.dx === 'ends' && atDifferential()) return productOf(run, from);
      addFactor(run, readSigned(readFactor), join);
    } else if (kind === '/' || kind === ':') {
      levels += 1;
      checkDepth(levels);
      const numerator = productOf(run, from);
      const written = next().text === 'slash' ? 'slash' : 'divide';
      run = startRun({ kind: 'quotient', numerator, denominator: readDivisor(), written, span: span(from) });
    } else if (kind === '{' && takeAll(/\{\}/y)) continue;
    else if (!startsFactor() && !(kind === '|' && opensInnerBar())) return productOf(run, from);
    else if (context.dx === 'held' && atDifferential()) takeDifferential();
    else addFactor(run, readFactor(), 'implicit', gap);
  }
};

/** `|a|b|c|`: the second bar may also open an inner pair. */
const opensInnerBar = (): boolean => {
  const after = peek(1).kind;
  return token.side === '' && context.bars === 1 && after !== '|' && !!atoms[after] && choose('bars');
};

const readFactor = (): Expr =>
  context.dx === 'held' && atDifferential() ? behindDifferential(readFactor) : readPower();

type Join = ProductExpr['joins'][number];

/** One product while it is read. */
export interface Run {
  readonly factors: Expr[];
  readonly joins: Join[];
}

export const startRun = (first: Expr): Run => {
  if (first.kind !== 'product' || first.bracketed) return { factors: [first], joins: [] };
  return { factors: [...first.factors], joins: [...first.joins] };
};

/** A product without brackets of its own goes on with its factors. */
const append = ({ factors, joins }: Run, expr: Expr): void => {
  if (expr.kind === 'product' && !expr.bracketed) {
    factors.push(...expr.factors);
    joins.push(...expr.joins);
  } else factors.push(expr);
};

/** `gap`: a space parts the factor from the one before it. */
export const addFactor = (run: Run, expr: Expr, join: Join = 'implicit', gap = false): void => {
  const { factors, joins } = run;
  const last = factors.at(-1)!;
  if (join === 'implicit') {
    const mixed = gap ? null : mixedNumber(last, expr);
    if (mixed) return void factors.splice(-1, 1, mixed);
    if (isDivided(last)) flag('slash-product');
    if (expr.kind === 'number' && last.kind === 'number' && !expr.bracketed && !last.bracketed)
      fail('product', expr.span);
  }
  joins.push(join);
  append(run, expr);
};

/** Written with a sign of division, so that what stands directly after it may or may not belong to it. */
export const isDivided = (expr: Expr): boolean =>
  expr.kind === 'quotient' && expr.written !== 'fraction' && !expr.bracketed;

/** The run as one expression. */
export const productOf = ({ factors, joins }: Run, from: number): Expr =>
  factors[1] ? { kind: 'product', factors, joins, span: span(from) } : factors[0]!;

/** `1/2x`: the divisor with what stands directly beside it, where that belongs to it. */
const readDivisor = (): Expr => {
  const from = start;
  const first = readSigned(readFactor);
  const run = startRun(first);
  if (startsFactor() && ((is('F') && !token.gap && first.kind === 'number') || choose('slash'))) {
    do {
      const { gap } = token;
      addFactor(run, readFactor(), 'implicit', gap);
    } while (startsFactor());
  }
  return productOf(run, from);
};
