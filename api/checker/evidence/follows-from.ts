import type { Line } from '../../../shared/maths/expression.ts';
import type { CheckContext } from '../context.ts';
import { meaningOf } from '../rules/meaning.ts';
import { judgeStep } from '../rules/step.ts';
import { Unsettled } from '../solving/unsettled.ts';
import type { Route } from '../walk-derivation.ts';
import { isPlainlyHeld } from './plainly-held.ts';

/** Whether one statement follows from another, taken by themselves. */
export function followsFrom(from: Line, to: Line, route: Route, context: CheckContext): boolean {
  const meaning = meaningOf(from);
  if (meaning?.kind !== 'statement') return false;
  try {
    const { result } = judgeStep({
      line: to,
      from: meaning,
      remark: null,
      reference: meaning.statement,
      known: [meaning.statement],
      givenLetters: route.givenLetters,
      unknown: route.unknown,
      isLast: true,
      later: () => [],
      mayBringUnit: true,
      given: meaning.statement,
      afterFault: false,
      settings: route.input.settings,
      context,
    });
    return isPlainlyHeld(result) && !result.notes.includes('one-way');
  } catch (cause) {
    if (cause instanceof Unsettled || cause instanceof RangeError) return false;
    throw cause;
  }
}
