import type { CheckContext } from '../context.ts';
import type { Evidence } from '../../../shared/schemas/verdict.ts';
import { reduceFraction } from '../solving/fraction.ts';
import { dividePolynomials, gcdPolynomials, squareFreePart } from '../solving/polynomial.ts';
import {
  difference,
  emptySet,
  intersection,
  isEmptySet,
  isFiniteSet,
  setOfPoints,
  type RealSet,
} from '../solving/real-set.ts';
import { Unsettled } from '../solving/unsettled.ts';
import { solveDefined, solveStatement, type SolveEnv } from '../statements/solve.ts';
import { truthAt } from '../statements/truth.ts';
import { comparesOf, type CompareStatement, type Statement } from '../statements/statement.ts';
import { equationFraction } from './complex-roots.ts';
import { deriveEquations } from './derived-equations.ts';
import { areSameUpToFactor } from './same-equation.ts';

export type Operation = NonNullable<Evidence['operation']>;

/** What a step that gained solutions is explained by (rule 3), or null where no operation does. */
export function explainGain(above: Statement, below: Statement, gained: RealSet, env: SolveEnv): Operation | null {
  // The operations gain single values: a whole stretch comes from none of them.
  if (!isFiniteSet(gained) && above.kind === 'compare' && equationFraction(above, env)) return null;
  const cases = above.kind === 'any' ? above.parts : [above];
  if (cases.length > 1) return explainByCases(cases, below, gained, env);
  if (above.kind !== 'compare' || above.sign !== '=') return explainParts(above, below, gained, env);
  return explainEquation(above, below, gained, env);
}

/** Every gained value has to be explained from one of the cases of the line above. */
function explainByCases(
  cases: readonly Statement[],
  below: Statement,
  gained: RealSet,
  env: SolveEnv,
): Operation | null {
  let rest = gained;
  let operation: Operation | null = null;
  for (const part of cases) {
    if (part.kind !== 'compare' || part.sign !== '=') continue;
    for (const derived of deriveEquations(part)) {
      const next = withoutSolutions(rest, derived.statement, env);
      if (next !== rest) operation ??= derived.operation;
      rest = next;
    }
  }
  void below;
  return isEmptySet(rest) ? operation : null;
}

/** What is left of a set without the solutions of a statement; single points are put in. */
function withoutSolutions(rest: RealSet, statement: Statement, env: SolveEnv): RealSet {
  if (!isFiniteSet(rest)) return difference(rest, solveOrNothing(statement, env) ?? emptySet);
  const points = rest.points.filter((point, k) => rest.at[k] && truthAt(statement, point, env)?.isTrue !== true);
  return points.length === rest.points.length ? rest : setOfPoints(points);
}

/** Several equations at once: one of them was changed, the others are still there or were dropped by mistake. */
function explainParts(above: Statement, below: Statement, gained: RealSet, env: SolveEnv): Operation | null {
  if (above.kind !== 'all') return null;
  for (const part of comparesOf(above)) {
    const found = part.sign === '=' ? explainEquation(part, below, gained, env) : null;
    if (found) return found;
  }
  return null;
}

function explainEquation(above: CompareStatement, below: Statement, gained: RealSet, env: SolveEnv): Operation | null {
  const multiplied = explainMultiple(above, below, gained, env);
  if (multiplied) return multiplied;
  for (const derived of deriveEquations(above)) {
    const rest = withoutSolutions(gained, derived.statement, env);
    if (isEmptySet(rest)) return derived.operation;
  }
  return explainRemoved(above, below, gained, env, env.context);
}

function solveOrNothing(statement: Statement, env: SolveEnv): RealSet | null {
  try {
    return solveStatement(statement, env);
  } catch (cause) {
    if (cause instanceof Unsettled) return null;
    throw cause;
  }
}

/** New left minus right is the old one times a polynomial, denominators cleared. */
function explainMultiple(above: CompareStatement, below: Statement, gained: RealSet, env: SolveEnv): Operation | null {
  if (below.kind !== 'compare' || below.sign !== '=') return null;
  const a = equationFraction(above, env);
  const b = a && equationFraction(below, env);
  if (!a || !b || b.num.length === 0) return null;
  const old = reduceFraction(a);
  const fresh = reduceFraction(b);
  if (old.num.length === 0) return null;
  const holes = squareFreePart(old.holes);
  const quotient = dividePolynomials(fresh.num, squareFreePart(old.num));
  if (!quotient) return null;
  const atHoles = squareFreePart(quotient);
  const onlyHoles = atHoles.length === 1 || gcdPolynomials(atHoles, holes).length === atHoles.length;
  // A line that is never true may only gain what its own denominators had shut out.
  if (old.num.length === 1 && !onlyHoles) return null;
  void gained;
  return onlyHoles && old.den.length === 1 && atHoles.length === 1 ? 'removed' : 'multiply';
}

/** A term or factor removed, or logarithms combined: the same equation where the old one has values. */
function explainRemoved(
  above: CompareStatement,
  below: Statement,
  gained: RealSet,
  env: SolveEnv,
  context: CheckContext,
): Operation | null {
  if (below.kind !== 'compare' || below.sign !== '=') return null;
  const defined = solveDefined(above, env);
  if (!isEmptySet(intersection(gained, defined))) return null;
  if (!areSameUpToFactor(above, below, env, context)) return null;
  return JSON.stringify(above, (_, value: unknown) => (typeof value === 'bigint' ? String(value) : value)).match(
    /"(ln|log)"/,
  )
    ? 'logarithm'
    : 'removed';
}
