import type { Expr } from '../../../shared/maths/expression.ts';
import type { CheckContext } from '../context.ts';
import * as Q from '../numbers/rational.ts';
import type { Rational } from '../numbers/rational.ts';
import { charge } from '../numbers/work.ts';
import { reduceFraction, toFraction } from '../solving/fraction.ts';
import { dividePolynomials, type Polynomial } from '../solving/polynomial.ts';
import { isolateRealRoots } from '../solving/real-roots.ts';
import { squareFreePart } from '../solving/polynomial.ts';
import { prepare } from '../values/evaluate.ts';
import {
  addExprs,
  callOf,
  divExprs,
  letterOf,
  mulExprs,
  numberOf,
  powExprs,
  rationalExpr,
  sqrtExpr,
  subExprs,
} from './build.ts';

/** A quotient of polynomials with fractions for coefficients, by partial fractions; null where a factor is out of reach. */
export function integrateRational(expr: Expr, letter: string, context: CheckContext): Expr | null {
  const fraction = toFraction(prepare(expr, context), letter);
  if (!fraction) return null;
  const { num, den } = reduceFraction(fraction);
  if (num.length === 0) return numberOf(0);
  const parts = splitDenominator(den);
  if (!parts) return null;
  const { quotient, rest } = divided(num, den);
  const proper = shapesOf(parts);
  const found = proper.length > 0 ? solveParts(rest, den, proper) : [];
  if (!found) return null;
  const shapes = [...quotient.map((_, exponent): Shape => ({ kind: 'power', exponent })), ...proper];
  const coefs = [...quotient, ...found];
  const x = letterOf(letter);
  return addExprs(
    ...shapes.flatMap((shape, k) =>
      Q.isZero(coefs[k] as Rational) ? [] : [integrateShape(shape, coefs[k] as Rational, x)],
    ),
  );
}

interface Parts {
  readonly roots: readonly { readonly at: Rational; readonly times: number }[];
  readonly quadratic: readonly [Rational, Rational, Rational] | null;
}

/** Rational roots with their multiplicities, and at most one quadratic without any. */
function splitDenominator(den: Polynomial): Parts | null {
  let rest = den;
  const roots: { at: Rational; times: number }[] = [];
  const found = den.length > 1 ? isolateRealRoots(squareFreePart(den)) : [];
  for (const { low, high } of found) {
    if (!Q.equals(low, high)) continue;
    let times = 0;
    for (;;) {
      const next = dividePolynomials(rest, [-low.num, low.den]);
      if (!next) break;
      rest = next;
      times += 1;
    }
    roots.push({ at: low, times });
  }
  if (rest.length === 1) return { roots, quadratic: null };
  if (rest.length !== 3) return null;
  const [c, b, a] = rest.map((value) => Q.rational(value)) as [Rational, Rational, Rational];
  return { roots, quadratic: [c, b, a] };
}

type Shape =
  | { readonly kind: 'power'; readonly exponent: number }
  | { readonly kind: 'root'; readonly at: Rational; readonly times: number }
  | { readonly kind: 'quadratic'; readonly of: readonly [Rational, Rational, Rational]; readonly top: 0 | 1 };

/** The polynomial part and what is left of the numerator, lowest powers first. */
function divided(num: Polynomial, den: Polynomial): { quotient: Rational[]; rest: Rational[] } {
  const rest = num.map((coef) => Q.rational(coef));
  const quotient: Rational[] = [];
  for (let shift = num.length - den.length; shift >= 0; shift -= 1) {
    const factor = Q.div(rest[shift + den.length - 1] as Rational, Q.rational(den[den.length - 1] as bigint));
    charge(den.length);
    quotient[shift] = factor;
    den.forEach((coef, k) => {
      rest[k + shift] = Q.sub(rest[k + shift] as Rational, Q.mul(factor, Q.rational(coef)));
    });
  }
  return { quotient, rest: rest.slice(0, den.length - 1) };
}

/** Those of a proper fraction. */
function shapesOf({ roots, quadratic }: Parts): Shape[] {
  const poles = roots.flatMap(({ at, times }) =>
    Array.from({ length: times }, (_, k): Shape => ({ kind: 'root', at, times: k + 1 })),
  );
  const rest: Shape[] = quadratic
    ? [
        { kind: 'quadratic', of: quadratic, top: 0 },
        { kind: 'quadratic', of: quadratic, top: 1 },
      ]
    : [];
  return [...poles, ...rest];
}

function shapeAt(shape: Shape, x: Rational): Rational | null {
  switch (shape.kind) {
    case 'power':
      return Q.pow(x, shape.exponent);
    case 'root': {
      const distance = Q.sub(x, shape.at);
      return Q.isZero(distance) ? null : Q.pow(distance, -shape.times);
    }
    case 'quadratic': {
      const [c, b, a] = shape.of;
      const bottom = Q.add(c, Q.mul(x, Q.add(b, Q.mul(a, x))));
      return Q.isZero(bottom) ? null : Q.div(shape.top === 1 ? x : Q.one, bottom);
    }
  }
}

function valueAt(p: readonly Rational[], x: Rational): Rational {
  return p.reduceRight((total, coef) => Q.add(Q.mul(total, x), coef), Q.zero);
}

/** The coefficients, from the values at as many points. */
function solveParts(num: readonly Rational[], den: Polynomial, shapes: readonly Shape[]): Rational[] | null {
  const rows: Rational[][] = [];
  const below = den.map((coef) => Q.rational(coef));
  for (let k = 0; rows.length < shapes.length && k < 400; k += 1) {
    const x = Q.rational(k % 2 === 0 ? k / 2 : -(k + 1) / 2);
    const bottom = valueAt(below, x);
    const values = shapes.map((shape) => shapeAt(shape, x));
    if (Q.isZero(bottom) || values.includes(null)) continue;
    rows.push([...(values as Rational[]), Q.div(valueAt(num, x), bottom)]);
  }
  return eliminate(rows, shapes.length);
}

/** Gaussian elimination; null where the rows do not decide. */
export function eliminate(rows: Rational[][], size: number): Rational[] | null {
  for (let column = 0; column < size; column += 1) {
    const pivot = rows.findIndex((row, k) => k >= column && !Q.isZero(row[column] as Rational));
    if (pivot < 0) return null;
    [rows[column], rows[pivot]] = [rows[pivot] as Rational[], rows[column] as Rational[]];
    const lead = rows[column] as Rational[];
    for (let k = 0; k < rows.length; k += 1) {
      const row = rows[k] as Rational[];
      if (k === column || Q.isZero(row[column] as Rational)) continue;
      charge(row.length / 2);
      const times = Q.div(row[column] as Rational, lead[column] as Rational);
      rows[k] = row.map((value, j) => Q.sub(value, Q.mul(times, lead[j] as Rational)));
    }
  }
  return Array.from({ length: size }, (_, k) =>
    Q.div((rows[k] as Rational[])[size] as Rational, (rows[k] as Rational[])[k] as Rational),
  );
}

function integrateShape(shape: Shape, coef: Rational, x: Expr): Expr {
  const times = rationalExpr(coef);
  switch (shape.kind) {
    case 'power':
      return mulExprs(times, divExprs(powExprs(x, numberOf(shape.exponent + 1)), numberOf(shape.exponent + 1)));
    case 'root': {
      const base = subExprs(x, rationalExpr(shape.at));
      if (shape.times === 1) return mulExprs(times, callOf('ln', callOf('abs', base)));
      return mulExprs(times, divExprs(powExprs(base, numberOf(1 - shape.times)), numberOf(1 - shape.times)));
    }
    case 'quadratic':
      return mulExprs(times, integrateQuadratic(shape.of, shape.top, x));
  }
}

/** x^top / (c + b x + a x^2). */
function integrateQuadratic([c, b, a]: readonly [Rational, Rational, Rational], top: 0 | 1, x: Expr): Expr {
  const linear = addExprs(mulExprs(rationalExpr(Q.mul(Q.rational(2), a)), x), rationalExpr(b));
  const d = Q.sub(Q.mul(b, b), Q.mul(Q.rational(4), Q.mul(a, c)));
  const root = sqrtExpr(rationalExpr(Q.absolute(d)));
  const plain =
    Q.sign(d) < 0
      ? divExprs(mulExprs(numberOf(2), callOf('arctan', divExprs(linear, root))), root)
      : divExprs(callOf('ln', callOf('abs', divExprs(subExprs(linear, root), addExprs(linear, root)))), root);
  if (top === 0) return plain;
  const whole = addExprs(
    rationalExpr(c),
    mulExprs(rationalExpr(b), x),
    mulExprs(rationalExpr(a), powExprs(x, numberOf(2))),
  );
  const log = mulExprs(rationalExpr(Q.div(Q.one, Q.mul(Q.rational(2), a))), callOf('ln', callOf('abs', whole)));
  return subExprs(log, mulExprs(rationalExpr(Q.div(b, Q.mul(Q.rational(2), a))), plain));
}
