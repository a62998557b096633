import type { Expr, Term } from '../../../shared/maths/expression.ts';
import { printExpr } from '../../../shared/maths/print.ts';
import * as Q from '../numbers/rational.ts';
import { signedTerm } from '../slips/relations.ts';
import { isZero, neg, sum, termsOf } from './build.ts';
import type { Candidate, Edit } from './edits.ts';
import { leavesOf } from './line-parts.ts';
import { collect, keyOf, monomialExpr, negated, spread, sumExpr, type Monomial } from './monomials.ts';
import { hits, outer, type Aim, type MendQuestion } from './mend-question.ts';

const mostMissing = 2;

/** Terms that are not there at all, put in where the work would have them. */
export function* missingTerms(aim: Aim): Generator<Candidate> {
  const [focus] = aim.roots;
  const above = aim.wanted && spread(aim.wanted);
  const own = focus && spread(focus);
  if (!focus || !above || !own || aim.roots.length !== 1) return;
  if (isZero(focus)) yield* inPlaceOfZero(focus, above, aim);
  if (isZero(focus)) return;
  const doubtful =
    focus.kind === 'sum'
      ? focus.terms.filter(({ expr }) => !aim.isRight(expr)).flatMap(({ expr }) => spread(expr) ?? [])
      : own;
  const present = new Set(doubtful.map(keyOf));
  // A like term that is there, and not known to be right, is changed instead.
  const isNew = (terms: readonly Monomial[]): boolean =>
    terms.length > 0 && terms.every((term) => !present.has(keyOf(term)));
  const missing = collect([...above, ...own.map(negated)]);
  if (missing.length <= mostMissing && isNew(missing)) yield put(missing, focus, above, aim.extra);
  for (const term of collect(above)) {
    const withTerm = sum(focus, monomialExpr(term));
    if (isNew([term]) && aim.targets.some((target) => hits(withTerm, target, aim.places)))
      yield put([term], focus, above, aim.extra);
  }
}

function put(missing: readonly Monomial[], focus: Expr, above: readonly Monomial[], extra: number): Candidate {
  const leaves = missing.reduce((count, term) => count + leavesOf(monomialExpr(term)).length, 0);
  return { edits: insertions(missing, focus, above), cost: 1.3 + 0.1 * leaves + extra, touchesRight: false };
}

/** Each behind the last term that comes before it in the work; in front where all come after it, else at the end. */
function insertions(missing: readonly Monomial[], focus: Expr, above: readonly Monomial[]): Edit[] {
  const own = termsOf(focus).map((term) => {
    const [monomial] = spread(signedTerm(term)) ?? [];
    const whole = focus.kind === 'sum' ? term.span : outer(focus);
    return { span: whole, rank: monomial ? rankOf(monomial, above) : -1 };
  });
  const known = own.filter(({ rank }) => rank >= 0);
  const edits: Edit[] = [];
  let front = '';
  for (const term of missing) {
    const place = above.findIndex((other) => keyOf(other) === keyOf(term));
    const before = known.filter(({ rank }) => rank < place);
    const isFront = before.length === 0 && known.length > 0;
    const at = (before[before.length - 1] ?? own[own.length - 1])?.span.end ?? focus.span.end;
    if (isFront) front += front === '' ? printExpr(monomialExpr(term)) : signedText(term);
    else edits.push({ start: at, end: at, text: signedText(term) });
  }
  const start = own[0]?.span.start ?? focus.span.start;
  const isSigned = focus.kind === 'sum' && focus.terms[0]?.sign === 'minus';
  return front === '' ? edits : [{ start, end: start, text: isSigned ? front : `${front}+` }, ...edits];
}

function signedText(term: Monomial): string {
  const text = printExpr(monomialExpr(term));
  return text.startsWith('-') ? text : `+${text}`;
}

/** Where a term stands in the work: the term itself, else the last one like it. */
function rankOf(term: Monomial, above: readonly Monomial[]): number {
  const exact = above.findIndex(
    (other) => keyOf(other) === keyOf(term) && Q.equals(other.coefficient, term.coefficient),
  );
  return exact >= 0 ? exact : above.map(keyOf).lastIndexOf(keyOf(term));
}

/** What is left of a line that was taken to come to nothing. */
function* inPlaceOfZero(focus: Expr, above: readonly Monomial[], aim: Aim): Generator<Candidate> {
  const terms = collect(above);
  if (terms.length === 0 || terms.length > mostMissing) return;
  yield { edits: [{ ...outer(focus), text: printExpr(sumExpr(terms)) }], cost: 1.4 + aim.extra, touchesRight: false };
}

interface OwnTerm {
  readonly term: Term;
  /** On the right of an equation: counted as moved to the left. */
  readonly isTurned: boolean;
  readonly isFirst: boolean;
  readonly monomial: Monomial;
}

const mostInserted = 3;
const mostWrong = 6;
const termCost = 1.1;
const dearest = 3.5;

/** Several terms of a sum at once: what has the wrong number gets the right one, what is missing comes in, what is too much goes. */
export function* termByTerm(aim: Aim): Generator<Candidate> {
  const [focus] = aim.roots;
  const above = aim.wanted && spread(aim.wanted);
  if (!above || focus?.kind !== 'sum' || aim.roots.length !== 1) return;
  const own = ownTerms(focus, false);
  if (!own) return;
  yield* corrections(own, above, focus, aim.extra, aim.isRight);
  const areWhole = [...above, ...own.map(({ monomial }) => monomial)].every(
    ({ powers, coefficient }) => powers.size === 0 && coefficient.den === 1n,
  );
  const inOrder = areWhole && own.length === above.length;
  if (inOrder) yield* oneByOne(own, above, aim);
}

/** The same for an equation, all of it taken to the left. */
export function* termByTermOfRelation({ above, line }: MendQuestion): Generator<Candidate> {
  if (above.kind !== 'relation' || line.kind !== 'relation') return;
  const [left, right] = [ownTerms(line.left, false), ownTerms(line.right, true)];
  const wanted = spread(sum(above.left, ...termsOf(above.right).map((term) => neg(signedTerm(term)))));
  if (!left || !right || !wanted) return;
  const own = [...left, ...right].filter(({ monomial }) => !Q.isZero(monomial.coefficient));
  yield* corrections(own, wanted, line.left, 0);
  yield* corrections(own, wanted.map(negated), line.left, 0.1);
}

function ownTerms(side: Expr, isTurned: boolean): OwnTerm[] | null {
  const terms = side.kind === 'sum' ? side.terms : [{ sign: 'plus' as const, expr: side, span: outer(side) }];
  const found = terms.map((term, k): OwnTerm | null => {
    const [only, ...more] = spread(signedTerm(term)) ?? [];
    const monomial = only && isTurned ? negated(only) : only;
    return monomial && more.length === 0 ? { term, isTurned, isFirst: k === 0, monomial } : null;
  });
  return found.includes(null) ? null : (found as OwnTerm[]);
}

function* corrections(
  own: readonly OwnTerm[],
  above: readonly Monomial[],
  focus: Expr,
  extra: number,
  isRight: (node: Expr) => boolean = () => false,
): Generator<Candidate> {
  const wrong = collect([...above, ...own.map(({ monomial }) => negated(monomial))]);
  if (wrong.length < 2 || wrong.length > mostWrong) return;
  const kept = own.filter(({ monomial }) => wrong.every((rest) => keyOf(rest) !== keyOf(monomial)));
  const edits: Edit[] = [];
  const missing: Monomial[] = [];
  for (const rest of wrong) {
    const alike = own.filter(({ monomial }) => keyOf(monomial) === keyOf(rest));
    const [only, ...more] = alike.length > 1 ? alike.filter(({ term }) => !isRight(term.expr)) : alike;
    if (more.length > 0 || (alike.length > 0 && !only)) return;
    if (only) edits.push(corrected(only, rest.coefficient));
    else missing.push(rest);
  }
  if (missing.length > mostInserted || (missing.length > 0 && kept.length === 0)) return;
  const cost = termCost * wrong.length + 0.1 * missing.length + 0.1 + extra;
  yield {
    edits: joinedEdits(edits, insertions(missing, focus, above)),
    cost: Math.min(dearest, cost),
    touchesRight: false,
  };
}

/** A term that goes where another comes in is replaced by it. */
function joinedEdits(edits: readonly Edit[], inserted: readonly Edit[]): Edit[] {
  const joined = edits.map((edit) => {
    const own = inserted.find(({ start }) => start === edit.start);
    return own ? { ...edit, text: edit.text === '' ? own.text.replace(/\+$/, '') : own.text + edit.text } : edit;
  });
  return [...joined, ...inserted.filter(({ start }) => edits.every((edit) => edit.start !== start))];
}

/** Numbers that stand for the numbers of the work, each in its place. */
function* oneByOne(own: readonly OwnTerm[], above: readonly Monomial[], aim: Aim): Generator<Candidate> {
  const edits = own.flatMap((one, k) => {
    const rest = Q.sub((above[k] as Monomial).coefficient, one.monomial.coefficient);
    return Q.isZero(rest) ? [] : [corrected(one, rest, true)];
  });
  if (edits.length > 0 && edits.length < own.length)
    yield { edits, cost: 0.9 + 0.02 * edits.length + aim.extra, touchesRight: false };
}

function corrected({ term, isTurned, isFirst, monomial }: OwnTerm, rest: Q.Rational, keepsZero = false): Edit {
  const coefficient = Q.add(monomial.coefficient, rest);
  if (Q.isZero(coefficient)) return { ...term.span, text: keepsZero ? `${term.sign === 'minus' ? '-' : '+'}0` : '' };
  const right = { ...monomial, coefficient };
  const text = printExpr(monomialExpr(isTurned ? negated(right) : right));
  return { ...term.span, text: isFirst || text.startsWith('-') ? text : `+${text}` };
}
