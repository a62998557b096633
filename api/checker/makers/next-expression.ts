import type { Expr } from '../../../shared/maths/expression.ts';
import { lettersOf } from '../../../shared/maths/letters.ts';
import { printExpr } from '../../../shared/maths/print.ts';
import { childrenOf, mapChildren, mapExpr } from '../../../shared/maths/walk.ts';
import { fraction, letter, neg, product, quotient, sum, termsOf, whole } from '../evidence/build.ts';
import { derive, integrate } from '../evidence/derive.ts';
import { expanded, spread, sumExpr } from '../evidence/monomials.ts';
import { substituteLetter } from '../evidence/substitute.ts';
import { overOneDenominator } from '../evidence/one-denominator.ts';
import * as Q from '../numbers/rational.ts';
import { coefficientsOf, inOrder, polynomialExpr, rationalRoots, withWholeCoefficients } from './polynomial-parts.ts';
import { byRule } from './right-rules.ts';

/** What an expression is worked towards. */
export type ExpressionAim = 'expanded' | 'factored' | 'simplified';

type Move = (expr: Expr) => Expr | null;

/** The next line of a model derivation, or null where the work is done. */
export function nextExpression(expr: Expr, aim: ExpressionAim): Expr | null {
  const before = printExpr(expr);
  for (const move of movesFor[aim]) {
    const found = move(expr);
    if (found && printExpr(found) !== before) return found;
  }
  return null;
}

/** Derivatives, integrals and evaluation brackets carried out one kind at a time. */
function calculusMove(expr: Expr): Expr | null {
  for (const carryOut of [derivatives, antiderivatives, boundsPutIn]) {
    let isMissing = false;
    const changed = mapExpr(expr, (node) => {
      const result = carryOut(node);
      if (result === null) isMissing = true;
      return result ?? node;
    });
    if (!isMissing && changed !== expr && printExpr(changed) !== printExpr(expr)) return changed;
  }
  return null;
}

function derivatives(node: Expr): Expr | null {
  if (node.kind !== 'derivative') return node;
  const found = derive(node.operand, node.variable);
  return found && (node.order === 1 ? found : { ...node, order: node.order - 1, operand: found });
}

function antiderivatives(node: Expr): Expr | null {
  if (node.kind !== 'integral') return node;
  const found = integrate(node.integrand, node.variable);
  if (!found) return null;
  if (!node.from || !node.to) return sum(found, letter('C'));
  return { kind: 'evaluated', operand: found, variable: node.variable, from: node.from, to: node.to, span: node.span };
}

function boundsPutIn(node: Expr): Expr | null {
  if (node.kind !== 'evaluated' || !node.from) return node;
  const name = node.variable ?? lettersOf(node.operand)[0];
  if (!name) return null;
  const upper = substituteLetter(node.operand, name, node.to);
  const lower = substituteLetter(node.operand, name, node.from);
  return sum(upper, { kind: 'sum', terms: [{ sign: 'minus', expr: lower, span: node.span }], span: node.span });
}

/** Brackets multiplied out, like terms not yet joined. */
function multipliedOut(expr: Expr): Expr | null {
  const terms = hasDeepFraction(expr) ? null : spread(expr);
  return terms && sumExpr(terms);
}

/** A fraction with a sum below that has a letter: nothing is multiplied out across it. */
function hasDeepFraction(expr: Expr): boolean {
  const isDeep = expr.kind === 'quotient' && lettersOf(expr.denominator).length > 0;
  if (isDeep && spread(expr.denominator)?.length !== 1) return true;
  return childrenOf(expr).some(hasDeepFraction);
}

/** Brackets that hold only numbers, worked out first. */
function numbersInBrackets(expr: Expr): Expr | null {
  const changed = mapChildren(expr, (part) => {
    if (part.kind !== 'sum' || part.terms.length < 2) return numbersInBrackets(part) ?? part;
    const terms = lettersOf(part).length === 0 ? expanded(part) : null;
    return terms && terms.length <= 1 ? sumExpr(terms) : (numbersInBrackets(part) ?? part);
  });
  return printExpr(changed) === printExpr(expr) ? null : changed;
}

function likeTermsJoined(expr: Expr): Expr | null {
  const terms = hasDeepFraction(expr) ? null : expanded(expr);
  const names = lettersOf(expr);
  return terms && inOrder(terms, names.length === 1 ? names[0] : undefined);
}

/** Like terms of a sum joined where nothing has to be multiplied out. */
function joinedOnly(expr: Expr): Expr | null {
  const isFlat = termsOf(expr).every(({ expr: part }) => (spread(part)?.length ?? 2) === 1);
  return isFlat ? likeTermsJoined(expr) : null;
}

function oneDenominator(expr: Expr): Expr | null {
  if (expr.kind !== 'sum' || expr.terms.length < 2) return null;
  return hasDeepFraction(expr) ? overOneDenominator(expr) : null;
}

/** The numerator of a fraction worked on by itself. */
function numeratorWorkedOn(expr: Expr): Expr | null {
  if (expr.kind !== 'quotient' || hasDeepFraction(expr.numerator)) return null;
  const numerator = nextExpression(expr.numerator, 'expanded');
  return numerator && { ...expr, numerator };
}

/** Above and below as products, where they share a root. */
function cancelledFraction(expr: Expr): Expr | null {
  if (expr.kind !== 'quotient') return null;
  const [name, ...others] = lettersOf(expr);
  if (!name || others.length > 0) return null;
  const [top, bottom] = [coefficientsOf(expr.numerator, name), coefficientsOf(expr.denominator, name)];
  if (!top || !bottom || bottom.length < 2) return null;
  const below = rationalRoots(bottom);
  const shared = rationalRoots(top).filter((root) => below.some((other) => Q.equals(root, other)));
  if (shared.length === 0) return null;
  const factored = quotient(factoredForm(top, name), factoredForm(bottom, name));
  if (printExpr(factored) !== printExpr(expr)) return factored;
  return quotient(factoredForm(without(top, shared), name), factoredForm(without(bottom, shared), name));
}

function without(coefficients: readonly Q.Rational[], roots: readonly Q.Rational[]): Q.Rational[] {
  let rest = [...coefficients];
  for (const root of roots) {
    const result: Q.Rational[] = [];
    let carried = Q.zero;
    for (const c of [...rest].reverse()) {
      carried = Q.add(Q.mul(carried, root), c);
      result.unshift(carried);
    }
    rest = result.slice(1);
  }
  return rest;
}

/** The number, the linear factors, and what has no rational root. */
export function factoredForm(coefficients: readonly Q.Rational[], name: string): Expr {
  const roots = rationalRoots(coefficients);
  const linear = roots.map((root) => withWholeCoefficients([Q.negate(root), Q.one]));
  const rest = without(coefficients, roots);
  const lead = linear.reduce((left, factor) => Q.div(left, factor[1] ?? Q.one), Q.one);
  const scaled = rest.map((c) => Q.mul(c, lead));
  const primitive = scaled.length > 1 ? withWholeCoefficients(scaled) : [Q.one];
  const number = Q.div(scaled[scaled.length - 1] ?? Q.one, primitive[primitive.length - 1] ?? Q.one);
  const factors = [...linear.map((factor) => polynomialExpr(factor, name)), polynomialExpr(primitive, name)];
  return product(fraction(number), ...factors);
}

/** The middle term of a quadratic written as two, the first two and the last two of which share a factor. */
function middleSplit(expr: Expr): Expr | null {
  const found = quadratic(expr);
  if (!found || expr.kind !== 'sum' || expr.terms.length !== 3) return null;
  const { name, a, parts, c } = found;
  const [p, q] = parts;
  const x = letter(name);
  return sum(product(whole(a), square(x)), product(whole(p), x), product(whole(q), x), whole(c));
}

/** A quadratic of four terms, as a split middle term leaves it: the pairs taken together. */
function splitFactored(expr: Expr): Expr | null {
  return termsOf(expr).length === 4 && quadratic(expr) ? factoredWhole(expr) : null;
}

function square(x: Expr): Expr {
  return { kind: 'power', base: x, exponent: whole(2), span: x.span };
}

/** Whole p and q with p + q = b and p q = a c. */
function quadratic(expr: Expr): { name: string; a: bigint; parts: readonly [bigint, bigint]; c: bigint } | null {
  const [name, ...others] = lettersOf(expr);
  const coefficients = name && others.length === 0 ? coefficientsOf(expr, name) : null;
  if (!name || coefficients?.length !== 3 || coefficients.some((c) => c.den !== 1n || Q.isZero(c))) return null;
  const [c, b, a] = coefficients.map(({ num }) => num) as [bigint, bigint, bigint];
  const root = Q.exactRoot(Q.rational(b * b - 4n * a * c), 2);
  if (!root || root.den !== 1n) return null;
  return { name, a, parts: [(b + root.num) / 2n, (b - root.num) / 2n], c };
}

function factoredWhole(expr: Expr): Expr | null {
  const [name, ...others] = lettersOf(expr);
  const coefficients = name && others.length === 0 ? coefficientsOf(expr, name) : null;
  return coefficients && coefficients.length > 1 && name ? factoredForm(coefficients, name) : null;
}

/** `a(x+1)-(x+1)b` and the like are left to the whole factorisation; a product is done. */
function unlessProduct(move: Move): Move {
  return (expr) => (termsOf(expr).length > 1 ? move(expr) : null);
}

function negativeOut(expr: Expr): Expr | null {
  if (expr.kind !== 'quotient') return null;
  const [only, ...more] = termsOf(expr.numerator);
  return only?.sign === 'minus' && more.length === 0 ? neg({ ...expr, numerator: only.expr }) : null;
}

/** A part worked on where the whole cannot be. */
function insideWorkedOn(expr: Expr): Expr | null {
  if (expr.kind !== 'sum' && expr.kind !== 'call' && expr.kind !== 'log' && expr.kind !== 'power') return null;
  let isDone = false;
  const changed = mapChildren(expr, (part) => {
    if (isDone) return part;
    const next = nextExpression(part, 'expanded');
    if (!next) return part;
    isDone = true;
    return next;
  });
  return isDone ? changed : null;
}

const movesFor: Record<ExpressionAim, readonly Move[]> = {
  expanded: [calculusMove, multipliedOut, likeTermsJoined],
  simplified: [
    calculusMove,
    oneDenominator,
    cancelledFraction,
    numeratorWorkedOn,
    joinedOnly,
    byRule,
    numbersInBrackets,
    multipliedOut,
    likeTermsJoined,
    negativeOut,
    insideWorkedOn,
  ],
  factored: [calculusMove, splitFactored, unlessProduct(joinedOnly), middleSplit, unlessProduct(factoredWhole)],
};
