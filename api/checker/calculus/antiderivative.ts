import type { Expr } from '../../../shared/maths/expression.ts';
import { sameExpr } from '../../../shared/maths/same.ts';
import { childrenOf, mapExpr, countNodes } from '../../../shared/maths/walk.ts';
import { compareExpressions } from '../compare/compare-expressions.ts';
import type { CheckContext } from '../context.ts';
import * as Q from '../numbers/rational.ts';
import { Unsettled } from '../solving/unsettled.ts';
import { isKnown } from '../values/arithmetic.ts';
import { evaluate } from '../values/evaluate.ts';
import {
  addExprs,
  callOf,
  divExprs,
  isZeroExpr,
  letterOf,
  mulExprs,
  numberOf,
  oneExpr,
  powExprs,
  rationalExpr,
  sqrtExpr,
  subExprs,
} from './build.ts';
import { bodyOf, differentiate } from './differentiate.ts';
import {
  factorise,
  isFree,
  linearIn,
  multiplied,
  polynomialExpr,
  polynomialIn,
  termsIn,
  type Factor,
  type Factored,
} from './integrand.ts';
import {
  antiderivativeOfCall,
  antiderivativeOfSquare,
  integrateByParts,
  integratePowerLog,
  integrateWave,
  productOfWaves,
} from './integrate-parts.ts';
import { integrateRational } from './integrate-rational.ts';
import { freshLetter, substitute } from './substitute.ts';
import { withoutRoots } from './rationalise.ts';

/** An antiderivative from the checker's own table, its derivative compared with the integrand; null where it has none. */
export function findAntiderivative(integrand: Expr, letter: string, context: CheckContext): Expr | null {
  try {
    const found = integrate(written(integrand, letter, context), letter, context, 0);
    if (!found) return null;
    const slope = differentiate(found, letter, withoutDefinition(context, letter));
    return compareExpressions(slope, integrand, withoutDefinition(context, letter)).kind === 'equal' ? found : null;
  } catch (cause) {
    if (cause instanceof Unsettled) return null;
    throw cause;
  }
}

/** The letter of an integral is its own, whatever a definition says of it. */
export function withoutDefinition(context: CheckContext, letter: string): CheckContext {
  if (!context.definitions.letters.has(letter)) return context;
  const letters = new Map(context.definitions.letters);
  letters.delete(letter);
  return { ...context, definitions: { ...context.definitions, letters } };
}

function written(expr: Expr, letter: string, context: CheckContext): Expr {
  return mapExpr(expr, (node) => {
    if (node.kind === 'apply') return written(bodyOf(node, context), letter, context);
    if (node.kind === 'letter' && node.name !== letter) return context.definitions.letters.get(node.name) ?? node;
    return node;
  });
}

const deepest = 4;

function integrate(expr: Expr, letter: string, context: CheckContext, depth: number): Expr | null {
  context.budget.spend(20 + 4 * countNodes(expr));
  if (depth > deepest) return null;
  if (isFree(expr, letter)) return mulExprs(expr, letterOf(letter));
  if (expr.kind === 'sum') {
    const parts = expr.terms.map((term) => ({ part: integrate(term.expr, letter, context, depth), sign: term.sign }));
    if (parts.every(({ part }) => part !== null)) {
      return addExprs(...parts.map(({ part, sign }) => mulExprs(numberOf(sign === 'minus' ? -1 : 1), part as Expr)));
    }
  }
  const polynomial = polynomialIn(expr, letter);
  if (polynomial) return integratePolynomial(polynomial, letter);
  const factored = factorise(expr, letter);
  const direct = integrateProduct(factored, letter, context, depth) ?? integrateRational(expr, letter, context);
  if (direct) return direct;
  const terms = termsIn(multiplied(factored), letter);
  if (terms.length > 1) {
    const parts = terms.map((term) => integrate(term, letter, context, depth + 1));
    if (parts.every((part) => part !== null)) return addExprs(...(parts as Expr[]));
  }
  const free = withoutRoots(expr, letter);
  const whole = free && integrate(free.integrand, free.letter, context, depth + 1);
  return whole && substitute(whole, free.letter, free.root);
}

function integratePolynomial(coefs: readonly Expr[], letter: string): Expr {
  return addExprs(
    ...coefs.map((coef, k) => mulExprs(divExprs(coef, numberOf(k + 1)), powExprs(letterOf(letter), numberOf(k + 1)))),
  );
}

function integrateProduct(
  { coef, factors }: Factored,
  letter: string,
  context: CheckContext,
  depth: number,
): Expr | null {
  const found =
    integrateOne(factors, letter) ??
    integratePair(factors, letter, context, depth) ??
    productOfWaves(factors, letter) ??
    substituteInner(factors, letter, context, depth) ??
    shiftLinear(factors, letter, context, depth);
  return found && mulExprs(coef, found);
}

/** A single base to a power. */
function integrateOne(factors: readonly Factor[], letter: string): Expr | null {
  const [only] = factors;
  if (factors.length !== 1 || !only) return null;
  const { base, times } = only;
  const linear = linearIn(base, letter);
  if (linear) {
    if (Q.equals(times, Q.minusOne)) return divExprs(callOf('ln', callOf('abs', base)), linear.slope);
    const next = Q.add(times, Q.one);
    return divExprs(powExprs(base, rationalExpr(next)), mulExprs(rationalExpr(next), linear.slope));
  }
  if (base.kind === 'call' && base.args[0]) {
    const inner = linearIn(base.args[0], letter);
    if (!inner) return null;
    const whole = Q.equals(times, Q.one)
      ? antiderivativeOfCall(base.name, base.args[0])
      : (antiderivativeOfSquare(base.name, times, base.args[0]) ?? inverseCall(base, times));
    return whole && divExprs(whole, inner.slope);
  }
  return Q.equals(times, Q.rational(-1, 2)) || Q.equals(times, Q.rational(1, 2))
    ? integrateRootOfQuadratic(base, times, letter)
    : null;
}

const reciprocals: Partial<Record<string, 'sec' | 'csc' | 'sech' | 'csch' | 'cos' | 'sin' | 'cot' | 'tan'>> = {
  cos: 'sec',
  sin: 'csc',
  sec: 'cos',
  csc: 'sin',
  tan: 'cot',
  cot: 'tan',
};

function inverseCall(base: Extract<Expr, { kind: 'call' }>, times: Q.Rational): Expr | null {
  const other = reciprocals[base.name];
  return other && Q.equals(times, Q.minusOne) && base.args[0] ? antiderivativeOfCall(other, base.args[0]) : null;
}

/** A root, or one over it, of c + b x + a x^2 with fractions for coefficients. */
function integrateRootOfQuadratic(base: Expr, times: Q.Rational, letter: string): Expr | null {
  const coefs = polynomialIn(base, letter)?.map((coef) => coef);
  if (coefs?.length !== 3) return null;
  const [c, b, a] = coefs as [Expr, Expr, Expr];
  const linear = addExprs(mulExprs(numberOf(2), a, letterOf(letter)), b);
  const lead = signOfNumber(a);
  const gap = subExprs(mulExprs(b, b), mulExprs(numberOf(4), a, c));
  if (lead === 0) return null;
  const inverse =
    lead > 0
      ? divExprs(
          callOf('ln', callOf('abs', addExprs(mulExprs(numberOf(2), sqrtExpr(a), sqrtExpr(base)), linear))),
          sqrtExpr(a),
        )
      : divExprs(
          callOf('arcsin', divExprs(mulExprs(numberOf(-1), linear), sqrtExpr(gap))),
          sqrtExpr(mulExprs(numberOf(-1), a)),
        );
  if (Q.sign(times) < 0) return inverse;
  const four = mulExprs(numberOf(4), a);
  const rest = divExprs(mulExprs(numberOf(-1), gap, inverse), mulExprs(numberOf(2), four));
  return addExprs(divExprs(mulExprs(linear, sqrtExpr(base)), four), rest);
}

function signOfNumber(expr: Expr): number {
  const coefs = polynomialIn(expr, '');
  const [only] = coefs ?? [];
  if (!only || only.kind === 'letter') return only ? 1 : 0;
  if (only.kind === 'number') return 1;
  return only.kind === 'sum' && only.terms.length === 1 && only.terms[0]?.sign === 'minus' ? -1 : 1;
}

/** Two bases that go together: polynomial and exponential, power and logarithm, exponential and sine, secant and tangent. */
function integratePair(factors: readonly Factor[], letter: string, context: CheckContext, depth: number): Expr | null {
  const calls = factors.filter(({ base }) => base.kind === 'call');
  const others = factors.filter(({ base }) => base.kind !== 'call');
  const [first, second] = calls;
  if (first?.base.kind !== 'call') return null;
  if (second?.base.kind === 'call') {
    if (calls.length > 2 || others.length > 0 || !Q.equals(first.times, Q.one) || !Q.equals(second.times, Q.one))
      return null;
    return integrateCalls(first.base, second.base, letter);
  }
  const polynomial = others.every(({ times }) => times.den === 1n && times.num > 0n)
    ? polynomialIn(multiplied({ coef: oneExpr, factors: others }), letter)
    : null;
  if (polynomial && Q.equals(first.times, Q.one)) {
    const parts =
      integrateByParts(polynomial, first.base, letter) ??
      integrateInverse(polynomial, first.base, letter, context, depth);
    if (parts) return parts;
  }
  const [power] = others;
  if (
    first.base.name !== 'ln' ||
    first.times.den !== 1n ||
    first.times.num < 0n ||
    first.times.num > 12n ||
    others.length > 1
  )
    return null;
  if (power && (power.base.kind !== 'letter' || power.base.name !== letter)) return null;
  return integratePowerLog(power?.times ?? Q.zero, Number(first.times.num), first.base, letter);
}

function integrateCalls(
  a: Extract<Expr, { kind: 'call' }>,
  b: Extract<Expr, { kind: 'call' }>,
  letter: string,
): Expr | null {
  if (a.name === 'exp' && (b.name === 'sin' || b.name === 'cos')) return integrateWave(a, b, letter);
  if (b.name === 'exp' && (a.name === 'sin' || a.name === 'cos')) return integrateWave(b, a, letter);
  const [u, v] = [a.args[0], b.args[0]];
  const linear = u && v && sameExpr(u, v) ? linearIn(u, letter) : null;
  if (!linear || !u) return null;
  const names = [a.name, b.name].sort().join();
  if (names === 'sec,tan') return divExprs(callOf('sec', u), linear.slope);
  if (names === 'cot,csc') return divExprs(mulExprs(numberOf(-1), callOf('csc', u)), linear.slope);
  return null;
}

const inverses: ReadonlySet<string> = new Set(['ln', 'arctan', 'arcsin', 'arccos', 'arsinh', 'artanh']);

/** A polynomial times an inverse function: by parts. */
function integrateInverse(
  polynomial: readonly Expr[],
  call: Extract<Expr, { kind: 'call' }>,
  letter: string,
  context: CheckContext,
  depth: number,
): Expr | null {
  if (!inverses.has(call.name)) return null;
  const whole = integratePolynomial(polynomial, letter);
  const slope = withoutConditions(differentiate(call, letter, context));
  const rest = integrate(mulExprs(whole, slope), letter, context, depth + 1);
  return rest && subExprs(mulExprs(whole, call), rest);
}

/** A derivative without the terms that only keep its domain. */
function withoutConditions(expr: Expr): Expr {
  return mapExpr(expr, (node) =>
    node.kind === 'sum'
      ? addExprs(...node.terms.map((t) => mulExprs(numberOf(t.sign === 'minus' ? -1 : 1), t.expr)))
      : node,
  );
}

/** f(g) g' up to a constant, for an inner g: then it is F(g). */
function substituteInner(
  factors: readonly Factor[],
  letter: string,
  context: CheckContext,
  depth: number,
): Expr | null {
  if (depth >= 2) return null;
  for (const [k, { base, times }] of factors.entries()) {
    for (const inner of innersOf(base, letter)) {
      const rest = multiplied({ coef: oneExpr, factors: factors.filter((_, j) => j !== k) });
      const factor = constantFactor(rest, differentiate(inner, letter, context), letter, context);
      if (!factor) continue;
      const fresh = freshLetter(new Set());
      const outer = powExprs(replaced(base, inner, letterOf(fresh)), rationalExpr(times));
      if (!isFree(outer, letter)) continue;
      const whole = integrate(outer, fresh, context, depth + 1);
      if (whole) return mulExprs(factor, substitute(whole, fresh, inner));
    }
  }
  return null;
}

function innersOf(base: Expr, letter: string): Expr[] {
  const own = base.kind === 'letter' ? [] : [base];
  const inside =
    base.kind === 'call' ? childrenOf(base).filter((part) => !isFree(part, letter) && part.kind !== 'letter') : [];
  return [...inside, ...own];
}

function replaced(expr: Expr, inner: Expr, value: Expr): Expr {
  if (sameExpr(expr, inner)) return value;
  return mapExpr(expr, (node) => (sameExpr(node, inner) ? value : node));
}

/** c with rest = c g', found at a point and then compared. */
export function constantFactor(rest: Expr, slope: Expr, letter: string, context: CheckContext): Expr | null {
  if (isZeroExpr(slope)) return null;
  const ratio = divExprs(rest, slope);
  for (const at of [Q.rational(3, 7), Q.rational(5, 3), Q.rational(-4, 5)]) {
    const factor = factorAt(ratio, letter, at, context);
    if (factor && compareExpressions(rest, mulExprs(factor, slope), context).kind === 'equal') return factor;
    if (factor) return null;
  }
  return null;
}

function factorAt(ratio: Expr, letter: string, at: Q.Rational, context: CheckContext): Expr | null {
  const value = evaluate(ratio, new Map([[letter, { kind: 'rational', value: at }]]), 128, context);
  if (value.kind === 'rational') return rationalExpr(value.value);
  if (!isKnown(value))
    return value.kind === 'unknown' && value.reason === 'not-covered'
      ? substitute(ratio, letter, rationalExpr(at))
      : null;
  if (value.kind !== 'ball' || value.im !== null) return substitute(ratio, letter, rationalExpr(at));
  for (let den = 1n; den <= 60n; den += 1n) {
    const scaled = (value.re.mid * den * 2n + (1n << 128n)) / (2n << 128n);
    for (const num of [scaled - 1n, scaled, scaled + 1n]) {
      const gap = value.re.mid * den - (num << 128n);
      if (num !== 0n && (gap < 0n ? -gap : gap) >> 64n === 0n) return numberOf(num, den);
    }
  }
  return substitute(ratio, letter, rationalExpr(at));
}

/** A linear base to a broken power: the others are written in it. */
function shiftLinear(factors: readonly Factor[], letter: string, context: CheckContext, depth: number): Expr | null {
  const inner = factors.find(({ base, times }) => times.den !== 1n && base.kind !== 'letter' && linearIn(base, letter));
  const linear = inner && linearIn(inner.base, letter);
  if (!inner || !linear) return null;
  const fresh = freshLetter(new Set());
  const back = divExprs(subExprs(letterOf(fresh), linear.constant), linear.slope);
  const rest = multiplied({ coef: oneExpr, factors: factors.filter((factor) => factor !== inner) });
  const polynomial = polynomialIn(substitute(rest, letter, back), fresh);
  if (!polynomial) return null;
  const power = powExprs(letterOf(fresh), rationalExpr(inner.times));
  const whole = integrate(mulExprs(polynomialExpr(polynomial, letterOf(fresh)), power), fresh, context, depth + 1);
  return whole && divExprs(substitute(whole, fresh, inner.base), linear.slope);
}
