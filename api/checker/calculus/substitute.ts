import type { Expr } from '../../../shared/maths/expression.ts';
import { lettersOf } from '../../../shared/maths/letters.ts';
import { mapChildren } from '../../../shared/maths/walk.ts';
import { Unsettled } from '../solving/unsettled.ts';
import { letterOf } from './build.ts';

/**
 * An expression in place of a letter; bound letters are renamed where they would catch a letter of it. Throws Unsettled
 * where the letter stands under an operator that is not carried out.
 */
export function substitute(expr: Expr, name: string, value: Expr): Expr {
  switch (expr.kind) {
    case 'letter':
      return expr.name === name ? value : expr;
    case 'series': {
      const bounds = { ...expr, from: substitute(expr.from, name, value), to: substitute(expr.to, name, value) };
      const inner = underBinder(expr.index, expr.body, name, value);
      return { ...bounds, index: inner.bound, body: inner.body };
    }
    case 'limit': {
      const inner = underBinder(expr.variable, expr.operand, name, value);
      return { ...expr, to: substitute(expr.to, name, value), variable: inner.bound, operand: inner.body };
    }
    case 'integral': {
      if (!expr.from || !expr.to) {
        if (expr.variable === name || lettersOf(value).includes(expr.variable)) throw new Unsettled('not-covered');
        return { ...expr, integrand: substitute(expr.integrand, name, value) };
      }
      const inner = underBinder(expr.variable, expr.integrand, name, value);
      const [from, to] = [substitute(expr.from, name, value), substitute(expr.to, name, value)];
      return { ...expr, from, to, variable: inner.bound, integrand: inner.body };
    }
    case 'derivative':
    case 'evaluated':
    case 'rate':
      if (lettersOf(expr).includes(name)) throw new Unsettled('not-covered');
      return expr;
    default:
      return mapChildren(expr, (part) => substitute(part, name, value));
  }
}

function underBinder(bound: string, body: Expr, name: string, value: Expr): { bound: string; body: Expr } {
  if (bound === name) return { bound, body };
  if (!lettersOf(value).includes(bound)) return { bound, body: substitute(body, name, value) };
  const taken = new Set([...lettersOf(body), ...lettersOf(value), name]);
  const fresh = freshLetter(taken);
  return { bound: fresh, body: substitute(substitute(body, bound, letterOf(fresh)), name, value) };
}

/** A letter that none of the names is. */
export function freshLetter(taken: ReadonlySet<string>, stem = 'q'): string {
  for (let k = 1; ; k += 1) if (!taken.has(`${stem}_{${k}}`)) return `${stem}_{${k}}`;
}

/** Whether a letter occurs freely. */
export function dependsOn(expr: Expr, name: string): boolean {
  return lettersOf(expr).includes(name);
}
