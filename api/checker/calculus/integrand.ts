import type { Expr } from '../../../shared/maths/expression.ts';
import { lettersOf } from '../../../shared/maths/letters.ts';
import { sameExpr } from '../../../shared/maths/same.ts';
import type { CheckContext } from '../context.ts';
import * as Q from '../numbers/rational.ts';
import type { Rational } from '../numbers/rational.ts';
import {
  addExprs,
  callOf,
  divExprs,
  isZeroExpr,
  mulExprs,
  negateExpr,
  numberOf,
  oneExpr,
  powExprs,
  rationalExpr,
  rationalOf,
  zeroExpr,
} from './build.ts';
import { bodyOf } from './differentiate.ts';

/** A product: what does not depend on the letter, and bases to fractional powers. Exponentials are one base exp(u). */
export interface Factored {
  readonly coef: Expr;
  readonly factors: readonly Factor[];
}
export interface Factor {
  readonly base: Expr;
  readonly times: Rational;
}

export function isFree(expr: Expr, letter: string): boolean {
  return !lettersOf(expr).includes(letter);
}

/** Definitions and own functions written out, so that the letter of integration shows. */
export function writtenOut(
  expr: Expr,
  context: CheckContext,
  map: (expr: Expr, change: (node: Expr) => Expr) => Expr,
): Expr {
  return map(expr, (node) => (node.kind === 'apply' ? bodyOf(node, context) : node));
}

export function factorise(expr: Expr, letter: string): Factored {
  const factors: Factor[] = [];
  let coef: Expr = oneExpr;
  let exponent: Expr = zeroExpr;
  const visit = (node: Expr, times: Rational): void => {
    if (isFree(node, letter)) {
      coef = mulExprs(coef, powExprs(node, rationalExpr(times)));
      return;
    }
    switch (node.kind) {
      case 'product':
        return node.factors.forEach((factor) => visit(factor, times));
      case 'quotient':
        visit(node.numerator, times);
        return visit(node.denominator, Q.negate(times));
      case 'sum': {
        const [only] = node.terms;
        if (node.terms.length !== 1 || !only) break;
        if (only.sign === 'minus' && times.den === 1n) {
          if (times.num % 2n !== 0n) coef = negateExpr(coef);
          return visit(only.expr, times);
        }
        if (only.sign === 'plus') return visit(only.expr, times);
        break;
      }
      case 'power':
        return visitPower(node, times);
      case 'root': {
        const degree = node.degree ? rationalOf(node.degree) : Q.rational(2);
        if (!degree || degree.num < 1n || node.radicand.kind === 'product') break;
        return visit(node.radicand, Q.div(times, degree));
      }
      case 'call':
        if (node.name === 'exp' && node.args[0]) {
          exponent = addExprs(exponent, mulExprs(rationalExpr(times), node.args[0]));
          return;
        }
        break;
      default:
    }
    put(node, times);
  };
  const visitPower = (node: Extract<Expr, { kind: 'power' }>, times: Rational): void => {
    const value = rationalOf(node.exponent);
    // (x^2)^(1/2) is |x|: only whole powers are taken apart.
    if (
      value &&
      (value.den === 1n && times.den === 1n
        ? true
        : node.base.kind === 'letter' || (times.den === 1n && node.base.kind !== 'product'))
    ) {
      // The square root of x^2 is |x|; its cube root is x^(2/3) for every real x.
      if (node.base.kind === 'letter' && times.den % 2n === 0n && value.num % 2n === 0n) return put(node, times);
      return visit(node.base, Q.mul(value, times));
    }
    if (isFree(node.base, letter)) {
      const rate = node.base.kind === 'constant' && node.base.name === 'e' ? oneExpr : callOf('ln', node.base);
      exponent = addExprs(exponent, mulExprs(rationalExpr(times), rate, node.exponent));
      return;
    }
    put(node, times);
  };
  const put = (base: Expr, times: Rational): void => {
    const at = factors.findIndex((factor) => sameExpr(factor.base, base));
    if (at < 0) factors.push({ base, times });
    else factors[at] = { base, times: Q.add((factors[at] as Factor).times, times) };
  };
  visit(expr, Q.one);
  if (!isZeroExpr(exponent)) factors.push({ base: callOf('exp', exponent), times: Q.one });
  return { coef, factors: factors.filter(({ times }) => !Q.isZero(times)) };
}

export function multiplied({ coef, factors }: Factored): Expr {
  return mulExprs(coef, ...factors.map(({ base, times }) => powExprs(base, rationalExpr(times))));
}

const highestDegree = 40;

/** Coefficients of a polynomial in the letter, the constant first; null for anything else. */
export function polynomialIn(expr: Expr, letter: string): Expr[] | null {
  if (isFree(expr, letter)) return [expr];
  switch (expr.kind) {
    case 'letter':
      return [zeroExpr, oneExpr];
    case 'sum': {
      let total: Expr[] = [];
      for (const term of expr.terms) {
        const next = polynomialIn(term.expr, letter);
        if (!next || (term.sign !== 'plus' && term.sign !== 'minus')) return null;
        total = addCoefficients(total, term.sign === 'plus' ? next : next.map(negateExpr));
      }
      return trimmed(total);
    }
    case 'product': {
      let total: Expr[] | null = [oneExpr];
      for (const factor of expr.factors) {
        const next = polynomialIn(factor, letter);
        if (!next) return null;
        total = mulCoefficients(total, next);
        if (!total) return null;
      }
      return total;
    }
    case 'quotient': {
      const top = isFree(expr.denominator, letter) ? polynomialIn(expr.numerator, letter) : null;
      return top && top.map((coef) => divExprs(coef, expr.denominator));
    }
    case 'power': {
      const times = rationalOf(expr.exponent);
      const base =
        times && times.den === 1n && times.num >= 0n && times.num <= highestDegree
          ? polynomialIn(expr.base, letter)
          : null;
      if (!base || !times) return null;
      let total: Expr[] | null = [oneExpr];
      for (let k = 0n; k < times.num && total; k += 1n) total = mulCoefficients(total, base);
      return total;
    }
    default:
      return null;
  }
}

function addCoefficients(a: readonly Expr[], b: readonly Expr[]): Expr[] {
  return Array.from({ length: Math.max(a.length, b.length) }, (_, k) => addExprs(a[k] ?? zeroExpr, b[k] ?? zeroExpr));
}

export function mulCoefficients(a: readonly Expr[], b: readonly Expr[]): Expr[] | null {
  if (a.length + b.length > highestDegree + 2) return null;
  const result: Expr[] = Array.from({ length: a.length + b.length - 1 }, () => zeroExpr);
  a.forEach((x, i) => b.forEach((y, j) => (result[i + j] = addExprs(result[i + j] as Expr, mulExprs(x, y)))));
  return trimmed(result);
}

function trimmed(coefs: Expr[]): Expr[] {
  const result = [...coefs];
  while (result.length > 1 && isZeroExpr(result[result.length - 1] as Expr)) result.pop();
  return result;
}

export function polynomialExpr(coefs: readonly Expr[], of: Expr): Expr {
  return addExprs(...coefs.map((coef, k) => mulExprs(coef, k === 0 ? oneExpr : powExprs(of, numberOf(k)))));
}

/** Slope and constant of a linear expression whose slope is not zero. */
export function linearIn(expr: Expr, letter: string): { slope: Expr; constant: Expr } | null {
  const coefs = polynomialIn(expr, letter);
  return coefs?.length === 2 ? { slope: coefs[1] as Expr, constant: coefs[0] as Expr } : null;
}

const mostTerms = 60;

/** The terms of an integrand with polynomial products multiplied out. */
export function termsIn(expr: Expr, letter: string): Expr[] {
  switch (expr.kind) {
    case 'sum':
      return expr.terms.flatMap((term) => {
        const parts = termsIn(term.expr, letter);
        return term.sign === 'minus' ? parts.map(negateExpr) : parts;
      });
    case 'quotient':
      return termsIn(expr.numerator, letter).map((term) => divExprs(term, expr.denominator));
    case 'product': {
      let total: Expr[] = [oneExpr];
      for (const factor of expr.factors) {
        const parts = termsIn(factor, letter);
        if (total.length * parts.length > mostTerms) return [expr];
        total = total.flatMap((a) => parts.map((b) => mulExprs(a, b)));
      }
      return total;
    }
    case 'power': {
      const times = rationalOf(expr.exponent);
      const parts = times && times.den === 1n && times.num > 1n && times.num < 12n ? termsIn(expr.base, letter) : [];
      if (parts.length < 2 || !times || parts.length ** Number(times.num) > 4096) return [expr];
      let total: Expr[] = [oneExpr];
      for (let k = 0n; k < times.num; k += 1n) {
        total = total.flatMap((a) => parts.map((b) => mulExprs(a, b)));
        if (total.length > 400) return [expr];
      }
      return total;
    }
    default:
      return [expr];
  }
}
