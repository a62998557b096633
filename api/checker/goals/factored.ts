import type { Expr } from '../../../shared/maths/expression.ts';
import { lettersOf } from '../../../shared/maths/letters.ts';
import { createContext } from '../context.ts';
import { rational } from '../numbers/rational.ts';
import { numberExpr, productExpr, sumExpr, letterExpr } from '../rules/build-expr.ts';
import { substitute } from '../rules/solve-system.ts';
import { toFraction } from '../solving/fraction.ts';
import type { Polynomial } from '../solving/polynomial.ts';
import { prepare } from '../values/evaluate.ts';
import { isIrreducible } from './irreducible.ts';

/** A product of factors that do not factor further over the rationals (rule 15). */
export function isFactored(expr: Expr): boolean {
  return factorsOf(expr).every(isPrimeFactor);
}

function factorsOf(expr: Expr): Expr[] {
  switch (expr.kind) {
    case 'product':
      return expr.factors.flatMap(factorsOf);
    case 'power':
      return expr.exponent.kind === 'number' && expr.exponent.denominator === 1n ? factorsOf(expr.base) : [expr];
    case 'quotient':
      return [...factorsOf(expr.numerator), ...factorsOf(expr.denominator)];
    case 'sum':
      return expr.terms.length === 1 && expr.terms[0] ? factorsOf(expr.terms[0].expr) : [expr];
    default:
      return [expr];
  }
}

const lines: readonly (readonly [number, number])[] = [
  [3, 5],
  [7, -4],
  [11, 9],
  [2, 13],
  [17, -6],
  [5, 23],
];

/**
 * A polynomial in several letters is tried on straight lines x = at + b, y = ct + d: factors stay factors there, so one
 * line on which it does not factor proves that it does not; Hilbert's theorem has it that such a line is soon found.
 */
function isPrimeFactor(factor: Expr): boolean {
  if (factor.kind !== 'sum') return true;
  const letters = lettersOf(factor);
  if (letters.length === 0) return true;
  if (hasCommonLetter(factor, letters)) return false;
  const onLines = lines.flatMap(([a, b], shift): Polynomial[] => {
    const values = new Map(
      letters.map((name, k) => {
        const t = productExpr([numberExpr(rational(letters.length === 1 ? 1 : a + 2 * k + shift)), letterExpr('t')]);
        return [name, sumExpr([t, numberExpr(rational(letters.length === 1 ? 0 : b - 3 * k))])] as const;
      }),
    );
    const fraction = toFraction(prepare(substitute(factor, values), createContext()), 't');
    return fraction && fraction.den.length === 1 ? [fraction.num] : [];
  });
  // What is no polynomial has no factors to speak of here.
  if (onLines.length === 0) return true;
  const most = Math.max(...onLines.map((p) => p.length));
  return onLines.some((p) => p.length === most && isIrreducible(p));
}

/** Every term has the letter: it could be taken out. */
function hasCommonLetter(factor: Extract<Expr, { kind: 'sum' }>, letters: readonly string[]): boolean {
  return letters.some((name) => {
    const zero = substitute(factor, new Map([[name, numberExpr(rational(0))]]));
    const values = new Map(
      letters.filter((other) => other !== name).map((other, k) => [other, rational(3 + 4 * k)] as const),
    );
    const fraction = toFraction(prepare(zero, createContext()), '', values);
    return fraction !== null && fraction.num.length === 0 && factor.terms.length > 1;
  });
}
