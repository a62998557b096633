import type { Expr } from '../../../shared/maths/expression.ts';
import { printExpr } from '../../../shared/maths/print.ts';
import { lettersOf } from '../../../shared/maths/letters.ts';
import type { CheckSettings } from '../../../shared/schemas/verdict.ts';
import { callOf, piExpr, rationalOf } from '../calculus/build.ts';
import type { CheckContext } from '../context.ts';
import { rational } from '../numbers/rational.ts';
import { ballSign, magnitude } from '../numbers/ball.ts';
import {
  gcdOf,
  minus,
  product,
  quotientOf,
  sameGaussian,
  simpleRoots,
  toGaussianFraction,
  unit,
  type Gaussian,
  type GaussianPolynomial,
} from '../solving/gaussian-polynomial.ts';
import { degreeIn } from '../solving/linear.ts';
import { differenceGraph } from '../statements/solve.ts';
import { isLetter, isListOfValues, type Statement } from '../statements/statement.ts';
import { subKnown, toBall, isKnown, fromParts } from '../values/arithmetic.ts';
import { evaluatePrepared, prepare } from '../values/evaluate.ts';
import { valueTex } from '../values/value-tex.ts';
import type { KnownValue } from '../values/value.ts';
import { substitute } from './solve-system.ts';
import { differenceExpr, minusExpr, numberExpr, powerExpr, productExpr, quotientExpr, sumExpr } from './build-expr.ts';
import { judgeSameEquation } from './same-equation.ts';
import { fails, holds, undecided, type StepResult } from './step-result.ts';

/** The solutions of a statement about one complex letter. */
type Roots =
  | { readonly kind: 'polynomial'; readonly of: GaussianPolynomial }
  | { readonly kind: 'values'; readonly exprs: readonly Expr[] };

interface Question {
  readonly above: Statement;
  readonly below: Statement;
  readonly settings: CheckSettings;
  readonly context: CheckContext;
}

/** Statements about complex numbers: polynomial equations and lists of values. */
export function judgeComplexStep(question: Question, letters: readonly string[]): StepResult {
  const { above, below, context } = question;
  const same = judgeSameEquation(above, below, context);
  if (same) return same;
  const [letter] = letters;
  if (letters.length !== 1 || letter === undefined) return undecided('not-covered');
  const a = rootsOf(above, letter, context) ?? rootsOfPower(above, letter);
  const b = a && rootsOf(below, letter, context);
  if (!a || !b) return undecided('not-covered');
  if (a.kind === 'polynomial' && b.kind === 'polynomial') return comparePolynomials(a.of, b.of, letter, question);
  if (b.kind === 'values') return compareToValues(a, above, b.exprs, letter, context);
  if (a.kind === 'values') {
    return compareFromValues(a.exprs, b.of, below, letter, context, question.settings.reversible ?? false);
  }
  return undecided('not-covered');
}

function rootsOf(statement: Statement, letter: string, context: CheckContext): Roots | null {
  const fraction = polynomialOf(statement, letter, context);
  if (fraction) return { kind: 'polynomial', of: fraction };
  const exprs = isListOfValues(statement, letter) ? valuesOf(statement) : solvedValues(statement, letter, context);
  return exprs && { kind: 'values', exprs };
}

function polynomialOf(statement: Statement, letter: string, context: CheckContext): GaussianPolynomial | null {
  switch (statement.kind) {
    case 'compare': {
      if (statement.sign !== '=') return null;
      const env = { letter, given: new Map(), context, window: null, hints: [] };
      const found = toGaussianFraction(differenceGraph(statement.left, statement.right, env), letter);
      if (!found || found.num.length === 0) return null;
      return simpleRoots(quotientOf(found.num, gcdOf(found.num, found.den)));
    }
    case 'any': {
      const parts = statement.parts.map((part) => polynomialOf(part, letter, context));
      return parts.includes(null) ? null : simpleRoots((parts as GaussianPolynomial[]).reduce(product, [unit]));
    }
    case 'never':
      return [unit];
    default:
      return null;
  }
}

function valuesOf(statement: Statement): Expr[] | null {
  if (statement.kind === 'compare') return [statement.right];
  if (statement.kind === 'member' && statement.set.kind === 'finite') return [...statement.set.items];
  if (statement.kind !== 'any') return null;
  const parts = statement.parts.map(valuesOf);
  return parts.includes(null) ? null : (parts as Expr[][]).flat();
}

/** The roots as expressions, where each equation is of first or second degree with constants of any kind. */
function solvedValues(statement: Statement, letter: string, context: CheckContext): Expr[] | null {
  if (statement.kind === 'any') {
    const parts = statement.parts.map((part) => solvedValues(part, letter, context));
    return parts.includes(null) ? null : (parts as Expr[][]).flat();
  }
  if (isListOfValues(statement, letter)) return valuesOf(statement);
  if (statement.kind !== 'compare' || statement.sign !== '=') return null;
  const env = { letter, given: new Map(), context, window: null, hints: [] };
  const degree = degreeIn(differenceGraph(statement.left, statement.right, env), letter);
  if (degree !== 1 && degree !== 2) return null;
  const f = differenceExpr(statement.left, statement.right);
  const [low, zero, high] = [-1, 0, 1].map((at) => substitute(f, new Map([[letter, numberExpr(rational(at))]]))) as [
    Expr,
    Expr,
    Expr,
  ];
  const half = (expr: Expr): Expr => quotientExpr(expr, numberExpr(rational(2)));
  const b = half(differenceExpr(high, low));
  if (degree === 1) return [quotientExpr(minusExpr(zero), b)];
  const a = differenceExpr(half(sumExpr([high, low])), zero);
  const inside = differenceExpr(powerExpr(b, rational(2)), productExpr([numberExpr(rational(4)), a, zero]));
  const root = powerExpr(inside, rational(1, 2));
  const divisor = productExpr([numberExpr(rational(2)), a]);
  return [sumExpr([minusExpr(b), root]), differenceExpr(minusExpr(b), root)].map((top) => quotientExpr(top, divisor));
}

const mostRoots = 24;

/** All n roots of letter^n = constant, from the principal one on. */
function rootsOfPower(statement: Statement, letter: string): Roots | null {
  if (statement.kind !== 'compare' || statement.sign !== '=') return null;
  const { left, right } = statement;
  if (left.kind !== 'power' || !isLetter(left.base, letter) || lettersOf(right).length > 0) return null;
  const degree = rationalOf(left.exponent);
  if (!degree || degree.den !== 1n || degree.num < 2n || degree.num > mostRoots) return null;
  const n = Number(degree.num);
  const first = powerExpr(right, rational(1, n));
  const i: Expr = { kind: 'constant', name: 'i', span: right.span };
  const exprs = Array.from({ length: n }, (_, k) => {
    const turn = productExpr([numberExpr(rational(2 * k, n)), piExpr, i]);
    return k === 0 ? first : productExpr([first, callOf('exp', turn)]);
  });
  return { kind: 'values', exprs };
}

function comparePolynomials(
  a: GaussianPolynomial,
  b: GaussianPolynomial,
  letter: string,
  question: Question,
): StepResult {
  if (a.length === b.length && a.every((c, k) => sameGaussian(c, b[k] as Gaussian))) return holds('proved');
  const common = gcdOf(a, b);
  const lost = quotientOf(a, common);
  const gained = quotientOf(b, common);
  if (lost.length > 1) return failOn('lost', nameRoots(lost, letter), letter);
  if (question.settings.reversible) return failOn('gained', nameRoots(gained, letter), letter);
  return holds('proved', ['one-way'], { gained: nameRoots(gained, letter), operation: 'multiply' });
}

/** The roots by name where there is one, else the equation that they satisfy. */
function nameRoots(p: GaussianPolynomial, letter: string): string[] {
  const [c0] = p;
  if (p.length === 2 && c0) return [valueTex(fromParts(minus(c0).re, minus(c0).im), 128)];
  const terms = p.map((c, k) => `(${valueTex(fromParts(c.re, c.im), 128)})${letter}^{${k}}`);
  return [`${terms.reverse().join('+')}=0`];
}

function failOn(side: 'lost' | 'gained', names: readonly string[], letter: string): StepResult {
  const [above, below] = side === 'lost' ? ['true', 'false'] : ['false', 'true'];
  return fails('proved', { [side]: [...names], witness: { at: { [letter]: names[0] as string }, above, below } });
}

const bits = 288;

function compareToValues(
  a: Roots,
  above: Statement,
  values: readonly Expr[],
  letter: string,
  context: CheckContext,
): StepResult {
  const distinct = distinctValues(values, context);
  if (!distinct) return undecided('not-settled');
  for (const expr of distinct) {
    const truth = isRoot(above, expr, letter, context);
    if (truth === null) return undecided('not-settled');
    if (!truth) return failOn('gained', [printExpr(expr)], letter);
  }
  if (a.kind === 'values') return compareValues(a.exprs, distinct, letter, context);
  if (a.of.length - 1 === distinct.length) return holds('sampled');
  return failOn('lost', [lostName(a.of, distinct, letter, context)], letter);
}

/** Every value of the list is known to be a root of the line above. */
function compareValues(
  above: readonly Expr[],
  listed: readonly Expr[],
  letter: string,
  context: CheckContext,
): StepResult {
  const roots = distinctValues(above, context);
  if (!roots) return undecided('not-settled');
  if (roots.length === listed.length) return holds('sampled');
  const lost = roots.find((root) => distinctValues([...listed, root], context)?.length === listed.length + 1);
  const value = lost && valueOf(lost, context);
  return value ? failOn('lost', [valueTex(value, bits)], letter) : undecided('not-settled');
}

/** One lost root is the sum of all roots without those listed; several are named by the equation that has them. */
function lostName(p: GaussianPolynomial, listed: readonly Expr[], letter: string, context: CheckContext): string {
  const next = p[p.length - 2];
  if (!next || listed.length !== p.length - 2) return nameRoots(p, letter)[0] as string;
  let rest: KnownValue = fromParts(minus(next).re, minus(next).im);
  for (const expr of listed) {
    const value = valueOf(expr, context);
    if (value) rest = subKnown(rest, value, bits);
  }
  return valueTex(rest, bits);
}

function compareFromValues(
  values: readonly Expr[],
  b: GaussianPolynomial,
  below: Statement,
  letter: string,
  context: CheckContext,
  isReversible: boolean,
): StepResult {
  const distinct = distinctValues(values, context);
  if (!distinct) return undecided('not-settled');
  for (const expr of distinct) {
    const truth = isRoot(below, expr, letter, context);
    if (truth === null) return undecided('not-settled');
    if (!truth) return failOn('lost', [printExpr(expr)], letter);
  }
  if (distinct.length === b.length - 1) return holds('sampled');
  const gained = [lostName(b, distinct, letter, context)];
  if (isReversible) return failOn('gained', gained, letter);
  return holds('sampled', ['one-way'], { gained, operation: 'multiply' });
}

function valueOf(expr: Expr, context: CheckContext): KnownValue | null {
  if (lettersOf(expr).length > 0) return null;
  const value = evaluatePrepared(prepare(expr, context), new Map(), bits, context);
  return isKnown(value) ? value : null;
}

/** Zero to 60 digits, certainly not zero, or null. */
function isZeroValue(value: KnownValue): boolean | null {
  if (value.kind === 'rational') return value.value.num === 0n;
  if (value.kind !== 'ball') return false;
  const parts = value.im === null ? [value.re] : [value.re, value.im];
  if (parts.some((ball) => ballSign(ball) !== 0)) return false;
  return parts.every((ball) => magnitude(ball.mid) + ball.rad < 1n << BigInt(bits - 200)) ? true : null;
}

function distinctValues(exprs: readonly Expr[], context: CheckContext): Expr[] | null {
  const found: { expr: Expr; value: KnownValue }[] = [];
  for (const expr of exprs) {
    const value = valueOf(expr, context);
    if (!value) return null;
    const same = found.map((other) => isZeroValue(subKnown(toBall(other.value, bits), toBall(value, bits), bits)));
    if (same.includes(null)) return null;
    if (!same.includes(true)) found.push({ expr, value });
  }
  return found.map(({ expr }) => expr);
}

function isRoot(statement: Statement, expr: Expr, letter: string, context: CheckContext): boolean | null {
  if (statement.kind === 'any') {
    const parts = statement.parts.map((part) => isRoot(part, expr, letter, context));
    return parts.includes(true) ? true : parts.includes(null) ? null : false;
  }
  if (statement.kind !== 'compare') return null;
  const put = substitute(differenceExpr(statement.left, statement.right), new Map([[letter, expr]]));
  const value = valueOf(put, context);
  return value && isZeroValue(value);
}
