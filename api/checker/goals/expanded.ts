import type { Expr } from '../../../shared/maths/expression.ts';
import { childrenOf } from '../../../shared/maths/walk.ts';
import { exprLayout } from './layout.ts';

/** A sum of monomials, no two alike (rule 15). */
export function isExpanded(expr: Expr): boolean {
  const terms = expr.kind === 'sum' ? expr.terms.map((term) => term.expr) : [expr];
  const names = terms.map(monomialName);
  return !names.includes(null) && new Set(names).size === names.length;
}

/** The letters and roots of a monomial with their powers, without its number; null for what is no monomial. */
function monomialName(expr: Expr): string | null {
  const powers = new Map<string, bigint>();
  if (!collect(expr, 1n, powers)) return null;
  return [...powers]
    .filter(([, power]) => power !== 0n)
    .map(([name, power]) => `${name}^${power}`)
    .sort()
    .join(' ');
}

function collect(expr: Expr, times: bigint, powers: Map<string, bigint>): boolean {
  switch (expr.kind) {
    case 'number':
      return true;
    case 'letter':
    case 'constant':
      powers.set(expr.name, (powers.get(expr.name) ?? 0n) + times);
      return true;
    case 'product':
      return hasOneNumber(expr.factors) && expr.factors.every((factor) => collect(factor, times, powers));
    case 'quotient':
      return collect(expr.numerator, times, powers) && collect(expr.denominator, -times, powers);
    case 'power':
      return collectPower(expr, times, powers);
    case 'sum':
      return false;
    default: {
      const inner = childrenOf(expr);
      if (expr.kind === 'root' && inner.some((part) => part.kind === 'product' || part.kind === 'power')) return false;
      const name = exprLayout(expr);
      powers.set(name, (powers.get(name) ?? 0n) + times);
      return true;
    }
  }
}

/** 2 times 3 times x is not multiplied out yet. */
function hasOneNumber(factors: readonly Expr[]): boolean {
  return factors.filter((factor) => factor.kind === 'number').length <= 1;
}

function collectPower(expr: Extract<Expr, { kind: 'power' }>, times: bigint, powers: Map<string, bigint>): boolean {
  const { base, exponent } = expr;
  if (exponent.kind === 'number' && exponent.denominator === 1n) {
    // A power of a product or a number is still to be worked out.
    if (base.kind === 'product' || base.kind === 'quotient' || base.kind === 'power' || base.kind === 'number')
      return false;
    return collect(base, times * exponent.numerator, powers);
  }
  if (base.kind === 'sum' || base.kind === 'product') return false;
  const name = exprLayout(expr);
  powers.set(name, (powers.get(name) ?? 0n) + times);
  return true;
}
