import type { Expr } from '../../../shared/maths/expression.ts';
import type { CheckContext } from '../context.ts';
import { isKnown } from '../values/arithmetic.ts';
import { evaluate } from '../values/evaluate.ts';
import { valueTex } from '../values/value-tex.ts';
import { noValueExpr } from './build.ts';
import { infinitySign } from './limit.ts';
import { lettersOf } from '../../../shared/maths/letters.ts';
import { sameExpr } from '../../../shared/maths/same.ts';

/** What a line is worth where that is not an ordinary value: beyond all bounds, or none at all. */
export type Worth =
  | { readonly kind: 'infinite'; readonly sign: 1 | -1 }
  | { readonly kind: 'none'; readonly sides?: boolean }
  | { readonly kind: 'ordinary'; readonly tex: string | null };

/** Infinities and missing values, of a limit, an integral or a sum by itself, with a sign or a number before it. */
export function worthOf(expr: Expr, context: CheckContext): Worth {
  const sign = infinitySign(expr);
  if (sign !== null) return { kind: 'infinite', sign };
  if (expr.kind === 'sum' && expr.terms.length === 1 && expr.terms[0]) {
    const inner = worthOf(expr.terms[0].expr, context);
    if (inner.kind === 'infinite' && expr.terms[0].sign === 'minus')
      return { kind: 'infinite', sign: inner.sign > 0 ? -1 : 1 };
    if (inner.kind !== 'ordinary') return inner;
  }
  if (['limit', 'integral', 'evaluated', 'series'].includes(expr.kind)) {
    const reduced = context.reduceCalculus?.(expr, context) ?? null;
    if (reduced && hasNoValue(reduced)) return { kind: 'none', sides: expr.kind === 'limit' };
    if (reduced && reduced.kind !== expr.kind) return worthOf(reduced, context);
  }
  if (
    (expr.kind === 'sum' || expr.kind === 'product' || expr.kind === 'quotient') &&
    partsOf(expr).some((part) => worthOf(part, context).kind === 'none')
  )
    return { kind: 'none' };
  return { kind: 'ordinary', tex: lettersOf(expr).length === 0 ? texOf(expr, context) : null };
}

function partsOf(expr: Extract<Expr, { kind: 'sum' | 'product' | 'quotient' }>): readonly Expr[] {
  if (expr.kind === 'sum') return expr.terms.map((term) => term.expr);
  return expr.kind === 'product' ? expr.factors : [expr.numerator, expr.denominator];
}

function hasNoValue(expr: Expr): boolean {
  if (sameExpr(expr, noValueExpr)) return true;
  return expr.kind === 'sum' && expr.terms.some((term) => hasNoValue(term.expr));
}

function texOf(expr: Expr, context: CheckContext): string | null {
  const value = evaluate(expr, new Map(), 160, context);
  return isKnown(value) ? valueTex(value, 160) : null;
}
