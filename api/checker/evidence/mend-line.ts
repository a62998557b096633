import type { Expr, Line, RelationSign, Span } from '../../../shared/maths/expression.ts';
import { lettersOf } from '../../../shared/maths/letters.ts';
import { readLine } from '../../../shared/maths/read.ts';
import { BudgetSpent, createBudget } from '../context.ts';
import { aimsOf, expressionsIn } from './aims.ts';
import { termsOf } from './build.ts';
import { splice, type Candidate, type Edit } from './edits.ts';
import { replaceNode } from './holes.ts';
import { leafEdits, numberPairs, numberText, smallChanges } from './leaf-edits.ts';
import { nodesOf } from './line-parts.ts';
import { hits, outer, type Aim, type MendQuestion } from './mend-question.ts';
import { missingTerms } from './missing-terms.ts';
import { findRightParts, findRightTerms } from './right-parts.ts';
import { shapeEdits } from './shape-edits.ts';
import { solutionSet } from './solution-set.ts';
import { signChoices, valueListEdits } from './value-lists.ts';
import { rewritten } from './worked-out.ts';
import { simpleFraction } from './holes.ts';

/** The author's line changed as little as makes it follow, as the checker itself has ruled. */
export interface MendedLine {
  readonly tex: string;
  readonly line: Line;
  readonly changed: readonly Span[];
  /** In the author's own text. */
  readonly edits: readonly Edit[];
  /** Written anew as a whole: nothing of the author's is left. */
  readonly isRewritten: boolean;
}

const mostRuled = 14;
const rightCost = 1.2;
const rewrittenCost = 4;
/** Beyond this two changes may be better than one. */
const likelyCost = 2.15;

/** The mended line of a step that fails; null where none was found. */
export function mendLine(question: MendQuestion): MendedLine | null {
  const aims = aimsOf(question);
  const isRight = rightParts(question, aims[0]?.wanted ?? null);
  if (question.isLarge) return firstThatHolds([...changesOfWrongTerms(question, aims, isRight)], question);
  const single = [...singleChanges(question, aims, isRight)];
  const likely = single.filter((candidate) => weight(candidate) < likelyCost);
  const unlikely = single.filter((candidate) => weight(candidate) >= likelyCost);
  const first = firstThatHolds(likely, question);
  if (first) return first;
  const pairs = aims.flatMap((aim) => findPairs(aim, question, isRight));
  return firstThatHolds([...pairs, ...unlikely], question);
}

function* singleChanges(
  question: MendQuestion,
  aims: readonly Aim[],
  isRight: (node: Expr) => boolean,
): Generator<Candidate> {
  const { line, above, tex } = question;
  yield* signChoices(question);
  yield* valueListEdits(question);
  yield* relationSigns(line);
  yield* solutionSet(question);
  const letters = [...new Set([...lettersOf(above), ...lettersOf(line)])];
  for (const aim of aims) {
    yield* leafEdits(aim, letters, tex, isRight);
    yield* shapeEdits(aim, tex, isRight);
    yield* missingTerms(aim, isRight);
    yield* valueItself(aim);
  }
  const pair = expressionsIn(question);
  const [aim] = aims;
  if (pair && aim) yield* rewritten(aim, pair.above, question.link === 1 ? question.aboveTex : null, question.context);
}

/** In a long line only those terms are looked at that do not match the line above. */
function* changesOfWrongTerms(
  { tex }: MendQuestion,
  aims: readonly Aim[],
  isRight: (node: Expr) => boolean,
): Generator<Candidate> {
  for (const aim of aims) {
    const wrong = aim.roots.flatMap((root) => termsOf(root).map((term) => term.expr)).filter((node) => !isRight(node));
    if (wrong.length > mostWrong) continue;
    const within = new Set(wrong.flatMap((node) => nodesOf(node).map((placed) => placed.node)));
    yield* leafEdits(aim, [], tex, isRight, (node) => within.has(node));
  }
}

const mostWrong = 3;

function rightParts(question: MendQuestion, wanted: Expr | null): (node: Expr) => boolean {
  const pair = expressionsIn(question);
  const { above, line } = question;
  const found = pair
    ? findRightParts(wanted ?? pair.above, pair.focus)
    : above.kind === 'relation' && line.kind === 'relation'
      ? findRightTerms([above.left, above.right], [line.left, line.right])
      : new Set<Expr>();
  return (node) => found.has(node);
}

const signTex: Partial<Record<RelationSign, string>> = { '<': '<', '>': '>', '<=': '\\le', '>=': '\\ge' };

/** Another sign of order. */
function* relationSigns(line: Line): Generator<Candidate> {
  if (line.kind === 'any' || line.kind === 'all') {
    for (const part of line.parts) yield* relationSigns(part);
  }
  if (line.kind !== 'relation' || !signTex[line.sign]) return;
  const place = { start: outer(line.left).end, end: outer(line.right).start };
  const turned: Partial<Record<RelationSign, RelationSign>> = { '<': '>', '>': '<', '<=': '>=', '>=': '<=' };
  for (const [sign, text] of Object.entries(signTex)) {
    if (sign !== line.sign)
      yield { edits: [{ ...place, text }], cost: sign === turned[line.sign] ? 1 : 1.05, touchesRight: false };
  }
}

/** letter = number: the number itself in place of what is written. */
function* valueItself(aim: Aim): Generator<Candidate> {
  const [focus] = aim.roots;
  const value = aim.targets[0]?.[0];
  if (!focus || !value || aim.roots.length > 1 || lettersOf(focus).length > 0) return;
  const found = simpleFraction(value);
  if (found && aim.targets[0]?.every((other) => other.re === value.re))
    yield { edits: [{ ...outer(focus), text: numberText(found) }], cost: 1.9, touchesRight: false };
}

const pairOperations = 50_000;

/** Two changes at once, as many as can be looked at; what was found before the work ran out is kept. */
function findPairs(aim: Aim, question: MendQuestion, isRight: (node: Expr) => boolean): Candidate[] {
  const limited: Aim = { ...aim, budget: createBudget(Math.min(pairOperations, Math.max(0, aim.budget.left()))) };
  const found: Candidate[] = [];
  try {
    for (const candidate of pairsOfChanges(limited, question, isRight)) found.push(candidate);
    for (const candidate of numberPairs(limited, question.tex, isRight)) found.push(candidate);
  } catch (cause) {
    if (!(cause instanceof BudgetSpent)) throw cause;
  }
  return found;
}

const mostSmall = 18;

/** Two changes, the first of them small. */
function* pairsOfChanges(aim: Aim, { tex }: MendQuestion, isRight: (node: Expr) => boolean): Generator<Candidate> {
  const small = smallChanges(aim, tex)
    .filter(({ node }) => !isRight(node))
    .slice(0, mostSmall);
  for (const [k, one] of small.entries()) {
    const changed: Aim = { ...aim, tree: replaceNode(aim.tree, one.node, one.by) };
    for (const other of small.slice(k + 1)) {
      aim.budget.spend(aim.cost);
      const both = replaceNode(changed.tree, other.node, other.by);
      if (aim.targets.some((target) => hits(both, target, aim.places)))
        yield { edits: [one.edit, other.edit], cost: one.cost + other.cost, touchesRight: false };
    }
    for (const found of leafEdits(changed, [], tex, isRight)) {
      yield { ...found, edits: [one.edit, ...found.edits], cost: one.cost + found.cost };
    }
  }
}

function weight(candidate: Candidate): number {
  return candidate.cost + (candidate.touchesRight ? rightCost : 0);
}

function placeOf(candidate: Candidate): number {
  return Math.min(...candidate.edits.map((edit) => edit.start));
}

/** In the order of their costs, leftmost on ties. */
function firstThatHolds(candidates: readonly Candidate[], question: MendQuestion): MendedLine | null {
  const ordered = [...candidates].sort((a, b) => weight(a) - weight(b) || placeOf(a) - placeOf(b));
  const seen = new Set<string>([question.tex]);
  for (const candidate of ordered) {
    const spliced = splice(question.tex, candidate.edits);
    if (!spliced || seen.has(spliced.tex)) continue;
    seen.add(spliced.tex);
    if (seen.size > mostRuled) return null;
    const reading = readLine(spliced.tex, question.settings);
    if (!reading.ok || reading.alternatives.length > 0 || !question.holds(reading.line)) continue;
    return { ...spliced, line: reading.line, edits: candidate.edits, isRewritten: candidate.cost >= rewrittenCost };
  }
  return null;
}
