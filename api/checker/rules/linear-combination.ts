import { lettersOf } from '../../../shared/maths/letters.ts';
import type { CheckContext } from '../context.ts';
import { rational, type Rational } from '../numbers/rational.ts';
import { numberExpr, productExpr, sumExpr } from './build-expr.ts';
import { reduceRows, rowOf } from './linear-rows.ts';
import { sameUpToFactor } from './same-equation.ts';
import { comparesOf, type CompareStatement, type Statement } from '../statements/statement.ts';

/**
 * Whether an equation is a sum of multiples of linear equations that are known. Where these have no solution together,
 * this is what a step may still be judged by.
 */
export function isCombination(known: readonly Statement[], below: Statement, context: CheckContext): boolean {
  const equations = known.flatMap(comparesOf);
  const wanted = comparesOf(below);
  if (wanted.length === 0 || [...equations, ...wanted].some(({ sign }) => sign !== '=')) return false;
  const letters = [...new Set([...equations, ...wanted].flatMap((e) => [...lettersOf(e.left), ...lettersOf(e.right)]))];
  const rows = [...equations, ...wanted].map((equation) => rowOf(equation, letters, context));
  if (rows.includes(null)) return false;
  const all = rows as Rational[][];
  const base = reduceRows(all.slice(0, equations.length));
  return reduceRows([...base, ...all.slice(equations.length)]).length === base.length;
}

const factors: readonly Rational[] = [1, -1, 2, -2, 3, -3]
  .map((n) => rational(n))
  .concat([rational(1, 2), rational(-1, 2)]);

/** Whether each equation below is one that is known, or one plus a small multiple of another, as they are written. */
export function followsBySums(known: readonly Statement[], below: Statement, context: CheckContext): boolean {
  const equations = known.flatMap((statement) => (statement.kind === 'any' ? [] : comparesOf(statement)));
  const wanted = below.kind === 'any' ? [] : comparesOf(below);
  if (wanted.length === 0 || equations.length > 6 || [...equations, ...wanted].some(({ sign }) => sign !== '='))
    return false;
  const isSame = (a: CompareStatement, b: CompareStatement): boolean =>
    sameUpToFactor(a, b, new Map(), context)?.sameDomain === true;
  return wanted.every(
    (equation) =>
      equations.some((one) => isSame(one, equation)) ||
      equations.some((one, k) =>
        equations.slice(k + 1).some((other) => factors.some((factor) => isSame(sumOf(one, other, factor), equation))),
      ),
  );
}

function sumOf(a: CompareStatement, b: CompareStatement, factor: Rational): CompareStatement {
  const plus = (x: CompareStatement['left'], y: CompareStatement['left']): CompareStatement['left'] =>
    sumExpr([x, productExpr([numberExpr(factor), y])]);
  return { kind: 'compare', left: plus(a.left, b.left), sign: '=', right: plus(a.right, b.right) };
}
