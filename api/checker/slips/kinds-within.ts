import type { Expr } from '../../../shared/maths/expression.ts';
import { childrenOf } from '../../../shared/maths/walk.ts';

/** Whether a negated part counts by itself: a sum of one term is a sign, one of more is a sum. */
const sumBit = 1;
const signBit = 2;

const bits: Readonly<Record<string, number>> = {
  quotient: 4,
  power: 8,
  root: 16,
  log: 32,
  derivative: 64,
  integral: 128,
  limit: 256,
  ln: 512,
  sin: 1024,
  cos: 2048,
  tan: 4096,
  abs: 8192,
  arcsin: 16384,
  arccos: 16384,
  arctan: 16384,
};

const known = new WeakMap<Expr, number>();

/** Which kinds of parts an expression has, one bit each; parts that tell little have none. */
export function kindsWithin(expr: Expr): number {
  const found = known.get(expr);
  if (found !== undefined) return found;
  let mask = ownBits(expr);
  for (const part of childrenOf(expr)) mask |= kindsWithin(part);
  known.set(expr, mask);
  return mask;
}

function ownBits(expr: Expr): number {
  if (expr.kind === 'sum') return expr.terms.length > 1 ? sumBit | signBit : signBit;
  return bits[expr.kind === 'call' ? expr.name : expr.kind] ?? 0;
}

/** The bit of one kind. */
export function bitOf(kind: 'derivative' | 'integral' | 'limit' | 'sum'): number {
  return kind === 'sum' ? sumBit : (bits[kind] ?? 0);
}
