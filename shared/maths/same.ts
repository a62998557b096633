import type { Expr, Line } from './expression.ts';

/** Equal structure; where it stands in the text (spans, brackets that change nothing) does not count. */
export function sameExpr(left: Expr, right: Expr): boolean {
  return sameData(left, right);
}

/** Equal structure of two lines, spans aside. */
export function sameLine(left: Line, right: Line): boolean {
  return sameData(left, right);
}

function sameData(left: unknown, right: unknown): boolean {
  if (left === right) return true;
  if (Array.isArray(left) && Array.isArray(right)) {
    return left.length === right.length && left.every((item, at) => sameData(item, right[at]));
  }
  if (!isRecord(left) || !isRecord(right)) return false;
  for (const key in left) if (!ignored(key) && !sameData(left[key], right[key])) return false;
  for (const key in right) if (!ignored(key) && right[key] !== undefined && left[key] === undefined) return false;
  return true;
}

function ignored(key: string): boolean {
  return key === 'span' || key === 'bracketed';
}

function isRecord(value: unknown): value is Record<string, unknown> {
  return typeof value === 'object' && value !== null && !Array.isArray(value);
}
