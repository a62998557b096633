import type { Expr } from '../../../shared/maths/expression.ts';
import { printExpr } from '../../../shared/maths/print.ts';
import { sum } from './build.ts';
import type { Candidate, Edit } from './edits.ts';
import { leavesOf } from './line-parts.ts';
import { collect, keyOf, monomialExpr, negated, spread, type Monomial } from './monomials.ts';
import { hits, outer, type Aim } from './mend-question.ts';

const mostMissing = 2;

/** Terms that are not there at all, put in where the work would have them. */
export function* missingTerms(aim: Aim, isRight: (node: Expr) => boolean): Generator<Candidate> {
  const [focus] = aim.roots;
  const above = aim.wanted && spread(aim.wanted);
  const own = focus && spread(focus);
  if (!focus || !above || !own || aim.roots.length !== 1) return;
  const order = collect(above).map(keyOf);
  const doubtful =
    focus.kind === 'sum'
      ? focus.terms.filter(({ expr }) => !isRight(expr)).flatMap(({ expr }) => spread(expr) ?? [])
      : own;
  const present = new Set(doubtful.map(keyOf));
  // A like term that is there, and not known to be right, is changed instead.
  const isNew = (terms: readonly Monomial[]): boolean =>
    terms.length > 0 && terms.every((term) => !present.has(keyOf(term)));
  const missing = collect([...above, ...own.map(negated)]);
  if (missing.length <= mostMissing && isNew(missing)) yield put(missing, focus, order);
  for (const term of collect(above)) {
    const withTerm = sum(focus, monomialExpr(term));
    if (isNew([term]) && aim.targets.some((target) => hits(withTerm, target, aim.places)))
      yield put([term], focus, order);
  }
}

function put(missing: readonly Monomial[], focus: Expr, order: readonly string[]): Candidate {
  const leaves = missing.reduce((count, term) => count + leavesOf(monomialExpr(term)).length, 0);
  return { edits: missing.map((term) => insertion(term, focus, order)), cost: 1.3 + 0.1 * leaves, touchesRight: false };
}

/** Behind the last term that comes before it in the work, else in front. */
function insertion(term: Monomial, focus: Expr, order: readonly string[]): Edit {
  const place = order.indexOf(keyOf(term));
  const text = printExpr(monomialExpr(term));
  const signed = text.startsWith('-') ? text : `+${text}`;
  const terms =
    focus.kind === 'sum'
      ? focus.terms.map(({ expr, span }) => ({ expr, end: span.end }))
      : [{ expr: focus, end: outer(focus).end }];
  let at: number | null = null;
  for (const { expr, end } of terms) {
    const parts = spread(expr);
    const own = parts?.[0] ? order.indexOf(keyOf(parts[0])) : -1;
    if (own >= 0 && own < place) at = end;
  }
  if (at !== null) return { start: at, end: at, text: signed };
  const last = terms[terms.length - 1];
  const end = last?.end ?? focus.span.end;
  return { start: end, end, text: signed };
}
