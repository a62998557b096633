import type { Line, RelationSign } from '../../../shared/maths/expression.ts';
import { countNodes, exprsOf } from '../../../shared/maths/walk.ts';
import type { Evidence, StepRuling, Verdict } from '../../../shared/schemas/verdict.ts';
import { BudgetSpent, createBudget, type CheckContext } from '../context.ts';
import { within } from '../numbers/work.ts';
import { nameKeptValue } from '../slips/kept-values.ts';
import { nameBetween, nameSlip } from '../slips/name-slip.ts';
import { contextOf, judgeLine, type Route, type WalkState } from '../walk-derivation.ts';
import { expressionsIn } from './aims.ts';
import { shortDifference } from './difference.ts';
import { followsFrom } from './follows-from.ts';
import { carryOn } from './mend-ending.ts';
import { mendLine } from './mend-line.ts';
import type { MendQuestion } from './mend-question.ts';
import { knownLines, meaningToLine } from './meaning-line.ts';
import { followsPlainly } from './plainly-held.ts';
import { findWrongPart } from './wrong-part.ts';

/** Later faults get less work than the first one. */
const mostFaults = 3;

/**
 * Operations for all that explains a fault, and for each kind of evidence; of larger lines than this only single terms
 * are looked at.
 */
export const allowed = { fault: 100_000, slip: 50_000, mend: 80_000, ending: 50_000, difference: 20_000 } as const;
const mostNodes = 160;
const largest = 900;

/**
 * The one place where the rulings are complete and what explains them is added: the wrong part, the mended line and
 * ending, the difference, the slip. `before` holds what was known before each step.
 */
export function addEvidence(verdict: Verdict, route: Route, before: readonly WalkState[]): Verdict {
  const failing = verdict.steps.filter((step) => step.ruling === 'fails').slice(0, mostFaults);
  if (failing.length === 0) return verdict;
  const added = new Map(failing.map((step, k) => [step.step, explainFault(step, k === 0, verdict, route, before)]));
  return {
    ...verdict,
    steps: verdict.steps.map((step) => ({ ...step, evidence: { ...step.evidence, ...added.get(step.step) } })),
  };
}

function explainFault(
  fault: StepRuling,
  isFirst: boolean,
  verdict: Verdict,
  route: Route,
  before: readonly WalkState[],
): Evidence {
  const state = before[fault.step];
  if (!state) return {};
  const share = isFirst ? 1 : 0.25;
  const question = within(allowed.slip * share, () => attempt(() => askAbout(fault, route, state), null));
  if (!question) return {};
  const look = (operations: number, find: (question: MendQuestion) => Evidence): Evidence => {
    if (question.isLarge && operations !== allowed.mend) return {};
    const context = { ...question.context, budget: createBudget(operations * share) };
    return attempt(() => find(asking(question, fault.step, route, state, context)), {});
  };
  return within(allowed.fault * share, () => ({
    ...look(allowed.slip, (asked) => namedSlip(asked, fault, route, state)),
    ...look(allowed.mend, (asked) => mends(asked, fault, isFirst, verdict, route, state)),
    // A line without a value differs from nothing.
    ...(fault.evidence.witness ? look(allowed.difference, difference) : {}),
  }));
}

/** Nothing is better than something half looked at. */
function attempt<T>(find: () => T, otherwise: T): T {
  try {
    return find();
  } catch (cause) {
    if (cause instanceof BudgetSpent || cause instanceof RangeError) return otherwise;
    throw cause;
  }
}

/** The same question, to be answered within the budget of the context. */
function asking(
  question: MendQuestion,
  step: number,
  route: Route,
  state: WalkState,
  context: CheckContext,
): MendQuestion {
  return { ...question, context, holds: (line) => followsPlainly(judgeLine(route, state, step, line, context), state) };
}

function askAbout(fault: StepRuling, route: Route, state: WalkState): MendQuestion | null {
  const own = route.read.lines[fault.step];
  const above = lineAbove(route, state, fault.step);
  const size = own?.ok && above ? sizeOf(own.line) + sizeOf(above.line) : Infinity;
  if (!own?.ok || !above || size > largest) return null;
  const { evidence } = fault;
  return {
    above: above.line,
    aboveTex: above.tex,
    line: own.line,
    tex: own.tex,
    link: evidence.link ?? 1,
    isLarge: size > mostNodes,
    solutions: solutionsOf(above.line, route, state, fault.step),
    known: knownLines(state),
    carried: [],
    lost: evidence.lost ?? [],
    gained: evidence.gained ?? [],
    settings: route.read.settings,
    context: contextOf(route, state),
    holds: () => false,
  };
}

/** Asked for inequalities only, whose solutions are not among what was lost or gained by name. */
function solutionsOf(above: Line, route: Route, state: WalkState, step: number): string | null {
  const signs = signsOf(above);
  if (signs.length === 0 || signs.includes('=')) return null;
  return judgeLine(route, state, step, above).result.evidence.solutions ?? null;
}

function signsOf(line: Line): readonly RelationSign[] {
  if (line.kind === 'any' || line.kind === 'all') return line.parts.flatMap(signsOf);
  return line.kind === 'relation' ? [line.sign] : line.kind === 'chain' ? line.signs : [];
}

function sizeOf(line: Line): number {
  return exprsOf(line).reduce((count, expr) => count + countNodes(expr), 0);
}

/** What the step starts from, as a line; its text only where it is a line of its own. */
function lineAbove(route: Route, state: WalkState, step: number): { line: Line; tex: string | null } | null {
  const uses = route.input.uses?.[step] ?? [];
  if (uses.length > 1) return null;
  const meaning = uses.length === 1 ? state.meanings[uses[0] ?? 0] : state.from;
  if (!meaning) return null;
  const place = state.meanings.lastIndexOf(meaning);
  const written = place >= 0 ? route.read.lines[place] : undefined;
  if (written?.ok && written.line.kind === meaning.kind) return { line: written.line, tex: written.tex };
  if (
    written?.ok &&
    meaning.kind === 'statement' &&
    ['relation', 'any', 'all', 'membership'].includes(written.line.kind)
  )
    return { line: written.line, tex: null };
  const line = meaningToLine(meaning);
  return line && { line, tex: null };
}

function namedSlip(question: MendQuestion, fault: StepRuling, route: Route, state: WalkState): Evidence {
  const { above, line, link, context } = question;
  // Such a line follows from the one above: what is wrong is that it still lists a value that the given shuts out.
  if (fault.notes.includes('not-rejected')) {
    const kept = state.reference && nameKeptValue(state.reference);
    if (kept) return { slip: { id: kept.id, kind: kept.kind } };
  }
  const pair = link > 1 ? expressionsIn(question) : null;
  const slip = pair
    ? nameBetween(pair.above, pair.focus, false, context)
    : nameSlip(above, line, context, (from, to) => followsFrom(from, to, route, context));
  return slip ? { slip: { id: slip.id, kind: slip.kind } } : {};
}

function mends(
  question: MendQuestion,
  fault: StepRuling,
  isFirst: boolean,
  verdict: Verdict,
  route: Route,
  state: WalkState,
): Evidence {
  const mended = mendLine(question);
  if (!mended) return {};
  const wrongPart = findWrongPart(question, mended);
  const found: Evidence = {
    mended: { line: mended.tex, changed: [...mended.changed] },
    ...(wrongPart ? { wrongPart } : {}),
  };
  if (!isFirst) return found;
  const ending = attempt(() => {
    const context = { ...question.context, budget: createBudget(allowed.ending) };
    const lines = carryOn(route, state, fault.step, mended, verdict.steps, context);
    return lines ? { mendedEnding: lines } : {};
  }, {});
  return { ...found, ...ending };
}

function difference(question: MendQuestion): Evidence {
  const pair = expressionsIn(question);
  const found = pair && shortDifference(pair.above, pair.focus, question.context);
  return found ? { difference: found } : {};
}
