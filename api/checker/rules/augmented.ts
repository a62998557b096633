import type { Expr } from '../../../shared/maths/expression.ts';
import type { CheckContext } from '../context.ts';
import { add, isZero, mul, sub, toTex, zero, type Rational } from '../numbers/rational.ts';
import { evaluatePrepared, prepare } from '../values/evaluate.ts';
import { reduceRows, type Rows } from './linear-rows.ts';
import { fails, holds, undecided, type StepResult } from './step-result.ts';

/**
 * Two matrices with a bar before the last column stand for systems of linear equations: a step keeps all solutions. Null
 * where the lines are no such matrices, or not of fractions.
 */
export function judgeAugmented(above: Expr, below: Expr, context: CheckContext): StepResult | null {
  const [a, b] = [rowsOf(above, context), rowsOf(below, context)];
  if (!a || !b || a[0]?.length !== b[0]?.length) return null;
  const [before, after] = [reduceRows(a), reduceRows(b)];
  if (before.every((row, k) => isSame(row, after[k])) && before.length === after.length) return holds('proved');
  const lost = solutionsOf(before).find((point) => !solves(b, point));
  if (lost) return failAt('lost', lost);
  const gained = solutionsOf(after).find((point) => !solves(a, point));
  return gained ? failAt('gained', gained) : undecided('not-settled', ['empty']);
}

function rowsOf(expr: Expr, context: CheckContext): Rows | null {
  if (expr.kind !== 'matrix' || expr.bar === undefined || expr.bar !== (expr.rows[0]?.length ?? 0) - 1) return null;
  const rows = expr.rows.map((row) =>
    row.map((entry) => {
      const value = evaluatePrepared(prepare(entry, context), new Map(), 128, context);
      return value.kind === 'rational' ? value.value : null;
    }),
  );
  return rows.flat().includes(null) ? null : (rows as Rational[][]);
}

function isSame(a: readonly Rational[], b: readonly Rational[] | undefined): boolean {
  return b !== undefined && a.every((value, k) => isZero(sub(value, b[k] as Rational)));
}

/** One solution, and one more for each unknown that is free; none where the equations contradict each other. */
function solutionsOf(rows: Rows): Rational[][] {
  const width = (rows[0]?.length ?? 1) - 1;
  const leads = rows.map((row) => row.findIndex((value) => !isZero(value)));
  if (leads.includes(width)) return [];
  const start = Array.from({ length: width }, (_, j) => rows[leads.indexOf(j)]?.[width] ?? zero);
  const one: Rational = { num: 1n, den: 1n };
  const free = start.flatMap((_, j) => (leads.includes(j) ? [] : [j]));
  const moved = free.map((column) =>
    start.map((value, j) => {
      if (j === column) return one;
      const row = rows[leads.indexOf(j)];
      return row ? sub(value, row[column] as Rational) : value;
    }),
  );
  return [start, ...moved];
}

function solves(rows: Rows, point: readonly Rational[]): boolean {
  return rows.every((row) => {
    const left = point.reduce((sum, value, j) => add(sum, mul(value, row[j] as Rational)), zero);
    return isZero(sub(left, row[point.length] as Rational));
  });
}

function failAt(side: 'lost' | 'gained', point: readonly Rational[]): StepResult {
  const name = `\\left(${point.map(toTex).join(',')}\\right)`;
  const [above, below] = side === 'lost' ? ['true', 'false'] : ['false', 'true'];
  const at = Object.fromEntries(point.map((value, j) => [`x_{${j + 1}}`, toTex(value)]));
  return fails('proved', { [side]: [name], witness: { at, above, below } });
}
