import type { Expr, SumExpr } from '../../../shared/maths/expression.ts';
import { readLine } from '../../../shared/maths/read.ts';
import { childrenOf } from '../../../shared/maths/walk.ts';
import { neg, product, sum } from '../evidence/build.ts';
import { withChild } from '../evidence/only-difference.ts';
import { bitOf, kindsWithin } from './kinds-within.ts';
import { factorsOf, fill, matchExpr, matchFactors, matchTerms, type Bindings } from './match.ts';

/** A wrong rule: what a part of a line becomes under it, in all the ways in which it applies there. */
export interface Rewrite {
  (part: Expr): Iterable<Expr>;
  /** Kinds of which a part has some where the rule applies, as in kinds-within.ts; looked at before anything else. */
  readonly needs?: number;
}

/** A rule that applies only to parts in which there is some of a kind. */
export function needing(kind: Parameters<typeof bitOf>[0], rewrite: (part: Expr) => Iterable<Expr>): Rewrite {
  return Object.assign(rewrite, { needs: bitOf(kind) });
}

/** A rule written as two pieces of TeX; letters stand for anything, k, m, n, p and q for numbers. */
export function rule(from: string, to: string, accepts: (bound: Bindings) => boolean = () => true): Rewrite {
  const pattern = toExpr(from);
  const result = toExpr(to);
  function* instancesIn(part: Expr): Generator<Expr> {
    for (const { bound, rebuild } of instances(pattern, part)) {
      if (accepts(bound)) yield rebuild(fill(result, bound));
    }
  }
  const rewrite = (part: Expr): Iterable<Expr> => (mayMatch(pattern, part) ? instancesIn(part) : none);
  return Object.assign(rewrite, { needs: kindsWithin(pattern) });
}

const none: readonly Expr[] = [];

/** A product may be found in anything, for a coefficient of 1 is not written; the rest only among its own kind. */
function mayMatch(pattern: Expr, part: Expr): boolean {
  if (pattern.kind === 'product') return part.kind === 'product' || pattern.factors[0]?.kind === 'letter';
  return pattern.kind === part.kind || pattern.kind === 'letter';
}

function toExpr(tex: string): Expr {
  const reading = readLine(tex);
  if (!reading.ok || reading.line.kind !== 'expression') throw new Error(`not a pattern: ${tex}`);
  return reading.line.expr;
}

interface Instance {
  readonly bound: Bindings;
  readonly rebuild: (replaced: Expr) => Expr;
}

const mostTerms = 9;

/** A pattern that is a sum or a product may also be found among the terms or factors, the others staying. */
function* instances(pattern: Expr, part: Expr): Generator<Instance> {
  if (pattern.kind === 'sum' && part.kind === 'sum') yield* amongTerms(pattern, part);
  else for (const bound of matchExpr(pattern, part)) yield { bound, rebuild: (replaced) => replaced };
  if (pattern.kind === 'product' && part.kind === 'product') yield* amongFactors(pattern.factors, part);
}

function* amongTerms(pattern: SumExpr, part: SumExpr): Generator<Instance> {
  const { terms } = part;
  if (terms.length > mostTerms || terms.length < pattern.terms.length) return;
  for (const picked of tuples(terms.length, pattern.terms.length)) {
    const groups = picked.map((k) => [terms[k] as SumExpr['terms'][number]]);
    const place = Math.min(...picked);
    for (const bound of matchTerms(pattern.terms, groups, new Map())) {
      const rebuild = (replaced: Expr): Expr =>
        sum(
          ...terms.flatMap((term, k) =>
            k === place ? [replaced] : picked.includes(k) ? [] : [term.sign === 'minus' ? neg(term.expr) : term.expr],
          ),
        );
      yield { bound, rebuild };
    }
  }
}

function* amongFactors(pattern: readonly Expr[], part: Expr): Generator<Instance> {
  const factors = factorsOf(part);
  if (factors.length > mostTerms || factors.length <= pattern.length) return;
  for (const picked of tuples(factors.length, pattern.length)) {
    const place = Math.min(...picked);
    for (const bound of matchFactors(
      pattern,
      picked.map((k) => [factors[k] as Expr]),
      new Map(),
    )) {
      const rebuild = (replaced: Expr): Expr =>
        product(...factors.flatMap((f, k) => (k === place ? [replaced] : picked.includes(k) ? [] : [f])));
      yield { bound, rebuild };
    }
  }
}

const knownTuples = new Map<number, readonly (readonly number[])[]>();

/** Ordered choices of `size` different indices below `count`. */
function tuples(count: number, size: number): readonly (readonly number[])[] {
  const key = count * 16 + size;
  const known = knownTuples.get(key);
  if (known) return known;
  const found: readonly (readonly number[])[] =
    size === 0
      ? [[]]
      : tuples(count, size - 1).flatMap((picked) =>
          Array.from({ length: count }, (_, k) => k)
            .filter((k) => !picked.includes(k))
            .map((k) => [...picked, k]),
        );
  knownTuples.set(key, found);
  return found;
}

/** The whole expression under a rule used once, at any of its parts. */
export function everywhere(expr: Expr, rewrite: Rewrite): Iterable<Expr> {
  const needs = rewrite.needs ?? 0;
  return (kindsWithin(expr) & needs) === needs ? within(expr, rewrite, needs) : none;
}

/** No rule is one on a number or letter by itself. */
function isLeaf({ kind }: Expr): boolean {
  return kind === 'number' || kind === 'letter';
}

function* within(expr: Expr, rewrite: Rewrite, needs: number): Generator<Expr> {
  yield* rewrite(expr);
  for (const [place, part] of childrenOf(expr).entries()) {
    if ((kindsWithin(part) & needs) !== needs || isLeaf(part)) continue;
    for (const changed of within(part, rewrite, needs)) yield withChild(expr, place, changed);
  }
}
