import { readDerivation } from '../../../api/checker/read-derivation.ts';
import type { StepResult } from '../../../api/checker/rules/step-result.ts';
import { judgeLine, planRoute, skipLine, startWalk } from '../../../api/checker/walk-derivation.ts';
import type { CheckSettings } from '../../../shared/schemas/verdict.ts';

/** The ruling on every step of a derivation, one after the other; null for a line that was not read. */
export function judgeLines(
  lines: readonly string[],
  settings: CheckSettings = {},
  assume: readonly string[] = [],
): (StepResult | null)[] {
  const input = { lines, assume, settings };
  const read = readDerivation(input);
  const route = planRoute(input, read);
  let state = startWalk(route);
  return read.lines.slice(1).map((line, k) => {
    if (!line.ok) {
      state = skipLine(state);
      return null;
    }
    const found = judgeLine(route, state, k + 1, line.line);
    state = found.state;
    return found.result;
  });
}

/** One letter a step: h, f or u. */
export function lettersFor(results: readonly (StepResult | null)[]): string {
  return results.map((result) => result?.ruling.charAt(0) ?? '-').join('');
}
