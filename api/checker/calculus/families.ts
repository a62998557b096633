import type { Expr } from '../../../shared/maths/expression.ts';
import { lettersOf } from '../../../shared/maths/letters.ts';
import { mapExpr } from '../../../shared/maths/walk.ts';
import { compareExpressions } from '../compare/compare-expressions.ts';
import type { CheckContext } from '../context.ts';
import * as Q from '../numbers/rational.ts';
import type { Assignment } from '../solving/fraction.ts';
import { isEmptySet } from '../solving/real-set.ts';
import { Unsettled } from '../solving/unsettled.ts';
import { solveStatement } from '../statements/solve.ts';
import type { CompareStatement, Statement } from '../statements/statement.ts';
import { fails, holds, undecided, type StepResult } from '../rules/step-result.ts';
import { divExprs, isZeroExpr, letterOf, mulExprs, negateExpr, powExprs, subExprs, zeroExpr } from './build.ts';
import { differentiate } from './differentiate.ts';
import { isFree, linearIn } from './integrand.ts';
import { substitute } from './substitute.ts';

/** Curves in x and y, one for each value of a constant. */
interface Family {
  readonly equation: CompareStatement;
  readonly constant: string;
}

/** The slope of the curves, by x and y alone, or along a curve y = g(x) with its constant. */
type Slope =
  | { readonly kind: 'everywhere'; readonly slope: Expr; readonly constant: Expr; readonly isPositive: boolean }
  | { readonly kind: 'explicit'; readonly y: Expr; readonly slope: Expr };

export interface Axes {
  readonly x: string;
  readonly y: string;
}

/**
 * Whether two equations with one constant of integration each are the same curves: the slope at a point, once the constant
 * is eliminated, is the same, and at sample points no curve is lost. Null where the lines are no such families.
 */
export function judgeFamilies(
  above: Statement,
  below: Statement,
  axes: Axes,
  context: CheckContext,
): StepResult | null {
  const from = familyOf(above, context);
  const to = below.kind === 'any' ? below.parts.map((part) => familyOf(part, context)) : [familyOf(below, context)];
  if (!from || to.length === 0 || to.includes(null)) return null;
  const source = slopeOf(from, axes, context);
  if (!source) return null;
  let reached: 'proved' | 'sampled' = 'proved';
  for (const family of to as Family[]) {
    const target = slopeOf(family, axes, context);
    const found = target && compareSlopes(source, target, axes, context);
    if (!found || found.kind === 'undecided') return undecided('not-settled');
    if (found.kind === 'different') {
      const { atTex, above: a, below: b } = found.witness;
      const hasCurves = [source, target].every((slope) => isOnCurve(slope, found.witness.at, context));
      return hasCurves
        ? fails('proved', { witness: { at: { ...atTex }, above: a, below: b } })
        : undecided('not-settled');
    }
    if (found.kind !== 'equal') return undecided('not-settled');
    if (found.reached === 'sampled') reached = 'sampled';
  }
  return losesCurves(from, to as Family[], axes, context) ? undecided('not-settled') : holds(reached);
}

function familyOf(statement: Statement, context: CheckContext): Family | null {
  if (statement.kind !== 'compare' || statement.sign !== '=') return null;
  const letters = [...lettersOf(statement.left), ...lettersOf(statement.right)];
  const constants = [...new Set(letters)].filter((name) => context.calculus?.constants.has(name));
  const [constant] = constants;
  return constant !== undefined && constants.length === 1 ? { equation: statement, constant } : null;
}

function slopeOf({ equation, constant }: Family, { x, y }: Axes, context: CheckContext): Slope | null {
  const { left, right } = equation;
  const along = (expr: Expr, by: string): Expr => differentiate(expr, by, context, true);
  const factor = 'z_{2}';
  const whole = withFactor(subExprs(left, right), constant, factor);
  const isPositive = whole.isReplaced;
  const name = isPositive ? factor : constant;
  const linear = isFree(whole.expr, constant) || !isPositive ? linearIn(whole.expr, name) : null;
  if (linear) {
    const value = negateExpr(divExprs(linear.constant, linear.slope));
    const [fx, fy] = [along(whole.expr, x), along(whole.expr, y)].map((slope) => substitute(slope, name, value)) as [
      Expr,
      Expr,
    ];
    if (isZeroExpr(fy)) return null;
    return { kind: 'everywhere', slope: negateExpr(divExprs(fx, fy)), constant: value, isPositive };
  }
  if (left.kind !== 'letter' || left.name !== y || lettersOf(right).includes(y)) return null;
  return { kind: 'explicit', y: right, slope: along(right, x) };
}

/** e^(u+C) as e^u times a positive letter. */
function withFactor(expr: Expr, constant: string, factor: string): { expr: Expr; isReplaced: boolean } {
  let isReplaced = false;
  const replaced = mapExpr(expr, (node) => {
    const exponent = exponentOfE(node);
    const linear = exponent && linearIn(exponent, constant);
    if (!linear || lettersOf(linear.slope).length > 0) return node;
    isReplaced = true;
    const e: Expr = { kind: 'constant', name: 'e', span: node.span };
    const power = powExprs(letterOf(factor), linear.slope);
    return isZeroExpr(linear.constant) ? power : mulExprs(powExprs(e, linear.constant), power);
  });
  return { expr: replaced, isReplaced };
}

function exponentOfE(node: Expr): Expr | null {
  if (node.kind === 'call' && node.name === 'exp') return node.args[0] ?? null;
  return node.kind === 'power' && node.base.kind === 'constant' && node.base.name === 'e' ? node.exponent : null;
}

function compareSlopes(a: Slope, b: Slope, { y }: Axes, context: CheckContext) {
  if (a.kind === 'everywhere' && b.kind === 'everywhere') return compareExpressions(a.slope, b.slope, context);
  if (a.kind === 'everywhere' && b.kind === 'explicit')
    return compareExpressions(substitute(a.slope, y, b.y), b.slope, context);
  if (a.kind === 'explicit' && b.kind === 'everywhere')
    return compareExpressions(a.slope, substitute(b.slope, y, a.y), context);
  return null;
}

/** Whether a curve of the family goes through the point: its constant has to be one that can be. */
function isOnCurve(slope: Slope, at: ReadonlyMap<string, unknown>, context: CheckContext): boolean {
  if (slope.kind === 'explicit') return true;
  if (!slope.isPositive) return true;
  const given = assignmentOf(at);
  if (!given) return false;
  const statement: Statement = { kind: 'compare', left: letterOf('z_{3}'), sign: '=', right: slope.constant };
  const positive: Statement = { kind: 'compare', left: letterOf('z_{3}'), sign: '>', right: zeroExpr };
  return canBe({ kind: 'all', parts: [statement, positive] }, 'z_{3}', given, context) === true;
}

function assignmentOf(at: ReadonlyMap<string, unknown>): Assignment | null {
  const given = new Map<string, Q.Rational>();
  for (const [name, value] of at) {
    const known = value as { kind: string; value?: Q.Rational };
    if (known.kind !== 'rational' || !known.value) return null;
    given.set(name, known.value);
  }
  return given;
}

function canBe(statement: Statement, letter: string, given: Assignment, context: CheckContext): boolean | null {
  try {
    const env = { letter, given, context, window: null, hints: [], families: new Set<string>() };
    return !isEmptySet(solveStatement(statement, env));
  } catch (cause) {
    if (cause instanceof Unsettled) return null;
    throw cause;
  }
}

const points: readonly (readonly [Q.Rational, Q.Rational])[] = [
  [Q.rational(1), Q.rational(2)],
  [Q.rational(2), Q.rational(-1)],
  [Q.rational(-1), Q.rational(1, 2)],
  [Q.rational(-2), Q.rational(-3)],
];

/** Whether a point that a curve above goes through has no curve below. */
function losesCurves(from: Family, to: readonly Family[], { x, y }: Axes, context: CheckContext): boolean {
  for (const [px, py] of points) {
    const given = new Map(
      [from, ...to].flatMap(({ equation, constant }) =>
        [...lettersOf(equation.left), ...lettersOf(equation.right)]
          .filter((name) => name !== constant && !context.calculus?.constants.has(name))
          .map((name, k) => [name, Q.rational(k + 3, 2)] as const),
      ),
    );
    given.set(x, px).set(y, py);
    const before = canBe(from.equation, from.constant, given, context);
    if (before === false) continue;
    const after = to.map(({ equation, constant }) => canBe(equation, constant, given, context));
    if (!after.includes(true) && !isShutOut(y, py, context)) return true;
  }
  return false;
}

function isShutOut(name: string, value: Q.Rational, context: CheckContext): boolean {
  return context.assumptions.some((line) => {
    if (!lettersOf(line).includes(name)) return false;
    if (line.kind !== 'relation') return true;
    const statement: Statement = { kind: 'compare', left: line.left, sign: line.sign, right: line.right };
    return canBe(statement, 'z_{3}', new Map([[name, value]]), context) !== true;
  });
}
