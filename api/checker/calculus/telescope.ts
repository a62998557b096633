import type { Expr } from '../../../shared/maths/expression.ts';
import { compareExpressions } from '../compare/compare-expressions.ts';
import type { CheckContext } from '../context.ts';
import * as Q from '../numbers/rational.ts';
import { reduceFraction, toFraction } from '../solving/fraction.ts';
import { derivePolynomial, squareFreePart, type Polynomial } from '../solving/polynomial.ts';
import { isolateRealRoots } from '../solving/real-roots.ts';
import { prepare } from '../values/evaluate.ts';
import { addExprs, divExprs, infinityExpr, letterOf, negateExpr, oneExpr, rationalExpr, zeroExpr } from './build.ts';
import { sideLimit, type LimitValue } from './limit.ts';
import { Unsettled } from '../solving/unsettled.ts';
import { substitute } from './substitute.ts';

/** G with G(k+1) - G(k) = body, and its limit beyond all bounds where there is one. */
export interface Telescope {
  readonly sum: Expr;
  readonly atInfinity: Expr | null;
}

export function telescoped(body: Expr, index: string, context: CheckContext): Telescope | null {
  return differenceOfTerms(body, index, context) ?? partialFractions(body, index, context);
}

/** f(k+1) - f(k), or the other way round, as it is written. */
function differenceOfTerms(body: Expr, index: string, context: CheckContext): Telescope | null {
  if (body.kind !== 'sum' || body.terms.length !== 2) return null;
  const [first, second] = body.terms.map((term) => (term.sign === 'minus' ? negateExpr(term.expr) : term.expr)) as [
    Expr,
    Expr,
  ];
  for (const [later, earlier] of [
    [first, second],
    [second, first],
  ] as const) {
    const sum = negateExpr(earlier);
    const next = substitute(sum, index, addExprs(letterOf(index), oneExpr));
    if (compareExpressions(later, next, context).kind === 'equal')
      return { sum, atInfinity: limitBeyond(sum, index, context) };
  }
  return null;
}

function limitBeyond(sum: Expr, index: string, context: CheckContext): Expr | null {
  try {
    const found: LimitValue = sideLimit(sum, index, { to: infinityExpr, side: 'right' }, context);
    return found.kind === 'finite' ? found.value : null;
  } catch (cause) {
    if (cause instanceof Unsettled) return null;
    throw cause;
  }
}

const longest = 40n;

/** Simple poles that are whole steps apart and whose residues cancel. */
function partialFractions(body: Expr, index: string, context: CheckContext): Telescope | null {
  const fraction = toFraction(prepare(body, context), index);
  if (!fraction) return null;
  const { num, den } = reduceFraction(fraction);
  if (den.length < 3 || num.length >= den.length || squareFreePart(den).length !== den.length) return null;
  const roots = isolateRealRoots(den);
  if (roots.length !== den.length - 1 || !roots.every(({ low, high }) => Q.equals(low, high))) return null;
  const poles = roots.map(({ low }) => ({ shift: Q.negate(low), residue: residueAt(num, den, low) }));
  const parts: Expr[] = [];
  while (poles.length > 0) {
    const first = poles[poles.length - 1] as { shift: Q.Rational; residue: Q.Rational };
    const group = poles.filter(({ shift }) => Q.isWhole(Q.sub(shift, first.shift)));
    poles.splice(0, poles.length, ...poles.filter((pole) => !group.includes(pole)));
    const part = joinPoles(group, index);
    if (!part) return null;
    parts.push(part);
  }
  return { sum: addExprs(...parts), atInfinity: zeroExpr };
}

/** 1/(k+s) is 1/(k+s0) and the steps between: the sum of the earlier ones has these as its differences. */
function joinPoles(group: readonly { shift: Q.Rational; residue: Q.Rational }[], index: string): Expr | null {
  const total = group.reduce((sum, { residue }) => Q.add(sum, residue), Q.zero);
  const lowest = group.reduce(
    (least, { shift }) => (Q.compare(shift, least) < 0 ? shift : least),
    (group[0] as { shift: Q.Rational }).shift,
  );
  if (!Q.isZero(total)) return null;
  const parts: Expr[] = [];
  for (const { shift, residue } of group) {
    const steps = Q.sub(shift, lowest).num;
    if (steps > longest) return null;
    for (let j = 0n; j < steps; j += 1n) {
      const bottom = addExprs(letterOf(index), rationalExpr(Q.add(lowest, Q.rational(j))));
      parts.push(divExprs(rationalExpr(residue), bottom));
    }
  }
  return addExprs(...parts);
}

function residueAt(num: Polynomial, den: Polynomial, at: Q.Rational): Q.Rational {
  return Q.div(valueAt(num, at), valueAt(derivePolynomial(den), at));
}

function valueAt(p: Polynomial, x: Q.Rational): Q.Rational {
  return p.reduceRight((total, coef) => Q.add(Q.mul(total, x), Q.rational(coef)), Q.zero);
}
