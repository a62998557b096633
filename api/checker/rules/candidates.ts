import { lettersOf } from '../../../shared/maths/letters.ts';
import { exprsOfStatement, type Statement } from '../statements/statement.ts';
import { compareNumbers, type RealNumber } from '../solving/real-number.ts';
import { nameNumber } from '../solving/naming.ts';
import { recogniseNumber } from '../solving/recognise.ts';
import type { Route, WalkState } from '../walk-derivation.ts';
import type { StepResult } from './step-result.ts';

/**
 * Rule 3: a value that does not satisfy the reference and is still listed where the derivation ends makes the first
 * line that lists it the fault.
 */
export function rejectCandidates(rulings: readonly StepResult[], last: WalkState, route: Route): StepResult[] {
  const final = last.candidates[last.candidates.length - 1];
  if (!final || final.step !== lastStatement(last, route)) return [...rulings];
  const firsts = final.values.map((value) => ({ value, step: firstListing(value, last) }));
  const step = Math.min(...firsts.map((first) => first.step));
  return rulings.map((result, k) => {
    if (k + 1 !== step || result.ruling !== 'holds') return result;
    const values = firsts.filter((first) => first.step === step).map(({ value }) => nameNumber(value, recogniseNumber));
    const meaning = last.meanings[step];
    const listed = meaning?.kind === 'statement' ? lettersIn(meaning.statement) : [];
    const name = listed.length === 1 ? listed[0] : (route.unknown ?? route.givenLetters[0]);
    const at = { [name ?? 'x']: values[0] as string };
    return {
      ...result,
      ruling: 'fails',
      notes: [...result.notes.filter((note) => note !== 'candidates'), 'not-rejected'],
      evidence: { ...result.evidence, gained: values, witness: { at, above: 'false', below: 'true' } },
    };
  });
}

function lettersIn(statement: Statement): string[] {
  return [...new Set(exprsOfStatement(statement).flatMap((expr) => [...lettersOf(expr)]))];
}

function lastStatement(last: WalkState, route: Route): number {
  let step = last.meanings.length - 1;
  while (step > 0 && last.meanings[step] === null) step -= 1;
  void route;
  return step;
}

function firstListing(value: RealNumber, { candidates }: WalkState): number {
  let first = Infinity;
  for (const { step, values } of [...candidates].reverse()) {
    if (values.some((other) => compareNumbers(other, value).order === 0)) first = step;
  }
  return first;
}
