import type { Expr, ProductExpr, QuotientExpr, Term, TermSign } from './expression.ts';
import { readExponent } from './read-arguments.ts';
import { mixedNumber } from './read-numbers.ts';
import { numberOf, outer, READ_LIMITS, type Reader } from './reader.ts';

const SIGNS: Partial<Record<string, TermSign>> = { '+': 'plus', '-': 'minus', pm: 'plusminus', mp: 'minusplus' };

/** Terms joined by signs. */
export function readSum(reader: Reader): Expr {
  const start = reader.token.start;
  const terms: Term[] = [];
  const only = SIGNS[reader.token.kind] === undefined ? readProduct(reader) : null;
  if (only && SIGNS[reader.token.kind] === undefined) return withBar(reader, only, start);
  if (only) terms.push({ sign: 'plus', expr: only, span: { start, end: reader.lastEnd } });
  for (;;) {
    const sign = SIGNS[reader.token.kind];
    if (sign === undefined || doneWithIntegrand(reader)) break;
    const from = reader.next().start;
    terms.push({ sign, expr: readSigned(reader), span: { start: from, end: reader.lastEnd } });
  }
  const sum: Expr = terms.length === 1 && only ? only : { kind: 'sum', terms, span: reader.span(start) };
  return withBar(reader, sum, start);
}

/** After `\int\frac{dx}{x}` the integrand is over. */
function doneWithIntegrand(reader: Reader): boolean {
  return reader.context.endsAtDifferential && reader.differential.variable !== null;
}

/** A second sign, as in `3--2`, makes a term of its own. */
function readSigned(reader: Reader): Expr {
  const { token } = reader;
  const sign = SIGNS[token.kind];
  if (sign === undefined) return readProduct(reader);
  reader.enter();
  reader.next();
  const expr = readSigned(reader);
  reader.leave();
  const span = reader.span(token.start);
  return { kind: 'sum', terms: [{ sign, expr, span }], span };
}

/** `F|_a^b` without a `\left.`: the whole sum is meant, or only its last term. */
function withBar(reader: Reader, expr: Expr, start: number): Expr {
  if (!reader.is('|') || !reader.barIsScripted() || reader.context.bars > 0) return expr;
  if (expr.kind === 'sum' && expr.terms.length > 1 && reader.choose('evaluated')) {
    const last = expr.terms[expr.terms.length - 1]!;
    reader.next();
    const operand = readEvaluation(reader, last.expr, last.expr.span.start);
    const terms = [
      ...expr.terms.slice(0, -1),
      { ...last, expr: operand, span: { start: last.span.start, end: reader.lastEnd } },
    ];
    return { ...expr, terms, span: reader.span(start) };
  }
  reader.next();
  return readEvaluation(reader, expr, start);
}

/** The `_a^b` after an evaluation bracket or bar; the bracket itself was taken. */
export function readEvaluation(reader: Reader, operand: Expr, start: number): Expr {
  let lower: Bound | null = null;
  let upper: Bound | null = null;
  while (reader.is('_') || reader.is('^')) {
    const below = reader.next().kind === '_';
    if (below ? lower : upper) reader.fail('extra-bracket', []);
    const bound = readBound(reader);
    if (below) lower = bound;
    else upper = bound;
  }
  const to = upper ?? lower;
  if (!to) return reader.fail('missing-operand', ['_']);
  return {
    kind: 'evaluated',
    operand,
    variable: lower?.variable ?? upper?.variable ?? null,
    from: upper ? (lower?.value ?? null) : null,
    to: to.value,
    span: reader.span(start),
  };
}

interface Bound {
  readonly variable: string | null;
  readonly value: Expr;
}

function readBound(reader: Reader): Bound {
  let variable: string | null = null;
  if (reader.is('{') && reader.peek(1).kind === 'letter' && reader.peek(2).kind === '=') {
    reader.next();
    variable = reader.next().text;
    reader.next();
    const value = reader.inside(reader.grammar.sum);
    reader.expect('}', 'missing-bracket', '}');
    return { variable, value };
  }
  return { variable, value: readExponent(reader) };
}

/** Factors and divisions, from left to right. */
export function readProduct(reader: Reader, first?: Expr): Expr {
  const start = first ? outer(first).start : reader.token.start;
  const run = new ProductRun(reader, start);
  run.add(first ?? readFactor(reader), 'implicit', false);
  for (;;) {
    const { token } = reader;
    switch (token.kind) {
      case '*':
      case 'x':
        reader.next();
        if (reader.context.endsAtDifferential && reader.is('letter') && reader.atDifferential()) return run.finish();
        run.add(readSignedFactor(reader), token.kind === '*' ? 'dot' : 'times', false);
        break;
      case '/':
      case 'div':
      case ':':
        run.divide(token.kind === '/' ? 'slash' : 'divide');
        break;
      default:
        if (token.kind === '{' && reader.peek(1).kind === '}') {
          reader.next();
          reader.next();
          break;
        }
        if (opensInnerBar(reader)) {
          run.add(readFactor(reader), 'implicit', token.gap);
          break;
        }
        if (!reader.startsFactor()) return run.finish();
        if (reader.context.holdsDifferential && token.kind === 'letter' && reader.atDifferential()) {
          takeDifferential(reader);
          break;
        }
        run.add(readFactor(reader), 'implicit', token.gap);
    }
  }
}

/** `|a|b|c|`: the second bar may also open an inner pair. */
function opensInnerBar(reader: Reader): boolean {
  if (!reader.is('|') || reader.token.side !== '' || reader.context.bars !== 1) return false;
  const after = reader.peek(1);
  if (after.kind === '|' || reader.grammar.atoms[after.kind] === undefined) return false;
  return reader.choose('bars');
}

/** The d and the letter after it. */
export function takeDifferential(reader: Reader): void {
  reader.next();
  reader.differential.variable = reader.next().text;
}

function readSignedFactor(reader: Reader): Expr {
  const { token } = reader;
  const sign = SIGNS[token.kind];
  if (sign === undefined) return readFactor(reader);
  reader.enter();
  reader.next();
  const expr = readSignedFactor(reader);
  reader.leave();
  const span = reader.span(token.start);
  return { kind: 'sum', terms: [{ sign, expr, span }], span };
}

function readFactor(reader: Reader): Expr {
  const { token } = reader;
  if (reader.context.holdsDifferential && token.kind === 'letter' && reader.atDifferential()) {
    takeDifferential(reader);
    return reader.startsFactor() ? readFactor(reader) : numberOf(reader.span(token.start), 1n);
  }
  return reader.grammar.power(reader);
}

/** One product while it is read: factors so far, folded into a quotient at each division. */
class ProductRun {
  private factors: Expr[] = [];
  private joins: ('implicit' | 'dot' | 'times')[] = [];
  private divisions = 0;
  /** The last division by a slash, which what stands directly after it may or may not belong to. */
  private slashed: Expr | null = null;
  private readonly reader: Reader;
  private readonly start: number;

  constructor(reader: Reader, start: number) {
    this.reader = reader;
    this.start = start;
  }

  add(expr: Expr, join: 'implicit' | 'dot' | 'times', gap: boolean): void {
    const last = this.factors[this.factors.length - 1];
    if (last !== undefined) {
      const mixed = join === 'implicit' && !gap ? mixedNumber(this.reader, last, expr) : null;
      if (mixed) {
        this.factors[this.factors.length - 1] = mixed;
        return;
      }
      if (join === 'implicit') this.checkBeside(last, expr);
      this.joins.push(join);
    }
    if (expr.kind === 'product' && !expr.bracketed) {
      this.factors.push(...expr.factors);
      this.joins.push(...expr.joins);
    } else this.factors.push(expr);
  }

  private checkBeside(last: Expr, expr: Expr): void {
    if (last === this.slashed) this.reader.flags.add('slash-product');
    if (expr.kind === 'number' && last.kind === 'number' && !expr.bracketed && !last.bracketed) {
      this.reader.fail('bad-number', ['*'], expr.span);
    }
  }

  divide(written: 'slash' | 'divide'): void {
    const { reader } = this;
    this.divisions += 1;
    if (this.divisions + reader.depth > READ_LIMITS.levels) reader.fail('too-deep', []);
    const numerator = this.finish();
    reader.next();
    const first = readSignedFactor(reader);
    const denominator = this.takesMore(first) ? this.juxtaposed(first) : first;
    const quotient: QuotientExpr = { kind: 'quotient', numerator, denominator, written, span: reader.span(this.start) };
    this.factors = [quotient];
    this.joins = [];
    this.slashed = quotient;
  }

  private takesMore(denominator: Expr): boolean {
    const { reader } = this;
    if (!reader.startsFactor()) return false;
    const isMixed = reader.is('frac') && !reader.token.gap && denominator.kind === 'number';
    return isMixed || reader.choose('slash');
  }

  /** All that stands directly beside the divisor, read as one product. */
  private juxtaposed(first: Expr): Expr {
    const { reader } = this;
    const run = new ProductRun(reader, outer(first).start);
    run.add(first, 'implicit', false);
    while (reader.startsFactor()) {
      const { gap } = reader.token;
      run.add(readFactor(reader), 'implicit', gap);
    }
    return run.finish();
  }

  finish(): Expr {
    const { factors, joins } = this;
    if (factors.length === 1) return factors[0]!;
    const product: ProductExpr = { kind: 'product', factors, joins, span: this.reader.span(this.start) };
    return product;
  }
}
