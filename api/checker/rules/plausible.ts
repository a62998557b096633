import type { Expr, Line } from '../../../shared/maths/expression.ts';
import type { CheckContext } from '../context.ts';
import { isDoubleReady, toDoubleFunction } from '../solving/double-evaluator.ts';
import { approximate } from '../solving/real-number.ts';
import { isFiniteSet } from '../solving/real-set.ts';
import { Unsettled } from '../solving/unsettled.ts';
import { solveStatement } from '../statements/solve.ts';
import type { Statement } from '../statements/statement.ts';
import { prepare } from '../values/evaluate.ts';
import type { Graph } from '../values/graph.ts';
import { differenceExpr } from './build-expr.ts';
import { freeLetters, type Meaning } from './meaning.ts';

/** Says in doubles, and so quickly, which lines may follow; a line that passes is still to be judged. */
export function plausibleAfter(from: Meaning | null, context: CheckContext): (line: Line) => boolean {
  if (from?.kind === 'expression') return afterExpression(from.expr, context);
  return from?.kind === 'statement' ? afterStatement(from.statement, context) : () => false;
}

const places: readonly number[] = [1.3719, 2.6173];

function afterExpression(above: Expr, context: CheckContext): (line: Line) => boolean {
  const worth = places.map((place) => valueAt(above, place, context));
  return (line) => {
    const below = line.kind === 'expression' ? line.expr : line.kind === 'continuation' ? line.members[0] : undefined;
    if (!below) return false;
    return places.every((place, k) => isClose(worth[k] ?? Number.NaN, valueAt(below, place, context)));
  };
}

/** Letters get different values from one place, always the same ones. */
function valueAt(expr: Expr, place: number, context: CheckContext): number {
  const graph = prepare(expr, context);
  const given = new Map(lettersOfGraph(graph).map((name) => [name, place + (nameNumber(name) % 97) * 0.0413] as const));
  return isDoubleReady(graph, '', given) ? toDoubleFunction(graph, '', given)(0) : Number.NaN;
}

function nameNumber(name: string): number {
  let sum = 0;
  for (const letter of name) sum = sum * 31 + (letter.codePointAt(0) ?? 0);
  return sum;
}

function lettersOfGraph(graph: Graph): string[] {
  return graph.nodes.flatMap((node) => (node.op === 'letter' ? [node.name] : []));
}

function isClose(a: number, b: number): boolean {
  return Math.abs(a - b) <= 1e-7 * (1 + Math.abs(a) + Math.abs(b));
}

/** An equation that follows is true at the solutions of the one above. */
function afterStatement(above: Statement, context: CheckContext): (line: Line) => boolean {
  const letters = freeLetters(above, context);
  const [letter] = letters;
  if (letters.length !== 1 || letter === undefined) return () => false;
  const points = solutionsOf(above, letter, context);
  if (points.length === 0) return () => false;
  return (line) => {
    if (line.kind !== 'relation' || line.sign !== '=') return false;
    const graph = prepare(differenceExpr(line.left, line.right), context);
    if (!isDoubleReady(graph, letter, new Map())) return false;
    const f = toDoubleFunction(graph, letter, new Map());
    return points.every((x) => Math.abs(f(x)) <= 1e-6 * (1 + Math.abs(f(x + 1)) + Math.abs(f(x - 1))));
  };
}

function solutionsOf(above: Statement, letter: string, context: CheckContext): number[] {
  try {
    const set = solveStatement(above, {
      letter,
      given: new Map(),
      context,
      window: null,
      hints: [],
      families: new Set(),
    });
    return isFiniteSet(set) ? set.points.filter((_, k) => set.at[k]).map(approximate) : [];
  } catch (cause) {
    if (cause instanceof Unsettled) return [];
    throw cause;
  }
}
