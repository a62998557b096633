import type { Expr } from '../../../shared/maths/expression.ts';
import { lettersOf } from '../../../shared/maths/letters.ts';
import { sameExpr } from '../../../shared/maths/same.ts';
import { childrenOf } from '../../../shared/maths/walk.ts';
import type { Evidence } from '../../../shared/schemas/verdict.ts';
import { rational } from '../numbers/rational.ts';
import type { CompareStatement } from '../statements/statement.ts';
import {
  differenceExpr,
  fromTerms,
  numberExpr,
  powerExpr,
  productExpr,
  quotientExpr,
  termsOf,
  type SignedTerm,
} from './build-expr.ts';

export interface DerivedEquation {
  readonly operation: NonNullable<Evidence['operation']>;
  readonly statement: CompareStatement;
}

/** What an equation becomes by one of the operations that may gain solutions (rule 3). */
export function deriveEquations(equation: CompareStatement): DerivedEquation[] {
  const terms = termsOf(differenceExpr(equation.left, equation.right));
  // Without roots, bars and logarithms only the sides as they stand are worth raising.
  if (!hasRootOrBar(equation.left) && !hasRootOrBar(equation.right)) {
    return [...raisedEquations(equation, []), ...clearedEquation(terms), ...withoutLogarithms(terms)];
  }
  return [...raisedEquations(equation, terms), ...clearedEquation(terms), ...withoutLogarithms(terms)];
}

function equate(left: Expr, right: Expr): CompareStatement {
  return { kind: 'compare', left, sign: '=', right };
}

function zeroExpr(): Expr {
  return numberExpr(rational(0));
}

/** Both sides to one power, as they stand and with each root or bar alone on its side. */
function raisedEquations(equation: CompareStatement, terms: readonly SignedTerm[]): DerivedEquation[] {
  const sides: [Expr, Expr][] = [[equation.left, equation.right]];
  terms.forEach((term, k) => {
    if (!hasRootOrBar(term.expr) && terms.length > 4) return;
    const rest = terms.filter((_, j) => j !== k).map((t) => ({ ...t, negative: !t.negative }));
    sides.push([fromTerms([term]), fromTerms(rest)]);
  });
  return sides.flatMap(([left, right]) =>
    [2, 4].map((n): DerivedEquation => {
      return { operation: 'power', statement: equate(raised(left, n), raised(right, n)) };
    }),
  );
}

/** An expression to an even power; a root of a product's or quotient's parts goes away together with its domain. */
function raised(expr: Expr, n: number): Expr {
  switch (expr.kind) {
    case 'root': {
      const degree = expr.degree === null ? 2 : Number(constantDegree(expr.degree));
      return n % degree === 0 ? powerExpr(expr.radicand, rational(n / degree)) : powerExpr(expr, rational(n));
    }
    case 'product':
      return productExpr(expr.factors.map((factor) => raised(factor, n)));
    case 'quotient':
      return quotientExpr(raised(expr.numerator, n), raised(expr.denominator, n));
    case 'sum':
      return expr.terms.length === 1 ? raised((expr.terms[0] as { expr: Expr }).expr, n) : powerExpr(expr, rational(n));
    default:
      return powerExpr(expr, rational(n));
  }
}

function constantDegree(expr: Expr): bigint {
  return expr.kind === 'number' && expr.denominator === 1n && expr.numerator > 1n ? expr.numerator : 7n;
}

function hasRootOrBar(expr: Expr): boolean {
  if (expr.kind === 'root' || (expr.kind === 'call' && expr.name === 'abs')) return true;
  if (expr.kind === 'power' && expr.exponent.kind !== 'number' && lettersOf(expr.exponent).length === 0) return true;
  return childrenOf(expr).some(hasRootOrBar);
}

/** All terms over one denominator, which is then dropped. */
export function clearedEquation(terms: readonly SignedTerm[]): DerivedEquation[] {
  const parts = terms.map((term) => splitQuotient(term.expr));
  const denominators: Expr[] = [];
  for (const { below } of parts)
    for (const d of below) if (!denominators.some((e) => sameExpr(e, d))) denominators.push(d);
  if (denominators.length === 0 || denominators.length > 6) return [];
  const cleared = parts.map(({ above, below }, k): SignedTerm => {
    const others = denominators.filter((d) => !below.some((b) => sameExpr(b, d)));
    return { negative: (terms[k] as SignedTerm).negative, expr: productExpr([...above, ...others]) };
  });
  return [{ operation: 'multiply', statement: equate(fromTerms(cleared), zeroExpr()) }];
}

function splitQuotient(expr: Expr): { above: Expr[]; below: Expr[] } {
  if (expr.kind === 'quotient') {
    const top = splitQuotient(expr.numerator);
    return { above: top.above, below: [...top.below, expr.denominator] };
  }
  if (expr.kind !== 'product') return { above: [expr], below: [] };
  const parts = expr.factors.map(splitQuotient);
  return { above: parts.flatMap((p) => p.above), below: parts.flatMap((p) => p.below) };
}

interface Logarithm {
  readonly argument: Expr;
  readonly times: bigint;
}

/** A sum of whole multiples of logarithms to one base and other terms, written without the logarithms. */
function withoutLogarithms(terms: readonly SignedTerm[]): DerivedEquation[] {
  const logs: Logarithm[] = [];
  const rest: SignedTerm[] = [];
  let base: Expr | 'e' | 'ten' | null = null;
  for (const term of terms) {
    const log = toLogarithm(term);
    if (!log) {
      rest.push(term);
      continue;
    }
    if (base !== null && !sameBase(base, log.base)) return [];
    base = log.base;
    logs.push(log);
  }
  if (base === null) return [];
  const side = (wanted: 1 | -1): Expr[] =>
    logs
      .filter((log) => (log.times > 0n ? 1 : -1) === wanted)
      .map((log) => powerExpr(log.argument, rational(log.times < 0n ? -log.times : log.times)));
  const constant = rest.length === 0 ? [] : [raiseBase(base, fromTerms(rest))];
  const statement = equate(productExpr([...side(1), ...constant]), productExpr(side(-1)));
  return [{ operation: 'logarithm', statement }];
}

function toLogarithm(term: SignedTerm): (Logarithm & { base: Expr | 'e' | 'ten' }) | null {
  const sign = term.negative ? -1n : 1n;
  const { expr } = term;
  if (expr.kind === 'call' && expr.name === 'ln' && expr.args[0])
    return { argument: expr.args[0], times: sign, base: 'e' };
  if (expr.kind === 'log') return { argument: expr.argument, times: sign, base: expr.base ?? 'ten' };
  if (expr.kind === 'product' && expr.factors.length === 2) {
    const [factor, inner] = expr.factors as [Expr, Expr];
    const log = toLogarithm({ negative: term.negative, expr: inner });
    if (log && factor.kind === 'number' && factor.denominator === 1n)
      return { ...log, times: log.times * factor.numerator };
  }
  return null;
}

function sameBase(a: Expr | 'e' | 'ten', b: Expr | 'e' | 'ten'): boolean {
  if (typeof a === 'string' || typeof b === 'string') return a === b;
  return sameExpr(a, b);
}

function raiseBase(base: Expr | 'e' | 'ten', exponent: Expr): Expr {
  const span = { start: 0, end: 0 };
  if (base === 'e') return { kind: 'call', name: 'exp', args: [exponent], span };
  return { kind: 'power', base: base === 'ten' ? numberExpr(rational(10)) : base, exponent, span };
}
