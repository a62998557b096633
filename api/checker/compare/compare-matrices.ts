import type { Expr } from '../../../shared/maths/expression.ts';
import { mapExpr } from '../../../shared/maths/walk.ts';
import type { CheckContext } from '../context.ts';
import { evaluate } from '../values/evaluate.ts';
import { valueTex } from '../values/value-tex.ts';
import type { Point } from '../values/value.ts';
import type { Comparison, Condition, Witness } from './comparison.ts';
import { holdsMatrix, resolveMatrices, sameSize } from './matrices.ts';
import type { Entries } from './matrices.ts';

type Compare = (above: Expr, below: Expr, context: CheckContext) => Comparison;

const shownBits = 256;

/** Entry by entry, once every operation on matrices is carried out. */
export function compareMatrices(above: Expr, below: Expr, context: CheckContext, compare: Compare): Comparison {
  const first = resolveMatrices(withDefinitions(above, context));
  const second = resolveMatrices(withDefinitions(below, context));
  if (first === null) return { kind: 'undecided', reason: 'no-domain' };
  if (second === null) return { kind: 'undecided', reason: 'not-covered' };
  if (first.kind === 'scalar' && second.kind === 'scalar') return compare(first.expr, second.expr, context);
  if (first.kind === 'scalar' || second.kind === 'scalar') return { kind: 'undecided', reason: 'change-of-kind' };
  if (!sameSize(first.rows, second.rows))
    return { kind: 'different', witness: witnessOfSizes(first.rows, second.rows) };
  return compareEntries(first.rows, second.rows, context, compare);
}

/** Letters that stand for matrices are replaced by them. */
function withDefinitions(expr: Expr, context: CheckContext): Expr {
  return mapExpr(expr, (part) => {
    const value = part.kind === 'letter' ? context.definitions.letters.get(part.name) : undefined;
    return value !== undefined && holdsMatrix(value) ? value : part;
  });
}

/** Whether an expression holds a matrix or a letter that stands for one. */
export function concernsMatrices(expr: Expr, context: CheckContext): boolean {
  return holdsMatrix(withDefinitions(expr, context));
}

function compareEntries(above: Entries, below: Entries, context: CheckContext, compare: Compare): Comparison {
  let reached: 'proved' | 'sampled' = 'proved';
  const excluded = new Map<string, Condition>();
  const cancelled = new Map<string, Condition>();
  let open: Comparison | null = null;
  for (const [i, row] of above.entries()) {
    for (const [j, entry] of row.entries()) {
      const other = below[i]?.[j];
      if (other === undefined) continue;
      const comparison = compare(entry, other, context);
      if (comparison.kind === 'different')
        return { kind: 'different', witness: widen(comparison.witness, above, below, context) };
      if (comparison.kind !== 'equal') {
        open ??= comparison;
        continue;
      }
      if (comparison.reached === 'sampled') reached = 'sampled';
      for (const condition of comparison.excluded) excluded.set(condition.tex, condition);
      for (const condition of comparison.cancelled) cancelled.set(condition.tex, condition);
    }
  }
  return open ?? { kind: 'equal', reached, excluded: [...excluded.values()], cancelled: [...cancelled.values()] };
}

/** The whole matrices at the point where one entry differs. */
function widen(witness: Witness, above: Entries, below: Entries, context: CheckContext): Witness {
  const point: Point = witness.at;
  const isComplete = [above, below].every((rows) => valuesTex(rows, point, context) !== null);
  if (!isComplete) return witness;
  return {
    ...witness,
    above: valuesTex(above, point, context) ?? witness.above,
    below: valuesTex(below, point, context) ?? witness.below,
  };
}

/** Null where an entry has a letter that the point does not give. */
function valuesTex(rows: Entries, point: Point, context: CheckContext): string | null {
  const lines: string[] = [];
  for (const row of rows) {
    const entries = row.map((entry) => evaluate(entry, point, shownBits, context));
    if (entries.some(({ kind }) => kind === 'unknown')) return null;
    lines.push(entries.map((value) => valueTex(value, shownBits)).join('&'));
  }
  return `\\begin{pmatrix}${lines.join('\\\\')}\\end{pmatrix}`;
}

function witnessOfSizes(above: Entries, below: Entries): Witness {
  const size = (rows: Entries): string => `${rows.length}\\times ${rows[0]?.length ?? 0}`;
  return { at: new Map(), atTex: {}, above: size(above), below: size(below) };
}
