import type { CheckContext } from '../context.ts';
import { compareExpressions } from '../compare/compare-expressions.ts';
import { printExpr } from '../../../shared/maths/print.ts';
import { rational } from '../numbers/rational.ts';
import { computedNumber } from '../solving/linear.ts';
import { toKnownValue } from '../solving/point-value.ts';
import { isKnown } from '../values/arithmetic.ts';
import { evaluatePrepared, prepare } from '../values/evaluate.ts';
import { nameNumber } from '../solving/naming.ts';
import { constantNumber } from '../statements/solve.ts';
import { Unsettled } from '../solving/unsettled.ts';
import { comparesOf, exprsOfStatement, type CompareStatement, type Statement } from '../statements/statement.ts';
import { letterExpr, numberExpr } from './build-expr.ts';
import { freeLetters } from './meaning.ts';
import type { Note } from '../../../shared/schemas/verdict.ts';
import type { RealNumber } from '../solving/real-number.ts';
import { strayValues } from './stray-values.ts';
import { followsBySums, isCombination } from './linear-combination.ts';
import {
  isTrueStatement,
  openLetters,
  solveSystem,
  substituteIn,
  type Anchor,
  type Solution,
  type SystemSolution,
} from './solve-system.ts';
import type { StatementQuestion } from './statement-question.ts';
import { fails, holds, undecided, type StepResult } from './step-result.ts';

/** Whether the step is about several equations that hold together for several letters. */
export function isSystem({ above, below, known, context }: StatementQuestion): boolean {
  return [above, below, ...known].some((statement) => isJoint(statement, context));
}

function isJoint(statement: Statement, context: CheckContext): boolean {
  if (statement.kind === 'any') return statement.parts.some((part) => isJoint(part, context));
  if (statement.kind !== 'all') return false;
  const equations = comparesOf(statement).filter((compare) => compare.sign === '=');
  return equations.length > 1 && new Set(equations.flatMap((equation) => freeLetters(equation, context))).size > 1;
}

export interface SystemAnswer extends StepResult {
  /** Values that the line lists though no solution has them. */
  readonly candidates?: readonly RealNumber[];
}

/** Rule 6a: a line holds when every solution of what is known satisfies it; values listed are solutions, all of them. */
export function judgeSystemStep(question: StatementQuestion): SystemAnswer {
  const { context, known } = question;
  const below = asPoint(question) ?? question.below;
  const first = judgeKnown(known, below, context);
  // Which number of a bare pair belongs to which letter is custom.
  if (first.ruling === 'fails' && below !== question.below) {
    const swapped = judgeKnown(known, asPoint(question, true) ?? below, context);
    return swapped.ruling === 'fails' ? first : undecided('no-agreed-meaning');
  }
  if (first.ruling !== 'fails' || !question.afterFault || !question.given) return first;
  // After a fault the author goes on from the wrong line, and still has the given.
  const wider = judgeKnown([...known, question.given], below, context);
  return wider.ruling === 'holds' ? wider : undecided('not-settled');
}

/** `(3,1)` at the end of a system is a point, its letters by the alphabet; several points are joined by or. */
function asPoint({ below, known, context }: StatementQuestion, isSwapped = false): Statement | null {
  const letters = freeLetters({ kind: 'all', parts: known }, context).toSorted();
  if (letters.length !== 2) return null;
  if (isSwapped) letters.reverse();
  if (below.kind !== 'all' && below.kind !== 'any') return pointOf(below, letters);
  const points = below.parts.map((part) => pointOf(part, letters));
  return points.includes(null) ? null : { kind: 'any', parts: points as Statement[] };
}

function pointOf(statement: Statement, letters: readonly string[]): Statement | null {
  if (statement.kind !== 'member' || statement.letter || statement.set.kind !== 'interval') return null;
  const { from, to, fromClosed, toClosed } = statement.set;
  if (!from || !to || fromClosed || toClosed) return null;
  return {
    kind: 'all',
    parts: [from, to].map((right, k) => ({
      kind: 'compare',
      left: letterExpr(letters[k] as string),
      sign: '=',
      right,
    })),
  };
}

function judgeKnown(known: readonly Statement[], below: Statement, context: CheckContext): SystemAnswer {
  try {
    return judgeBySolutions(known, below, context);
  } catch (cause) {
    // What cannot be solved may still be added up.
    if (cause instanceof Unsettled && followsBySums(known, below, context)) return holds('sampled');
    throw cause;
  }
}

function judgeBySolutions(known: readonly Statement[], below: Statement, context: CheckContext): SystemAnswer {
  const solutions = branchesOf({ kind: 'all', parts: known }).flatMap((branch) => solveSystem(branch, context));
  if (below.kind === 'never')
    return solutions.length === 0 ? holds('proved') : failAt(solutions[0] as SystemSolution, context, 'lost');
  if (solutions.length === 0)
    return isCombination(known, below, context) ? holds('proved') : undecided('not-settled', ['empty']);
  let sampled = false;
  const isGeneral = ({ values }: SystemSolution): boolean => solutions.every((s) => s.values.size >= values.size);
  for (const solution of solutions) {
    const truth = isTrueOn(solution, known, below, context);
    // For single values of the parameters a line may have no value, as x=1/(1-a) for a=1.
    if (truth === null || (truth === 'no-value' && isGeneral(solution))) return undecided('not-settled');
    if (typeof truth === 'object') return failAt(truth, context, 'lost');
    sampled ||= truth !== true;
  }
  const extra = listedPoints(below, context).find((point) => !satisfies(known, point, context));
  if (extra) return failAt({ values: extra, anchor: null }, context, 'gained');
  const candidates = strayValues(below, solutions, context);
  const notes: Note[] = candidates.length > 0 ? ['candidates'] : [];
  return { ...holds(sampled ? 'sampled' : 'proved', notes, solutionsEvidence(solutions, context)), candidates };
}

/** Each way to choose one case of every "or": lists of equations that hold together. */
function branchesOf(statement: Statement): CompareStatement[][] {
  switch (statement.kind) {
    case 'compare':
      return statement.sign === '=' ? [[statement]] : [[]];
    case 'all':
      return statement.parts.reduce<CompareStatement[][]>(
        (branches, part) => {
          const next = branchesOf(part);
          const joined = branches.flatMap((branch) => next.map((more) => [...branch, ...more]));
          if (joined.length > 16) throw new Unsettled('limit');
          return joined;
        },
        [[]],
      );
    case 'any':
      return statement.parts.flatMap(branchesOf);
    case 'always':
      return [[]];
    default:
      throw new Unsettled('not-covered');
  }
}

/**
 * true or 'sampled' where the statement holds on the solution, a point of it where it does not, 'no-value' where it has
 * none at the points that were tried, null where unknown.
 */
function isTrueOn(
  solution: SystemSolution,
  known: readonly Statement[],
  below: Statement,
  context: CheckContext,
): true | 'sampled' | 'no-value' | SystemSolution | null {
  const { values, anchor } = solution;
  const put = substituteIn(below, values);
  const letters = openLetters(put, context, anchor);
  if (letters.length === 0) {
    const truth = isTrueStatement(put, context, anchor);
    return truth === false ? solution : truth;
  }
  const identity = isIdentity(put, context);
  if (identity !== null) return identity;
  let hasValue = false;
  for (const [p, q] of trials) {
    const free = new Map(letters.map((name, k) => [name, numberExpr(rational(k === 0 ? p : q + k))] as const));
    const at = new Map([...[...values].map(([name, expr]) => [name, substituteExpr(expr, free)] as const), ...free]);
    if (![...at.values()].every((expr) => isDefined(expr, context, anchor))) continue;
    if (isTrueStatement(substituteIn({ kind: 'all', parts: known }, at), context, anchor) !== true) continue;
    const there = substituteIn(below, at);
    if (!exprsOfStatement(there).every((expr) => isDefined(expr, context, anchor))) continue;
    hasValue = true;
    if (isTrueStatement(there, context, anchor) === false) return { values: at, anchor };
  }
  return hasValue ? null : 'no-value';
}

const trials = [
  [1, 2],
  [2, 5],
  [3, 1],
  [0, 7],
] as const;

function isDefined(expr: CompareStatement['left'], context: CheckContext, anchor: Anchor | null): boolean {
  const point = new Map(anchor ? [[anchor.letter, toKnownValue(anchor.number, 96)]] : []);
  return evaluatePrepared(prepare(expr, context), point, 96, context).kind !== 'undefined';
}

function substituteExpr(expr: CompareStatement['left'], values: Solution): CompareStatement['left'] {
  return (substituteIn({ kind: 'compare', left: expr, sign: '=', right: expr }, values) as CompareStatement).left;
}

function isIdentity(statement: Statement, context: CheckContext): true | 'sampled' | null {
  if (statement.kind === 'compare' && statement.sign === '=') {
    const found = compareExpressions(statement.left, statement.right, context);
    if (found.kind !== 'equal') return null;
    return found.reached === 'proved' ? true : 'sampled';
  }
  if (statement.kind === 'all') {
    const parts = statement.parts.map((part) => isIdentity(part, context));
    if (parts.includes(null)) return null;
    return parts.includes('sampled') ? 'sampled' : true;
  }
  return statement.kind === 'any'
    ? (statement.parts.map((part) => isIdentity(part, context)).find(Boolean) ?? null)
    : null;
}

/** The points that a line lists outright: letter = number for several letters, joined by and, cases by or. */
function listedPoints(statement: Statement, context: CheckContext): Solution[] {
  if (statement.kind === 'any') return statement.parts.flatMap((part) => listedPoints(part, context));
  if (statement.kind !== 'all') return [];
  const values = new Map<string, CompareStatement['right']>();
  for (const part of statement.parts) {
    if (part.kind !== 'compare' || part.sign !== '=' || part.left.kind !== 'letter') return [];
    if (freeLetters({ ...part, left: part.right }, context).length > 0) return [];
    values.set(part.left.name, part.right);
  }
  return [values];
}

function satisfies(known: readonly Statement[], point: Solution, context: CheckContext): boolean {
  const put = substituteIn({ kind: 'all', parts: known }, point);
  if (freeLetters(put, context).length > 0) return true;
  return isTrueStatement(put, context) !== false;
}

function failAt(point: SystemSolution, context: CheckContext, side: 'lost' | 'gained'): StepResult {
  const at = Object.fromEntries(namesOf(point, context));
  const [above, below] = side === 'lost' ? ['true', 'false'] : ['false', 'true'];
  const named = Object.entries(at)
    .map(([name, value]) => `${name}=${value}`)
    .join(',\\ ');
  return fails('proved', { [side]: [named], witness: { at, above, below } });
}

/** Each letter with what it is worth. */
function namesOf({ values, anchor }: SystemSolution, context: CheckContext): [string, string][] {
  const names = [...values].map(([name, expr]): [string, string] => [name, nameValue(expr, context, anchor)]);
  return anchor ? [[anchor.letter, nameNumber(anchor.number)], ...names] : names;
}

function nameValue(expr: CompareStatement['left'], context: CheckContext, anchor: Anchor | null): string {
  const letters = freeLetters({ kind: 'compare', left: expr, sign: '=', right: expr }, context);
  if (anchor && letters.length === 1 && letters[0] === anchor.letter) return nameAnchored(expr, anchor, context);
  if (letters.length > 0) return printExpr(expr);
  const env = { letter: '', given: new Map(), context, window: null, hints: [], families: new Set<string>() };
  return nameNumber(constantNumber(expr, env), () => printExpr(expr));
}

/** Decimals: the number has no shorter name. */
function nameAnchored(expr: CompareStatement['left'], anchor: Anchor, context: CheckContext): string {
  const graph = prepare(expr, context);
  const number = computedNumber((bits) => {
    const point = new Map([[anchor.letter, toKnownValue(anchor.number, bits)]]);
    const value = evaluatePrepared(graph, point, bits, context);
    return isKnown(value) ? value : null;
  });
  return number ? nameNumber(number) : printExpr(expr);
}

function solutionsEvidence(solutions: readonly SystemSolution[], context: CheckContext): { solutions?: string } {
  const isPoint = ({ values, anchor }: SystemSolution): boolean =>
    [...values.values()].every(
      (expr) => openLetters({ kind: 'compare', left: expr, sign: '=', right: expr }, context, anchor).length === 0,
    );
  if (!solutions.every(isPoint) || solutions.length > 8) return {};
  const names = solutions.map((solution) => {
    return namesOf(solution, context)
      .sort(([a], [b]) => (a < b ? -1 : 1))
      .map(([name, value]) => `${name}=${value}`)
      .join(',\\ ');
  });
  return { solutions: [...new Set(names)].join('\\text{ or }') };
}
