import type { Expr, Line } from '../../../shared/maths/expression.ts';
import { readLine } from '../../../shared/maths/read.ts';
import { compareExpressions } from '../../../api/checker/compare/compare-expressions.ts';
import type { Comparison } from '../../../api/checker/compare/comparison.ts';
import { createContext } from '../../../api/checker/context.ts';
import type { CheckContext } from '../../../api/checker/context.ts';

export function line(tex: string, numbers: 'real' | 'complex' = 'real'): Line {
  const reading = readLine(tex, { numbers, decimal: 'point', functions: [] });
  if (!reading.ok) throw new Error(`${tex}: ${reading.refusal.complaint}`);
  return reading.line;
}

export function expression(tex: string, numbers: 'real' | 'complex' = 'real'): Expr {
  const read = line(tex, numbers);
  if (read.kind !== 'expression') throw new Error(`${tex} is a ${read.kind}`);
  return read.expr;
}

export interface Setting {
  readonly assume?: readonly string[];
  readonly numbers?: 'real' | 'complex';
  readonly whole?: readonly string[];
  readonly seed?: number;
}

export function contextOf(setting: Setting = {}): CheckContext {
  return createContext({
    numbers: setting.numbers ?? 'real',
    assumptions: (setting.assume ?? []).map((tex) => line(tex)),
    wholeLetters: new Set(setting.whole),
    seed: setting.seed ?? 1,
  });
}

export function compare(above: string, below: string, setting: Setting = {}): Comparison {
  const numbers = setting.numbers ?? 'real';
  return compareExpressions(expression(above, numbers), expression(below, numbers), contextOf(setting));
}

/** `equal`, `different`, or the rest with its reason, in one word or two. */
export function verdictOf(above: string, below: string, setting: Setting = {}): string {
  const comparison = compare(above, below, setting);
  return comparison.kind === 'undecided' ? `undecided ${comparison.reason}` : comparison.kind;
}
