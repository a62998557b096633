import type { Expr, SeriesExpr } from '../../../shared/maths/expression.ts';
import { lettersOf } from '../../../shared/maths/letters.ts';
import { sameExpr } from '../../../shared/maths/same.ts';
import { childrenOf } from '../../../shared/maths/walk.ts';
import { compareExpressions } from '../compare/compare-expressions.ts';
import type { Comparison } from '../compare/comparison.ts';
import type { CheckContext } from '../context.ts';
import * as Q from '../numbers/rational.ts';
import {
  addExprs,
  divExprs,
  letterOf,
  mulExprs,
  negateExpr,
  numberOf,
  powExprs,
  rationalOf,
  zeroExpr,
} from './build.ts';
import { isIndexed } from './indexed-letters.ts';
import { isFree, linearIn, polynomialIn } from './integrand.ts';
import { infinitySign } from './limit.ts';
import { carriedOut } from './reduce.ts';
import { convergesAbsolutely, hasRadius } from './sequence-tests.ts';
import { substitute } from './substitute.ts';
import { readableTex, termTex } from './term-tex.ts';

const index = 'j_{0}';
const mostTerms = 8;

/** The terms of a sum to infinity from `start` on, in the common index; `key` says which powers they go by. */
interface OpenSeries {
  readonly key: string;
  readonly start: bigint;
  readonly body: Expr;
  readonly base: Expr | null;
}

interface Parts {
  readonly rest: Expr;
  readonly series: readonly OpenSeries[];
}

/**
 * Two lines with sums to infinity that no table has: equal where they have the same terms, power by power, once the first
 * ones are written out; different where a power of the letter has different factors and all sums converge near zero. Null
 * where there are no such sums, or they are more than multiples in a sum.
 */
export function compareOpenSeries(above: Expr, below: Expr, context: CheckContext): Comparison | null {
  if (![above, below].some(hasOpenSum)) return null;
  const [a, b] = [above, below].map((expr) => partsOf(carriedOut(expr, context)));
  if (!a || !b || a.series.length + b.series.length === 0) return null;
  const within = { ...context, wholeLetters: new Set([...context.wholeLetters, index]) };
  return (
    shiftsOf(a, b)
      .map((shift) => compareTerms(a, { ...b, series: b.series.map((one) => moved(one, shift)) }, within))
      .reduce<Comparison | null>((best, found) => best ?? found, null) ?? lowestDifference(a, b, within)
  );
}

function hasOpenSum(expr: Expr): boolean {
  if (expr.kind === 'series' && expr.operation === 'sum' && infinitySign(expr.to) === 1) return !isIndexed(expr);
  return childrenOf(expr).some(hasOpenSum);
}

function partsOf(expr: Expr): Parts | null {
  if (!hasOpenSum(expr)) return { rest: expr, series: [] };
  switch (expr.kind) {
    case 'series': {
      const one = hasOpenSum(expr.body) ? null : canonical(expr);
      return one && { rest: zeroExpr, series: [one] };
    }
    case 'sum': {
      const parts = expr.terms.map(({ sign, expr: term }) =>
        sign === 'plus' ? partsOf(term) : sign === 'minus' ? scaled(partsOf(term), numberOf(-1)) : null,
      );
      if (!parts.every((part) => part !== null)) return null;
      const known = parts as Parts[];
      return { rest: addExprs(...known.map(({ rest }) => rest)), series: known.flatMap(({ series }) => series) };
    }
    case 'product': {
      const [only, ...more] = expr.factors.filter(hasOpenSum);
      if (!only || more.length > 0) return null;
      return scaled(partsOf(only), mulExprs(...expr.factors.filter((factor) => factor !== only)));
    }
    case 'quotient':
      return hasOpenSum(expr.denominator)
        ? null
        : scaled(partsOf(expr.numerator), divExprs(numberOf(1), expr.denominator));
    default:
      return null;
  }
}

function scaled(parts: Parts | null, factor: Expr): Parts | null {
  if (!parts) return null;
  const series = parts.series.map((one) => indexed(mulExprs(factor, one.body), one.start));
  return { rest: mulExprs(factor, parts.rest), series };
}

function canonical({ index: name, from, body }: SeriesExpr): OpenSeries | null {
  const start = rationalOf(from);
  if (start?.den !== 1n) return null;
  return indexed(substitute(body, name, letterOf(index)), start.num);
}

/** A power series in the letter, where that is 0: its term without the letter. */
export function seriesAtZero(node: SeriesExpr, letter: string): Expr | null {
  const one = canonical(node);
  if (one?.base?.kind !== 'letter' || one.base.name !== letter) return null;
  const exponent = exponentOf(one.body, one.base);
  const first = exponent && rationalOf(substitute(exponent, index, numberOf(one.start)));
  if (!first || Q.sign(first) < 0) return null;
  if (Q.sign(first) > 0) return zeroExpr;
  return substitute(substitute(one.body, letter, numberOf(1)), index, numberOf(one.start));
}

/** Moved so that the powers begin with an exponent below their step. */
function indexed(body: Expr, start: bigint): OpenSeries {
  const base = baseOf(body);
  const exponent = base && exponentOf(body, base);
  const linear = exponent && linearIn(exponent, index);
  const [step, first] = [linear?.slope, linear?.constant].map((part) => (part ? rationalOf(part) : null));
  if (!base || step?.den !== 1n || first?.den !== 1n || step.num < 1n) return { key: 'none', start, body, base: null };
  const shift = Q.floor(Q.div(first, step));
  const key = `${readableTex(base)} ${step.num} ${first.num - shift * step.num}`;
  return { ...moved({ key, start, body, base }, shift), key };
}

/** The same terms, numbered from `shift` more on. */
function moved(one: OpenSeries, shift: bigint): OpenSeries {
  if (shift === 0n) return one;
  const body = substitute(one.body, index, addExprs(letterOf(index), numberOf(-shift)));
  return { ...one, start: one.start + shift, body };
}

/** What is raised to the index and has letters. */
function baseOf(expr: Expr): Expr | null {
  if (
    expr.kind === 'power' &&
    isFree(expr.base, index) &&
    !isFree(expr.exponent, index) &&
    lettersOf(expr.base).length > 0
  )
    return expr.base.kind === 'quotient' && lettersOf(expr.base.denominator).length === 0
      ? expr.base.numerator
      : expr.base;
  if (expr.kind !== 'product' && expr.kind !== 'quotient' && expr.kind !== 'sum') return null;
  for (const part of childrenOf(expr)) {
    const found = baseOf(part);
    if (found) return found;
  }
  return null;
}

/** The exponent of the base in a product; null where it stands elsewhere as well. */
function exponentOf(expr: Expr, base: Expr): Expr | null {
  if (sameExpr(expr, base)) return numberOf(1);
  if (lettersOf(base).every((name) => isFree(expr, name))) return zeroExpr;
  switch (expr.kind) {
    case 'power': {
      const inner = exponentOf(expr.base, base);
      return inner && mulExprs(inner, expr.exponent);
    }
    case 'product': {
      const parts = expr.factors.map((factor) => exponentOf(factor, base));
      return parts.every((part) => part !== null) ? addExprs(...(parts as Expr[])) : null;
    }
    case 'quotient': {
      const [top, bottom] = [exponentOf(expr.numerator, base), exponentOf(expr.denominator, base)];
      return top && bottom && addExprs(top, negateExpr(bottom));
    }
    case 'sum':
      return expr.terms.length === 1 && expr.terms[0] ? exponentOf(expr.terms[0].expr, base) : null;
    default:
      return null;
  }
}

/** Sums without powers of a letter may be numbered in several ways. */
function shiftsOf(a: Parts, b: Parts): bigint[] {
  const [one, other] = [a.series[0], b.series[0]];
  if (a.series.length !== 1 || b.series.length !== 1 || one?.key !== 'none' || other?.key !== 'none') return [0n];
  return [...new Set([0n, one.start - other.start, -1n, 1n, -2n, 2n])];
}

function compareTerms(a: Parts, b: Parts, context: CheckContext): Comparison | null {
  let reached: 'proved' | 'sampled' = 'proved';
  const rests: [Expr[], Expr[]] = [[a.rest], [b.rest]];
  for (const key of new Set([...a.series, ...b.series].map((one) => one.key))) {
    const [upper, lower] = [a, b].map(({ series }) => series.filter((one) => one.key === key)) as [
      OpenSeries[],
      OpenSeries[],
    ];
    // Sums of numbers can be taken apart only where each of them has a value.
    const isApart = key === 'none' && (upper.length > 1 || lower.length > 1);
    if (isApart && ![...upper, ...lower].every((one) => convergesAbsolutely(one.body, index, context))) return null;
    const start = [...upper, ...lower].reduce((most, one) => (one.start > most ? one.start : most), -1000n);
    for (const [k, list] of [upper, lower].entries())
      for (const one of list) {
        if (start - one.start > BigInt(mostTerms)) return null;
        rests[k as 0 | 1].push(...firstTerms(one, start - one.start));
      }
    const [left, right] = [upper, lower].map((list) => addExprs(zeroExpr, ...list.map(({ body }) => body))) as [
      Expr,
      Expr,
    ];
    const found = compareExpressions(left, right, context);
    if (found.kind !== 'equal') return null;
    if (found.reached === 'sampled') reached = 'sampled';
  }
  const rest = compareExpressions(addExprs(...rests[0]), addExprs(...rests[1]), context);
  if (rest.kind === 'equal') return { ...rest, reached: rest.reached === 'sampled' ? 'sampled' : reached };
  return rest.kind === 'different' &&
    [...a.series, ...b.series].every((one) => convergesAbsolutely(one.body, index, context))
    ? rest
    : null;
}

function firstTerms({ body, start }: OpenSeries, count: bigint): Expr[] {
  return Array.from({ length: Number(count) }, (_, k) => substitute(body, index, numberOf(start + BigInt(k))));
}

/** A power of the letter with other factors in one line than in the other. */
function lowestDifference(a: Parts, b: Parts, context: CheckContext): Comparison | null {
  const all = [...a.series, ...b.series];
  const [base] = all.map((one) => one.base);
  const letters = lettersOf(addExprs(a.rest, b.rest, ...all.map(({ body }) => body))).filter((name) => name !== index);
  const [letter] = letters;
  if (base?.kind !== 'letter' || letter !== base.name || letters.length > 1) return null;
  if (!all.every((one) => one.base && sameExpr(one.base, base) && one.start >= 0n)) return null;
  if (!all.every((one) => hasRadius(substitute(one.body, letter, numberOf(1)), index, context))) return null;
  const order = BigInt(mostTerms);
  const lines = [a, b].map(({ rest, series }) =>
    polynomialIn(addExprs(rest, ...series.flatMap((one) => firstTerms(one, order))), letter),
  );
  const [upper, lower] = lines;
  if (!upper || !lower) return null;
  const complete = Number(all.reduce((least, one) => (one.start < least ? one.start : least), order) + order);
  for (let k = 0; k < Math.min(complete, mostTerms); k += 1) {
    const [left, right] = [upper[k] ?? zeroExpr, lower[k] ?? zeroExpr];
    const found = compareExpressions(left, right, context);
    if (found.kind === 'equal') continue;
    if (found.kind !== 'different') return null;
    const power = k === 0 ? numberOf(1) : powExprs(letterOf(letter), numberOf(k));
    const tex = (coef: Expr): string => termTex(coef, power, context);
    return { kind: 'different', witness: { at: new Map(), atTex: {}, above: tex(left), below: tex(right) } };
  }
  return null;
}
