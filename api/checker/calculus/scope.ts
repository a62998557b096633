import type { Expr, Line } from '../../../shared/maths/expression.ts';
import { lettersOf } from '../../../shared/maths/letters.ts';
import { childrenOf, exprsOf } from '../../../shared/maths/walk.ts';
import type { CalculusScope } from '../context.ts';
import { rateNamed } from './rates.ts';

/** What the lines of a derivation say about its calculus as a whole. */
export function scopeOf(lines: readonly (Line | null)[], constantNeeded: boolean): CalculusScope {
  const dependents = new Map<string, string>();
  const variables = new Set<string>();
  const constants = new Set<string>();
  const before = new Set<string>();
  let hasIntegral = false;
  for (const line of lines) {
    if (!line) continue;
    const exprs = exprsOf(line);
    const letters = new Set(lettersOf(line));
    for (const integral of exprs.flatMap(integralsIn)) variables.add(integral.variable);
    for (const name of letters) {
      const rate = rateNamed(name);
      if (rate) dependents.set(rate.of, rate.by);
    }
    if (hasIntegral) {
      for (const name of letters) if (!before.has(name) && rateNamed(name) === null) constants.add(name);
    } else if (line.kind === 'relation' && exprs.some((expr) => integralsIn(expr).length > 0)) {
      // The constant may stand beside the integral in the line that brings it: S 2x dx = x^2 + C.
      for (const name of letters) if (!before.has(name) && usualConstants.has(name.charAt(0))) constants.add(name);
    }
    hasIntegral ||=
      exprs.some((expr) => integralsIn(expr).some(({ from }) => from === null)) ||
      [...letters].some((name) => rateNamed(name) !== null);
    if (line.kind === 'definition') before.add(line.name);
    for (const name of letters) before.add(name);
  }
  const first = lines[0];
  const isRelation =
    first !== null && first !== undefined && first.kind !== 'expression' && first.kind !== 'definition';
  const ambiguous = new Map<string, string>();
  for (const operator of lines.flatMap((line) => (line ? exprsOf(line).flatMap(derivativesIn) : []))) {
    const { variable, operand } = operator;
    if (operator.partial || variable === 'y' || dependents.has('y') || !lettersOf(operand).includes('y')) continue;
    (isRelation ? dependents : ambiguous).set('y', variable);
  }
  for (const name of variables) constants.delete(name);
  for (const name of [...dependents.keys(), ...dependents.values()]) constants.delete(name);
  return { dependents, ambiguous, variables, constants, hasIntegral, constantNeeded, known: new WeakMap() };
}

const usualConstants: ReadonlySet<string> = new Set(['C', 'c', 'K', 'k', 'D', 'A', 'B']);

function derivativesIn(expr: Expr): Extract<Expr, { kind: 'derivative' }>[] {
  const inside = childrenOf(expr).flatMap(derivativesIn);
  return expr.kind === 'derivative' ? [expr, ...inside] : inside;
}

function integralsIn(expr: Expr): Extract<Expr, { kind: 'integral' }>[] {
  const inside = childrenOf(expr).flatMap(integralsIn);
  return expr.kind === 'integral' ? [expr, ...inside] : inside;
}

/** The variables of the indefinite integrals of an expression. */
export function indefiniteVariables(expr: Expr): string[] {
  return [...new Set(integralsIn(expr).flatMap((integral) => (integral.from ? [] : [integral.variable])))];
}
