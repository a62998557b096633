import type { Expr } from '../../../shared/maths/expression.ts';
import { letterOf } from './build.ts';

/** dy/dx as a letter of its own, spelt as it is displayed. */
export interface Rate {
  readonly of: string;
  readonly by: string;
  readonly order: number;
}

export function rateName({ of, by, order }: Rate): string {
  return order === 1 ? `\\frac{d${of}}{d${by}}` : `\\frac{d^{${order}}${of}}{d${by}^{${order}}}`;
}

export function rateExpr(rate: Rate): Expr {
  return letterOf(rateName(rate));
}

const pattern = /^\\frac\{d(?:\^\{(\d+)\})?(.+?)\}\{d(.+?)(?:\^\{\d+\})?\}$/;

/** The rate that a letter's name spells, null for an ordinary letter. */
export function rateNamed(name: string): Rate | null {
  const found = pattern.exec(name);
  if (!found) return null;
  return { order: found[1] ? Number(found[1]) : 1, of: found[2] as string, by: found[3] as string };
}
