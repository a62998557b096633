import type { Expr, Line } from '../../../shared/maths/expression.ts';
import { lettersOf } from '../../../shared/maths/letters.ts';
import type { StepRuling } from '../../../shared/schemas/verdict.ts';
import type { CheckContext } from '../context.ts';
import { judgeLine, type Route, type WalkState } from '../walk-derivation.ts';
import { printExpr, printLine } from '../../../shared/maths/print.ts';
import { sameLine } from '../../../shared/maths/same.ts';
import * as Q from '../numbers/rational.ts';
import { listOf } from '../slips/may-follow.ts';
import { neg, sum, termsOf } from './build.ts';
import { changesAgain } from './carried-changes.ts';
import { completedSquare } from './completed-square.ts';
import type { Candidate, Edit } from './edits.ts';
import { collect, expanded, monomialExpr, negated, spread, sumExpr } from './monomials.ts';
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
    // What the mend has done already needs no line of its own.
    if (sameLine(found.line, last)) continue;
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
): Carried | null {
  const judged = judgeLine(route, state, step, own.line, context);
  const { result } = judged;
  if (followsPlainly(judged, state)) return { ...own, edits: [] };
  const holds = (line: Line): boolean => followsPlainly(judgeLine(route, state, step, line, context), state);
  const square = completedSquare(above.line, own.line);
  const found = mendLine({
    above: above.line,
    aboveTex: above.tex,
    line: own.line,
    tex: own.tex,
    link: result.evidence.link ?? 1,
    isLarge: false,
    solutions: null,
    known: knownLines(state),
    carried: [...sameChanges, ...(square ? [square] : [])],
    lost: result.evidence.lost ?? [],
    gained: result.evidence.gained ?? [],
    settings: route.read.settings,
    context,
    holds,
  });
  if (!found || found.isRewritten) return null;
  return joinedAgain(own.line, found, holds) ?? solvedAgain(own.line, found, holds) ?? found;
}

type Carried = Written & { readonly edits: readonly Edit[] };

/** Like terms that the mend leaves where the author had joined all of them are joined as well. */
function joinedAgain(own: Line, found: MendedLine, holds: (line: Line) => boolean): Carried | null {
  if (own.kind === 'expression' && found.line.kind === 'expression') {
    const expr = joinedSide(own.expr, found.line.expr);
    return expr && accepted({ ...found.line, expr }, printExpr(expr), found, holds);
  }
  if (own.kind !== 'relation' || found.line.kind !== 'relation') return null;
  const [left, right] = [joinedSide(own.left, found.line.left), joinedSide(own.right, found.line.right)];
  if (!left && !right) return null;
  const line: Line = { ...found.line, left: left ?? found.line.left, right: right ?? found.line.right };
  return accepted(line, printLine(line), found, holds);
}

/** Null where there is nothing to join, or the author had not joined all either. */
function joinedSide(own: Expr, found: Expr): Expr | null {
  const [before, after] = [spread(own), spread(found)];
  if (!before || !after || found.kind !== 'sum' || termsOf(found).length !== after.length) return null;
  const joined = collect(after);
  return collect(before).length < before.length || joined.length === after.length ? null : sumExpr(joined);
}

/** A case that the mend puts in is solved where the author's cases are. */
function solvedAgain(own: Line, found: MendedLine, holds: (line: Line) => boolean): Carried | null {
  if (!listOf(own) && !isBound(own)) return null;
  if (found.line.kind !== 'any' || found.line.parts.every((part) => listOf(part) || isBound(part))) return null;
  const parts = found.line.parts.map(solved);
  if (parts.includes(null)) return null;
  const line: Line = { ...found.line, parts: parts as Line[] };
  return accepted(line, printLine(line), found, holds);
}

/** letter < number, and the like. */
function isBound(line: Line): boolean {
  return line.kind === 'relation' && line.left.kind === 'letter' && lettersOf(line.right).length === 0;
}

/** letter + number = number, with any sign of order. */
function solved(line: Line): Line | null {
  if (listOf(line) || isBound(line)) return line;
  if (line.kind !== 'relation') return null;
  const terms = expanded(sum(line.left, neg(line.right)));
  const [name, ...others] = lettersOf(line);
  const moving = terms?.filter(({ powers }) => powers.size > 0) ?? [];
  const [only] = moving;
  if (!terms || !name || others.length > 0 || moving.length !== 1 || !only || !Q.equals(only.coefficient, Q.one))
    return null;
  const rest = sumExpr(terms.filter((term) => term !== only).map(negated));
  const base = monomialExpr(only);
  return base.kind === 'letter' ? { ...line, left: base, right: rest } : null;
}

function accepted(line: Line, tex: string, found: MendedLine, holds: (line: Line) => boolean): Carried | null {
  return holds(line) ? { line, tex, edits: [{ start: 0, end: found.tex.length, text: tex }] } : null;
}
