import type { CheckContext } from '../context.ts';
import { div, isZero, mul, rational, sub, type Rational } from '../numbers/rational.ts';
import { toFraction } from '../solving/fraction.ts';
import { degreeIn } from '../solving/linear.ts';
import { differenceGraph } from '../statements/solve.ts';
import type { CompareStatement } from '../statements/statement.ts';

/** Linear equations by the coefficients of left minus right, the constant last. */
export type Rows = readonly (readonly Rational[])[];

/** The coefficients of left minus right, the constant last; null where it is not written as linear in the letters. */
export function rowOf(
  equation: CompareStatement,
  letters: readonly string[],
  context: CheckContext,
): Rational[] | null {
  const env = { letter: '', given: new Map(), context, window: null, hints: [] };
  const graph = differenceGraph(equation.left, equation.right, env);
  if (degreeIn(graph, ...letters) > 1) return null;
  const valueAt = (one: string | null): Rational | null => {
    const at = new Map(letters.map((name) => [name, rational(name === one ? 1 : 0)] as const));
    const fraction = toFraction(graph, '', at);
    return fraction && rational(fraction.num[0] ?? 0n, fraction.den[0] ?? 1n);
  };
  const constant = valueAt(null);
  const ones = letters.map(valueAt);
  if (!constant || ones.includes(null)) return null;
  return [...(ones as Rational[]).map((value) => sub(value, constant)), constant];
}

/** The reduced echelon form without rows of zeros. */
export function reduceRows(rows: Rows): Rational[][] {
  let rest = rows.map((row) => [...row]);
  const done: Rational[][] = [];
  for (let column = 0; column < (rows[0]?.length ?? 0); column += 1) {
    const pivot = rest.find((row) => !isZero(row[column] as Rational));
    if (!pivot) continue;
    const own = pivot.map((value) => div(value, pivot[column] as Rational));
    const clear = (row: Rational[]): Rational[] =>
      row.map((value, k) => sub(value, mul(row[column] as Rational, own[k] as Rational)));
    rest = rest.filter((row) => row !== pivot).map(clear);
    done.splice(0, done.length, ...done.map(clear), own);
  }
  return done;
}
