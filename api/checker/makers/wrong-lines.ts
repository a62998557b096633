import type { Expr, Line } from '../../../shared/maths/expression.ts';
import { countNodes, exprsOf } from '../../../shared/maths/walk.ts';
import { createBudget, createContext, type CheckContext } from '../context.ts';
import { everywhere } from '../slips/rewrite.ts';
import type { Slip } from '../slips/slip.ts';

const mostCandidates = 24;

/**
 * What an author who makes a slip may write below a line, where the right next line would have been `below`: the wrong rule
 * used once, at any of the places where it applies.
 */
export function wrongLines(slip: Slip, above: Line, below: Line): Line[] {
  const context = createContext({ budget: createBudget(50_000) });
  const found: Line[] = [];
  for (const line of candidates(slip, above, below, context)) {
    if (exprsOf(line).reduce((nodes, expr) => nodes + countNodes(expr), 0) > 120) continue;
    found.push(line);
    if (found.length >= mostCandidates) break;
  }
  return found;
}

function* candidates(slip: Slip, above: Line, below: Line, context: CheckContext): Generator<Line> {
  if (slip.lines) yield* slip.lines(above, below, context);
  if (above.kind === 'expression') {
    const other = below.kind === 'expression' ? below.expr : above.expr;
    for (const expr of wrongExpressions(slip, above.expr, other, context)) yield { ...above, expr };
  }
  if (above.kind === 'relation') {
    for (const left of rewritten(slip, above.left)) yield { ...above, left };
    for (const right of rewritten(slip, above.right)) yield { ...above, right };
  }
}

function* wrongExpressions(slip: Slip, above: Expr, below: Expr, context: CheckContext): Generator<Expr> {
  if (slip.whole) yield* slip.whole(above, below, context);
  yield* rewritten(slip, above);
}

function* rewritten(slip: Slip, expr: Expr): Generator<Expr> {
  for (const rewrite of slip.rewrites ?? []) yield* everywhere(expr, rewrite);
}
