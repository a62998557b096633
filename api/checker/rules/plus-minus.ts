import type { Expr } from '../../../shared/maths/expression.ts';
import { agreementOf } from '../compare/agreement.ts';
import type { CheckContext } from '../context.ts';
import { choicesOf } from '../statements/statement.ts';
import { isKnown } from '../values/arithmetic.ts';
import { evaluate } from '../values/evaluate.ts';
import { valueTex } from '../values/value-tex.ts';
import type { Point } from '../values/value.ts';
import type { Comparison } from '../compare/comparison.ts';

type Compare = (above: Expr, below: Expr, context: CheckContext) => Comparison;

const bits = 256;

/**
 * Two expressions of which one at least has a plus-or-minus sign: they stand for the same values, in whatever order; null
 * where neither has one.
 */
export function compareChoices(above: Expr, below: Expr, context: CheckContext, compare: Compare): Comparison | null {
  const [first, second] = [choicesOf(above), choicesOf(below)];
  if (first.length === 1 && second.length === 1) return null;
  const table = first.map((a) => second.map((b) => compare(a, b, context)));
  const equal: Extract<Comparison, { kind: 'equal' }>[] = [];
  const rows = first.map((_, k) => table[k] ?? []);
  const columns = second.map((_, j) => table.map((row) => row[j] as Comparison));
  for (const [k, cells] of [...rows, ...columns].entries()) {
    const match = cells.find((cell) => cell.kind === 'equal');
    if (match?.kind === 'equal') {
      equal.push(match);
      continue;
    }
    const isAbove = k < first.length;
    const single = isAbove ? first[k] : second[k - first.length];
    if (single === undefined) return null;
    return notAmong(single, isAbove ? second : first, cells, isAbove, context);
  }
  return {
    kind: 'equal',
    reached: equal.every(({ reached }) => reached === 'proved') ? 'proved' : 'sampled',
    excluded: equal.flatMap(({ excluded }) => excluded),
    cancelled: equal.flatMap(({ cancelled }) => cancelled),
  };
}

/** A value that the other line does not have, at one point for all of the other line's values. */
function notAmong(
  single: Expr,
  others: readonly Expr[],
  cells: readonly Comparison[],
  isAbove: boolean,
  context: CheckContext,
): Comparison {
  for (const cell of cells) {
    if (cell.kind !== 'different') continue;
    const { at, atTex } = cell.witness;
    const own = evaluate(single, at, bits, context);
    if (!isKnown(own) || !others.every((other) => isApart(single, other, at, context))) continue;
    const texOf = (exprs: readonly Expr[]): string => {
      const values = exprs.map((expr) => evaluate(expr, at, bits, context));
      return [...new Set(values.map((value) => valueTex(value, bits)))].join(',\\ ');
    };
    const [mine, theirs] = [texOf([single]), texOf(others)];
    return {
      kind: 'different',
      witness: { at, atTex, above: isAbove ? mine : theirs, below: isAbove ? theirs : mine },
    };
  }
  return { kind: 'undecided', reason: 'not-settled' };
}

function isApart(a: Expr, b: Expr, at: Point, context: CheckContext): boolean {
  return agreementOf(evaluate(a, at, bits, context), evaluate(b, at, bits, context), bits) === 'apart';
}
