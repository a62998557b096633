import type { Expr } from '../../../shared/maths/expression.ts';
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
  rationalOf,
  sqrtExpr,
  subExprs,
  zeroExpr,
} from '../calculus/build.ts';
import type { CheckContext } from '../context.ts';

/** An expression as re + i im, both over the real numbers. */
export interface Parts {
  readonly re: Expr;
  readonly im: Expr;
}

/** What a letter is: one of two real letters for a complex one, itself for a real one. */
export type LetterParts = (name: string) => Parts;

/** The real and the imaginary part, written out; null for what is not built from whole powers, bars, conjugates and e^(..). */
export function partsOf(expr: Expr, letters: LetterParts, context: CheckContext, depth = 0): Parts | null {
  if (depth > 40) return null;
  const visit = (part: Expr): Parts | null => partsOf(part, letters, context, depth + 1);
  context.budget.spend(4);
  switch (expr.kind) {
    case 'number':
      return real(expr);
    case 'constant':
      return expr.name === 'i' ? { re: zeroExpr, im: oneExpr } : expr.name === 'infinity' ? null : real(expr);
    case 'letter': {
      const definition = context.definitions.letters.get(expr.name);
      return definition ? visit(definition) : letters(expr.name);
    }
    case 'sum':
      return ofSum(expr, visit);
    case 'product':
      return expr.factors.map(visit).reduce((a, b) => a && b && times(a, b), real(oneExpr));
    case 'quotient': {
      const [top, bottom] = [visit(expr.numerator), visit(expr.denominator)];
      return top && bottom && over(top, bottom);
    }
    case 'power':
      return ofPower(expr, visit);
    case 'root': {
      const value = expr.degree === null ? rationalOf(expr.radicand) : null;
      if (!value) return null;
      return value.num >= 0n ? real(expr) : { re: zeroExpr, im: sqrtExpr(numberOf(-value.num, value.den)) };
    }
    case 'call':
      return ofCall(expr, visit);
    default:
      return null;
  }
}

function real(re: Expr): Parts {
  return { re, im: zeroExpr };
}

function times(a: Parts, b: Parts): Parts {
  return {
    re: subExprs(mulExprs(a.re, b.re), mulExprs(a.im, b.im)),
    im: addExprs(mulExprs(a.re, b.im), mulExprs(a.im, b.re)),
  };
}

/** re^2 + im^2 */
export function squaredSize({ re, im }: Parts): Expr {
  return addExprs(mulExprs(re, re), mulExprs(im, im));
}

function over(a: Parts, b: Parts): Parts {
  if (isZeroExpr(b.im)) return { re: divExprs(a.re, b.re), im: divExprs(a.im, b.re) };
  const top = times(a, { re: b.re, im: negateExpr(b.im) });
  const size = squaredSize(b);
  return { re: divExprs(top.re, size), im: divExprs(top.im, size) };
}

type Visit = (part: Expr) => Parts | null;

function ofSum(expr: Extract<Expr, { kind: 'sum' }>, visit: Visit): Parts | null {
  let total: Parts = real(zeroExpr);
  for (const { sign, expr: term } of expr.terms) {
    const next = sign === 'plus' || sign === 'minus' ? visit(term) : null;
    if (!next) return null;
    const signed = sign === 'minus' ? { re: negateExpr(next.re), im: negateExpr(next.im) } : next;
    total = { re: addExprs(total.re, signed.re), im: addExprs(total.im, signed.im) };
  }
  return total;
}

function ofPower({ base, exponent }: Extract<Expr, { kind: 'power' }>, visit: Visit): Parts | null {
  if (base.kind === 'constant' && base.name === 'e') return exponential(visit(exponent));
  const count = rationalOf(exponent);
  const parts = visit(base);
  if (!parts || count?.den !== 1n || count.num > 12n || count.num < -12n) return null;
  if (isZeroExpr(parts.im)) return real(powExprs(parts.re, exponent));
  let total = real(oneExpr);
  for (let k = 0n; k < (count.num < 0n ? -count.num : count.num); k += 1n) total = times(total, parts);
  return count.num < 0n ? over(real(oneExpr), total) : total;
}

function exponential(parts: Parts | null): Parts | null {
  if (!parts) return null;
  const size = isZeroExpr(parts.re) ? oneExpr : callOf('exp', parts.re);
  if (isZeroExpr(parts.im)) return real(size);
  return { re: mulExprs(size, callOf('cos', parts.im)), im: mulExprs(size, callOf('sin', parts.im)) };
}

function ofCall(expr: Extract<Expr, { kind: 'call' }>, visit: Visit): Parts | null {
  const [argument] = expr.args;
  const parts = argument && expr.args.length === 1 ? visit(argument) : null;
  if (!parts) return null;
  switch (expr.name) {
    case 'conj':
      return { re: parts.re, im: negateExpr(parts.im) };
    case 're':
      return real(parts.re);
    case 'im':
      return real(parts.im);
    case 'abs':
      return real(isZeroExpr(parts.im) ? callOf('abs', parts.re) : sqrtExpr(squaredSize(parts)));
    case 'exp':
      return exponential(parts);
    case 'sin':
    case 'cos':
      return isZeroExpr(parts.im) ? real({ ...expr, args: [parts.re] }) : null;
    case 'degrees':
      return isZeroExpr(parts.im) ? real({ ...expr, args: [parts.re] }) : null;
    default:
      return null;
  }
}
