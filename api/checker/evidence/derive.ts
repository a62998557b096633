import type { Expr, FunctionName } from '../../../shared/maths/expression.ts';
import { lettersOf } from '../../../shared/maths/letters.ts';
import { call, letter, neg, power, product, quotient, root, sum, termsOf, whole } from './build.ts';

/** The derivative by the rules of a first course, lightly tidied; null for what they do not cover. */
export function derive(expr: Expr, by: string): Expr | null {
  if (!lettersOf(expr).includes(by)) return whole(0);
  switch (expr.kind) {
    case 'letter':
      return whole(1);
    case 'sum':
      return deriveSum(expr, by);
    case 'product':
      return deriveProduct(expr.factors, by);
    case 'quotient':
      return deriveQuotient(expr.numerator, expr.denominator, by);
    case 'power':
      return derivePower(expr.base, expr.exponent, by);
    case 'root': {
      if (expr.degree) return null;
      const inner = derive(expr.radicand, by);
      return inner && quotient(inner, product(whole(2), root(expr.radicand)));
    }
    case 'log': {
      const inner = derive(expr.argument, by);
      return inner && quotient(inner, product(expr.argument, call('ln', expr.base ?? whole(10))));
    }
    case 'call': {
      const [argument] = expr.args;
      const outer = argument && expr.args.length === 1 ? derivativeOf(expr.name, argument) : null;
      const inner = argument && derive(argument, by);
      return outer && inner ? product(inner, outer) : null;
    }
    default:
      return null;
  }
}

function deriveSum(expr: Extract<Expr, { kind: 'sum' }>, by: string): Expr | null {
  const parts: Expr[] = [];
  for (const { sign, expr: part } of expr.terms) {
    const derived = sign === 'plus' || sign === 'minus' ? derive(part, by) : null;
    if (!derived) return null;
    if (derived.kind !== 'number' || derived.numerator !== 0n)
      parts.push(sign === 'minus' ? negTerms(derived) : derived);
  }
  return sum(...parts);
}

function negTerms(expr: Expr): Expr {
  return expr.kind === 'sum' && expr.terms.length > 1
    ? sum(...termsOf(expr).map((t) => (t.sign === 'minus' ? t.expr : neg(t.expr))))
    : neg(expr);
}

export function deriveProduct(factors: readonly Expr[], by: string): Expr | null {
  const parts: Expr[] = [];
  for (const [k, factor] of factors.entries()) {
    const derived = derive(factor, by);
    if (!derived) return null;
    if (derived.kind === 'number' && derived.numerator === 0n) continue;
    parts.push(product(...factors.map((other, at) => (at === k ? derived : other))));
  }
  return sum(...parts);
}

function deriveQuotient(top: Expr, bottom: Expr, by: string): Expr | null {
  const [up, down] = [derive(top, by), derive(bottom, by)];
  if (!up || !down) return null;
  if (down.kind === 'number' && down.numerator === 0n) return quotient(up, bottom);
  return quotient(sum(product(up, bottom), neg(product(top, down))), power(bottom, whole(2)));
}

function derivePower(base: Expr, exponent: Expr, by: string): Expr | null {
  const inner = derive(base, by);
  const growth = derive(exponent, by);
  if (!inner || !growth) return null;
  const isConstant = growth.kind === 'number' && growth.numerator === 0n;
  if (isConstant) return product(exponent, power(base, lessOne(exponent)), inner);
  const self = power(base, exponent);
  const isFixed = inner.kind === 'number' && inner.numerator === 0n;
  if (isFixed)
    return base.kind === 'constant' && base.name === 'e'
      ? product(growth, self)
      : product(growth, self, call('ln', base));
  return product(self, sum(product(growth, call('ln', base)), quotient(product(exponent, inner), base)));
}

/** n - 1, worked out for whole numbers. */
export function lessOne(exponent: Expr): Expr {
  if (exponent.kind === 'number' && exponent.denominator === 1n) return whole(exponent.numerator - 1n);
  const [only] = exponent.kind === 'sum' && exponent.terms.length === 1 ? exponent.terms : [];
  if (only?.sign === 'minus' && only.expr.kind === 'number' && only.expr.denominator === 1n)
    return whole(-only.expr.numerator - 1n);
  return sum(exponent, neg(whole(1)));
}

/** The derivative of a function at its argument, without the inner one. */
export function derivativeOf(name: FunctionName, x: Expr): Expr | null {
  const square = power(x, whole(2));
  switch (name) {
    case 'sin':
      return call('cos', x);
    case 'cos':
      return neg(call('sin', x));
    case 'tan':
      return power(call('sec', x), whole(2));
    case 'cot':
      return neg(power(call('csc', x), whole(2)));
    case 'sec':
      return product(call('sec', x), call('tan', x));
    case 'csc':
      return neg(product(call('csc', x), call('cot', x)));
    case 'arcsin':
      return quotient(whole(1), root(sum(whole(1), neg(square))));
    case 'arccos':
      return neg(quotient(whole(1), root(sum(whole(1), neg(square)))));
    case 'arctan':
      return quotient(whole(1), sum(square, whole(1)));
    case 'sinh':
      return call('cosh', x);
    case 'cosh':
      return call('sinh', x);
    case 'ln':
      return quotient(whole(1), x);
    case 'exp':
      return call('exp', x);
    case 'degrees':
      return quotient({ kind: 'constant', name: 'pi', span: x.span }, whole(180));
    default:
      return null;
  }
}

/** An antiderivative by the table, for sums of multiples of powers and of functions of a x + b; null otherwise. */
export function integrate(expr: Expr, by: string): Expr | null {
  if (!lettersOf(expr).includes(by)) return product(expr, letter(by));
  switch (expr.kind) {
    case 'letter':
      return quotient(power(letter(by), whole(2)), whole(2));
    case 'sum':
      return integrateSum(expr, by);
    case 'product': {
      const moving = expr.factors.filter((factor) => lettersOf(factor).includes(by));
      const fixed = expr.factors.filter((factor) => !moving.includes(factor));
      const [only] = moving;
      const inner = only && moving.length === 1 ? integrate(only, by) : null;
      return inner && product(...fixed, inner);
    }
    case 'quotient':
      return integrateQuotient(expr.numerator, expr.denominator, by);
    case 'power':
      return integratePower(expr, by);
    case 'root':
      return expr.degree
        ? null
        : integratePower(
            { kind: 'power', base: expr.radicand, exponent: quotient(whole(1), whole(2)), span: expr.span },
            by,
          );
    case 'call':
      return integrateCall(expr, by);
    default:
      return null;
  }
}

function integrateSum(expr: Extract<Expr, { kind: 'sum' }>, by: string): Expr | null {
  const parts: Expr[] = [];
  for (const { sign, expr: part } of expr.terms) {
    const found = sign === 'plus' || sign === 'minus' ? integrate(part, by) : null;
    if (!found) return null;
    parts.push(sign === 'minus' ? neg(found) : found);
  }
  return sum(...parts);
}

/** The slope of a x + b, null for anything else. */
export function slopeOf(expr: Expr, by: string): Expr | null {
  const slope = derive(expr, by);
  return slope && !lettersOf(slope).includes(by) ? slope : null;
}

function integrateQuotient(top: Expr, bottom: Expr, by: string): Expr | null {
  if (!lettersOf(bottom).includes(by)) {
    const inner = integrate(top, by);
    return inner && quotient(inner, bottom);
  }
  if (lettersOf(top).includes(by)) return null;
  if (bottom.kind === 'root' && !bottom.degree) {
    const slope = slopeOf(bottom.radicand, by);
    return slope && product(top, quotient(product(whole(2), bottom), slope));
  }
  if (bottom.kind === 'power' && bottom.exponent.kind === 'number') {
    const inner = integratePower({ ...bottom, exponent: neg(bottom.exponent) }, by);
    return inner && product(top, inner);
  }
  const slope = slopeOf(bottom, by);
  return slope && product(top, quotient(call('ln', call('abs', bottom)), slope));
}

function integratePower(expr: Extract<Expr, { kind: 'power' }>, by: string): Expr | null {
  const { base, exponent } = expr;
  if (!lettersOf(base).includes(by)) {
    const slope = slopeOf(exponent, by);
    if (!slope) return null;
    const isE = base.kind === 'constant' && base.name === 'e';
    return quotient(expr, isE ? slope : product(slope, call('ln', base)));
  }
  const slope = slopeOf(base, by);
  if (!slope || lettersOf(exponent).includes(by)) return null;
  const next = lessOne(neg(exponent));
  const raised = neg(next);
  if (raised.kind === 'number' && raised.numerator === 0n) return quotient(call('ln', call('abs', base)), slope);
  return quotient(power(base, raised), product(raised, slope));
}

function integrateCall(expr: Extract<Expr, { kind: 'call' }>, by: string): Expr | null {
  const [x] = expr.args;
  const slope = x && slopeOf(x, by);
  if (!x || !slope) return null;
  const table: Partial<Record<FunctionName, Expr>> = {
    sin: neg(call('cos', x)),
    cos: call('sin', x),
    exp: expr,
    sinh: call('cosh', x),
    cosh: call('sinh', x),
  };
  const found = table[expr.name];
  return found ? quotient(found, slope) : null;
}
