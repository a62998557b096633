import type { Expr, SeriesExpr } from '../../../shared/maths/expression.ts';
import { lettersOf } from '../../../shared/maths/letters.ts';
import { childrenOf } from '../../../shared/maths/walk.ts';

/** The letter that `a_k`, `a_{k+1}` or `a_{2k}` is where the index is a number; null for a letter without that index. */
export function indexedName(name: string, index: string, value: bigint): string | null {
  const [stem, subscript] = name.split(/_(.*)/s, 2) as [string, string | undefined];
  const inner = subscript?.replace(/^\{(.*)\}$/s, '$1');
  if (inner === undefined || !inner.includes(index)) return null;
  const rest = inner.split(index);
  const [times, shift] = rest as [string, string];
  if (rest.length !== 2 || !/^\d*$/.test(times) || !/^(?:[+-]\d+)?$/.test(shift)) return null;
  const at = String(BigInt(times || '1') * value + BigInt(shift || '0'));
  return at.length === 1 ? `${stem}_${at}` : `${stem}_{${at}}`;
}

/** Whether letters of the body are numbered by the index of the sum, so that each term has its own. */
export function isIndexed({ index, body }: SeriesExpr): boolean {
  return lettersOf(body).some((name) => name !== index && indexedName(name, index, 1n) !== null);
}

export function hasIndexed(expr: Expr): boolean {
  return (expr.kind === 'series' && isIndexed(expr)) || childrenOf(expr).some(hasIndexed);
}
