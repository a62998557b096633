import { difference, isEmptySet } from '../solving/real-set.ts';
import { solveStatement, type SolveEnv } from '../statements/solve.ts';
import type { Statement } from '../statements/statement.ts';
import { BudgetSpent } from '../context.ts';
import { contextOf, judgeLine, type Route, type WalkState, type WalkStep } from '../walk-derivation.ts';
import { freeLetters, meaningOf } from './meaning.ts';
import type { StepResult } from './step-result.ts';
import { Unsettled } from '../solving/unsettled.ts';

export interface Regrouped {
  readonly results: readonly StepResult[];
  readonly state: WalkState;
}

const mostCases = 6;

/**
 * Rule 6b: lines that follow one another and each state one case of the line above are read as one line joined by or.
 * Null where the lines from this step on are no such cases.
 */
export function joinCases(route: Route, state: WalkState, step: number, failed: WalkStep): Regrouped | null {
  if (state.from?.kind !== 'statement' || !failed.result.evidence.lost || failed.result.evidence.gained) return null;
  const parts = collectCases(route, state, step);
  for (let count = parts.length; count > 1; count -= 1) {
    const joined: Statement = { kind: 'any', parts: parts.slice(0, count) };
    const line = route.read.lines[step + count - 1];
    if (!line?.ok) continue;
    const whole = judgeLine(route, state, step, {
      kind: 'any',
      parts: route.read.lines.slice(step, step + count).flatMap((result) => (result.ok ? [result.line] : [])),
      span: line.line.span,
    });
    if (whole.result.ruling !== 'holds') continue;
    const result: StepResult = { ...whole.result, notes: [...whole.result.notes, 'cases'] };
    const meanings = [
      ...state.meanings.slice(0, step),
      ...parts.slice(0, count).map((part) => ({ kind: 'statement' as const, statement: part, last: null })),
    ];
    const meaning = { kind: 'statement' as const, statement: joined, last: null };
    const results = parts.slice(0, count).map((): StepResult => result);
    return { results, state: { ...whole.state, meanings: [...meanings.slice(0, -1), meaning], from: meaning } };
  }
  return null;
}

/** The statements from this step on whose solutions are some, not all, of those of the line above. */
function collectCases(route: Route, state: WalkState, step: number): Statement[] {
  const context = contextOf(route, state);
  const above = state.from?.kind === 'statement' ? state.from.statement : null;
  const parts: Statement[] = [];
  for (let k = step; k < route.read.lines.length && parts.length < mostCases; k += 1) {
    const result = route.read.lines[k];
    const meaning = result?.ok ? meaningOf(result.line) : null;
    if (!above || meaning?.kind !== 'statement') break;
    const letters = [...new Set([...freeLetters(above, context), ...freeLetters(meaning.statement, context)])];
    if (
      letters.length !== 1 ||
      !isPartOf(meaning.statement, above, { ...emptyEnv, letter: letters[0] as string, context })
    )
      break;
    parts.push(meaning.statement);
  }
  return parts;
}

const emptyEnv = { given: new Map(), window: null, hints: [], families: new Set<string>() };

function isPartOf(part: Statement, whole: Statement, env: SolveEnv): boolean {
  try {
    const inside = solveStatement(part, env);
    const all = solveStatement(whole, { ...env, hints: inside.points });
    return isEmptySet(difference(inside, all)) && !isEmptySet(difference(all, inside)) && !isEmptySet(inside);
  } catch (cause) {
    if (cause instanceof Unsettled || cause instanceof BudgetSpent) return false;
    throw cause;
  }
}
