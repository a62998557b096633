import type { Expr, RelationSign } from '../../../shared/maths/expression.ts';
import { lettersOf } from '../../../shared/maths/letters.ts';
import type { CheckContext } from '../context.ts';
import { isApart } from '../numbers/ball.ts';
import { rational, toTex, type Rational } from '../numbers/rational.ts';
import { exactRange, mayBeRounded, rangeOf } from '../statements/rounding.ts';
import { judgeLinks } from './expression-step.ts';
import { fails, holds, undecided, type StepResult } from './step-result.ts';

/** An expression that was rounded on the way, and what it was before. */
export interface RoundedValue {
  readonly expr: Expr;
  /** The last expression that was not rounded. */
  readonly exact: Expr;
  readonly isRounded: boolean;
}

/**
 * Rule 9 on expressions: after an approximation sign, numbers stand for all that round to them, and the next member
 * holds where it fits some of these values or the exact one.
 */
export function judgeRoundedLinks(
  from: RoundedValue,
  members: readonly Expr[],
  signs: readonly RelationSign[],
  context: CheckContext,
): { readonly result: StepResult; readonly last: RoundedValue } {
  let current = from;
  let result: StepResult = holds('proved');
  for (const [k, member] of members.entries()) {
    const isAbout = signs[k] === 'approx';
    const link =
      !isAbout && !current.isRounded
        ? judgeLinks(current.expr, [member], context)
        : judgeLink(current, member, isAbout, context);
    current =
      isAbout || current.isRounded
        ? { ...current, expr: member, isRounded: true }
        : { expr: member, exact: member, isRounded: false };
    if (result.ruling === 'holds') {
      result =
        link.ruling === 'holds' || members.length === 1
          ? link
          : { ...link, evidence: { ...link.evidence, link: k + 1 } };
    }
  }
  return { result, last: current };
}

function judgeLink(from: RoundedValue, member: Expr, isAbout: boolean, context: CheckContext): StepResult {
  const letters = [...new Set([...lettersOf(from.exact), ...lettersOf(from.expr), ...lettersOf(member)])];
  if (isAbout && !mayBeRounded(member)) return undecided('not-covered');
  for (const given of placesFor(letters)) {
    const values = [
      exactRange(from.exact, given, context),
      from.isRounded ? rangeOf(from.expr, given, context) : null,
    ].filter((value) => value !== null);
    const range = isAbout ? rangeOf(member, given, context) : exactRange(member, given, context);
    if (values.length === 0 || !range) return undecided('not-settled');
    if (values.some((value) => !isApart(value, range))) continue;
    return fails('proved', { witness: { at: namesOf(given), above: 'true', below: 'false' } });
  }
  return holds(letters.length === 0 ? 'proved' : 'sampled');
}

const places: readonly Rational[] = [rational(2), rational(3), rational(7, 2), rational(11), rational(1, 3)];

function placesFor(letters: readonly string[]): ReadonlyMap<string, Rational>[] {
  if (letters.length === 0) return [new Map()];
  return places.map(
    (_, k) => new Map(letters.map((name, j) => [name, places[(k + 2 * j) % places.length] as Rational])),
  );
}

function namesOf(given: ReadonlyMap<string, Rational>): Record<string, string> {
  return Object.fromEntries([...given].map(([name, value]) => [name, toTex(value)]));
}
