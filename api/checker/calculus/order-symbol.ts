import type { Expr } from '../../../shared/maths/expression.ts';
import type { CheckContext } from '../context.ts';

export type OrderExpr = Extract<Expr, { kind: 'apply' }>;

/** `O(x^3)` or `o(x^3)`, where the derivation has no function of that name. */
export function isOrder(expr: Expr, { definitions }: CheckContext): expr is OrderExpr {
  return (
    expr.kind === 'apply' &&
    (expr.name === 'O' || expr.name === 'o') &&
    expr.primes === 0 &&
    expr.args.length === 1 &&
    !definitions.functions.has(expr.name)
  );
}
