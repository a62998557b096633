import type { Expr } from '../../../shared/maths/expression.ts';
import { lettersOf } from '../../../shared/maths/letters.ts';
import { call, letter, neg, power, product, quotient, sum, whole } from '../evidence/build.ts';
import { derive, integrate, slopeOf } from '../evidence/derive.ts';
import { substituteLetter } from '../evidence/substitute.ts';
import { memory, slip, type Slip } from './slip.ts';
import { needing, type Rewrite } from './rewrite.ts';

type Integral = Extract<Expr, { kind: 'integral' }>;
type WrongIntegral = (integrand: Expr, by: string) => Iterable<Expr | null>;

const orton = 'Orton 1983, Educ. Stud. Math. 14, integration / differentiation (from memory)';
const dawkins = 'Dawkins, Common Math Errors: Calculus Errors';

/** Antiderivatives in which the wrong rule was used on the whole or on one term of a sum. */
function* variants(integrand: Expr, by: string, wrong: WrongIntegral): Generator<Expr> {
  for (const found of wrong(integrand, by)) if (found) yield found;
  if (integrand.kind === 'product') {
    const fixed = integrand.factors.filter((factor) => !lettersOf(factor).includes(by));
    const moving = integrand.factors.filter((factor) => lettersOf(factor).includes(by));
    if (fixed.length > 0 && moving.length > 0) {
      for (const found of wrong(product(...moving), by)) if (found) yield product(...fixed, found);
    }
  }
  if (integrand.kind !== 'sum') return;
  for (const [k, term] of integrand.terms.entries()) {
    const others = integrand.terms.map((other) => integrate(other.expr, by));
    for (const found of variants(term.expr, by, wrong)) {
      const parts = integrand.terms.map((other, at) => ({
        sign: other.sign,
        expr: at === k ? found : (others[at] ?? null),
      }));
      if (parts.every(({ expr }) => expr !== null))
        yield sum(...parts.map(({ sign, expr }) => (sign === 'minus' ? neg(expr as Expr) : (expr as Expr))));
    }
  }
}

/** Indefinite: without a constant, which is dropped on the other side as well. Definite: from the lower to the upper limit. */
function onIntegrals(wrong: WrongIntegral): readonly Rewrite[] {
  return [
    needing('integral', function* rewrite(part) {
      if (part.kind !== 'integral') return;
      for (const found of variants(part.integrand, part.variable, wrong)) {
        if (!part.from || !part.to) yield found;
        else yield sum(at(found, part, part.to), neg(at(found, part, part.from)));
      }
    }),
  ];
}

function at(antiderivative: Expr, { variable }: Integral, value: Expr): Expr {
  return substituteLetter(antiderivative, variable, value);
}

/** What becomes of the limits, the antiderivative being right. */
function onLimits(join: (upper: Expr, lower: Expr) => Expr): readonly Rewrite[] {
  return [
    function* rewrite(part) {
      if (part.kind === 'integral' && part.from && part.to) {
        const found = integrate(part.integrand, part.variable);
        if (found) yield join(at(found, part, part.to), at(found, part, part.from));
      }
      const [only, ...others] = part.kind === 'evaluated' ? lettersOf(part.operand) : [];
      const name = part.kind === 'evaluated' ? (part.variable ?? (others.length === 0 ? only : null)) : null;
      if (part.kind === 'evaluated' && part.from && name) {
        yield join(substituteLetter(part.operand, name, part.to), substituteLetter(part.operand, name, part.from));
      }
    },
  ];
}

function* productOfIntegrals(integrand: Expr, by: string): Generator<Expr> {
  if (integrand.kind !== 'product' || integrand.factors.filter((factor) => lettersOf(factor).includes(by)).length < 2)
    return;
  const factors = integrand.factors.map((factor) => (lettersOf(factor).includes(by) ? integrate(factor, by) : factor));
  if (!factors.includes(null)) yield product(...(factors as Expr[]));
}

function* logOfAnything(integrand: Expr, by: string): Generator<Expr> {
  if (integrand.kind !== 'quotient' || lettersOf(integrand.numerator).includes(by)) return;
  yield product(integrand.numerator, call('ln', call('abs', integrand.denominator)));
}

function* logWithoutModulus(integrand: Expr, by: string): Generator<Expr> {
  if (integrand.kind !== 'quotient' || lettersOf(integrand.numerator).includes(by)) return;
  const slope = slopeOf(integrand.denominator, by);
  if (slope) yield product(quotient(integrand.numerator, slope), call('ln', integrand.denominator));
}

function innerOf(integrand: Expr): Expr | null {
  if (integrand.kind === 'power')
    return integrand.base.kind === 'letter'
      ? null
      : integrand.exponent.kind === 'number'
        ? integrand.base
        : integrand.exponent;
  const [inner] = integrand.kind === 'call' ? integrand.args : [];
  return inner && inner.kind !== 'letter' ? inner : null;
}

/** No letter of a line is called so. */
const stand = '\u25a1';

/** The antiderivative of the outer function, at the inner one. */
function outerIntegral(integrand: Expr, by: string): { outer: Expr; slope: Expr } | null {
  const inner = innerOf(integrand);
  const slope = inner && derive(inner, by);
  if (!inner || !slope) return null;
  const replaced: Expr =
    integrand.kind === 'power'
      ? integrand.base === inner
        ? { ...integrand, base: letter(stand) }
        : { ...integrand, exponent: letter(stand) }
      : integrand.kind === 'call'
        ? { ...integrand, args: [letter(stand)] }
        : integrand;
  const outer = integrate(replaced, stand);
  return outer && { outer: substituteLetter(outer, stand, inner), slope };
}

function* innerNotDivided(integrand: Expr, by: string): Generator<Expr> {
  const found = outerIntegral(integrand, by);
  if (found) yield found.outer;
}

function* dividedByInner(integrand: Expr, by: string): Generator<Expr> {
  const found = outerIntegral(integrand, by);
  if (found && lettersOf(found.slope).includes(by)) yield quotient(found.outer, found.slope);
}

function* differentiated(integrand: Expr, by: string): Generator<Expr | null> {
  yield derive(integrand, by);
}

function* wrongSign(integrand: Expr, by: string): Generator<Expr> {
  const found = integrand.kind === 'call' ? integrate(integrand, by) : null;
  if (found) yield neg(found);
}

/** The exponent raised, but not divided by: x^2 for the integral of x. */
function* raisedOnly(integrand: Expr, by: string): Generator<Expr> {
  if (integrand.kind === 'letter' && integrand.name === by) yield power(integrand, whole(2));
  if (integrand.kind === 'power' && integrand.exponent.kind === 'number') {
    const exponent = whole(integrand.exponent.numerator + 1n);
    yield power(integrand.base, exponent);
    yield quotient(power(integrand.base, exponent), integrand.exponent);
  }
}

function isReciprocal(expr: Expr): boolean {
  return expr.kind === 'quotient' || (expr.kind === 'power' && expr.exponent.kind === 'sum');
}

function hasZeroBelow(expr: Expr): boolean {
  return expr.kind === 'quotient' && expr.denominator.kind === 'number' && expr.denominator.numerator === 0n;
}

/** A value at all means that nobody looked for a pole: the antiderivative was put in at both ends. */
export const integralSlips: readonly Slip[] = [
  slip(
    'the integral of a product was taken as the product of the integrals',
    'calculus',
    `OpenStax Calculus, m53621 Antiderivatives, Example 2; ${dawkins}`,
    { rank: 7, rewrites: onIntegrals(productOfIntegrals) },
  ),
  slip('the power rule was used at exponent minus one', 'calculus', dawkins, {
    rank: 8,
    *whole(above, below) {
      if (above.kind === 'integral' && isReciprocal(above.integrand) && hasZeroBelow(below)) yield below;
    },
  }),
  slip('one over an expression was integrated to its logarithm', 'calculus', 'Dawkins, calculus errors', {
    rank: 6,
    rewrites: onIntegrals(logOfAnything),
  }),
  slip('the absolute value was dropped in a logarithm', 'calculus', 'Dawkins, calculus errors', {
    rank: 5,
    rewrites: onIntegrals(logWithoutModulus),
  }),
  slip('the inner derivative was not divided out', 'calculus', memory, {
    rank: 6,
    rewrites: onIntegrals(innerNotDivided),
  }),
  slip('an inner derivative that is not constant was divided out', 'calculus', memory, {
    rank: 7,
    rewrites: onIntegrals(dividedByInner),
  }),
  slip('the integrand was differentiated instead of integrated', 'calculus', orton, {
    rank: 7,
    rewrites: onIntegrals(differentiated),
  }),
  slip('a sign was wrong in the integral of a function', 'calculus', memory, {
    rank: 7.5,
    rewrites: onIntegrals(wrongSign),
  }),
  slip('the exponent was raised without dividing by it', 'calculus', memory, {
    rank: 5,
    rewrites: onIntegrals(raisedOnly),
  }),
  slip(
    'the constant of integration was left out',
    'calculus',
    'Schechter, The Most Common Errors in Undergraduate Mathematics (loss of constants of integration)',
    {
      rank: 6,
      *whole(above, below) {
        if (above.kind !== 'integral' || above.from || lettersOf(below).some((name) => /^[cCkK]$/.test(name))) return;
        const found = integrate(above.integrand, above.variable);
        if (found) yield found;
      },
    },
  ),
  slip('the lower limit was added instead of subtracted', 'calculus', orton, {
    rank: 6,
    rewrites: onLimits((upper, lower) => sum(upper, lower)),
  }),
  slip('the limits were put in the wrong way round', 'calculus', memory, {
    rank: 6,
    rewrites: onLimits((upper, lower) => sum(lower, neg(upper))),
  }),
  slip('an integral was taken across a pole', 'calculus', memory, {
    rank: 8,
    rewrites: onLimits((upper, lower) => sum(upper, neg(lower))),
  }),
];
