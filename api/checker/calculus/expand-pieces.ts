import type { Expr } from '../../../shared/maths/expression.ts';
import { lettersOf } from '../../../shared/maths/letters.ts';
import * as Q from '../numbers/rational.ts';
import { Unsettled } from '../solving/unsettled.ts';
import { isKnown } from '../values/arithmetic.ts';
import { evaluate } from '../values/evaluate.ts';
import { addExprs, callOf, mulExprs, numberOf, piExpr, rationalExpr, zeroExpr } from './build.ts';
import { isFree } from './integrand.ts';
import {
  addSeries,
  boundedSeries,
  constantSeries,
  expSeries,
  isZeroCoefficient,
  lnSeries,
  mulSeries,
  negateSeries,
  powerSeries,
  rationalPower,
  scaleSeries,
  signOfCoefficient,
  splitBySize,
  unitScale,
  type Expansion,
  type Series,
} from './series-ring.ts';

/** The floor of what grows is that up to 1; at a whole number it depends on the side. */
export function expandFloor(name: 'floor' | 'ceil', a: Series, context: Expansion): Series {
  if (context.numbers === 'complex') throw new Unsettled('not-covered');
  const { large, constant, small } = splitBySize(a, context);
  if (large.length > 0) return addSeries({ ...a, error: null }, boundedSeries(unitScale), context);
  const value = evaluate(constant ?? zeroExpr, new Map(), 128, context);
  if (!isKnown(value)) throw new Unsettled('not-covered');
  const rounded = callOf(name, constant ?? zeroExpr);
  if (value.kind !== 'rational' || value.value.den !== 1n) {
    if (!isKnown(evaluate(rounded, new Map(), 128, context))) throw new Unsettled('not-settled');
    return constantSeries(rounded);
  }
  const [lead] = small.terms;
  if (!lead && small.error) throw new Unsettled('not-settled');
  const side = lead ? signOfCoefficient(lead.coef, context) : 0;
  const step = name === 'floor' ? Math.min(side, 0) : Math.max(side, 0);
  return constantSeries(rationalExpr(Q.add(value.value, Q.rational(step))));
}

/** The larger or the smaller one, once it is certain which that is. */
export function expandExtreme(name: 'max' | 'min', parts: readonly Series[], context: Expansion): Series {
  return parts.reduce((best, next) => {
    const gap = addSeries(next, negateSeries(best), context);
    const [lead] = gap.terms;
    if (!lead && gap.error) throw new Unsettled('not-settled');
    const order = lead ? signOfCoefficient(lead.coef, context) : 0;
    return order > 0 === (name === 'max') ? next : best;
  });
}

/** Stirling's series of what grows beyond all bounds: DLMF 5.11.1 for ln(u!). */
export function expandFactorial(u: Series, context: Expansion): Series {
  const [lead] = u.terms;
  const { large } = splitBySize(u, context);
  if (!lead || large.length === 0 || signOfCoefficient(lead.coef, context) < 0) throw new Unsettled('not-covered');
  const log = lnSeries(u, context);
  const inverse = rationalPower(u, Q.minusOne, context);
  const half = numberOf(1, 2);
  const cube = mulSeries(inverse, mulSeries(inverse, inverse, context), context);
  const fifth = mulSeries(cube, mulSeries(inverse, inverse, context), context).terms[0]?.scale;
  if (!fifth) throw new Unsettled('not-settled');
  const parts = [
    negateSeries(u),
    scaleSeries(log, half, context),
    constantSeries(mulExprs(half, callOf('ln', mulExprs(numberOf(2), piExpr)))),
    scaleSeries(inverse, numberOf(1, 12), context),
    scaleSeries(cube, numberOf(-1, 360), context),
    boundedSeries(fifth),
  ];
  const exponent = parts.reduce((total, part) => addSeries(total, part, context), mulSeries(u, log, context));
  return expSeries(exponent, context);
}

type Definite = Extract<Expr, { kind: 'integral' }>;

/**
 * An integral from a constant to what tends to the same constant: term by term, from the expansion of the integrand there.
 * `expandAt` gives that expansion, for the letter of the integral as its first argument says.
 */
export function expandIntegral(
  node: Definite,
  variable: string,
  visit: (expr: Expr) => Series,
  expandAt: (integrand: Expr, letter: string, at: Series) => Series,
  context: Expansion,
): Series {
  const { from, to, integrand } = node;
  if (!from || !to || !isFree(integrand, variable) || node.variable === variable) throw new Unsettled('not-covered');
  const [low, high] = [visit(from), visit(to)].map((series) => splitBySize(series, context));
  if (!low || !high || low.large.length + high.large.length > 0) throw new Unsettled('not-covered');
  const at = high.constant ?? zeroExpr;
  const gap = addExprs(at, mulExprs(numberOf(-1), low.constant ?? zeroExpr));
  if (lettersOf(at).length > 0 || !isZeroCoefficient(gap, context)) throw new Unsettled('not-covered');
  const upTo = (end: Series): Series => {
    const [lead] = end.terms;
    if (!lead) {
      if (end.error) throw new Unsettled('not-settled');
      return end;
    }
    const side = signOfCoefficient(lead.coef, context);
    const path: Series = addSeries(constantSeries(at), powerSeries(numberOf(side), Q.one), context);
    const inner = expandAt(integrand, node.variable, path);
    const length = side < 0 ? negateSeries(end) : end;
    const whole = termByTerm(inner, length, context);
    return side < 0 ? negateSeries(whole) : whole;
  };
  return addSeries(upTo(high.small), negateSeries(upTo(low.small)), context);
}

/** The integral of a sum of powers from 0 to `length`. */
function termByTerm(inner: Series, length: Series, context: Expansion): Series {
  const raised = (p: Q.Rational): Series => rationalPower(length, Q.add(p, Q.one), context);
  let total: Series = { terms: [], error: null };
  for (const { coef, scale } of inner.terms) {
    const next = Q.add(scale.p, Q.one);
    if (scale.growth.length > 0 || scale.q !== 0 || Q.sign(next) <= 0) throw new Unsettled('not-covered');
    total = addSeries(
      total,
      scaleSeries(raised(scale.p), mulExprs(rationalExpr(Q.div(Q.one, next)), coef), context),
      context,
    );
  }
  if (!inner.error) return total;
  if (inner.error.growth.length > 0 || inner.error.q !== 0 || Q.compare(inner.error.p, Q.minusOne) <= 0)
    throw new Unsettled('not-covered');
  const beyond = raised(inner.error.p).terms[0]?.scale;
  if (!beyond) throw new Unsettled('not-settled');
  return addSeries(total, boundedSeries(beyond), context);
}
