import type { Expr } from '../../../shared/maths/expression.ts';
import { lettersOf } from '../../../shared/maths/letters.ts';
import { printExpr } from '../../../shared/maths/print.ts';
import type { Note } from '../../../shared/schemas/verdict.ts';
import { compareExpressions } from '../compare/compare-expressions.ts';
import type { CheckContext } from '../context.ts';
import { judgeFormula } from '../rules/formula.ts';
import { judgeSameEquation } from '../rules/same-equation.ts';
import type { StatementQuestion } from '../rules/statement-step.ts';
import { fails, holds, undecided, type StepResult } from '../rules/step-result.ts';
import { exprsOfStatement, type CompareStatement, type Statement } from '../statements/statement.ts';
import { divExprs, isZeroExpr, mulExprs, negateExpr, subExprs } from './build.ts';
import { tryOnCurve } from './curve.ts';
import { differentiate } from './differentiate.ts';
import { rateName, rateNamed } from './rates.ts';
import { judgeFamilies, type Axes } from './families.ts';
import { carriedOut } from './reduce.ts';
import { judgeSolutionCurve } from './solution-curves.ts';
import { indefiniteVariables } from './scope.ts';

/** Equations with indefinite integrals or a constant of integration on the way; null for all others. */
export function judgeIntegralEquations({
  above,
  below,
  settings,
  context,
  families,
}: StatementQuestion & { readonly families?: ReadonlySet<string> }): StepResult | null {
  if (!context.calculus?.hasIntegral) return null;
  if (!isEquation(above) || !isEquation(below)) return isEquation(above) ? judgeChoices(above, below, context) : null;
  const constants = [above, below].map((statement) =>
    lettersIn(statement).filter((name) => context.calculus?.constants.has(name)),
  );
  const integrals = [above, below].map((statement) => exprsOfStatement(statement).flatMap(indefiniteVariables));
  const rates = [above, below].map((statement) => lettersIn(statement).filter((name) => rateNamed(name) !== null));
  const isFreeBelow = constants[1]?.length !== 0 || integrals[1]?.length !== 0;
  const orders = rates.map((names) => Math.max(0, ...names.map((name) => rateNamed(name)?.order ?? 0))) as [
    number,
    number,
  ];
  if (orders[0] > orders[1]) return solved(above, below, isFreeBelow, { settings, context, families });
  if ((rates[0]?.length ?? 0) + (rates[1]?.length ?? 0) > 0) return null;
  if (constants.flat().length + integrals.flat().length === 0) return null;
  const isFreeAbove = constants[0]?.length !== 0 || integrals[0]?.length !== 0;
  const notes: Note[] = isFreeAbove && !isFreeBelow ? ['constant'] : [];
  if (notes.length > 0 && context.calculus.constantNeeded) return noConstant(below);
  const areFamilies = constants.every((names) => names.length === 1) && integrals.flat().length === 0;
  const axes = areFamilies ? axesOf(above, below, context) : null;
  const found = axes && judgeFamilies(above, below, axes, context);
  if (found && found.ruling !== 'undecided') return found;
  return sameCurves(above, below, notes, integrals.flat().length > 0, context);
}

function isEquation(statement: Statement): statement is CompareStatement {
  return statement.kind === 'compare' && statement.sign === '=';
}

/** y = the one or the other curve. */
function judgeChoices(above: CompareStatement, below: Statement, context: CheckContext): StepResult | null {
  if (below.kind !== 'any' || !below.parts.every(isEquation)) return null;
  const axes = axesOf(above, below, context);
  const found = axes && judgeFamilies(above, below, axes, context);
  return found?.ruling === 'undecided' ? null : found;
}

/** The two letters that vary: those of dy/dx, or those that the derivation integrates by. */
function axesOf(above: Statement, below: Statement, { calculus }: CheckContext): Axes | null {
  const letters = new Set([...lettersIn(above), ...lettersIn(below)]);
  const pairs = [...(calculus?.dependents ?? [])].filter(([y, x]) => letters.has(y) && letters.has(x));
  if (pairs.length === 1 && pairs[0]) return { y: pairs[0][0], x: pairs[0][1] };
  const [a, b, ...more] = [...(calculus?.variables ?? [])].filter((name) => letters.has(name));
  if (pairs.length > 0 || a === undefined || b === undefined || more.length > 0) return null;
  return b === 'x' || b === 't' ? { x: b, y: a } : { x: a, y: b };
}

function lettersIn(statement: Statement): string[] {
  return [...new Set(exprsOfStatement(statement).flatMap((expr) => lettersOf(expr)))];
}

function noConstant(below: CompareStatement): StepResult {
  return fails('proved', { meant: `${printExpr(below.left)}=${printExpr(below.right)}+C` }, ['constant']);
}

type Rest = Pick<StatementQuestion, 'settings' | 'context'> & { readonly families?: ReadonlySet<string> | undefined };

/** A relation between x and y as the solution of an equation for dy/dx: its derivative gives that equation. */
function solved(
  above: CompareStatement,
  below: CompareStatement,
  isFree: boolean,
  { settings, context }: Rest,
): StepResult {
  const names = lettersIn(above).filter((name) => rateNamed(name) !== null);
  const rate = names.length === 1 ? rateNamed(names[0] as string) : null;
  const lower = rate && rate.order > 1 ? rateName({ ...rate, order: rate.order - 1 }) : rate?.of;
  const direct = judgeSolutionCurve(above, below, context);
  if (direct?.ruling === 'holds' || (direct?.ruling === 'fails' && isFree)) return direct;
  const open = exprsOfStatement(below).flatMap(indefiniteVariables);
  if (!rate || lower === undefined || !(lettersIn(below).includes(lower) || open.includes(lower)))
    return direct ?? undecided('not-covered');
  if (!isFree && context.calculus?.constantNeeded) return noConstant(below);
  const sides = [below.left, below.right].map((side) => differentiate(carriedOut(side, context), rate.by, context)) as [
    Expr,
    Expr,
  ];
  const derived: CompareStatement = { kind: 'compare', left: sides[0], sign: '=', right: sides[1] };
  const notes: Note[] = isFree ? [] : ['constant'];
  const same = judgeSameEquation(above, derived, context);
  if (same) return holds(same.reached ?? 'proved', notes);
  const formula = judgeFormula({
    above,
    below: derived,
    letter: names[0] as string,
    reference: above,
    families: new Set(),
    settings,
    context,
  });
  if (formula.ruling === 'holds') return holds(formula.reached ?? 'sampled', notes);
  const found = tryOnCurve([below], [derived], above, context);
  if (found.kind === 'apart')
    return fails('proved', { witness: { at: { ...found.at }, above: 'false', below: 'true' } });
  return found.kind === 'agreed' ? holds('sampled', notes) : undecided('not-settled');
}

/**
 * The curves left - right = constant are the same when the gradients are parallel everywhere. A fault shows at a point
 * where the slopes of the curves through it differ.
 */
function sameCurves(
  above: CompareStatement,
  below: CompareStatement,
  notes: readonly Note[],
  hasIntegral: boolean,
  context: CheckContext,
): StepResult | null {
  const moving = lettersIn(above)
    .concat(lettersIn(below))
    .filter((name) => !context.calculus?.constants.has(name));
  const variables = [...new Set(moving)].filter(
    (name) => context.calculus?.variables.has(name) || context.calculus?.dependents.has(name) || isBy(name, context),
  );
  if (variables.length === 1)
    variables.push(...[...new Set(moving)].filter((name) => !variables.includes(name)).slice(0, 1));
  const [x, y] = variables;
  if (x === undefined) return undecided('not-covered');
  const [f, g] = [above, below].map(({ left, right }) =>
    subExprs(carriedOut(left, context), carriedOut(right, context)),
  ) as [Expr, Expr];
  const along = (expr: Expr, name: string): Expr => differentiate(expr, name, context, true);
  if (y === undefined || variables.length > 2) return hasIntegral ? exactly(f, g, variables, notes, context) : null;
  const [fx, fy, gx, gy] = [along(f, x), along(f, y), along(g, x), along(g, y)];
  // A line without x and y, such as what C is, says nothing of the curves.
  if (
    [
      [fx, fy],
      [gx, gy],
    ].some((pair) => pair.every((slope) => isZeroExpr(slope as Expr)))
  )
    return undecided('not-settled');
  const slopes = [fx, fy, gx, gy].flatMap((expr) => lettersOf(expr));
  if (slopes.some((name) => context.calculus?.constants.has(name)))
    return hasIntegral ? undecided('not-settled') : null;
  const found = compareExpressions(negateExpr(divExprs(fx, fy)), negateExpr(divExprs(gx, gy)), context);
  if (found.kind === 'equal') return holds(found.reached, notes);
  if (found.kind !== 'different') {
    const crossed = compareExpressions(mulExprs(fx, gy), mulExprs(fy, gx), context);
    return crossed.kind === 'equal' ? holds(crossed.reached, notes) : undecided('not-settled');
  }
  const { atTex, above: slopeAbove, below: slopeBelow } = found.witness;
  return fails('proved', { witness: { at: { ...atTex }, above: slopeAbove, below: slopeBelow } });
}

function isBy(name: string, context: CheckContext): boolean {
  return [...(context.calculus?.dependents.values() ?? [])].includes(name);
}

/** One variable only: left - right changes by a constant. */
function exactly(
  f: Expr,
  g: Expr,
  variables: readonly string[],
  notes: readonly Note[],
  context: CheckContext,
): StepResult {
  let reached: 'proved' | 'sampled' = 'proved';
  for (const name of variables) {
    const found = compareExpressions(
      differentiate(f, name, context, true),
      differentiate(g, name, context, true),
      context,
    );
    if (found.kind !== 'equal') return undecided('not-settled');
    if (found.reached === 'sampled') reached = 'sampled';
  }
  return holds(reached, notes);
}
