import { lettersOf } from '../../../shared/maths/letters.ts';
import type { CheckContext } from '../context.ts';
import { ballSign, magnitude } from '../numbers/ball.ts';
import * as Q from '../numbers/rational.ts';
import { toKnownValue } from '../solving/point-value.ts';
import { Unsettled } from '../solving/unsettled.ts';
import { solveStatement, type SolveEnv } from '../statements/solve.ts';
import type { CompareStatement } from '../statements/statement.ts';
import {
  divKnown,
  isExactZero,
  isKnown,
  isReal,
  mulKnown,
  negateKnown,
  oneValue,
  subKnown,
  toBall,
  zeroValue,
} from '../values/arithmetic.ts';
import { evaluate } from '../values/evaluate.ts';
import { valueTex } from '../values/value-tex.ts';
import type { KnownValue } from '../values/value.ts';
import { subExprs } from './build.ts';
import { rateNamed } from './rates.ts';

const bits = 224;
const mostPoints = 14;
const agreementsNeeded = 4;

export type CurveAnswer =
  | { readonly kind: 'apart'; readonly at: Readonly<Record<string, string>> }
  | { readonly kind: 'agreed' }
  | { readonly kind: 'unknown' };

/**
 * Whether an equation with dy/dx is true on a curve: at points of the relation, with the rates that the equations with
 * rates give there. Every equation is linear in the rate that it is solved for.
 */
export function tryOnCurve(
  relations: readonly CompareStatement[],
  rated: readonly CompareStatement[],
  claim: CompareStatement,
  context: CheckContext,
): CurveAnswer {
  let agreed = 0;
  let apart: Readonly<Record<string, string>> | null = null;
  for (const start of pointsOn(relations, [...rated, claim], context)) {
    const point = withRates(start, rated, [claim], context);
    if (!point) continue;
    const truth = isTrueAt(claim, point, context);
    if (truth === false) apart ??= Object.fromEntries([...point].map(([name, value]) => [name, valueTex(value, bits)]));
    if (truth === true) agreed += 1;
  }
  // True on one branch of the curve and false on another: which one is meant is not said.
  if (apart) return agreed < 3 ? { kind: 'apart', at: apart } : { kind: 'unknown' };
  return { kind: agreed >= agreementsNeeded ? 'agreed' : 'unknown' };
}

type CurvePoint = Map<string, KnownValue>;

const firsts: readonly Q.Rational[] = [1, 3, 2, -1, 4, -2, 5, 6, -3]
  .map((n) => Q.rational(n))
  .concat([Q.rational(1, 2), Q.rational(3, 2), Q.rational(7, 3)]);

/** Points that satisfy the relations; without any, all letters are free. */
function pointsOn(
  relations: readonly CompareStatement[],
  others: readonly CompareStatement[],
  context: CheckContext,
): CurvePoint[] {
  const names = [...new Set([...relations, ...others].flatMap(lettersOfEquation))].filter(
    (name) => rateNamed(name) === null && !context.definitions.letters.has(name),
  );
  const [relation] = relations;
  const solved = relation && dependentOf(relation, others, context);
  const found: CurvePoint[] = [];
  for (let k = 0; k < firsts.length && found.length < mostPoints; k += 1) {
    const given = new Map(
      names
        .filter((name) => name !== solved)
        .map((name, j) => [name, firsts[(k + j * 4) % firsts.length] as Q.Rational]),
    );
    const start: CurvePoint = new Map([...given].map(([name, value]) => [name, { kind: 'rational', value }]));
    if (!relation || !solved) found.push(start);
    else
      for (const value of solutionsOf(relation, solved, given, context)) found.push(new Map(start).set(solved, value));
  }
  return found
    .filter((point) => relations.slice(1).every((other) => isTrueAt(other, point, context) === true))
    .sort((a, b) => weight(a) - weight(b));
}

/** Exact points first: a person puts them in by hand. */
function weight(point: CurvePoint): number {
  return [...point.values()].filter((value) => value.kind !== 'rational').length;
}

function lettersOfEquation({ left, right }: CompareStatement): string[] {
  return [...lettersOf(left), ...lettersOf(right)];
}

/** The letter that a rate is of, else one that the relation has. */
function dependentOf(
  relation: CompareStatement,
  others: readonly CompareStatement[],
  context: CheckContext,
): string | undefined {
  const names = lettersOfEquation(relation);
  const moving = others.flatMap(lettersOfEquation).flatMap((name) => rateNamed(name)?.of ?? []);
  return (
    moving.find((name) => names.includes(name)) ??
    names.find((name) => context.calculus?.dependents.has(name)) ??
    names[0]
  );
}

function solutionsOf(
  relation: CompareStatement,
  letter: string,
  given: ReadonlyMap<string, Q.Rational>,
  context: CheckContext,
): KnownValue[] {
  const window = { low: -8, high: 8, isAll: true };
  const env: SolveEnv = { letter, given, context, window, hints: [], families: new Set() };
  try {
    const set = solveStatement(relation, env);
    return set.points.filter((_, k) => set.at[k]).map((point) => toKnownValue(point, bits));
  } catch (cause) {
    if (cause instanceof Unsettled) return [];
    throw cause;
  }
}

/** Adds the rates, lowest order first; null where an equation does not give one. */
function withRates(
  start: CurvePoint,
  rated: readonly CompareStatement[],
  claims: readonly CompareStatement[],
  context: CheckContext,
): CurvePoint | null {
  const point = new Map(start);
  const names = [
    ...new Set([...rated, ...claims].flatMap(lettersOfEquation).filter((name) => rateNamed(name) !== null)),
  ];
  for (let round = 0; round < 4 && names.some((name) => !point.has(name)); round += 1) {
    for (const equation of rated) {
      const open = [...new Set(lettersOfEquation(equation))].filter(
        (name) => rateNamed(name) !== null && !point.has(name),
      );
      const [name] = open;
      if (open.length !== 1 || name === undefined) continue;
      const value = solveLinear(equation, name, point, context);
      if (value) point.set(name, value);
    }
  }
  return names.every((name) => point.has(name)) ? point : null;
}

function solveLinear(
  equation: CompareStatement,
  name: string,
  point: CurvePoint,
  context: CheckContext,
): KnownValue | null {
  const difference = subExprs(equation.left, equation.right);
  const worth = (value: KnownValue): KnownValue | null => {
    const result = evaluate(difference, new Map(point).set(name, value), bits, context);
    return isKnown(result) ? result : null;
  };
  const two: KnownValue = { kind: 'rational', value: Q.rational(2) };
  const [f0, f1, f2] = [worth(zeroValue), worth(oneValue), worth(two)];
  if (!f0 || !f1 || !f2) return null;
  const slope = subKnown(f1, f0, bits);
  const bend = subKnown(subKnown(f2, mulKnown(two, f1, bits), bits), negateKnown(f0), bits);
  if (!isNothing(bend) || isExactZero(slope)) return null;
  const result = divKnown(negateKnown(f0), slope, bits);
  return isKnown(result) ? result : null;
}

/** Zero to many digits. */
function isNothing(value: KnownValue): boolean {
  if (value.kind !== 'ball') return isExactZero(value);
  return ballSign(value.re) === 0 && magnitude(value.re.mid) + value.re.rad < 1n << BigInt(bits - 100);
}

/** False only where the two sides are certainly apart; null where it cannot be told. */
function isTrueAt({ left, right }: CompareStatement, point: CurvePoint, context: CheckContext): boolean | null {
  const [a, b] = [evaluate(left, point, bits, context), evaluate(right, point, bits, context)];
  if (!isKnown(a) || !isKnown(b) || !isReal(a) || !isReal(b)) return null;
  const difference = subKnown(a, b, bits);
  if (isNothing(difference)) return true;
  if (difference.kind !== 'ball') return false;
  return ballSign(toBall(difference, bits).re) === 0 ? null : false;
}
