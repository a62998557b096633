import type { Expr, Line } from '../../../shared/maths/expression.ts';
import { lettersOf } from '../../../shared/maths/letters.ts';
import { childrenOf } from '../../../shared/maths/walk.ts';
import type { CheckContext } from '../context.ts';
import { circularArguments, knownToNumber } from '../solving/circular.ts';
import type { Assignment } from '../solving/fraction.ts';
import type { Window } from '../solving/line-env.ts';
import { degreeIn, linearForm } from '../solving/linear.ts';
import { approximate } from '../solving/real-number.ts';
import { intersection, wholeLine, type RealSet } from '../solving/real-set.ts';
import { Unsettled } from '../solving/unsettled.ts';
import { solveStatement, type SolveEnv } from '../statements/solve.ts';
import { exprsOfStatement, toStatement, type Statement } from '../statements/statement.ts';
import { prepare } from '../values/evaluate.ts';

/** The values that the task's assumptions leave to the letter. */
export function universeOf(letter: string, given: Assignment, context: CheckContext): RealSet {
  let universe = wholeLine;
  for (const line of context.assumptions) {
    const statement = assumptionOn(line, letter, given);
    if (!statement) continue;
    const env: SolveEnv = { letter, given, context, window: null, hints: [], families: new Set() };
    universe = intersection(universe, solveStatement(statement, env));
  }
  return universe;
}

function assumptionOn(line: Line, letter: string, given: Assignment): Statement | null {
  const letters = lettersOf(line);
  if (!letters.includes(letter) || !letters.every((name) => name === letter || given.has(name))) return null;
  if (
    line.kind === 'membership' &&
    (line.set.kind === 'integers' || line.set.kind === 'naturals' || line.set.kind === 'rationals')
  ) {
    return null;
  }
  return toStatement(line);
}

/**
 * The stretch on which lines with sines and the like are compared: what the assumptions leave, else two of their
 * common periods to either side of zero. Null where the lines are not circular.
 */
export function windowFor(
  statements: readonly Statement[],
  universe: RealSet,
  letter: string,
  given: Assignment,
  families: ReadonlySet<string>,
  context: CheckContext,
): Window | null {
  const exprs = statements.flatMap(exprsOfStatement);
  if (!exprs.some(isCircular) && families.size === 0) return null;
  const bounded = boundsOf(universe);
  if (bounded) return bounded;
  let reach = 7;
  for (const period of exprs.flatMap((expr) => periodsOf(expr, letter, given, context))) {
    const turns = period / (2 * Math.PI);
    // Periods are multiples or parts of a full turn in school work; others get a long stretch.
    reach = Math.max(reach, Number.isInteger(turns * 12) ? 2 * period : 60);
  }
  if (reach > 400) throw new Unsettled('limit');
  // The ends are no multiples of pi: nothing of interest lies on them.
  return { low: -reach - 0.317, high: reach + 0.317 };
}

function boundsOf(universe: RealSet): Window | null {
  const first = universe.points[0];
  const last = universe.points[universe.points.length - 1];
  if (!first || !last || universe.between[0] || universe.between[universe.points.length]) return null;
  return { low: approximate(first), high: approximate(last) };
}

function isCircular(expr: Expr): boolean {
  if (expr.kind === 'call' && ['sin', 'cos', 'tan', 'cot', 'sec', 'csc'].includes(expr.name)) return true;
  return childrenOf(expr).some(isCircular);
}

function periodsOf(expr: Expr, letter: string, given: Assignment, context: CheckContext): number[] {
  const graph = prepare(expr, context);
  return circularArguments(graph, letter).map((argument) => {
    const inner = { nodes: graph.nodes, root: argument };
    const form = degreeIn(inner, letter) === 1 ? linearForm(inner, letter, given, 96, context) : null;
    const slope = form ? Math.abs(knownToNumber(form.slope)) : 0;
    return slope === 0 ? 40 : (2 * Math.PI) / slope;
  });
}
