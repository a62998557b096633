import type { Expr, Line } from '../../../shared/maths/expression.ts';
import { lettersOf } from '../../../shared/maths/letters.ts';
import { childrenOf, exprsOf, mapLine } from '../../../shared/maths/walk.ts';
import { differentialsIn, isDifferential, withoutDifferentials } from './differentials.ts';
import { rateExpr, rateNamed } from './rates.ts';

/** A pair of letters that the derivation is about: y and the x that it depends on. */
interface Pair {
  readonly of: string;
  readonly by: string;
}

/**
 * Lines such as dy/y = x dx of a derivation about dy/dx, with dx as 1 and dy as dy/dx: so they are equations for that rate.
 * All other lines stay as they are.
 */
export function nameDifferentials(lines: readonly (Line | null)[]): readonly (Line | null)[] {
  const [first] = lines;
  if (!first || first.kind === 'expression' || first.kind === 'definition') return lines;
  const pairs = lines.flatMap((line) => (line ? pairsOf(line) : []));
  if (pairs.length === 0) return lines;
  return lines.map((line) => line && nameIn(line, pairs));
}

function nameIn(line: Line, pairs: readonly Pair[]): Line {
  if (line.kind === 'all' || line.kind === 'any')
    return { ...line, parts: line.parts.map((part) => nameIn(part, pairs)) };
  if (line.kind !== 'relation' || line.sign !== '=') return line;
  const names = new Set([...differentialsIn(line.left), ...differentialsIn(line.right)]);
  const pair = pairs.find(({ of, by }) => names.size === 2 && names.has(of) && names.has(by));
  if (!pair || ![line.left, line.right].every(isOfFirstDegree)) return line;
  return mapLine(line, (expr) => withoutDifferentials(expr, [pair.of, pair.by], rateExpr({ ...pair, order: 1 })));
}

/** From dy/dx, and from an equation of two integrals. */
function pairsOf(line: Line): Pair[] {
  const rates = lettersOf(line).flatMap((name) => rateNamed(name) ?? []);
  if (rates.length > 0) return rates;
  const variables = exprsOf(line).map(integralVariables);
  const [a, b] = variables.flat();
  if (line.kind !== 'relation' || variables.flat().length !== 2 || a === undefined || b === undefined || a === b)
    return [];
  if (usuallyFree.has(b)) return [{ of: a, by: b }];
  return usuallyFree.has(a) ? [{ of: b, by: a }] : [];
}

const usuallyFree: ReadonlySet<string> = new Set(['x', 't', '\\theta']);

function integralVariables(expr: Expr): string[] {
  const inside = childrenOf(expr).flatMap(integralVariables);
  return expr.kind === 'integral' && !expr.from ? [expr.variable, ...inside] : inside;
}

/** Each term has one differential, as a factor and not below. */
function isOfFirstDegree(expr: Expr): boolean {
  const degree = degreeOf(expr);
  return degree === 1 || (degree === 0 && expr.kind === 'number' && expr.numerator === 0n);
}

function degreeOf(expr: Expr): number | null {
  if (differentialsIn(expr).length === 0) return hasLooseD(expr) ? null : 0;
  switch (expr.kind) {
    case 'sum': {
      const degrees = new Set(expr.terms.map((term) => degreeOf(term.expr)));
      return degrees.size === 1 ? ([...degrees][0] as number | null) : null;
    }
    case 'product': {
      let total = 0;
      for (const [k, factor] of expr.factors.entries()) {
        if (isDifferential(expr.factors, k)) total += 1;
        else if (!isDifferential(expr.factors, k + 1)) {
          const degree = degreeOf(factor);
          if (degree === null) return null;
          total += degree;
        }
      }
      return total;
    }
    case 'quotient':
      return degreeOf(expr.denominator) === 0 ? degreeOf(expr.numerator) : null;
    default:
      return null;
  }
}

function hasLooseD(expr: Expr): boolean {
  return lettersOf(expr).includes('d');
}
