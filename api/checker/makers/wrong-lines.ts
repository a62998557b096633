import type { Expr, Line } from '../../../shared/maths/expression.ts';
import { sameLine } from '../../../shared/maths/same.ts';
import { countNodes, exprsOf, mapExpr } from '../../../shared/maths/walk.ts';
import { createBudget, createContext, type CheckContext } from '../context.ts';
import { product, sum, whole } from '../evidence/build.ts';
import { wholeValue } from '../evidence/monomials.ts';
import { signedTerm } from '../slips/relations.ts';
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
  if (above.kind === 'all') {
    yield* inOnePart(slip, above, below, context);
    return;
  }
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

/** One equation of several, the others as the next line has them. */
function* inOnePart(
  slip: Slip,
  above: Extract<Line, { kind: 'any' | 'all' }>,
  below: Line,
  context: CheckContext,
): Generator<Line> {
  if (below.kind !== 'all' || below.parts.length !== above.parts.length) return;
  const changed = [...above.parts.keys()].filter((k) => !sameLine(above.parts[k] as Line, below.parts[k] as Line));
  for (const place of changed) {
    for (const part of candidates(slip, above.parts[place] as Line, below.parts[place] as Line, context))
      yield { ...below, parts: below.parts.map((own, k) => (k === place ? part : own)) };
  }
}

function* wrongExpressions(slip: Slip, above: Expr, below: Expr, context: CheckContext): Generator<Expr> {
  if (slip.whole) yield* slip.whole(above, below, context);
  yield* rewritten(slip, above);
}

function* rewritten(slip: Slip, expr: Expr): Generator<Expr> {
  for (const rewrite of slip.rewrites ?? []) {
    for (const changed of everywhere(expr, rewrite)) yield mapExpr(changed, withNumbersAdded);
  }
}

/** Numbers that a rule put side by side, as -48+3, are added at once, as an author would. */
function withNumbersAdded(node: Expr): Expr {
  if (node.kind === 'product' && node.factors.some(hasSignOrIsZero)) return product(...node.factors);
  if (node.kind !== 'sum' || node.span.end > 0) return node;
  const numbers = node.terms.map((term) => wholeValue(signedTerm(term)));
  if (node.terms.length > 1 && numbers.every((value) => value !== null))
    return whole(numbers.reduce((total, value) => total + (value ?? 0), 0));
  return node.terms.some(({ expr }) => hasSignOrIsZero(expr)) ? sum(...node.terms.map(signedTerm)) : node;
}

function hasSignOrIsZero(expr: Expr): boolean {
  return (wholeValue(expr) ?? 1) <= 0;
}
