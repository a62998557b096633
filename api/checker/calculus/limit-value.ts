import type { Expr } from '../../../shared/maths/expression.ts';

/** Where an expression goes: to a number, beyond all bounds, or nowhere. */
export type LimitValue =
  | { readonly kind: 'finite'; readonly value: Expr }
  | { readonly kind: 'infinite'; readonly sign: 1 | -1 }
  | { readonly kind: 'none' };
