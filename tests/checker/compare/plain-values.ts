import type { Expr } from '../../../shared/maths/expression.ts';

/**
 * The value of an expression in doubles by its own short recursion, independent of the checker: NaN where it has none.
 * Tests use it as a second opinion.
 */
export function plainValue(expr: Expr, at: Readonly<Record<string, number>>): number {
  const of = (part: Expr): number => plainValue(part, at);
  switch (expr.kind) {
    case 'number':
      return Number(expr.numerator) / Number(expr.denominator);
    case 'letter':
      return at[expr.name] ?? Number.NaN;
    case 'constant':
      return expr.name === 'pi' ? Math.PI : expr.name === 'e' ? Math.E : Number.NaN;
    case 'sum':
      return expr.terms.reduce((sum, term) => sum + (term.sign === 'minus' ? -1 : 1) * of(term.expr), 0);
    case 'product':
      return expr.factors.reduce((product, factor) => product * of(factor), 1);
    case 'quotient': {
      const bottom = of(expr.denominator);
      return bottom === 0 ? Number.NaN : of(expr.numerator) / bottom;
    }
    case 'power':
      return plainPower(of(expr.base), expr.exponent, of(expr.exponent));
    case 'root':
      return plainRoot(of(expr.radicand), expr.degree === null ? 2 : of(expr.degree));
    case 'log':
      return Math.log(of(expr.argument)) / Math.log(expr.base === null ? 10 : of(expr.base));
    case 'call':
      return plainCall(expr.name, expr.args.map(of));
    case 'factorial':
      return factorial(of(expr.operand));
    case 'binomial': {
      const [n, k] = [of(expr.top), of(expr.bottom)];
      return k > n ? 0 : factorial(n) / (factorial(k) * factorial(n - k));
    }
    default:
      return Number.NaN;
  }
}

function plainPower(base: number, exponent: Expr, value: number): number {
  const odd =
    exponent.kind === 'quotient' &&
    exponent.denominator.kind === 'number' &&
    exponent.denominator.numerator % 2n === 1n;
  if (base >= 0 || Number.isInteger(value) || !odd) return base ** value;
  const top = exponent.numerator.kind === 'number' && exponent.numerator.numerator % 2n === 0n ? 1 : -1;
  return top * (-base) ** value;
}

function plainRoot(radicand: number, degree: number): number {
  return radicand < 0 && degree % 2 === 1 ? -((-radicand) ** (1 / degree)) : radicand ** (1 / degree);
}

function factorial(n: number): number {
  if (!Number.isInteger(n) || n < 0) return Number.NaN;
  return n < 2 ? 1 : n * factorial(n - 1);
}

function plainCall(name: string, args: readonly number[]): number {
  const [a = Number.NaN] = args;
  const known: Readonly<Record<string, (x: number) => number>> = {
    sin: Math.sin,
    cos: Math.cos,
    tan: Math.tan,
    exp: Math.exp,
    ln: Math.log,
    abs: Math.abs,
    floor: Math.floor,
    ceil: Math.ceil,
    cot: (x) => 1 / Math.tan(x),
    sec: (x) => 1 / Math.cos(x),
    csc: (x) => 1 / Math.sin(x),
    arcsin: Math.asin,
    arccos: Math.acos,
    arctan: Math.atan,
    sinh: Math.sinh,
    cosh: Math.cosh,
    tanh: Math.tanh,
    arsinh: Math.asinh,
    arcosh: Math.acosh,
    artanh: Math.atanh,
    degrees: (x) => (x * Math.PI) / 180,
    sign: Math.sign,
  };
  if (name === 'max') return Math.max(...args);
  if (name === 'min') return Math.min(...args);
  return known[name]?.(a) ?? Number.NaN;
}
