import type { Expr, Line } from '../../shared/maths/expression.ts';
import { lettersOf } from '../../shared/maths/letters.ts';
import { childrenOf, exprsOf } from '../../shared/maths/walk.ts';

/** Letters that usually stand for a complex number themselves. */
const complexLetters: ReadonlySet<string> = new Set(['z', 'w', 'Z', 'W']);

export function isComplexLetter(name: string): boolean {
  return complexLetters.has(name.charAt(0));
}

/**
 * The letters that a derivation about complex numbers writes as real ones: the parts of a+bi, the angle of an exponent with
 * i. Common practice.
 */
export function realLettersOf(lines: readonly Line[]): ReadonlySet<string> {
  const found = new Set<string>(radiiOf(lines));
  const add = (expr: Expr): void => {
    for (const name of lettersOf(expr)) if (!isComplexLetter(name)) found.add(name);
  };
  const visit = (expr: Expr): void => {
    if (isTimesUnit(expr)) add(expr);
    if (expr.kind === 'sum' && expr.terms.some((term) => isTimesUnit(term.expr))) add(expr);
    childrenOf(expr).forEach(visit);
  };
  for (const line of lines) exprsOf(line).forEach(visit);
  return found;
}

/** The letters of a modulus, as r in r(cos t + i sin t) and r e^(it), which nobody takes to be negative. Common practice. */
export function radiiOf(lines: readonly Line[]): readonly string[] {
  const found = new Set<string>();
  const visit = (expr: Expr): void => {
    if (expr.kind === 'product' && expr.factors.some(isDirection))
      for (const factor of expr.factors) if (factor.kind === 'letter' && radii.has(factor.name)) found.add(factor.name);
    childrenOf(expr).forEach(visit);
  };
  for (const line of lines) exprsOf(line).forEach(visit);
  return [...found];
}

/** e^(it) or cos t + i sin t. */
function isDirection(expr: Expr): boolean {
  if (expr.kind === 'power') return expr.base.kind === 'constant' && speaksOfComplex(expr.exponent);
  const terms = expr.kind === 'sum' ? expr.terms.map((term) => term.expr) : [];
  return terms.some((term) => term.kind === 'call' && term.name === 'cos') && terms.some(isTimesUnit);
}

const radii: ReadonlySet<string> = new Set(['r', 'R', '\\rho']);

function isTimesUnit(expr: Expr): boolean {
  if (expr.kind === 'constant') return expr.name === 'i';
  if (expr.kind === 'quotient') return isTimesUnit(expr.numerator);
  return expr.kind === 'product' && expr.factors.some(isTimesUnit);
}

const partsOfNumber: ReadonlySet<string> = new Set(['conj', 're', 'im', 'arg']);

/** Whether an expression has an i, or asks for the parts of a number that is usually complex. */
export function speaksOfComplex(expr: Expr): boolean {
  if (expr.kind === 'constant' && expr.name === 'i') return true;
  if (expr.kind === 'call' && partsOfNumber.has(expr.name) && lettersOf(expr).some(isComplexLetter)) return true;
  return childrenOf(expr).some(speaksOfComplex);
}
