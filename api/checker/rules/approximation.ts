import { intersection, isEmptySet, openIf, weaker, type RealSet } from '../solving/real-set.ts';
import { nameNumber, nameSet } from '../solving/naming.ts';
import { recogniseNumber } from '../solving/recognise.ts';
import { Unsettled } from '../solving/unsettled.ts';
import { solveStatement, type SolveEnv } from '../statements/solve.ts';
import type { OneLetterQuestion } from './one-letter.ts';
import { frameFor, universeOf } from './one-letter-env.ts';
import { fails, holds, type StepResult } from './step-result.ts';

/** Rule 9: each solution above fits a value below, and each value below fits a solution above; throws Unsettled. */
export function judgeApproximation(question: OneLetterQuestion): StepResult {
  const { letter, given, context, families } = question;
  const universe = universeOf(letter, given, context);
  const start: SolveEnv = { letter, given, context, window: null, hints: [], families };
  const frame = frameFor([question.above, question.below], universe, start);
  const env: SolveEnv = { ...start, window: frame?.window ?? null };
  const above = intersection(solveStatement(question.above, env), universe);
  const below = intersection(solveStatement(question.below, { ...env, hints: above.points }), universe);
  const reference = solveStatement(question.reference, env);
  const lost = piecesOf(above).filter((piece) => meets(piece, reference) && !meets(piece, below));
  const gained = piecesOf(below).filter((piece) => !meets(piece, above));
  const reached = weaker(above.reached, below.reached);
  if (lost.length === 0 && gained.length === 0) {
    if (above.open || below.open || frame?.isWhole === false) throw new Unsettled('not-settled');
    return holds(reached);
  }
  const names = (pieces: readonly RealSet[]): string[] => pieces.map(nameOf);
  const point = nameOf((lost[0] ?? gained[0]) as RealSet);
  const [worthAbove, worthBelow] = lost.length > 0 ? ['true', 'false'] : ['false', 'true'];
  return fails(reached, {
    ...(lost.length > 0 ? { lost: names(lost) } : {}),
    ...(gained.length > 0 ? { gained: names(gained) } : {}),
    witness: { at: { [letter]: point }, above: worthAbove, below: worthBelow },
  });
}

/** Two stretches of numbers that round to different values have an end in common: that is no fit. */
function meets(a: RealSet, b: RealSet): boolean {
  const common = intersection(a, b);
  const isStretch = (set: RealSet): boolean => set.between.some(Boolean);
  return !isEmptySet(common) && (isStretch(common) || !isStretch(a) || !piecesOf(b).every(isStretch));
}

/** The points and intervals of a set, each as a set. */
function piecesOf(set: RealSet): RealSet[] {
  const pieces: RealSet[] = [];
  for (let k = 0; k < set.between.length; k += 1) {
    if (set.between[k])
      pieces.push(
        only(
          set,
          (j) => j === k - 1 || j === k,
          (j) => j === k,
        ),
      );
    else if (set.at[k] && !set.between[k + 1])
      pieces.push(
        only(
          set,
          (j) => j === k,
          () => false,
        ),
      );
  }
  return pieces;
}

function only(set: RealSet, keepPoint: (k: number) => boolean, keepBetween: (k: number) => boolean): RealSet {
  return {
    points: set.points,
    at: set.at.map((inside, k) => inside && keepPoint(k)),
    between: set.between.map((inside, k) => inside && keepBetween(k)),
    reached: set.reached,
    ...openIf(set),
  };
}

function nameOf(piece: RealSet): string {
  const open = piece.between.some(Boolean);
  const point = piece.points[piece.at.indexOf(true)];
  return open || !point ? nameSet(piece, recogniseNumber) : nameNumber(point, recogniseNumber);
}
