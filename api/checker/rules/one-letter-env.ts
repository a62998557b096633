import type { Expr, Line } from '../../../shared/maths/expression.ts';
import { lettersOf } from '../../../shared/maths/letters.ts';
import { childrenOf } from '../../../shared/maths/walk.ts';
import type { CheckContext } from '../context.ts';
import { absolute, div, gcd, lcm, rational, type Rational } from '../numbers/rational.ts';
import { circularArguments, isPeriodic } from '../solving/circular.ts';
import type { Assignment } from '../solving/fraction.ts';
import type { Window } from '../solving/line-env.ts';
import { piBall } from '../numbers/elementary.ts';
import { degreeIn, linearForm, solveLinear } from '../solving/linear.ts';
import { approximate, enclose, type RealNumber } from '../solving/real-number.ts';
import { intersection, wholeLine, type RealSet } from '../solving/real-set.ts';
import { Unsettled } from '../solving/unsettled.ts';
import { signsOf } from '../solving/sign-map.ts';
import { differenceGraph, solveStatement, type SolveEnv } from '../statements/solve.ts';
import { comparesOf, exprsOfStatement, toStatement, type Statement } from '../statements/statement.ts';
import { isExactZero } from '../values/arithmetic.ts';
import type { Graph } from '../values/graph.ts';
import type { KnownValue } from '../values/value.ts';

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

/** Where lines with sines and the like are compared. */
export interface Frame {
  readonly window: Window;
  /** False where the lines need not repeat themselves beyond the window as they do in it. */
  readonly isWhole: boolean;
}

const longest = 400;
const anyReach = 60;

/**
 * The stretch on which lines with sines and the like are compared: what the assumptions leave, else one common period on
 * either side of everything that does not repeat itself. Null where the lines are not circular.
 */
export function frameFor(statements: readonly Statement[], universe: RealSet, env: SolveEnv): Frame | null {
  const exprs = statements.flatMap(exprsOfStatement);
  if (!exprs.some(isCircular) && env.families.size === 0) return null;
  const bounded = boundsOf(universe);
  if (bounded) return { window: bounded, isWhole: true };
  const periods = statements.flatMap((statement) => periodsOf(statement, env));
  const common = commonPeriod(periods);
  const far = Math.max(0, ...statements.map((statement) => farthestOf(statement, env)), farthestPoint(universe));
  const reach = Math.max(common ?? anyReach, 0.5) + far;
  if (!(reach <= longest)) throw new Unsettled('limit');
  // The ends are no multiples of pi: nothing of interest lies on them.
  return { window: { low: -reach - 0.317, high: reach + 0.317, isAll: false }, isWhole: common !== null };
}

function boundsOf(universe: RealSet): Window | null {
  const first = universe.points[0];
  const last = universe.points[universe.points.length - 1];
  if (!first || !last || universe.between[0] || universe.between[universe.points.length]) return null;
  return { low: approximate(first), high: approximate(last), isAll: true };
}

function isCircular(expr: Expr): boolean {
  if (expr.kind === 'call' && ['sin', 'cos', 'tan', 'cot', 'sec', 'csc'].includes(expr.name)) return true;
  return childrenOf(expr).some(isCircular);
}

/** A fraction, of pi or of 1; null where it is neither. */
type Period = { readonly ofPi: boolean; readonly length: Rational } | null;

function periodsOf(statement: Statement, env: SolveEnv): Period[] {
  return comparesOf(statement).flatMap(({ left, right }) => {
    const graph = differenceGraph(left, right, env);
    const round = circularArguments(graph, env.letter).map((argument) => {
      const slope = slopeOf({ nodes: graph.nodes, root: argument }, env.letter, env);
      if (slope?.kind === 'rational') return { ofPi: true, length: absolute(div(rational(2), slope.value)) };
      return slope?.kind === 'pi' ? { ofPi: false, length: absolute(div(rational(2), slope.value)) } : null;
    });
    const family = graph.nodes.find((node) => node.op === 'letter' && env.families.has(node.name));
    return family?.op === 'letter' ? [...round, familyPeriod(graph, family.name, env)] : round;
  });
}

/**
 * After how much the values of a general solution repeat themselves: the index may go up by one or by two, as in
 * (-1)^n pi/6 + n pi. Looked at for nine values to 36 digits; null where there is no such step.
 */
function familyPeriod(graph: Graph, index: string, env: SolveEnv): Period {
  if (degreeIn(graph, env.letter) !== 1) return null;
  const values = Array.from({ length: 9 }, (_, k) => {
    const root = solveLinear(graph, env.letter, new Map([...env.given, [index, rational(k - 4)]]), env.context);
    return root && enclose(root, periodBits).mid;
  });
  if (values.includes(null)) return null;
  const mids = values as bigint[];
  for (const step of [1, 2]) {
    const gap = (mids[step] as bigint) - (mids[0] as bigint);
    const isSteady = mids.every((mid, k) => k < step || isNearly(mid - (mids[k - step] as bigint), gap));
    const size = gap < 0n ? -gap : gap;
    const period =
      isSteady && size > 0n
        ? (shortMultiple(size, piBall(periodBits).mid, true) ?? shortMultiple(size, 1n << BigInt(periodBits), false))
        : null;
    if (period) return period;
  }
  return null;
}

const periodBits = 160;

function isNearly(a: bigint, b: bigint): boolean {
  const gap = a > b ? a - b : b - a;
  return gap < 1n << BigInt(periodBits - 120);
}

/** size / unit as a fraction with a denominator up to 120. */
function shortMultiple(size: bigint, unit: bigint, ofPi: boolean): Period {
  for (let den = 1n; den <= 120n; den += 1n) {
    const num = (2n * size * den + unit) / (2n * unit);
    if (num > 0n && isNearly(size * den, num * unit)) return { ofPi, length: rational(num, den) };
  }
  return null;
}

function slopeOf(graph: Graph, letter: string, env: SolveEnv): KnownValue | null {
  if (degreeIn(graph, letter) !== 1) return null;
  const slope = linearForm(graph, letter, env.given, 96, env.context)?.slope ?? null;
  return slope && isExactZero(slope) ? null : slope;
}

/** The least common multiple; null where the periods have none that is known, 0 for no periods. */
function commonPeriod(periods: readonly Period[]): number | null {
  const first = periods[0];
  if (periods.length === 0) return 0;
  if (!first || periods.some((period) => period?.ofPi !== first.ofPi)) return null;
  let { num, den } = first.length;
  for (const period of periods) {
    const { length } = period as NonNullable<Period>;
    num = lcm(num, length.num);
    den = gcd(den, length.den);
  }
  return (Number(num) / Number(den)) * (first.ofPi ? Math.PI : 1);
}

/** The size of the farthest point at which something that does not repeat itself changes. */
function farthestOf(statement: Statement, env: SolveEnv): number {
  switch (statement.kind) {
    case 'all':
    case 'any':
      return Math.max(0, ...statement.parts.map((part) => farthestOf(part, env)));
    case 'member':
      return farthestPoint(solveStatement(statement, env));
    case 'compare': {
      const graph = differenceGraph(statement.left, statement.right, env);
      if (graph.nodes.some((node) => node.op === 'letter' && env.families.has(node.name))) return 0;
      if (statement.sign === 'approx') return farthestPoint(solveStatement(statement, env));
      return farthestOfGraph(graph, env);
    }
    default:
      return 0;
  }
}

function farthestOfGraph(graph: Graph, env: SolveEnv): number {
  const node = graph.nodes[graph.root];
  if (isPeriodic(graph, env.letter)) return 0;
  if (node?.op === 'mul' || node?.op === 'div')
    return Math.max(...node.args.map((root) => farthestOfGraph({ nodes: graph.nodes, root }, env)));
  return farthestPoint(signsOf(graph, env));
}

function farthestPoint({ points }: { readonly points: readonly RealNumber[] }): number {
  return Math.max(0, ...points.map((point) => Math.abs(approximate(point))));
}
