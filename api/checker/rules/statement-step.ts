import type { RealNumber } from '../solving/real-number.ts';
import { Unsettled } from '../solving/unsettled.ts';
import { comparesOf, isListOfValues, type Statement } from '../statements/statement.ts';
import { judgeApproximation } from './approximation.ts';
import { judgePlane } from './complex-plane.ts';
import { judgeComplexStep } from './complex-step.ts';
import { withFamilies } from './families.ts';
import { isolatedLetter, judgeAsLetter, judgeFormula, nearlyIsolatedLetter } from './formula.ts';
import { withEntries } from './matrix-equations.ts';
import { withPlainForms } from './plain-statements.ts';
import { isPutIn } from './put-in.ts';
import { judgeSameEquation } from './same-equation.ts';
import { freeLetters } from './meaning.ts';
import { judgeOneLetter } from './one-letter.ts';
import { judgeUndetermined } from './undetermined.ts';
import { undecided, type StepResult } from './step-result.ts';
import type { StatementQuestion } from './statement-question.ts';
import { isSystem, judgeSystemStep } from './system-step.ts';

export type { StatementQuestion };

export interface StatementAnswer extends StepResult {
  readonly candidates: readonly RealNumber[];
}

/** Rules 2 to 4, 6 and 9 on two statements; throws Unsettled. */
export function judgeStatements(question: StatementQuestion): StatementAnswer {
  try {
    return judgeWritten(question);
  } catch (cause) {
    const plain = cause instanceof Unsettled && cause.reason !== 'limit' ? withPlainForms(question) : null;
    if (!plain) throw cause;
    return judgeWritten(plain);
  }
}

function judgeWritten(asked: StatementQuestion): StatementAnswer {
  const { question, families } = withFamilies(withEntries(asked) ?? asked);
  const { above, below, context } = question;
  const letters = [...new Set([...freeLetters(above, context), ...freeLetters(below, context)])].filter(
    (n) => !families.has(n),
  );
  if (context.numbers === 'complex') return withoutCandidates(judgeComplex(question, letters));
  const identity = letters.some(isCapital) && letters.length > 1 ? judgeUndetermined(question, judgeStatements) : null;
  if (identity) return withoutCandidates(identity);
  if (isSystem(question)) return { candidates: [], ...judgeSystemStep(question) };
  const letter = letters.length === 1 ? (letters[0] as string) : chooseUnknown(question, letters);
  if (letter === null)
    return withoutCandidates(judgeSameEquation(above, below, context) ?? judgeForAny(question, letters));
  const shared = {
    above,
    below,
    letter,
    reference: question.reference,
    families,
    settings: question.settings,
    context,
  };
  if (letters.length > 1) {
    const whole = judgeAsLetter(shared);
    const found = whole?.ruling === 'holds' ? whole : judgeFormula(shared);
    return withoutCandidates(found.ruling === 'fails' && isPutIn(above, below) ? undecided('not-covered') : found);
  }
  if (isApproximate(above) || isApproximate(below)) {
    return withoutCandidates(judgeApproximation({ ...shared, given: new Map() }));
  }
  return judgeOneLetter({ ...shared, given: new Map() });
}

const mostUnknowns = 4;

/** No line after the given says which letter is the unknown: a step holds that does so whichever it is, else the given's counts. */
function judgeForAny(question: StatementQuestion, letters: readonly string[]): StepResult {
  const { above, below, reference, given, settings, context } = question;
  if (letters.length > mostUnknowns || isPutIn(above, below)) return undecided('no-unknown');
  const judgeIn = (letter: string): StepResult =>
    judgeFormula({ above, below, letter, reference, families: new Set<string>(), settings, context });
  const isolated = given && isolatedLetter(given);
  if (isolated && letters.includes(isolated)) return judgeIn(isolated);
  let first: StepResult | null = null;
  for (const letter of letters) {
    const found = judgeIn(letter);
    if (found.ruling !== 'holds') return undecided('no-unknown');
    first ??= found;
  }
  return first ?? undecided('no-unknown');
}

/** By roots where the line is about one letter, else by real and imaginary parts. */
function judgeComplex(question: StatementQuestion, letters: readonly string[]): StepResult {
  const found = judgeComplexStep(question, letters);
  return found.ruling === 'undecided' ? (judgePlane(question, judgeStatements) ?? found) : found;
}

function isCapital(name: string): boolean {
  return name >= 'A' && name < '[';
}

function withoutCandidates(result: StepResult): StatementAnswer {
  return { ...result, candidates: [] };
}

function isApproximate(statement: Statement): boolean {
  return comparesOf(statement).some((compare) => compare.sign === 'approx');
}

function chooseUnknown(question: StatementQuestion, letters: readonly string[]): string | null {
  const { unknown, below, above } = question;
  if (unknown !== null && letters.includes(unknown)) return unknown;
  if (letters.length === 0) return 'x';
  return (
    isolatedLetter(below) ??
    isolatedLetter(above) ??
    letters.find((name) => isListOfValues(below, name)) ??
    nearlyIsolatedLetter(below) ??
    nearlyIsolatedLetter(above)
  );
}
