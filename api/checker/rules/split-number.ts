import type { Expr } from '../../../shared/maths/expression.ts';
import { lettersOf } from '../../../shared/maths/letters.ts';
import { childrenOf } from '../../../shared/maths/walk.ts';
import type { CheckContext } from '../context.ts';

/** z = x + yi, with two letters that were not met before, among complex numbers. */
export function isSplit(
  name: string,
  value: Expr,
  used: readonly string[],
  { numbers, definitions }: CheckContext,
): boolean {
  const letters = lettersOf(value);
  if (numbers !== 'complex' || !used.includes(name) || definitions.letters.has(name)) return false;
  const isNew = letters.length === 2 && letters.every((letter) => !used.includes(letter));
  const terms = value.kind === 'sum' ? value.terms.map((term) => term.expr) : [];
  return isNew && terms.length === 2 && terms.some((term) => hasUnit(term)) && terms.some((term) => !hasUnit(term));
}

function hasUnit(expr: Expr): boolean {
  return (expr.kind === 'constant' && expr.name === 'i') || childrenOf(expr).some(hasUnit);
}
