import { printExpr } from '../../../shared/maths/print.ts';
import type { CheckSettings, Evidence, Note } from '../../../shared/schemas/verdict.ts';
import type { CheckContext } from '../context.ts';
import type { Assignment } from '../solving/fraction.ts';
import type { Window } from '../solving/line-env.ts';
import { nameNumber, nameSet } from '../solving/naming.ts';
import { approximate, between, rationalNumber, type RealNumber } from '../solving/real-number.ts';
import {
  difference,
  intersection,
  isEmptySet,
  isFiniteSet,
  isWholeLine,
  weaker,
  type Reached,
  type RealSet,
} from '../solving/real-set.ts';
import { recogniseNumber } from '../solving/recognise.ts';
import { Unsettled } from '../solving/unsettled.ts';
import { solveDefined, solveStatement, type SolveEnv } from '../statements/solve.ts';
import { wholeNumbersOf } from '../solving/whole-numbers.ts';
import { truthAt } from '../statements/truth.ts';
import { comparesOf, isListOfValues, type Statement } from '../statements/statement.ts';
import { haveSameComplexRoots } from './complex-roots.ts';
import { judgeComplexStep } from './complex-step.ts';
import { explainGain } from './one-way.ts';
import { frameFor, universeOf } from './one-letter-env.ts';
import { sameUpToFactor } from './same-equation.ts';
import { fails, holds, undecided, type StepResult } from './step-result.ts';

/** One step between two statements about one letter; the other letters have the values given. */
export interface OneLetterQuestion {
  readonly above: Statement;
  readonly below: Statement;
  readonly letter: string;
  readonly given: Assignment;
  /** The given of the task, or the faulty line since the first fault: what a value has to satisfy. */
  readonly reference: Statement;
  /** Letters that run through all whole numbers. */
  readonly families: ReadonlySet<string>;
  readonly settings: CheckSettings;
  readonly context: CheckContext;
  /** A solution at which the new line has no value is no loss: for special values of a formula's other letters. */
  readonly isSpecial?: boolean;
}

export interface OneLetterAnswer extends StepResult {
  readonly solutions: RealSet | null;
  /** Values that the line lists though they do not satisfy the reference. */
  readonly candidates: readonly RealNumber[];
}

interface Solved {
  readonly above: RealSet;
  readonly below: RealSet;
  readonly reference: RealSet;
  readonly env: SolveEnv;
  readonly isStretch: boolean;
  /** The lines may differ outside of the stretch. */
  readonly isPartial: boolean;
}

/** Rules 2 to 4 on statements about one letter; throws Unsettled. */
export function judgeOneLetter(question: OneLetterQuestion): OneLetterAnswer {
  try {
    const solved = solveAll(question);
    const found = judgeBySolutions(question, solved);
    // That there are no further solutions is more than the places show that were looked at.
    if (found.ruling === 'holds' && isOpen(solved)) throw new Unsettled('not-settled');
    return found;
  } catch (cause) {
    if (!(cause instanceof Unsettled)) throw cause;
    // What cannot be solved may still be the same equation.
    const same = sameAsWritten(question);
    if (!same) throw cause;
    return { ...holds(same), solutions: null, candidates: [] };
  }
}

function isOpen({ above, below, isPartial }: Solved): boolean {
  return isPartial || above.open === true || below.open === true;
}

function sameAsWritten({ above, below, given, context }: OneLetterQuestion): Reached | null {
  if (above.kind !== 'compare' || below.kind !== 'compare') return null;
  const same = sameUpToFactor(above, below, given, context);
  return same?.sameDomain && keepsDirection(above.sign, below.sign, same.factor.num > 0n) ? same.reached : null;
}

function judgeBySolutions(question: OneLetterQuestion, solved: Solved): OneLetterAnswer {
  const { above, below, reference } = solved;
  const pieces = question.context.wholeLetters.has(question.letter) ? wholeNumbersOf : (set: RealSet): RealSet => set;
  const missing = pieces(intersection(difference(above, below), reference));
  const lost = question.isSpecial ? intersection(missing, solveDefined(question.below, solved.env)) : missing;
  if (!isEmptySet(lost)) return answer(failWith(question, 'lost', lost, solved), solved, []);
  const gained = pieces(difference(below, above));
  if (isEmptySet(gained)) return answer(judgeSame(question, solved), solved, listed(question, solved));
  const untrue = difference(gained, reference);
  if (isEmptySet(untrue)) return answer(holds(reachedBy(solved)), solved, listed(question, solved));
  return judgeGain(question, solved, untrue);
}

function answer(result: StepResult, solved: Solved, candidates: readonly RealNumber[]): OneLetterAnswer {
  const solutions = solved.below;
  // Without bounds from the task, a circular line was solved on a stretch only.
  if (solved.isStretch) return { ...result, solutions, candidates };
  const evidence: Evidence = { ...result.evidence, solutions: nameSet(solutions, recognise) };
  return { ...result, evidence, solutions, candidates };
}

function recognise(point: RealNumber): string | null {
  return recogniseNumber(point) ?? (point.kind === 'computed' && point.expr ? printExpr(point.expr) : null);
}

function solveAll(question: OneLetterQuestion): Solved {
  const { letter, given, context, families } = question;
  const universe = universeOf(letter, given, context);
  const start: SolveEnv = { letter, given, context, window: null, hints: universe.points, families };
  const statements = [question.above, question.below, question.reference];
  const frame = frameFor(statements, universe, start);
  const window = frame?.window ?? null;
  const inside = window && isWholeLine(universe) ? intersection(universe, windowSet(window)) : universe;
  const env: SolveEnv = { ...start, window };
  const restrict = context.wholeLetters.has(letter) ? wholeNumbersOf : (set: RealSet): RealSet => set;
  const solve = (statement: Statement, hints: readonly RealNumber[]): RealSet =>
    restrict(
      isWholeLine(inside)
        ? solveStatement(statement, { ...env, hints })
        : intersection(solveStatement(statement, { ...env, hints: [...universe.points, ...hints] }), inside),
    );
  const first = solve(question.below, []);
  const above = solve(question.above, first.points);
  const below = needsHints(first) ? solve(question.below, above.points) : first;
  const reference =
    question.reference === question.above ? above : solve(question.reference, [...above.points, ...below.points]);
  const isStretch = window !== null && isWholeLine(universe);
  return { above, below, reference, env, isStretch, isPartial: frame?.isWhole === false };
}

function needsHints(set: RealSet): boolean {
  return set.reached === 'sampled';
}

function windowSet({ low, high }: Window): RealSet {
  const at = (x: number): RealNumber => rationalNumber({ num: BigInt(Math.round(x * 1024)), den: 1024n });
  return { points: [at(low), at(high)], at: [true, true], between: [false, true, false], reached: 'proved' };
}

function reachedBy({ above, below }: Solved): Reached {
  return weaker(above.reached, below.reached);
}

/** Same solutions: what remains is the rule on empty and full sets. */
function judgeSame(question: OneLetterQuestion, solved: Solved): StepResult {
  const { above, below } = solved;
  const reached = reachedBy(solved);
  const drops = isEmptySet(difference(above, below)) ? [] : (['candidates'] as const);
  const notes: Note[] = [...drops];
  const candidates = listed(question, solved);
  if (candidates.length > 0 && !notes.includes('candidates')) notes.push('candidates');
  const exempt = isSentence(question.below) || isSentence(question.above);
  const bothEmpty = isEmptySet(above) && isEmptySet(below);
  const bothFull = isWholeLine(above) && isWholeLine(below);
  if (exempt || !(bothEmpty || bothFull)) return holds(reached, notes);
  const same = areSameStatements(question, solved.env);
  if (bothEmpty && isEmptySet(solveDefined(question.below, solved.env))) notes.push('meaningless');
  return same ? holds(same, notes) : undecided('not-settled', [...notes, 'empty']);
}

function isSentence(statement: Statement): boolean {
  if (statement.kind === 'never' || statement.kind === 'always') return true;
  return statement.kind === 'member' && ['empty', 'reals'].includes(statement.set.kind);
}

function areSameStatements(question: OneLetterQuestion, env: SolveEnv): Reached | null {
  const { above, below, given, context } = question;
  const roots = haveSameComplexRoots(above, below, env);
  if (roots === true) return 'proved';
  if (above.kind === 'compare' && below.kind === 'compare') {
    const same = sameUpToFactor(above, below, given, context);
    if (same && keepsDirection(above.sign, below.sign, same.factor.num > 0n)) return same.reached;
  }
  return given.size === 0 && roots === null ? haveSameComplexValues(question) : null;
}

/** x=\\pm\\sqrt{-4} after x^2=-4: no real solutions, the same complex ones. */
function haveSameComplexValues({ above, below, letter, settings, context }: OneLetterQuestion): Reached | null {
  const asked = { above, below, settings, context: { ...context, numbers: 'complex' as const } };
  const found = judgeComplexStep(asked, [letter]);
  return found.ruling === 'holds' && found.notes.length === 0 ? found.reached : null;
}

function keepsDirection(above: string, below: string, isPositive: boolean): boolean {
  const flipped: Record<string, string> = { '<': '>', '>': '<', '<=': '>=', '>=': '<=' };
  return isPositive ? above === below : (flipped[above] ?? above) === below;
}

/** Values in a list that do not satisfy the reference. */
function listed(question: OneLetterQuestion, { below, reference }: Solved): RealNumber[] {
  if (!isListOfValues(question.below, question.letter)) return [];
  const untrue = difference(below, reference);
  return untrue.points.filter((_, k) => untrue.at[k]);
}

function judgeGain(question: OneLetterQuestion, solved: Solved, gained: RealSet): OneLetterAnswer {
  const isOrder = [question.above, question.below].some((s) =>
    comparesOf(s).some((c) => c.sign !== '=' && c.sign !== 'approx'),
  );
  if (question.settings.reversible || (isOrder && !isListOfValues(question.below, question.letter))) {
    return answer(failWith(question, 'gained', gained, solved), solved, []);
  }
  // A set that is said to be the solutions cannot be narrowed by a later line value by value.
  const isSaid = isSentence(question.below) || question.below.kind === 'member';
  if (isSaid && !isFiniteSet(gained)) return answer(failWith(question, 'gained', gained, solved), solved, []);
  const names = nameEach(gained);
  const operation = explainGain(question.above, question.below, gained, solved.env);
  const candidates = listed(question, solved);
  if (operation) {
    const notes: Note[] = candidates.length > 0 ? ['one-way', 'candidates'] : ['one-way'];
    return answer(holds(reachedBy(solved), notes, { gained: names, operation }), solved, candidates);
  }
  // In a formula no later line rejects a value for some of the other letters' values.
  if (candidates.length > 0 && question.given.size === 0)
    return answer(holds(reachedBy(solved), ['candidates'], { gained: names }), solved, candidates);
  return answer(failWith(question, 'gained', gained, solved), solved, []);
}

/** A fault is named by its values, or where they fill an interval by one of them, which is put into both lines. */
function failWith(question: OneLetterQuestion, side: 'lost' | 'gained', values: RealSet, solved: Solved): StepResult {
  const [inside, simplest] = [samplePoint(values, false), samplePoint(values, true)];
  const found = ((): StepResult => {
    try {
      return failAt(simplest, question, side, values, solved);
    } catch (cause) {
      if (simplest === inside || !(cause instanceof Unsettled)) throw cause;
      return failAt(inside, question, side, values, solved);
    }
  })();
  const at = side === 'lost' && !isWhole(simplest) && found.evidence.gained ? wholeGain(question, solved) : null;
  return at === null
    ? found
    : { ...found, evidence: { ...found.evidence, witness: { at, above: 'false', below: 'true' } } };
}

function isWhole(point: RealNumber): boolean {
  return point.kind === 'rational' && point.value.den === 1n;
}

/** A whole number that the line below admits and the one above does not, as easier to put in than a value that was lost. */
function wholeGain(question: OneLetterQuestion, solved: Solved): Record<string, string> | null {
  const gained = difference(solved.below, solved.above);
  const point = isEmptySet(gained) ? null : samplePoint(gained, true);
  if (!point || !isWhole(point)) return null;
  const [above, below] = [question.above, question.below].map((one) => truthAt(one, point, solved.env));
  if (!above?.certain || above.isTrue || !below?.certain || !below.isTrue) return null;
  const given = [...question.given].map(([name, value]) => [name, nameNumber(rationalNumber(value))] as const);
  return Object.fromEntries([[question.letter, nameNumber(point, recognise)], ...given]);
}

function failAt(
  point: RealNumber,
  question: OneLetterQuestion,
  side: 'lost' | 'gained',
  values: RealSet,
  solved: Solved,
): StepResult {
  const expected = side === 'lost' ? [true, false] : [false, true];
  const truths = [question.above, question.below].map((statement) => truthAt(statement, point, solved.env));
  if (truths.some((truth, k) => truth !== null && truth.isTrue !== expected[k])) throw new Unsettled('not-settled');
  // Between places that were looked at only the value at the place itself counts.
  const isSeen = [solved.above, solved.below].every((set, k) => truths[k] !== null || set.open !== true);
  const isReferred = side === 'gained' || truthAt(question.reference, point, solved.env)?.isTrue !== false;
  if (!isSeen || !isReferred) throw new Unsettled('not-settled');
  const at: Record<string, string> = { [question.letter]: nameNumber(point, recognise) };
  for (const [name, value] of question.given) at[name] = nameNumber(rationalNumber(value));
  const [above, below] = expected.map(String) as [string, string];
  const evidence: Evidence = { [side]: nameEach(values), witness: { at, above, below } };
  const gained = side === 'lost' ? difference(solved.below, solved.above) : null;
  if (gained && !isEmptySet(gained)) evidence.gained = nameEach(gained);
  const notes: Note[] = isEmptySet(solveDefined(question.below, solved.env)) ? ['meaningless'] : [];
  const isProved = truths.every((truth) => truth?.certain) || reachedBy(solved) === 'proved';
  return fails(isProved ? 'proved' : 'sampled', evidence, notes);
}

const mostNames = 8;

function nameEach(set: RealSet): string[] {
  if (set.between.some(Boolean)) return [nameSet(set, recognise)];
  const points = set.points.filter((_, k) => set.at[k]);
  const nearest = points.length > mostNames ? [...points].sort(bySimplicity).slice(0, mostNames) : points;
  return nearest.map((p) => nameNumber(p, recognise));
}

/** Fractions with small numbers first: a person has to put them in by hand. */
function bySimplicity(a: RealNumber, b: RealNumber): number {
  return weight(a) - weight(b);
}

function weight(a: RealNumber): number {
  const size = Math.abs(approximate(a));
  return a.kind === 'rational' ? size + Number(a.value.den) * 2 - (a.value.num < 0n ? 0 : 0.5) : 1000 + size;
}

/** Inside an interval where there is one, or also one of its ends where that is simpler. */
function samplePoint(set: RealSet, withEnds: boolean): RealNumber {
  const open = set.between.flatMap((inside, k) =>
    inside ? [rationalNumber(between(set.points[k - 1] ?? null, set.points[k] ?? null))] : [],
  );
  const ends = set.points.filter(
    (point, k) => set.at[k] && (open.length === 0 || (withEnds && point.kind === 'rational')),
  );
  const points = [...open, ...ends];
  return [...points].sort(bySimplicity)[0] as RealNumber;
}
