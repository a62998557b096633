import type { Line } from '../../../shared/maths/expression.ts';
import type { StepRuling } from '../../../shared/schemas/verdict.ts';
import type { CheckContext } from '../context.ts';
import { judgeLine, type Route, type WalkState } from '../walk-derivation.ts';
import { printExpr } from '../../../shared/maths/print.ts';
import { termsOf } from './build.ts';
import { changesAgain } from './carried-changes.ts';
import type { Candidate, Edit } from './edits.ts';
import { collect, spread, sumExpr } from './monomials.ts';
import { knownLines } from './meaning-line.ts';
import { mendLine, type MendedLine } from './mend-line.ts';
import { operationsBetween } from './operations.ts';
import { followsPlainly } from './plainly-held.ts';

const mostLines = 12;

/**
 * The author's later steps carried through from a mended line: each of them holds from the one before and is explained
 * by an operation that also explains the author's own step. Null where one of them is not, for none is better than a
 * wrong one.
 */
export function carryOn(
  route: Route,
  before: WalkState,
  step: number,
  mended: MendedLine,
  steps: readonly StepRuling[],
  context: CheckContext,
): string[] | null {
  const { lines } = route.read;
  if (lines.length - step > mostLines) return null;
  const carried = [mended.tex];
  let last: Line = mended.line;
  let edits: readonly Edit[] = mended.edits;
  let state = judgeLine(route, before, step, mended.line, context).state;
  for (let next = step + 1; next < lines.length; next += 1) {
    const own = lines[next];
    const above = lines[next - 1];
    if (!own?.ok || !above?.ok || steps[next - 1]?.ruling !== 'holds' || (route.input.uses?.[next]?.length ?? 0) > 0)
      return null;
    const found = carryLine(route, state, next, {
      own: { line: own.line, tex: own.tex },
      above: { line: last, tex: carried[carried.length - 1] ?? '' },
      sameChanges: changesAgain({ line: above.line, tex: above.tex, edits }, { line: own.line, tex: own.tex }),
      context,
    });
    if (!found) return null;
    const explained = operationsBetween(above.line, own.line, context);
    const mendedToo = operationsBetween(last, found.line, context);
    if (![...explained].some((operation) => mendedToo.has(operation))) return null;
    carried.push(found.tex);
    last = found.line;
    edits = found.edits;
    state = judgeLine(route, state, next, found.line, context).state;
  }
  return carried;
}

interface Written {
  readonly line: Line;
  readonly tex: string;
}

interface Carrying {
  readonly own: Written;
  readonly above: Written;
  readonly sameChanges: readonly Candidate[];
  readonly context: CheckContext;
}

/** The author's line as it stands where it still follows, else with the numbers that the mend brings with it. */
function carryLine(
  route: Route,
  state: WalkState,
  step: number,
  { own, above, sameChanges, context }: Carrying,
): (Written & { readonly edits: readonly Edit[] }) | null {
  const judged = judgeLine(route, state, step, own.line, context);
  const { result } = judged;
  if (followsPlainly(judged, state)) return { ...own, edits: [] };
  const holds = (line: Line): boolean => followsPlainly(judgeLine(route, state, step, line, context), state);
  const found = mendLine({
    above: above.line,
    aboveTex: above.tex,
    line: own.line,
    tex: own.tex,
    link: result.evidence.link ?? 1,
    isLarge: false,
    solutions: null,
    known: knownLines(state),
    carried: sameChanges,
    lost: result.evidence.lost ?? [],
    gained: result.evidence.gained ?? [],
    settings: route.read.settings,
    context,
    holds,
  });
  if (!found || found.isRewritten) return null;
  return joinedAgain(own.line, found, holds) ?? found;
}

/** Like terms that the mend leaves where the author had joined all of them are joined as well. */
function joinedAgain(
  own: Line,
  found: MendedLine,
  holds: (line: Line) => boolean,
): (Written & { readonly edits: readonly Edit[] }) | null {
  if (own.kind !== 'expression' || found.line.kind !== 'expression') return null;
  const [before, after] = [spread(own.expr), spread(found.line.expr)];
  if (!before || !after || found.line.expr.kind !== 'sum' || termsOf(found.line.expr).length !== after.length)
    return null;
  const joined = collect(after);
  if (collect(before).length < before.length || joined.length === after.length) return null;
  const tex = printExpr(sumExpr(joined));
  const line: Line = { ...found.line, expr: sumExpr(joined) };
  return holds(line) ? { line, tex, edits: [{ ...own.span, text: tex }] } : null;
}
