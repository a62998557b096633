import type { Expr } from '../../../shared/maths/expression.ts';
import { lettersOf } from '../../../shared/maths/letters.ts';
import { childrenOf } from '../../../shared/maths/walk.ts';
import { exprsOfStatement, type Statement } from '../statements/statement.ts';
import { allSlips } from './catalogue.ts';
import type { Slip } from './slip.ts';

/**
 * The slip of keeping a value that the statement does not admit: by what of it shuts values out. Null where that may be
 * one thing or another.
 */
export function nameKeptValue(statement: Statement): Slip | null {
  const found = new Set(exprsOfStatement(statement).flatMap(limitsIn));
  const [id, ...others] = found;
  return id && others.length === 0 ? (allSlips.find((slip) => slip.id === id) ?? null) : null;
}

function limitsIn(expr: Expr): string[] {
  const inside = childrenOf(expr).flatMap(limitsIn);
  const id = limitOf(expr);
  return id ? [id, ...inside] : inside;
}

function limitOf(expr: Expr): string | null {
  if (expr.kind === 'log' || (expr.kind === 'call' && expr.name === 'ln'))
    return 'a-root-outside-the-domain-of-a-logarithm-was-kept';
  if (expr.kind === 'quotient' && lettersOf(expr.denominator).length > 0)
    return 'a-root-at-which-a-denominator-is-zero-was-kept';
  const isRoot = expr.kind === 'root' || (expr.kind === 'power' && expr.exponent.kind === 'quotient');
  return isRoot && lettersOf(expr).length > 0 ? 'a-root-that-squaring-brought-in-was-kept' : null;
}
