import type { Expr } from '../../../shared/maths/expression.ts';
import { compareExpressions } from '../compare/compare-expressions.ts';
import type { CheckContext } from '../context.ts';
import * as Q from '../numbers/rational.ts';
import type { Rational } from '../numbers/rational.ts';
import { reduceFraction, toFraction } from '../solving/fraction.ts';
import { isKnown, isReal } from '../values/arithmetic.ts';
import { evaluate, prepare } from '../values/evaluate.ts';
import { signOf } from '../values/powers.ts';
import {
  addExprs,
  callOf,
  divExprs,
  mulExprs,
  negateExpr,
  numberOf,
  oneExpr,
  piExpr,
  powExprs,
  rationalExpr,
  rationalOf,
  sqrtExpr,
  subExprs,
  wherever,
  zeroExpr,
} from './build.ts';
import { sumOfPoles, type Ratio } from './fraction-sums.ts';
import { isFree, linearIn } from './integrand.ts';
import { partialFractions } from './partial-fractions.ts';

const mostSkipped = 40n;

/** A term as coef * ratio^k * rest / (factorial of slope k + constant); `rest` has no power with the index above. */
interface Term {
  readonly ratio: Expr;
  readonly rest: Expr;
  readonly factorial: { readonly slope: bigint; readonly constant: bigint } | null;
}

/** Sums to infinity of r^k times a quotient of polynomials in k, or over a factorial; null where no table has them. */
export function knownInfiniteSum(body: Expr, index: string, from: Expr, context: CheckContext): Expr | null {
  const start = rationalOf(from);
  const term = start?.den === 1n ? splitTerm(body, index) : null;
  if (!start || !term || start.num < -mostSkipped || start.num > mostSkipped) return null;
  const letters = coefficientOf(term.rest, index);
  const fraction = toFraction(prepare(letters.rest, context), index);
  if (!fraction) return null;
  const { num, den } = reduceFraction(fraction);
  const found = term.factorial
    ? overFactorial(num, den, term, start.num, context)
    : overPolynomial(num, den, term.ratio, start.num, context);
  return found && mulExprs(letters.coef, found);
}

/** Factors that do not depend on the index apart from the others. */
function coefficientOf(expr: Expr, index: string): { coef: Expr; rest: Expr } {
  if (isFree(expr, index)) return { coef: expr, rest: oneExpr };
  if (expr.kind !== 'product') return { coef: oneExpr, rest: expr };
  const free = expr.factors.filter((factor) => isFree(factor, index));
  return { coef: mulExprs(...free), rest: mulExprs(...expr.factors.filter((factor) => !isFree(factor, index))) };
}

function splitTerm(body: Expr, index: string): Term | null {
  const ratios: Expr[] = [];
  const rest: Expr[] = [];
  const factorials: { slope: bigint; constant: bigint }[] = [];
  const visit = (node: Expr, times: 1 | -1): boolean => {
    const put = (expr: Expr): boolean => rest.push(times === 1 ? expr : divExprs(oneExpr, expr)) > 0;
    if (isFree(node, index)) return put(node);
    switch (node.kind) {
      case 'product':
        return node.factors.every((factor) => visit(factor, times));
      case 'quotient':
        return visit(node.numerator, times) && visit(node.denominator, times === 1 ? -1 : 1);
      case 'sum': {
        const [only] = node.terms;
        if (node.terms.length !== 1 || !only || only.sign === 'plusminus' || only.sign === 'minusplus')
          return put(node);
        if (only.sign === 'minus') rest.push(numberOf(-1));
        return visit(only.expr, times);
      }
      case 'power': {
        if (isFree(node.exponent, index)) {
          if (node.base.kind !== 'quotient' && node.base.kind !== 'product') return put(node);
          const parts =
            node.base.kind === 'quotient' ? [node.base.numerator, node.base.denominator] : node.base.factors;
          return parts.every((part) => isFree(part, index)) || rationalOf(node.exponent)?.den === 1n
            ? put(node)
            : false;
        }
        const linear = isFree(node.base, index) ? linearIn(node.exponent, index) : null;
        const slope = linear && rationalOf(linear.slope);
        if (!linear || !slope) return false;
        ratios.push(raised(node.base, numberOf(BigInt(times) * slope.num, slope.den)));
        rest.push(raised(node.base, mulExprs(numberOf(times), linear.constant)));
        return true;
      }
      case 'factorial': {
        const linear = linearIn(node.operand, index);
        const [slope, constant] = [linear?.slope, linear?.constant].map((part) => (part ? rationalOf(part) : null));
        if (times === 1 || slope?.den !== 1n || constant?.den !== 1n) return false;
        factorials.push({ slope: slope.num, constant: constant.num });
        return true;
      }
      default:
        return put(node);
    }
  };
  if (!visit(body, 1) || factorials.length > 1) return null;
  return { ratio: mulExprs(...ratios), rest: mulExprs(...rest), factorial: factorials[0] ?? null };
}

function raised(base: Expr, exponent: Expr): Expr {
  const value = rationalOf(exponent);
  return value && Q.isZero(value) ? oneExpr : powExprs(base, exponent);
}

/** 1, -1, or what its size and sign are; null where the sum does not converge or that is not certain. */
function kindOf(ratio: Expr, context: CheckContext): { kind: Ratio; isCertain: boolean } | null {
  const value = evaluate(ratio, new Map(), 128, context);
  if (isKnown(value)) {
    if (!isReal(value)) return null;
    for (const [kind, number] of [
      ['one', oneExpr],
      ['minus-one', numberOf(-1)],
    ] as const)
      if (compareExpressions(ratio, number, context).kind === 'equal') return { kind, isCertain: true };
    const room = evaluate(subExprs(oneExpr, mulExprs(ratio, ratio)), new Map(), 128, context);
    const isSmall = isKnown(room) && isReal(room) && signOf(room) === 1;
    const sign = signOf(value);
    if (!isSmall || sign === null || sign === 0) return null;
    return { kind: sign > 0 ? 'positive' : 'negative', isCertain: true };
  }
  if (context.numbers === 'complex') return null;
  const sign = signByForm(ratio);
  return { kind: sign === 0 ? 'small' : sign > 0 ? 'positive' : 'negative', isCertain: false };
}

/** The sign of a number times squares; 0 where the form does not say. */
function signByForm(expr: Expr): -1 | 0 | 1 {
  const value = rationalOf(expr);
  if (value) return Q.sign(value);
  if (expr.kind === 'product')
    return expr.factors.reduce<-1 | 0 | 1>((sign, factor) => (sign * signByForm(factor)) as -1 | 0 | 1, 1);
  if (expr.kind === 'sum' && expr.terms.length === 1 && expr.terms[0])
    return ((expr.terms[0].sign === 'minus' ? -1 : 1) * signByForm(expr.terms[0].expr)) as -1 | 0 | 1;
  if (expr.kind === 'quotient') return (signByForm(expr.numerator) * signByForm(expr.denominator)) as -1 | 0 | 1;
  const times = expr.kind === 'power' ? rationalOf(expr.exponent) : null;
  return times?.den === 1n && times.num % 2n === 0n ? 1 : 0;
}

function overPolynomial(
  num: readonly bigint[],
  den: readonly bigint[],
  ratio: Expr,
  start: bigint,
  context: CheckContext,
): Expr | null {
  const known = kindOf(ratio, context);
  const parts = known && den.length > 1 ? partialFractions(num, den) : null;
  if (!known || !parts || parts.whole.some((coef) => !Q.isZero(coef))) return null;
  const total = sumOfPoles(parts.poles, ratio, known.kind, start);
  if (!total || known.isCertain) return total;
  return wherever(callOf('ln', subExprs(oneExpr, mulExprs(ratio, ratio))), total);
}

/** P(k) r^k over k! or (2k)! and their neighbours: exponentials, cosines and sines (DLMF 4.2.19, 4.19, 4.33). */
function overFactorial(
  num: readonly bigint[],
  den: readonly bigint[],
  { ratio, factorial }: Term,
  start: bigint,
  context: CheckContext,
): Expr | null {
  if (!factorial || den.length !== 1 || num.length > 8) return null;
  const { slope, constant } = factorial;
  if (slope * start + constant < 0n) return null;
  const scale = Q.rational(1n, den[0] as bigint);
  const polynomial = num.map((coef) => Q.mul(Q.rational(coef), scale));
  if (slope === 1n) return exponentialSum(polynomial, ratio, constant, start);
  if (slope !== 2n || polynomial.length !== 1) return null;
  const value = evaluate(ratio, new Map(), 128, context);
  const sign = isKnown(value) && isReal(value) ? signOf(value) : isKnown(value) ? null : signByForm(ratio);
  if (!sign || context.numbers === 'complex') return null;
  const shift = constant >= 0n ? constant / 2n : (constant - 1n) / 2n;
  const isOdd = constant - 2n * shift === 1n;
  const root = sqrtExpr(sign > 0 ? ratio : negateExpr(ratio));
  const call = callOf(sign > 0 ? (isOdd ? 'sinh' : 'cosh') : isOdd ? 'sin' : 'cos', root);
  const whole = isOdd ? divExprs(call, root) : call;
  const first = start + shift;
  if (first > mostSkipped) return null;
  const before: Expr[] = [zeroExpr];
  for (let j = 0n; j < first; j += 1n)
    before.push(divExprs(raised(ratio, numberOf(j)), numberOf(factorialOf(2n * j + (isOdd ? 1n : 0n)))));
  const total = mulExprs(raised(ratio, numberOf(-shift)), subExprs(whole, addExprs(...before)));
  return mulExprs(rationalExpr(polynomial[0] as Rational), total);
}

/** The sum of P(k) r^k / (k + s)!: with j = k + s by falling factorials, j (j-1) ... r^j / j! being r^m r^(j-m) / (j-m)!. */
function exponentialSum(polynomial: readonly Rational[], ratio: Expr, shift: bigint, start: bigint): Expr | null {
  const first = start + shift;
  if (first > mostSkipped) return null;
  const falling = fallingCoefficients(movedBy(polynomial, Q.negate(Q.rational(shift))));
  const whole = mulExprs(
    callOf('exp', ratio),
    addExprs(...falling.map((coef, m) => mulExprs(rationalExpr(coef), raised(ratio, numberOf(m))))),
  );
  const before: Expr[] = [zeroExpr];
  for (let j = 0n; j < first; j += 1n) {
    const value = polynomial.reduceRight<Rational>(
      (total, coef) => Q.add(Q.mul(total, Q.rational(j - shift)), coef),
      Q.zero,
    );
    before.push(mulExprs(rationalExpr(Q.div(value, Q.rational(factorialOf(j)))), raised(ratio, numberOf(j))));
  }
  return mulExprs(raised(ratio, numberOf(-shift)), subExprs(whole, addExprs(...before)));
}

/** The coefficients of p(x + at). */
function movedBy(p: readonly Rational[], at: Rational): Rational[] {
  const result = [...p];
  for (let k = 0; k < p.length; k += 1)
    for (let j = p.length - 2; j >= k; j -= 1)
      result[j] = Q.add(result[j] as Rational, Q.mul(at, result[j + 1] as Rational));
  return result;
}

/** p as a sum of c_m x (x-1) ... (x-m+1): by division by x, x-1, ... in turn. */
function fallingCoefficients(p: readonly Rational[]): Rational[] {
  const found: Rational[] = [];
  let rest = [...p];
  for (let m = 0; rest.length > 0; m += 1) {
    const next: Rational[] = [];
    let carry = Q.zero;
    for (let k = rest.length - 1; k >= 0; k -= 1) {
      carry = Q.add(Q.mul(carry, Q.rational(m)), rest[k] as Rational);
      if (k > 0) next[k - 1] = carry;
    }
    found.push(carry);
    rest = next;
  }
  return found;
}

function factorialOf(k: bigint): bigint {
  let product = 1n;
  for (let j = 2n; j <= k; j += 1n) product *= j;
  return product;
}

/** A product to infinity of a quotient of polynomials with rational zeros and poles, by gamma functions (DLMF 5.8.5). */
export function knownInfiniteProduct(body: Expr, index: string, from: Expr, context: CheckContext): Expr | null {
  const start = rationalOf(from);
  const fraction = start?.den === 1n ? toFraction(prepare(body, context), index) : null;
  if (!start || !fraction) return null;
  const { num, den } = reduceFraction(fraction);
  const [zeros, poles] = [num, den].map((p) => rootsOf(p, start));
  if (!zeros || !poles || zeros.length !== poles.length) return null;
  const sum = (list: readonly Rational[]): Rational => list.reduce((total, one) => Q.add(total, one), Q.zero);
  const lead = Q.rational(num[num.length - 1] as bigint, den[den.length - 1] as bigint);
  if (!Q.equals(lead, Q.one) || !Q.equals(sum(zeros), sum(poles))) return null;
  const [top, bottom] = [poles, zeros].map((list) => list.map(gammaOf));
  if (!top?.every((one) => one !== null) || !bottom?.every((one) => one !== null)) return null;
  return divExprs(mulExprs(...(top as Expr[])), mulExprs(...(bottom as Expr[])));
}

/** start - r for each root r, as often as it occurs; null where one is no fraction or not above zero. */
function rootsOf(p: readonly bigint[], start: Rational): Rational[] | null {
  if (p.length === 1) return [];
  const parts = partialFractions([1n], p);
  if (!parts) return null;
  const found = new Map<string, { readonly at: Rational; readonly order: number }>();
  for (const { shift, order } of parts.poles) {
    const name = `${shift.num}/${shift.den}`;
    if (order > (found.get(name)?.order ?? 0)) found.set(name, { at: Q.add(start, shift), order });
  }
  const all = [...found.values()].flatMap(({ at, order }) => Array.from({ length: order }, () => at));
  return all.every((at) => Q.sign(at) > 0) ? all : null;
}

/** Gamma of a whole number or half of an odd one: DLMF 5.4.1 and 5.4.6. */
function gammaOf(at: Rational): Expr | null {
  if (at.den > 2n || Q.floor(at) > mostSkipped) return null;
  if (at.den === 1n) return numberOf(factorialOf(at.num - 1n));
  let product = Q.one;
  for (let j = Q.rational(1, 2); Q.compare(j, at) < 0; j = Q.add(j, Q.one)) product = Q.mul(product, j);
  return mulExprs(rationalExpr(product), sqrtExpr(piExpr));
}
