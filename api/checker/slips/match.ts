import type { Expr, Term } from '../../../shared/maths/expression.ts';
import { sameExpr } from '../../../shared/maths/same.ts';
import { neg, product, sum, whole } from '../evidence/build.ts';

/** What the letters of a pattern stand for. */
export type Bindings = ReadonlyMap<string, Expr>;

const nothing: Bindings = new Map();

/** Letters of patterns that stand for numbers only; every other letter stands for anything. */
const numberNames: ReadonlySet<string> = new Set(['k', 'm', 'n', 'p', 'q']);

/** All ways in which a whole expression is an instance of a pattern: sums and products in any order and grouping. */
export function* matchExpr(pattern: Expr, expr: Expr, bound: Bindings = nothing): Generator<Bindings> {
  if (pattern.kind === 'letter') {
    const next = bind(pattern.name, expr, bound);
    if (next) yield next;
    return;
  }
  if (pattern.kind === 'sum') yield* matchSum(pattern.terms, expr, bound);
  else if (pattern.kind === 'product') yield* matchProduct(pattern.factors, expr, bound);
  else if (pattern.kind === 'quotient') {
    if (expr.kind === 'quotient' && (pattern.written !== 'divide' || expr.written !== 'fraction'))
      yield* matchAll([pattern.numerator, pattern.denominator], [expr.numerator, expr.denominator], bound);
  } else if (pattern.kind === 'power') {
    if (expr.kind === 'power') yield* matchAll([pattern.base, pattern.exponent], [expr.base, expr.exponent], bound);
  } else if (pattern.kind === 'root') {
    if (expr.kind === 'root' && (pattern.degree === null) === (expr.degree === null)) {
      const parts = [pattern.radicand, ...(pattern.degree ? [pattern.degree] : [])];
      yield* matchAll(parts, [expr.radicand, ...(expr.degree ? [expr.degree] : [])], bound);
    }
  } else if (pattern.kind === 'call') {
    if (expr.kind === 'call' && expr.name === pattern.name) yield* matchAll(pattern.args, expr.args, bound);
  } else if (pattern.kind === 'log') {
    const hasBase = pattern.base !== null;
    if (expr.kind === 'log' && hasBase === (expr.base !== null)) {
      yield* matchAll(
        [pattern.argument, ...(pattern.base ? [pattern.base] : [])],
        [expr.argument, ...(expr.base ? [expr.base] : [])],
        bound,
      );
    }
  } else if (sameExpr(pattern, expr)) yield bound;
}

function* matchAll(patterns: readonly Expr[], exprs: readonly Expr[], bound: Bindings): Generator<Bindings> {
  const [pattern, ...others] = patterns;
  const [expr, ...rest] = exprs;
  if (!pattern || !expr) {
    if (!pattern && !expr) yield bound;
    return;
  }
  for (const next of matchExpr(pattern, expr, bound)) yield* matchAll(others, rest, next);
}

function bind(name: string, expr: Expr, bound: Bindings): Bindings | null {
  const found = bound.get(name);
  if (found) return sameExpr(found, expr) ? bound : null;
  if (numberNames.has(name) && !isNumber(expr)) return null;
  return new Map(bound).set(name, expr);
}

export function isNumber(expr: Expr): boolean {
  if (expr.kind === 'number') return true;
  if (expr.kind === 'quotient') return expr.numerator.kind === 'number' && expr.denominator.kind === 'number';
  const [only] = expr.kind === 'sum' && expr.terms.length === 1 ? expr.terms : [];
  return only?.sign === 'minus' && isNumber(only.expr);
}

/** One term of a pattern against some terms of a sum. A minus in the pattern wants a minus in the line. */
export function* matchTerm(pattern: Term, terms: readonly Term[], bound: Bindings): Generator<Bindings> {
  const [first] = terms;
  if (!first || terms.some((term) => term.sign !== 'plus' && term.sign !== 'minus')) return;
  if (pattern.sign === 'minus') {
    if (first.sign !== 'minus') return;
    if (terms.length === 1) yield* matchExpr(pattern.expr, first.expr, bound);
    else
      yield* matchExpr(
        pattern.expr,
        sum(...terms.map((term) => (term.sign === 'minus' ? term.expr : neg(term.expr)))),
        bound,
      );
    return;
  }
  if (pattern.expr.kind === 'letter') {
    yield* matchExpr(pattern.expr, sum(...terms.map(signed)), bound);
    return;
  }
  if (terms.length === 1)
    yield* matchExpr(pattern.expr, first.sign === 'minus' ? withNegativeNumber(first.expr) : first.expr, bound);
}

function signed(term: Term): Expr {
  return term.sign === 'minus' ? neg(term.expr) : term.expr;
}

/** -3x as (-3) x, so that the sign goes with the number. */
function withNegativeNumber(expr: Expr): Expr {
  if (isNumber(expr)) return neg(expr);
  const [first, ...rest] = expr.kind === 'product' ? expr.factors : [whole(1), expr];
  const factors =
    first && isNumber(first) ? [neg(first), ...rest] : [neg(whole(1)), ...(first ? [first] : []), ...rest];
  return { kind: 'product', factors, joins: factors.slice(1).map(() => 'implicit' as const), span: expr.span };
}

function* matchSum(pattern: readonly Term[], expr: Expr, bound: Bindings): Generator<Bindings> {
  if (expr.kind !== 'sum' || expr.terms.length < pattern.length) return;
  if (pattern.length > 1 && expr.terms.length === 1) return;
  for (const groups of groupings(expr.terms, pattern.length)) yield* matchTerms(pattern, groups, bound);
}

export function* matchTerms(
  pattern: readonly Term[],
  groups: readonly (readonly Term[])[],
  bound: Bindings,
): Generator<Bindings> {
  const [term, ...others] = pattern;
  const [group, ...rest] = groups;
  if (!term || !group) {
    yield bound;
    return;
  }
  for (const next of matchTerm(term, group, bound)) yield* matchTerms(others, rest, next);
}

function* matchProduct(pattern: readonly Expr[], expr: Expr, bound: Bindings): Generator<Bindings> {
  const factors = factorsOf(expr);
  for (const groups of groupings(factors, pattern.length)) yield* matchFactors(pattern, groups, bound);
  const [first, ...others] = pattern;
  // A coefficient of 1 is not written.
  if (first?.kind === 'letter' && numberNames.has(first.name) && !factors.some(isNumber)) {
    const next = bind(first.name, whole(1), bound);
    if (next) yield* others.length === 1 ? matchExpr(others[0] as Expr, expr, next) : matchProduct(others, expr, next);
  }
}

export function* matchFactors(
  pattern: readonly Expr[],
  groups: readonly (readonly Expr[])[],
  bound: Bindings,
): Generator<Bindings> {
  const [factor, ...others] = pattern;
  const [group, ...rest] = groups;
  if (!factor || !group) {
    yield bound;
    return;
  }
  const single = group.length === 1 ? (group[0] as Expr) : product(...group);
  for (const next of matchExpr(factor, single, bound)) yield* matchFactors(others, rest, next);
}

export function factorsOf(expr: Expr): readonly Expr[] {
  return expr.kind === 'product' ? expr.factors.flatMap(factorsOf) : [expr];
}

const mostParts = 6;

/** All orders where there are as many items as groups, else runs of neighbours, in either order for two groups. */
function groupings<T>(items: readonly T[], count: number): (readonly T[])[][] {
  if (items.length < count || items.length > mostParts) return [];
  if (items.length === count) {
    return ordersOf(count).map((order) => order.map((k) => [items[k] as T]));
  }
  if (count === 1) return [[items]];
  if (count > 2) return [];
  const cuts = items.slice(1).map((_, k) => [items.slice(0, k + 1), items.slice(k + 1)]);
  const singles = items.map((item, k) => [[item], items.filter((_, other) => other !== k)]);
  return [...cuts, ...cuts.map(([a, b]) => [b as readonly T[], a as readonly T[]]), ...singles.slice(1)];
}

const knownOrders = new Map<number, readonly (readonly number[])[]>();

function ordersOf(count: number): readonly (readonly number[])[] {
  const known = knownOrders.get(count);
  if (known) return known;
  const found = permutations(Array.from({ length: count }, (_, k) => k));
  knownOrders.set(count, found);
  return found;
}

export function permutations<T>(items: readonly T[]): T[][] {
  if (items.length <= 1) return [[...items]];
  return items.flatMap((item, k) =>
    permutations(items.filter((_, other) => other !== k)).map((rest) => [item, ...rest]),
  );
}

/** The pattern with its letters replaced by what they stand for. */
export function fill(pattern: Expr, bound: Bindings): Expr {
  switch (pattern.kind) {
    case 'letter':
      return bound.get(pattern.name) ?? pattern;
    case 'sum':
      return sum(
        ...pattern.terms.map(({ sign, expr }) => (sign === 'minus' ? neg(fill(expr, bound)) : fill(expr, bound))),
      );
    case 'product':
      return product(...pattern.factors.map((factor) => fill(factor, bound)));
    case 'quotient':
      return {
        ...pattern,
        written: 'fraction',
        numerator: fill(pattern.numerator, bound),
        denominator: fill(pattern.denominator, bound),
      };
    case 'power':
      return { ...pattern, base: fill(pattern.base, bound), exponent: fill(pattern.exponent, bound) };
    case 'root':
      return {
        ...pattern,
        degree: pattern.degree && fill(pattern.degree, bound),
        radicand: fill(pattern.radicand, bound),
      };
    case 'call':
      return { ...pattern, args: pattern.args.map((arg) => fill(arg, bound)) };
    case 'log':
      return { ...pattern, base: pattern.base && fill(pattern.base, bound), argument: fill(pattern.argument, bound) };
    default:
      return pattern;
  }
}
