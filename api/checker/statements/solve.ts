import type { Expr, NumberExpr, SetExpr } from '../../../shared/maths/expression.ts';
import { lettersOf } from '../../../shared/maths/letters.ts';
import { isApart, type Ball } from '../numbers/ball.ts';
import { mayBeRounded, rangeBits, rangeOf, roundingHalf } from './rounding.ts';
import { rational, type Rational } from '../numbers/rational.ts';
import type { Sign, SignMap } from '../solving/fraction-signs.ts';
import type { LineEnv } from '../solving/line-env.ts';
import { computedNumber } from '../solving/linear.ts';
import { rationalNumber, type RealNumber } from '../solving/real-number.ts';
import {
  complement,
  difference,
  emptySet,
  intersection,
  mapPieces,
  setOfPoints,
  union,
  wholeLine,
  type RealSet,
} from '../solving/real-set.ts';
import { signsOf } from '../solving/sign-map.ts';
import { surdToNumber, toSurd } from '../solving/surd.ts';
import { Unsettled } from '../solving/unsettled.ts';
import { isKnown } from '../values/arithmetic.ts';
import { evaluatePrepared, prepare } from '../values/evaluate.ts';
import type { Graph } from '../values/graph.ts';
import { lowerAll } from '../values/lower.ts';
import { familyPoints, familySets } from './family.ts';
import {
  comparesOf,
  isLetter,
  isListOfValues,
  type CompareStatement,
  type MemberStatement,
  type Statement,
} from './statement.ts';

/** How a statement about one letter is solved, and what its other letters stand for. */
export interface SolveEnv extends LineEnv {
  /** Letters that run through all whole numbers, as k in a general solution. */
  readonly families: ReadonlySet<string>;
}

/** The values of the letter for which a statement is true; throws Unsettled where that cannot be found. */
export function solveStatement(statement: Statement, env: SolveEnv): RealSet {
  const family = env.families.size > 0 ? familyOfOrders(statement, env) : null;
  if (family !== null) return familySets(statement, family, env, solveStatement);
  switch (statement.kind) {
    case 'always':
      return wholeLine;
    case 'never':
      return emptySet;
    case 'all':
      return statement.parts.map((part) => solveStatement(part, env)).reduce(intersection, wholeLine);
    case 'any':
      return statement.parts.map((part) => solveStatement(part, env)).reduce(union, emptySet);
    case 'member':
      return solveMember(statement, env);
    case 'compare':
      return solveCompare(statement, env);
  }
}

/** The index of a family in inequalities, such as pi/6 + 2k pi < x < 5pi/6 + 2k pi; null for anything else. */
function familyOfOrders(statement: Statement, { families }: SolveEnv): string | null {
  if (statement.kind !== 'all' && statement.kind !== 'compare') return null;
  const compares = comparesOf(statement);
  const isIn = ({ left, right }: CompareStatement, name: string): boolean =>
    [left, right].some((side) => lettersOf(side).includes(name));
  return [...families].find((name) => compares.some((c) => c.sign !== '=' && isIn(c, name))) ?? null;
}

/** left - right as one graph. */
export function differenceGraph(left: Expr, right: Expr, env: LineEnv): Graph {
  const { builder, roots } = lowerAll([left, right], env.context);
  const root = builder.add([roots[0] ?? 0, builder.negate(roots[1] ?? 0)]);
  return { nodes: builder.nodes, root };
}

function solveCompare(statement: CompareStatement, env: SolveEnv): RealSet {
  if (statement.sign === '=' && isListOfValues(statement, env.letter)) {
    const free = lettersOf(statement.right).filter((name) => !env.given.has(name));
    if (free.length === 0) return solveValue(statement.right, env);
  }
  const graph = differenceGraph(statement.left, statement.right, env);
  const family = graph.nodes.find((node) => node.op === 'letter' && env.families.has(node.name));
  if (family?.op === 'letter') {
    if (statement.sign !== '=') throw new Unsettled('not-covered');
    return familyPoints(graph, family.name, env);
  }
  if (statement.sign === 'approx') return solveApproximation(statement, env);
  return withSign(signsOf(graph, env), statement.sign);
}

/** letter = value: the point keeps the form that the author gave it. */
function solveValue(expr: Expr, env: SolveEnv): RealSet {
  const number = findConstant(expr, env);
  if (number === 'undefined') return emptySet;
  return setOfPoints([number]);
}

function withSign(signs: SignMap, sign: CompareStatement['sign']): RealSet {
  return mapPieces(signs, (s) => isTrueFor(s, sign));
}

/** Whether a comparison holds for a difference of this sign; without a value none does. */
export function isTrueFor(found: Sign, sign: CompareStatement['sign']): boolean {
  if (found === null) return false;
  switch (sign) {
    case '=':
    case 'approx':
      return found === 0;
    case '<':
      return found < 0;
    case '>':
      return found > 0;
    case '<=':
      return found <= 0;
    case '>=':
      return found >= 0;
    case '!=':
      return found !== 0;
  }
}

/** Where both sides of every comparison have a value. */
export function solveDefined(statement: Statement, env: SolveEnv): RealSet {
  switch (statement.kind) {
    case 'all':
    case 'any':
      return statement.parts.map((part) => solveDefined(part, env)).reduce(union, emptySet);
    case 'compare': {
      const graph = differenceGraph(statement.left, statement.right, env);
      if (graph.nodes.some((node) => node.op === 'letter' && env.families.has(node.name))) return wholeLine;
      return mapPieces(signsOf(graph, env), (s) => s !== null);
    }
    default:
      return wholeLine;
  }
}

/** A value after an approximation sign stands for all numbers that round to it (rule 9). */
function solveApproximation(statement: CompareStatement, env: SolveEnv): RealSet {
  const half = roundingHalf(statement.right) ?? roundingHalf(statement.left);
  if (!half) return solveRange(statement, env);
  const above = withSign(signsOf(shifted(statement, half, env), env), '>=');
  const below = withSign(signsOf(shifted(statement, { num: -half.num, den: half.den }, env), env), '<=');
  return intersection(above, below);
}

/** letter = an expression with rounded numbers in it, or two numbers of which some are rounded. */
function solveRange({ left, right }: CompareStatement, env: SolveEnv): RealSet {
  const isOpen = (expr: Expr): boolean => lettersOf(expr).some((name) => !env.given.has(name));
  if (isOpen(right) || !mayBeRounded(right)) throw new Unsettled('not-covered');
  const range = rangeOf(right, env.given, env.context);
  if (!range) throw new Unsettled('not-settled');
  if (isLetter(left, env.letter)) return rangeSet(range);
  const value = isOpen(left) ? null : rangeOf(left, env.given, env.context);
  if (!value) throw new Unsettled('not-covered');
  return isApart(value, range) ? emptySet : wholeLine;
}

function rangeSet({ mid, rad }: Ball): RealSet {
  const at = (num: bigint): RealNumber => rationalNumber(rational(num, 1n << BigInt(rangeBits)));
  return { points: [at(mid - rad), at(mid + rad)], at: [true, true], between: [false, true, false], reached: 'proved' };
}

function shifted(statement: CompareStatement, by: Rational, env: SolveEnv): Graph {
  const number: NumberExpr = {
    kind: 'number',
    numerator: by.num < 0n ? -by.num : by.num,
    denominator: by.den,
    written: 'integer',
    decimals: 0,
    span: statement.left.span,
  };
  const sign = by.num < 0n ? 'minus' : 'plus';
  const span = statement.left.span;
  const left: Expr = {
    kind: 'sum',
    terms: [
      { sign: 'plus', expr: statement.left, span },
      { sign, expr: number, span },
    ],
    span,
  };
  return differenceGraph(left, statement.right, env);
}

function solveMember(statement: MemberStatement, env: SolveEnv): RealSet {
  if (statement.letter && (statement.letter.kind !== 'letter' || statement.letter.name !== env.letter)) {
    throw new Unsettled('not-covered');
  }
  const inside = solveSet(statement.set, env);
  return statement.negated ? complement(inside) : inside;
}

function solveSet(set: SetExpr, env: SolveEnv): RealSet {
  switch (set.kind) {
    case 'empty':
      return emptySet;
    case 'reals':
    case 'complex':
      return wholeLine;
    case 'finite':
      return setOfPoints(set.items.map((item) => constantNumber(item, env)));
    case 'interval':
      return solveInterval(set, env);
    case 'union':
      return set.parts.map((part) => solveSet(part, env)).reduce(union, emptySet);
    case 'intersection':
      return set.parts.map((part) => solveSet(part, env)).reduce(intersection, wholeLine);
    case 'without':
      return difference(solveSet(set.from, env), solveSet(set.removed, env));
    default:
      throw new Unsettled('not-covered');
  }
}

function solveInterval(set: Extract<SetExpr, { kind: 'interval' }>, env: SolveEnv): RealSet {
  const from = set.from && constantNumber(set.from, env);
  const to = set.to && constantNumber(set.to, env);
  const right = from ? afterPoint(from, set.fromClosed) : wholeLine;
  const left = to ? complement(afterPoint(to, !set.toClosed)) : wholeLine;
  return intersection(right, left);
}

function afterPoint(point: RealNumber, closed: boolean): RealSet {
  return { points: [point], at: [closed], between: [false, true], reached: 'proved' };
}

/** The number that an expression without free letters is worth; throws Unsettled where it has none. */
export function constantNumber(expr: Expr, env: SolveEnv): RealNumber {
  const number = findConstant(expr, env);
  if (number === 'undefined') throw new Unsettled('not-covered');
  return number;
}

function findConstant(expr: Expr, env: SolveEnv): RealNumber | 'undefined' {
  const graph = prepare(expr, env.context);
  const surd = toSurd(graph, env.given);
  if (surd) return surdToNumber(surd);
  const point = new Map([...env.given].map(([name, value]) => [name, { kind: 'rational' as const, value }]));
  if (evaluatePrepared(graph, point, 160, env.context).kind === 'undefined') return 'undefined';
  const number = computedNumber((bits) => {
    const value = evaluatePrepared(graph, point, bits, env.context);
    return isKnown(value) ? value : null;
  });
  if (!number) throw new Unsettled('not-covered');
  return number.kind === 'computed' ? { ...number, expr } : number;
}
