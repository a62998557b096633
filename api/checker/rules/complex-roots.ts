import { reduceFraction, toFraction, type PolynomialFraction } from '../solving/fraction.ts';
import type { LineEnv } from '../solving/line-env.ts';
import {
  areProportional,
  dividePolynomials,
  gcdPolynomials,
  multiplyPolynomials,
  onePolynomial,
  squareFreePart,
  type Polynomial,
} from '../solving/polynomial.ts';
import { differenceGraph } from '../statements/solve.ts';
import type { CompareStatement, Statement } from '../statements/statement.ts';

/** left - right of an equation as a rational function of the letter. */
export function equationFraction(equation: CompareStatement, env: LineEnv): PolynomialFraction | null {
  return toFraction(differenceGraph(equation.left, equation.right, env), env.letter, env.given);
}

/** The polynomial without double roots whose complex roots are the solutions; null where there is none. */
function complexRoots(statement: Statement, env: LineEnv): Polynomial | null {
  switch (statement.kind) {
    case 'compare': {
      const fraction = statement.sign === '=' ? equationFraction(statement, env) : null;
      if (!fraction) return null;
      const { num, holes } = reduceFraction(fraction);
      if (num.length === 0) return [];
      const top = squareFreePart(num);
      return dividePolynomials(top, gcdPolynomials(top, holes));
    }
    case 'any':
    case 'all': {
      const parts = statement.parts.map((part) => complexRoots(part, env));
      if (parts.includes(null)) return null;
      const all = parts as Polynomial[];
      return statement.kind === 'any'
        ? squareFreePart(all.reduce(multiplyPolynomials, onePolynomial))
        : all.reduce(gcdPolynomials, []);
    }
    case 'never':
      return onePolynomial;
    default:
      return null;
  }
}

/** Whether two polynomial statements have the same complex solutions; null where they are not both polynomial. */
export function haveSameComplexRoots(above: Statement, below: Statement, env: LineEnv): boolean | null {
  const a = complexRoots(above, env);
  const b = a && complexRoots(below, env);
  return a && b && (a.length === 0 || b.length === 0 ? a.length === b.length : areProportional(a, b));
}
