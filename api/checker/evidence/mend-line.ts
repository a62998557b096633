import type { Line, RelationSign, Span } from '../../../shared/maths/expression.ts';
import { lettersOf } from '../../../shared/maths/letters.ts';
import { readLine } from '../../../shared/maths/read.ts';
import { sameExpr, sameLine } from '../../../shared/maths/same.ts';
import { BudgetSpent, createBudget } from '../context.ts';
import { aimsOf, expressionsIn } from './aims.ts';
import { termsOf } from './build.ts';
import { splice, type Candidate, type Edit } from './edits.ts';
import { replaceNode } from './holes.ts';
import { barsPutIn, exchangedNumbers, letterPutUnder, monomialPutIn, rootPutIn } from './factor-edits.ts';
import { leafEdits, numberPairs, numberText, signChanges, smallChanges } from './leaf-edits.ts';
import { nodesOf } from './line-parts.ts';
import { hits, outer, type Aim, type MendQuestion } from './mend-question.ts';
import { missingTerms, termByTerm, termByTermOfRelation } from './missing-terms.ts';
import { lostCases, otherCases } from './case-edits.ts';
import { roundedValues } from './rounded-values.ts';
import { systemEdits } from './system-edits.ts';
import { tidied } from './tidy-edits.ts';
import { shapeEdits, wholeShapes } from './shape-edits.ts';
import { solutionSet } from './solution-set.ts';
import { signChoices, valueListEdits } from './value-lists.ts';
import { rewritten, valuesAtLimits } from './worked-out.ts';
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

const mostRuled = 24;
/** Of lines written anew, whatever was looked at before. */
const mostAnew = 4;
const rightCost = 1.2;
const rewrittenCost = 4;
/** Beyond this two changes may be better than one. */
const likelyCost = 2.15;

/** The mended line of a step that fails; null where none was found. */
export function mendLine(question: MendQuestion): MendedLine | null {
  const aims = aimsOf(question);
  const trials = createTrials(question);
  if (question.isLarge)
    return trials.firstThatHolds([...aims.narrow, ...aims.wide].flatMap((aim) => largeChanges(aim, question)));
  const told = [...statementChanges(question)];
  for (const group of aims.narrow.length > 0 ? [aims.narrow, aims.wide] : [aims.wide]) {
    const single = [...told, ...group.flatMap((aim) => limited(aim, (own) => singleChanges(own, question)))];
    const found =
      trials.firstThatHolds(single.filter((candidate) => weight(candidate) < likelyCost)) ??
      trials.firstThatHolds([
        ...group.flatMap((aim) => limited(aim, (own) => pairedChanges(own, question))),
        ...single.filter((candidate) => weight(candidate) >= likelyCost),
      ]);
    if (found) return found;
  }
  return trials.firstThatHolds([...wholeChanges(question, aims.wide)], mostAnew);
}

/** What is read off the line above as a statement: signs, values, cases. */
function* statementChanges(question: MendQuestion): Generator<Candidate> {
  yield* signChoices(question);
  yield* valueListEdits(question);
  yield* relationSigns(question.line);
  yield* solutionSet(question);
  yield* roundedValues(question);
  yield* lostCases(question);
  yield* otherCases(question);
  yield* systemEdits(question);
  yield* termByTermOfRelation(question);
  yield* valuesAtLimits(question);
  yield* question.carried;
}

function* singleChanges(aim: Aim, { line, above, aboveTex, tex }: MendQuestion): Generator<Candidate> {
  const letters = [...new Set([...lettersOf(above), ...lettersOf(line)])];
  yield* leafEdits(aim, letters, tex);
  yield* signChanges(aim, tex);
  yield* shapeEdits(aim, tex);
  yield* exchangedNumbers(aim, tex);
  yield* letterPutUnder(aim, letters, tex);
  yield* barsPutIn(aim, above, tex);
  yield* rootPutIn(aim, `${aboveTex ?? ''}${tex}`);
  if (isSolved(line)) yield* wholeShapes(aim, letters, tex);
  yield* valueItself(aim);
  yield* missingTerms(aim);
  yield* termByTerm(aim);
}

function isSolved(line: Line): boolean {
  return line.kind === 'relation' && (line.left.kind === 'letter' || line.right.kind === 'letter');
}

/** The line written anew, where no small change mends it. */
function* wholeChanges(question: MendQuestion, aims: readonly Aim[]): Generator<Candidate> {
  const pair = expressionsIn(question);
  const [aim] = aims;
  if (pair && aim) yield* rewritten(aim, pair.above, question.link === 1 ? question.aboveTex : null, question.context);
  yield* sideAgain(question);
}

/** Where one side stands as it was and the other had nothing to be done: that side as it was. */
function* sideAgain({ above, line, aboveTex }: MendQuestion): Generator<Candidate> {
  if (above.kind !== 'relation' || line.kind !== 'relation' || aboveTex === null) return;
  for (const [own, was, other, kept] of [
    [line.left, above.left, line.right, above.right],
    [line.right, above.right, line.left, above.left],
  ] as const) {
    if (!sameExpr(other, kept)) continue;
    const text = aboveTex.slice(outer(was).start, outer(was).end);
    yield { edits: [{ ...outer(own), text }], cost: rewrittenCost + 1, touchesRight: false };
  }
}

/** In a long line only those terms are looked at that do not match the line above. */
function largeChanges(aim: Aim, { tex }: MendQuestion): Candidate[] {
  const wrong = aim.roots
    .flatMap((root) => termsOf(root).map((term) => term.expr))
    .filter((node) => !aim.isRight(node));
  if (wrong.length > mostWrong) return [];
  const within = new Set(wrong.flatMap((node) => nodesOf(node).map((placed) => placed.node)));
  return [...leafEdits(aim, [], tex, (node) => within.has(node))];
}

const mostWrong = 3;

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

const aimOperations = 50_000;

/** What was found before the work on one aim ran out. */
function limited(aim: Aim, find: (own: Aim) => Iterable<Candidate>): Candidate[] {
  const budget = createBudget(Math.min(aimOperations, Math.max(0, aim.budget.left() / 2)));
  const found: Candidate[] = [];
  try {
    for (const candidate of find({ ...aim, budget })) found.push(candidate);
  } catch (cause) {
    if (!(cause instanceof BudgetSpent)) throw cause;
  }
  return found;
}

/** Two changes at once. */
function* pairedChanges(aim: Aim, question: MendQuestion): Generator<Candidate> {
  yield* monomialPutIn(aim, lettersOf(question.line));
  yield* pairsOfChanges(aim, question);
  yield* numberPairs(aim, question.tex);
}

const mostSmall = 18;

/** Two changes, the first of them small. */
function* pairsOfChanges(aim: Aim, { tex }: MendQuestion): Generator<Candidate> {
  const small = smallChanges(aim, tex)
    .filter(({ node }) => !aim.isRight(node))
    .slice(0, mostSmall);
  for (const [k, one] of small.entries()) {
    const changed: Aim = { ...aim, tree: replaceNode(aim.tree, one.node, one.by) };
    for (const other of small.slice(k + 1)) {
      aim.budget.spend(aim.cost);
      const both = replaceNode(changed.tree, other.node, other.by);
      if (aim.targets.some((target) => hits(both, target, aim.places)))
        yield { edits: [one.edit, other.edit], cost: one.cost + other.cost + aim.extra, touchesRight: false };
    }
    for (const found of leafEdits(changed, [], tex)) {
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

interface Trials {
  /** In the order of their costs, leftmost on ties. */
  readonly firstThatHolds: (candidates: readonly Candidate[], more?: number) => MendedLine | null;
}

/** The checker's own ruling on changed lines, each looked at once and not too many of them. */
function createTrials(question: MendQuestion): Trials {
  const seen = new Set<string>([question.tex]);
  const attempt = (candidate: Candidate): MendedLine | null => {
    const edits = tidied(question.tex, candidate.edits, question.settings);
    const spliced = splice(question.tex, edits);
    if (!spliced || seen.has(spliced.tex)) return null;
    seen.add(spliced.tex);
    const reading = readLine(spliced.tex, question.settings);
    if (!reading.ok || reading.alternatives.length > 0 || isEmptyCopy(reading.line, candidate, question)) return null;
    if (!question.holds(reading.line)) return null;
    return { ...spliced, line: reading.line, edits, isRewritten: candidate.cost >= rewrittenCost };
  };
  return {
    firstThatHolds(candidates, more = 0) {
      const most = Math.max(mostRuled, more > 0 ? seen.size + more : 0);
      const ordered = [...candidates].sort((a, b) => weight(a) - weight(b) || placeOf(a) - placeOf(b));
      for (const candidate of ordered) {
        if (seen.size > most) return null;
        const found = attempt(candidate);
        if (found) return found;
      }
      return null;
    },
  };
}

/** The line above once more says nothing of the step, unless the author only miscopied it. */
function isEmptyCopy(line: Line, { edits, cost }: Candidate, { above }: MendQuestion): boolean {
  const isExchange = edits.every(({ start, end, text }) => end > start && text !== '');
  return cost < rewrittenCost && !isExchange && sameLine(line, above);
}
