import type { Expr } from '../../../shared/maths/expression.ts';
import { printExpr } from '../../../shared/maths/print.ts';
import { childrenOf } from '../../../shared/maths/walk.ts';
import { compareExpressions } from '../compare/compare-expressions.ts';
import type { CheckContext } from '../context.ts';
import { suggestForm } from '../suggest/suggest-form.ts';
import { isZero, neg, sum, termsOf } from './build.ts';
import { expanded, spread, sumExpr } from './monomials.ts';
import { overOneDenominator } from './one-denominator.ts';
import { workOut } from './worked-out.ts';

const mostTerms = 6;
const longest = 80;

/**
 * The line above minus this line, multiplied out, as TeX; null where that is long or says no more than the two lines.
 * Quotients come over one denominator, for which an outside library may suggest a shorter form; it counts only when the
 * checker finds it equal.
 */
export function shortDifference(above: Expr, below: Expr, context: CheckContext): string | null {
  const whole = sum(
    workOut(above, below, context),
    ...termsOf(below).map((term) => (term.sign === 'minus' ? term.expr : neg(term.expr))),
  );
  const forms = isRationalSum(whole) ? quotients(whole) : [plainDifference(whole)];
  const texts = forms
    .flatMap((form) => (form && !hasQuotientInside(form) ? [{ form, tex: printExpr(form) }] : []))
    .filter(({ tex }) => tex.length <= longest);
  texts.sort((a, b) => a.tex.length - b.tex.length);
  const found = texts.find(({ form }) => !isZero(form) && compareExpressions(whole, form, context).kind === 'equal');
  return found?.tex ?? null;
}

/** Shorter than the two lines written one after the other, so that something has come of it. */
function plainDifference(whole: Expr): Expr | null {
  const terms = expanded(whole);
  const before = spread(whole);
  if (!terms || !before || terms.length > mostTerms) return null;
  return terms.length < before.length ||
    terms.every(({ powers }) => [...powers.values()].every(({ base }) => base.kind === 'letter'))
    ? sumExpr(terms)
    : null;
}

function isRationalSum(expr: Expr): boolean {
  return hasSumBelow(expr) && isRational(expr);
}

function hasSumBelow(expr: Expr): boolean {
  return (expr.kind === 'quotient' && expr.denominator.kind !== 'number') || childrenOf(expr).some(hasSumBelow);
}

/** A quotient within a quotient, which nobody would want to read. */
function hasQuotientInside(expr: Expr): boolean {
  const isDeep = (part: Expr): boolean => part.kind === 'quotient' || childrenOf(part).some(isDeep);
  if (expr.kind === 'quotient' && childrenOf(expr).some(isDeep)) return true;
  return childrenOf(expr).some(hasQuotientInside);
}

function isRational(expr: Expr): boolean {
  const isOperation = ['number', 'letter', 'sum', 'product', 'quotient', 'power'].includes(expr.kind);
  return isOperation && childrenOf(expr).every(isRational);
}

function quotients(whole: Expr): (Expr | null)[] {
  const joined = overOneDenominator(whole);
  const terms = expanded(whole);
  const plain = terms && terms.length <= mostTerms ? sumExpr(terms) : null;
  return [plain, joined, joined && suggestForm(joined, 'factor')];
}
