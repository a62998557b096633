import type { Expr } from '../../../shared/maths/expression.ts';
import { lettersOf } from '../../../shared/maths/letters.ts';
import { printExpr } from '../../../shared/maths/print.ts';
import { mapExpr } from '../../../shared/maths/walk.ts';
import type { CheckContext } from '../context.ts';
import { fraction, letter, neg, product, quotient, sum } from './build.ts';
import { antiderivative } from './antiderivative.ts';
import { derive } from './derive.ts';
import type { Candidate } from './edits.ts';
import { collect, expanded, monomialExpr, spread, sumExpr } from './monomials.ts';
import { outer, type Aim } from './mend-question.ts';
import { substituteLetter } from './substitute.ts';

const constantNames = ['C', 'c', 'K', 'k'];

/** Derivatives and integrals by the table; an indefinite integral with the constant that the other line has. */
export function workOut(expr: Expr, other: Expr, context: CheckContext): Expr {
  const constant = constantNames.find((name) => lettersOf(other).includes(name) && !lettersOf(expr).includes(name));
  return mapExpr(expr, (node) => {
    if (node.kind === 'derivative' && node.order === 1) return derive(node.operand, node.variable) ?? node;
    if (node.kind !== 'integral') return node;
    const found = antiderivative(node.integrand, node.variable, context);
    if (!found) return node;
    if (!node.from || !node.to) return constant ? sum(found, letter(constant)) : found;
    return sum(substituteLetter(found, node.variable, node.to), neg(substituteLetter(found, node.variable, node.from)));
  });
}

const wholeCost = 4;

/** The whole expression written anew, for lines that no small change mends; the values at two limits come first. */
export function* rewritten(
  aim: Aim,
  above: Expr,
  aboveTex: string | null,
  context: CheckContext,
): Generator<Candidate> {
  const [focus] = aim.roots;
  if (!focus || aim.roots.length !== 1) return;
  const whole = (text: string, cost: number): Candidate => ({
    edits: [{ ...outer(focus), text }],
    cost,
    touchesRight: false,
  });
  const limits = atBothLimits(above, context);
  const isDifference = focus.kind === 'sum' && focus.terms.length === 2 && focus.terms[1]?.sign === 'minus';
  if (limits && isDifference) yield whole(printExpr(limits), 1.05);
  const worked = workOut(above, focus, context);
  if (hasCalculus(above) && !hasCalculus(worked)) {
    const terms = above.kind === 'integral' ? expanded(worked) : null;
    yield whole(printExpr(terms ? sumExpr(terms) : worked), wholeCost);
  }
  const joined = focus.kind === 'quotient' ? overOneDenominator(above) : null;
  if (joined) yield whole(printExpr(joined), wholeCost);
  const multiplied = focus.kind === 'sum' ? expanded(worked) : null;
  if (multiplied && multiplied.length <= 8) yield whole(printExpr(sumExpr(multiplied)), wholeCost + 0.5);
  if (aboveTex !== null && !hasCalculus(above)) yield whole(aboveTex, wholeCost + 1);
}

function hasCalculus(expr: Expr): boolean {
  let found = false;
  mapExpr(expr, (node) => {
    if (node.kind === 'integral' || node.kind === 'derivative' || node.kind === 'limit') found = true;
    return node;
  });
  return found;
}

/** F(b) - F(a), both worked out to fractions; null where they are none. */
function atBothLimits(above: Expr, context: CheckContext): Expr | null {
  const ends = limitsOf(above, context);
  const values = ends?.map((end) => {
    const terms = expanded(end);
    const [only] = terms ?? [];
    if (terms?.length === 0) return fraction({ num: 0n, den: 1n });
    return terms?.length === 1 && only?.powers.size === 0 ? fraction(only.coefficient) : null;
  });
  const [upper, lower] = values ?? [];
  return upper && lower ? sum(upper, neg(lower)) : null;
}

function limitsOf(above: Expr, context: CheckContext): readonly [Expr, Expr] | null {
  if (above.kind === 'evaluated' && above.from && above.variable) {
    return [
      substituteLetter(above.operand, above.variable, above.to),
      substituteLetter(above.operand, above.variable, above.from),
    ];
  }
  if (above.kind !== 'integral' || !above.from || !above.to) return null;
  const found = antiderivative(above.integrand, above.variable, context);
  return (
    found && [substituteLetter(found, above.variable, above.to), substituteLetter(found, above.variable, above.from)]
  );
}

/** Fractions added over the product of their denominators, the numerator multiplied out. */
export function overOneDenominator(above: Expr): Expr | null {
  if (above.kind !== 'sum' || above.terms.length > 4) return null;
  const parts = above.terms.map(({ sign, expr }) => {
    const [top, bottom] = expr.kind === 'quotient' ? [expr.numerator, expr.denominator] : [expr, null];
    return { top: sign === 'minus' ? neg(top) : top, bottom };
  });
  const denominators = parts.flatMap(({ bottom }) => (bottom ? [bottom] : []));
  if (denominators.length === 0) return null;
  const tops = parts.map(({ top, bottom }) => {
    const others = denominators.filter((other) => other !== bottom);
    return product(top, ...others);
  });
  const numerator = spread(sum(...tops));
  return numerator && quotient(sum(...collect(numerator).map(monomialExpr)), product(...denominators));
}
