import type { Expr } from '../../../shared/maths/expression.ts';
import { lettersOf } from '../../../shared/maths/letters.ts';
import { sameExpr } from '../../../shared/maths/same.ts';
import { childrenOf, mapChildren } from '../../../shared/maths/walk.ts';
import { compareExpressions } from '../compare/compare-expressions.ts';
import type { Comparison } from '../compare/comparison.ts';
import type { CheckContext } from '../context.ts';
import { ballSign, magnitude } from '../numbers/ball.ts';
import { isKnown, subKnown, toBall } from '../values/arithmetic.ts';
import { evaluate } from '../values/evaluate.ts';
import { valueTex } from '../values/value-tex.ts';
import type { KnownValue } from '../values/value.ts';
import { withoutDefinition } from './antiderivative.ts';
import { addExprs, letterOf, mulExprs, subExprs } from './build.ts';
import { throughAntiderivative } from './definite.ts';
import { differentiate } from './differentiate.ts';
import { factorise, multiplied, termsIn } from './integrand.ts';
import { isEverywhere } from './needs.ts';
import { encloseIntegral, quadratureBits } from './quadrature.ts';
import { carriedOut, onlyLetter } from './reduce.ts';
import { substitute } from './substitute.ts';
import { Unsettled } from '../solving/unsettled.ts';
import { compareByUpperEnd } from './upper-end.ts';

type DefiniteExpr = Extract<Expr, { kind: 'integral' }> & { readonly from: Expr; readonly to: Expr };

/** Definite integrals that the checker's own table does not cover. */
export function openIntegrals(expr: Expr, context: CheckContext): DefiniteExpr[] {
  if (isDefinite(expr)) return context.reduceCalculus?.(expr, context) ? [] : [expr];
  const reduced = carriers.has(expr.kind) ? context.reduceCalculus?.(expr, context) : null;
  return (reduced ? [reduced] : childrenOf(expr)).flatMap((part) => openIntegrals(part, context));
}

/** Operators that may do away with an integral inside. */
const carriers: ReadonlySet<Expr['kind']> = new Set(['derivative', 'limit', 'evaluated']);

function isDefinite(expr: Expr): expr is DefiniteExpr {
  return expr.kind === 'integral' && expr.from !== null && expr.to !== null;
}

/**
 * Two lines with integrals that have no antiderivative in the table: through one that the other line shows in brackets,
 * by the laws of integrals alone, else by enclosing their values.
 */
export function compareOpenIntegrals(above: Expr, below: Expr, context: CheckContext): Comparison {
  const [a, b] = [withShown(above, below, context), withShown(below, above, context)];
  if (openIntegrals(a, context).length + openIntegrals(b, context).length === 0)
    return compareExpressions(a, b, context);
  const names = createNames(context);
  const [formalA, formalB] = [named(a, names, context), named(b, names, context)];
  // Where an integrand may have a pole, only the same integrals in both lines are as good as equal.
  const isAlike = formalA.ends.size === formalB.ends.size && [...formalA.ends].every((end) => formalB.ends.has(end));
  if ((formalA.isCertain && formalB.isCertain) || isAlike) {
    const found = compareExpressions(formalA.expr, formalB.expr, context);
    if (found.kind === 'equal')
      return formalA.isCertain && formalB.isCertain ? found : { ...found, reached: 'sampled' };
  }
  const enclosed = compareEnclosures(a, b, context);
  return (enclosed.kind === 'undecided' ? compareByUpperEnd(above, below, context) : null) ?? enclosed;
}

/** Puts in the value of an integral whose antiderivative the other line shows. */
function withShown(expr: Expr, other: Expr, context: CheckContext): Expr {
  const shown = bracketsIn(other);
  if (shown.length === 0) return expr;
  return replaceOpen(expr, context, (integral) => {
    for (const bracket of shown) {
      const value = throughShown(integral, bracket, context);
      if (value) return value;
    }
    return integral;
  });
}

function bracketsIn(expr: Expr): Extract<Expr, { kind: 'evaluated' }>[] {
  const inside = childrenOf(expr).flatMap(bracketsIn);
  return expr.kind === 'evaluated' ? [expr, ...inside] : inside;
}

function throughShown(
  integral: DefiniteExpr,
  bracket: Extract<Expr, { kind: 'evaluated' }>,
  context: CheckContext,
): Expr | null {
  const inner = withoutDefinition(context, integral.variable);
  const letter = bracket.variable ?? onlyLetter(bracket.operand, context);
  if (letter === null) return null;
  try {
    const primitive = substitute(carriedOut(bracket.operand, inner), letter, letterOf(integral.variable));
    const slope = differentiate(primitive, integral.variable, inner);
    if (compareExpressions(slope, integral.integrand, inner).kind !== 'equal') return null;
    return throughAntiderivative(primitive, integral, inner);
  } catch (cause) {
    if (cause instanceof Unsettled) return null;
    throw cause;
  }
}

function replaceOpen(expr: Expr, context: CheckContext, change: (integral: DefiniteExpr) => Expr): Expr {
  if (isDefinite(expr)) return context.reduceCalculus?.(expr, context) ? expr : change(expr);
  const reduced = carriers.has(expr.kind) ? context.reduceCalculus?.(expr, context) : null;
  if (reduced) return replaceOpen(reduced, context, change);
  return mapChildren(expr, (part) => replaceOpen(part, context, change));
}

interface Names {
  readonly integrandOf: (integrand: Expr, variable: string) => string;
  readonly endOf: (integrand: string, end: Expr) => Expr;
}

/** A letter for each antiderivative at each end: integrals become differences of these. */
function createNames(context: CheckContext): Names {
  const integrands: { readonly expr: Expr; readonly name: string }[] = [];
  const ends: { readonly of: string; readonly at: Expr; readonly letter: Expr }[] = [];
  const same = (a: Expr, b: Expr): boolean => sameExpr(a, b) || compareExpressions(a, b, context).kind === 'equal';
  return {
    integrandOf(integrand, variable) {
      const expr = substitute(integrand, variable, letterOf('z_{1}'));
      const found = integrands.find((known) => same(known.expr, expr));
      if (found) return found.name;
      const name = `F_{${integrands.length + 1}}`;
      integrands.push({ expr, name });
      return name;
    },
    endOf(of, at) {
      const found = ends.find((known) => known.of === of && same(known.at, at));
      if (found) return found.letter;
      const letter = letterOf(`F_{${of.slice(3, -1)},${ends.length + 1}}`);
      ends.push({ of, at, letter });
      return letter;
    },
  };
}

interface Formal {
  readonly expr: Expr;
  /** Whether every integral certainly has a value. */
  readonly isCertain: boolean;
  readonly ends: ReadonlySet<string>;
}

/** Integrals as differences of letters, by terms and without constant factors. */
function named(expr: Expr, names: Names, context: CheckContext): Formal {
  let isCertain = true;
  const ends = new Set<string>();
  const result = replaceOpen(expr, context, (integral) => {
    const inner = withoutDefinition(context, integral.variable);
    const integrand = carriedOut(integral.integrand, inner);
    if (!isEverywhere(integrand, integral.variable)) isCertain = false;
    const parts = termsIn(integrand, integral.variable).map((term) => {
      const { coef, factors } = factorise(term, integral.variable);
      const part = { ...integral, integrand: multiplied({ coef: mulExprs(), factors }) };
      const value = context.reduceCalculus?.(part, context);
      if (value) return mulExprs(coef, value);
      const name = names.integrandOf(part.integrand, integral.variable);
      const [upper, lower] = [names.endOf(name, integral.to), names.endOf(name, integral.from)];
      for (const letter of [upper, lower]) for (const used of lettersOf(letter)) ends.add(used);
      return mulExprs(coef, subExprs(upper, lower));
    });
    return addExprs(...parts);
  });
  return { expr: result, isCertain, ends };
}

/** Both lines in numbers: apart for certain, or equal to many digits. */
function compareEnclosures(above: Expr, below: Expr, context: CheckContext): Comparison {
  const [a, b] = [enclosedValue(above, context), enclosedValue(below, context)];
  if (!a || !b) return { kind: 'undecided', reason: 'not-covered' };
  const difference = toBall(subKnown(a, b, quadratureBits), quadratureBits);
  if (difference.im !== null) return { kind: 'undecided', reason: 'not-covered' };
  if (ballSign(difference.re) !== 0) {
    return {
      kind: 'different',
      witness: { at: new Map(), atTex: {}, above: valueTex(a, quadratureBits), below: valueTex(b, quadratureBits) },
    };
  }
  const isClose = magnitude(difference.re.mid) + difference.re.rad < 1n << BigInt(quadratureBits - agreeingBits);
  return isClose
    ? { kind: 'equal', reached: 'sampled', excluded: [], cancelled: [] }
    : { kind: 'undecided', reason: 'not-settled' };
}

const agreeingBits = 64;

function enclosedValue(expr: Expr, context: CheckContext): KnownValue | null {
  const point = new Map<string, KnownValue>();
  let isKnownThroughout = true;
  const replaced = replaceOpen(expr, context, (integral) => {
    const inner = withoutDefinition(context, integral.variable);
    const integrand = carriedOut(integral.integrand, inner);
    const isNumeric = lettersOf(integral).length === 0;
    const ball = isNumeric ? encloseIntegral(integrand, integral.variable, integral.from, integral.to, inner) : null;
    if (!ball) isKnownThroughout = false;
    const name = `F_{${point.size + 1}}`;
    if (ball) point.set(name, { kind: 'ball', re: ball, im: null });
    return letterOf(name);
  });
  if (!isKnownThroughout || lettersOf(replaced).some((name) => !point.has(name))) return null;
  const value = evaluate(replaced, point, quadratureBits, context);
  return isKnown(value) ? value : null;
}
