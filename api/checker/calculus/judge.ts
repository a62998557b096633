import type { Expr } from '../../../shared/maths/expression.ts';
import { childrenOf } from '../../../shared/maths/walk.ts';
import type { Evidence, Note } from '../../../shared/schemas/verdict.ts';
import { compareAtLength, compareExpressions } from '../compare/compare-expressions.ts';
import { compareQuickly } from '../compare/compare-quickly.ts';
import type { Comparison } from '../compare/comparison.ts';
import type { CheckContext } from '../context.ts';
import { compareIndexed } from './indexed.ts';
import { hasIndexed } from './indexed-letters.ts';
import { compareAntiderivatives, concernsConstants, type AntiderivativeRuling } from './judge-antiderivative.ts';
import { worthOf, type Worth } from './judge-values.ts';
import { compareOpenIntegrals, openIntegrals } from './open-integrals.ts';
import { compareOpenSeries } from './open-series.ts';
import { compareOrders } from './orders.ts';
import { carriedOut } from './reduce.ts';
import { boundsOfSeries } from './series-bounds.ts';

export interface CalculusComparison {
  readonly found: Comparison;
  readonly notes: readonly Note[];
  readonly evidence: Evidence;
}

/** Rule 8 on two expressions: up to a constant where one is free, by values that may be infinite or missing, else rule 1. */
export function compareWithCalculus(above: Expr, below: Expr, context: CheckContext): CalculusComparison {
  const { calculus } = context;
  const isCalculus = calculus && calculus.variables.size + calculus.constants.size + calculus.ambiguous.size > 0;
  const quick = isCalculus ? null : compareQuickly(above, below, context);
  if (quick !== null) return plain(quick);
  const first = compareAsRead(above, below, context);
  const other =
    first.found.kind === 'undecided'
      ? (compareOrders(above, below, context) ?? compareOpenSeries(above, below, context))
      : null;
  if (other) return plain(other);
  if (!calculus || calculus.ambiguous.size === 0 || first.found.kind === 'equal') return first;
  // The other reading: y depends on x. A fault has to be one under both.
  const moving = {
    ...calculus,
    dependents: new Map([...calculus.dependents, ...calculus.ambiguous]),
    known: new WeakMap(),
  };
  const second = compareAsRead(above, below, { ...context, calculus: moving });
  if (second.found.kind === 'equal' || second.found.kind === first.found.kind)
    return second.found.kind === 'equal' ? second : first;
  return plain({ kind: 'undecided', reason: 'not-settled' });
}

function compareAsRead(above: Expr, below: Expr, context: CheckContext): CalculusComparison {
  if (concernsConstants(above, below, context)) return compareFreely(above, below, context);
  if (!hasOperator(above) && !hasOperator(below)) return plain(compareAtLength(above, below, context));
  if (hasIndexed(above) || hasIndexed(below)) return plain(compareIndexed(above, below, context));
  const [a, b] = [worthOf(above, context), worthOf(below, context)];
  if (a.kind !== 'ordinary' || b.kind !== 'ordinary') return plain(compareWorth(a, b));
  if (openIntegrals(above, context).length + openIntegrals(below, context).length > 0)
    return plain(compareOpenIntegrals(above, below, context));
  const bounds = [above, below].flatMap((expr) => boundsOfSeries(expr));
  const within = bounds.length > 0 ? { ...context, assumptions: [...context.assumptions, ...bounds] } : context;
  return plain(compareExpressions(carriedOut(above, context), carriedOut(below, context), within));
}

export const noEvidence: Evidence = {};

function plain(found: Comparison): CalculusComparison {
  return { found, notes: [], evidence: noEvidence };
}

const operators: ReadonlySet<Expr['kind']> = new Set(['limit', 'integral', 'evaluated', 'series', 'derivative']);

function hasOperator(expr: Expr): boolean {
  if (operators.has(expr.kind) || (expr.kind === 'constant' && expr.name === 'infinity')) return true;
  return childrenOf(expr).some(hasOperator);
}

function compareWorth(above: Worth, below: Worth): Comparison {
  if (above.kind === 'none')
    return below.kind === 'ordinary' || (below.kind === 'infinite' && above.sides)
      ? { kind: 'nothing-in-common' }
      : { kind: 'undecided', reason: 'no-domain' };
  if (below.kind === 'none') return { kind: 'meaningless' };
  if (above.kind === 'infinite' && below.kind === 'infinite') {
    if (above.sign === below.sign) return { kind: 'equal', reached: 'proved', excluded: [], cancelled: [] };
  }
  const [left, right] = [texOf(above), texOf(below)];
  if (left === null || right === null) return { kind: 'undecided', reason: 'not-settled' };
  return { kind: 'different', witness: { at: new Map(), atTex: {}, above: left, below: right } };
}

function texOf(worth: Worth): string | null {
  if (worth.kind === 'infinite') return worth.sign > 0 ? '\\infty' : '-\\infty';
  return worth.kind === 'ordinary' ? worth.tex : null;
}

/** Lines without an integral that are the same as they stand need no constant. */
function compareFreely(above: Expr, below: Expr, context: CheckContext): CalculusComparison {
  const exact = compareExpressions(above, below, context);
  if (exact.kind === 'equal') return plain(exact);
  return fromRuling(compareAntiderivatives(above, below, context));
}

function fromRuling(ruling: AntiderivativeRuling): CalculusComparison {
  switch (ruling.kind) {
    case 'holds':
      return { found: ruling.found, notes: ruling.notes, evidence: {} };
    case 'no-constant':
      return {
        found: { kind: 'different', witness: { at: new Map(), atTex: {}, above: '0', below: '0' } },
        notes: ['constant'],
        evidence: { witness: undefined, meant: ruling.meant },
      };
    case 'compared':
      return plain(ruling.found);
    case 'undecided':
      return plain({ kind: 'undecided', reason: ruling.reason });
  }
}
