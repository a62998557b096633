import type { Expr } from '../../../shared/maths/expression.ts';
import { lettersOf } from '../../../shared/maths/letters.ts';
import { printExpr } from '../../../shared/maths/print.ts';
import { childrenOf } from '../../../shared/maths/walk.ts';
import { compareExpressions } from '../compare/compare-expressions.ts';
import type { CheckContext } from '../context.ts';
import { suggestForm } from '../suggest/suggest-form.ts';
import { isZero, neg, sum, termsOf } from './build.ts';
import { isNear, minus, over, real, sizeOf, times, type Complex } from './complex-double.ts';
import { estimate } from './estimate.ts';
import { expanded, spread, sumExpr } from './monomials.ts';
import { overCommonDenominator } from './one-denominator.ts';
import { choosePlaces } from './places.ts';
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
  const forms = isRationalSum(whole) ? quotients(whole, context) : [plainDifference(whole)];
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

/** Whether numerator and denominator may have a factor in common: one of the first degree has its zero in both. */
function mayCancel(form: Expr, context: CheckContext): boolean {
  const joined = form.kind === 'sum' && form.terms.length === 1 ? form.terms[0]?.expr : form;
  if (joined?.kind !== 'quotient') return false;
  const [place] = choosePlaces([joined], 1, context);
  const factors = joined.denominator.kind === 'product' ? joined.denominator.factors : [joined.denominator];
  return factors.some((factor) => {
    const base = factor.kind === 'power' ? factor.base : factor;
    const [name] = lettersOf(base);
    if (!name || !place) return false;
    const at = (expr: Expr, x: Complex): Complex =>
      estimate(expr, { ...place, letters: new Map(place.letters).set(name, x) });
    const [f0, f1, f3] = [at(base, real(0)), at(base, real(1)), at(base, real(3))];
    const slope = minus(f1, f0);
    if (!isNear(minus(f3, f0), times(real(3), slope))) return true;
    const value = at(joined.numerator, over(minus(real(0), f0), slope));
    return sizeOf(value) < 1e-6;
  });
}

function quotients(whole: Expr, context: CheckContext): (Expr | null)[] {
  const joined = overCommonDenominator(whole);
  const terms = expanded(whole);
  const plain = terms && terms.length <= mostTerms ? sumExpr(terms) : null;
  return [plain, joined, joined && mayCancel(joined, context) ? suggestForm(joined, 'factor') : null];
}
