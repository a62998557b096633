import { BudgetSpent, type CheckContext } from '../context.ts';
import { rational, type Rational } from '../numbers/rational.ts';
import type { Assignment } from '../solving/fraction.ts';
import { isEmptySet } from '../solving/real-set.ts';
import { Unsettled } from '../solving/unsettled.ts';
import { solveDefined, type SolveEnv } from '../statements/solve.ts';
import { comparesOf, exprsOfStatement, isLetter, type Statement } from '../statements/statement.ts';
import { fromRational, isKnown } from '../values/arithmetic.ts';
import { evaluatePrepared, prepare } from '../values/evaluate.ts';
import type { Expr } from '../../../shared/maths/expression.ts';
import { lettersOf } from '../../../shared/maths/letters.ts';
import { sameExpr } from '../../../shared/maths/same.ts';
import { childrenOf, mapChildren } from '../../../shared/maths/walk.ts';
import { freeLetters } from './meaning.ts';
import { judgeOneLetter, type OneLetterAnswer, type OneLetterQuestion } from './one-letter.ts';
import { meetsAssumptions } from './parameters.ts';
import { judgeSameEquation } from './same-equation.ts';
import { wholeAssignment } from './whole-assignment.ts';
import { holds, undecided, type StepResult } from './step-result.ts';

export type FormulaQuestion = Omit<OneLetterQuestion, 'given'>;

/** The letter that a line says outright: letter = expression without it. */
export function isolatedLetter(statement: Statement): string | null {
  const compares = comparesOf(statement);
  const first = compares[0];
  if (!first || compares.length !== countCompares(statement)) return null;
  const isolates = (name: string): boolean =>
    compares.every(
      ({ left, right }) =>
        (isLetter(left, name) && !lettersOf(right).includes(name)) ||
        // a - b < x < a + b
        (compares.length > 1 && isLetter(right, name) && !lettersOf(left).includes(name)),
    );
  const alone = [first.left, first.right].flatMap((side) => (side.kind === 'letter' ? [side.name] : []));
  return alone.find(isolates) ?? null;
}

/** The letter inside a power or function that a line says outright: r in r^2=..., A in \cos A=... */
export function nearlyIsolatedLetter(statement: Statement): string | null {
  if (statement.kind !== 'compare' || statement.sign !== '=') return null;
  if (!['power', 'call', 'root', 'log'].includes(statement.left.kind)) return null;
  const [letter, ...others] = lettersOf(statement.left);
  return letter && others.length === 0 && !lettersOf(statement.right).includes(letter) ? letter : null;
}

function countCompares(statement: Statement): number {
  if (statement.kind === 'all' || statement.kind === 'any')
    return statement.parts.reduce((n, part) => n + countCompares(part), 0);
  return 1;
}

/** Rule 2 on formulas: compared in the unknown, the other letters at fractions where both lines have a value. */
export function judgeFormula(question: FormulaQuestion): StepResult {
  const { above, below, letter, context } = question;
  const same = judgeSameEquation(above, below, context);
  if (same) return same;
  const names = [...new Set([above, below, question.reference].flatMap((line) => freeLetters(line, context)))].filter(
    (name) => name !== letter && !question.families.has(name),
  );
  const seen: OneLetterAnswer[] = [];
  const places = new Map<OneLetterAnswer, Assignment>();
  const excluded: string[] = [];
  let open = 0;
  for (const [index, given] of listAssignments(names, context).entries()) {
    // Lines that are solved by samples cost more: fewer special values are tried.
    if (index >= mostSampled && seen[0]?.reached === 'sampled') break;
    const found = judgeAt({ ...question, isSpecial: isSpecial(given) }, given);
    if (found === 'no-value-below') excluded.push(...zeroNames(given));
    if (typeof found === 'string') continue;
    if (found.ruling === 'fails' && !(isSpecial(given) && !found.evidence.lost))
      return inWholeNumbers(question, names) ?? found;
    if (found.ruling === 'fails') continue;
    if (found.ruling === 'undecided') open += 1;
    else {
      seen.push(found);
      places.set(found, given);
    }
  }
  const informative = seen.filter((answer) => answer.solutions && !isEmptySet(answer.solutions));
  if (informative.length < 2) return undecided(open > 0 ? 'not-settled' : 'no-domain');
  // A value that is gained wherever there is one was never right: both lines never have a solution together.
  if (informative.every(isOnlyGained)) return judgeNeverRight(question, informative[0] as OneLetterAnswer, places);
  return summarise(seen, excluded);
}

/** The same fault at small whole numbers, which a person can put in by hand. */
function inWholeNumbers(question: FormulaQuestion, names: readonly string[]): StepResult | null {
  try {
    const given = wholeAssignment(question, names);
    if (!given || !meetsAssumptions(given, question.context)) return null;
    const found = judgeAt({ ...question, isSpecial: isSpecial(given) }, given);
    return typeof found !== 'string' && found.ruling === 'fails' && found.evidence.lost ? found : null;
  } catch (cause) {
    if (cause instanceof BudgetSpent || cause instanceof Unsettled) return null;
    throw cause;
  }
}

/** Fails with one of the gained values, unless it comes from taking away a root, a bar, a logarithm or a denominator. */
function judgeNeverRight(
  question: FormulaQuestion,
  first: OneLetterAnswer,
  places: ReadonlyMap<OneLetterAnswer, Assignment>,
): StepResult {
  const given = places.get(first) ?? new Map<string, Rational>();
  const isRaised = first.evidence.operation === 'power' && !exprsOfStatement(question.above).some(mayLoseSign);
  const found = isRaised
    ? judgeOneLetter({ ...question, given, settings: { ...question.settings, reversible: true } })
    : null;
  return found?.ruling === 'fails' ? found : undecided('no-domain');
}

/** Whether a root, a bar or a broken power stands in an expression: what people square both sides for. */
function mayLoseSign(expr: Expr): boolean {
  if (expr.kind === 'root' || (expr.kind === 'call' && expr.name === 'abs')) return true;
  const exponent = expr.kind === 'power' ? expr.exponent : null;
  return exponent?.kind === 'quotient' || exponent?.kind === 'number'
    ? exponent.kind === 'quotient' || exponent.denominator !== 1n || childrenOf(expr).some(mayLoseSign)
    : childrenOf(expr).some(mayLoseSign);
}

function isOnlyGained({ solutions, candidates }: OneLetterAnswer): boolean {
  const listed = solutions?.at.filter(Boolean).length ?? 0;
  return candidates.length > 0 && candidates.length >= listed && !solutions?.between.some(Boolean);
}

/**
 * A line that says r^2 or \cos A outright, where the line above has the letter in that form only: the form may stand for
 * a letter of its own. Holds for it is holds; anything else says nothing. Null where there is no such form.
 */
export function judgeAsLetter(question: FormulaQuestion): StepResult | null {
  const letter = nearlyIsolatedLetter(question.below);
  if (letter === null || question.below.kind !== 'compare') return null;
  const form = question.below.left;
  const whole: Expr = { kind: 'letter', name: `${letter}_{*}`, span: form.span };
  const put = (statement: Statement): Statement => replaceIn(statement, form, whole);
  const above = put(question.above);
  if (comparesOf(above).length !== 1 || freeLetters(above, question.context).includes(letter)) return null;
  return judgeFormula({
    ...question,
    above,
    below: put(question.below),
    reference: put(question.reference),
    letter: `${letter}_{*}`,
  });
}

function replaceIn(statement: Statement, form: Expr, whole: Expr): Statement {
  const put = (expr: Expr): Expr => (sameExpr(expr, form) ? whole : mapChildren(expr, put));
  if (statement.kind === 'compare') return { ...statement, left: put(statement.left), right: put(statement.right) };
  if (statement.kind !== 'all' && statement.kind !== 'any') return statement;
  return { ...statement, parts: statement.parts.map((part) => replaceIn(part, form, whole)) };
}

const mostSampled = 12;

/** A letter that is 0 or 1 in size, or equal to another: where formulas may have no value. */
function isSpecial(given: Assignment): boolean {
  const values = [...given.values()].map(({ num, den }) => `${num}/${den}`);
  return new Set(values).size < values.length || values.some((value) => ['0/1', '1/1', '-1/1'].includes(value));
}

function summarise(seen: readonly OneLetterAnswer[], excluded: readonly string[]): StepResult {
  const notes = new Set(seen.flatMap((answer) => answer.notes.filter((note) => note !== 'empty')));
  if (excluded.length > 0) notes.add('domain');
  const operation = seen.find((answer) => answer.evidence.operation)?.evidence.operation;
  return holds('sampled', [...notes], {
    ...(excluded.length > 0 ? { excluded: [...new Set(excluded)].map((name) => `${name}\\ne 0`) } : {}),
    ...(operation ? { operation } : {}),
  });
}

function zeroNames(given: Assignment): string[] {
  return [...given].flatMap(([name, value]) => (value.num === 0n ? [name] : []));
}

function judgeAt(question: FormulaQuestion, given: Assignment): OneLetterAnswer | 'no-value-below' | 'no-value' {
  const env: SolveEnv = {
    letter: question.letter,
    given,
    context: question.context,
    window: null,
    hints: [],
    families: question.families,
  };
  const hasValue = (statement: Statement): boolean =>
    hasValueNearby(statement, env) || !isEmptySet(solveDefined(statement, env));
  if (!hasValue(question.above)) return 'no-value';
  if (!hasValue(question.below)) return 'no-value-below';
  return judgeOneLetter({ ...question, given });
}

const nearby: readonly Rational[] = [rational(2, 3), rational(-5, 7), rational(17, 5)];

/** Whether a line has a value at one of a few places: most have, and then need not be looked at more closely. */
function hasValueNearby(statement: Statement, env: SolveEnv): boolean {
  const exprs = exprsOfStatement(statement);
  return nearby.some((place) => {
    const point = new Map([...env.given, [env.letter, place] as const].map(([n, value]) => [n, fromRational(value)]));
    return exprs.every((expr) => isKnown(evaluatePrepared(prepare(expr, env.context), point, 96, env.context)));
  });
}

const values: readonly Rational[] = [
  rational(2),
  rational(3),
  rational(5),
  rational(7, 2),
  rational(11),
  rational(4, 3),
  rational(13),
  rational(6),
];

/** General values first, both signs, then each letter at 0, 1 and equal to another: where formulas lose solutions. */
function listAssignments(names: readonly string[], context: CheckContext): Assignment[] {
  const general = (shift: number, signs: number): Assignment =>
    new Map(
      names.map((name, k) => {
        const value = values[(k * 3 + shift) % values.length] as Rational;
        const whole = context.wholeLetters.has(name) ? rational(BigInt(k + shift + 2)) : value;
        return [name, (signs >> k) % 2 === 1 ? { num: -whole.num, den: whole.den } : whole];
      }),
    );
  const all = [
    general(0, 0),
    general(1, 0),
    general(2, 1),
    general(3, 2),
    general(4, 5),
    general(5, 10),
    general(6, 15),
  ];
  const base = general(0, 0);
  for (const name of names) {
    for (const special of [rational(0), rational(1), rational(-1)]) all.push(new Map(base).set(name, special));
    for (const other of names) {
      if (other !== name) all.push(new Map(base).set(name, base.get(other) as Rational));
    }
  }
  return all.filter((given) => meetsAssumptions(given, context)).slice(0, 24);
}
