import { lettersOf } from '../../../shared/maths/letters.ts';
import type { CheckContext } from '../context.ts';
import { div, isZero, mul, rational, sub, type Rational } from '../numbers/rational.ts';
import { degreeIn } from '../solving/linear.ts';
import { toFraction } from '../solving/fraction.ts';
import { differenceGraph } from '../statements/solve.ts';
import { numberExpr, productExpr, sumExpr } from './build-expr.ts';
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
  const rows = [...equations, ...wanted].map((equation) => coefficientsOf(equation, letters, context));
  if (rows.includes(null)) return false;
  const all = rows as Rational[][];
  const base = reduceRows(all.slice(0, equations.length));
  return all.slice(equations.length).every((row) => reduceBy(row, base).every(isZero));
}

/** The coefficients of left minus right, the constant last; null where it is not linear. */
function coefficientsOf(
  equation: CompareStatement,
  letters: readonly string[],
  context: CheckContext,
): Rational[] | null {
  const env = { letter: '', given: new Map(), context, window: null, hints: [] };
  const graph = differenceGraph(equation.left, equation.right, env);
  if (letters.some((letter) => degreeIn(graph, letter) > 1)) return null;
  const valueAt = (at: ReadonlyMap<string, Rational>): Rational | null => {
    const fraction = toFraction(graph, '', at);
    return fraction && rational(fraction.num[0] ?? 0n, fraction.den[0] ?? 1n);
  };
  const point = (ones: readonly string[]): ReadonlyMap<string, Rational> =>
    new Map(letters.map((name) => [name, rational(ones.includes(name) ? 1 : 0)]));
  const constant = valueAt(point([]));
  const both = valueAt(point(letters));
  const slopes = letters.map((letter) => valueAt(point([letter])));
  if (!constant || !both || slopes.includes(null)) return null;
  const own = (slopes as Rational[]).map((value) => sub(value, constant));
  // Letters multiplied with each other show where all of them are one.
  const rest = own.reduce((left, slope) => sub(left, slope), sub(both, constant));
  return isZero(rest) ? [...own, constant] : null;
}

function reduceRows(rows: readonly (readonly Rational[])[]): Rational[][] {
  const base: Rational[][] = [];
  for (const row of rows) {
    const rest = reduceBy(row, base);
    if (!rest.every(isZero)) base.push(rest);
  }
  return base;
}

/** A row without what the rows before it can take away, each at its first entry. */
function reduceBy(row: readonly Rational[], base: readonly (readonly Rational[])[]): Rational[] {
  let rest = [...row];
  for (const other of base) {
    const lead = other.findIndex((value) => !isZero(value));
    const factor = div(rest[lead] as Rational, other[lead] as Rational);
    if (!isZero(factor)) rest = rest.map((value, k) => sub(value, mul(factor, other[k] as Rational)));
  }
  return rest;
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
