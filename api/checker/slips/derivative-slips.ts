import type { Expr } from '../../../shared/maths/expression.ts';
import { lettersOf } from '../../../shared/maths/letters.ts';
import { call, isZero, letter, neg, power, product, quotient, sum, termsOf, whole } from '../evidence/build.ts';
import { derivativeOf, derive, lessOne } from '../evidence/derive.ts';
import { needing, type Rewrite } from './rewrite.ts';
import { memory, slip, type Slip } from './slip.ts';

/** What a wrong rule makes of the derivative of one part. */
type WrongDerivative = (part: Expr, by: string) => Iterable<Expr>;

/** Derivatives in which the wrong rule was used once, at any part, and the right rules elsewhere. */
function* variants(expr: Expr, by: string, wrong: WrongDerivative): Generator<Expr> {
  yield* wrong(expr, by);
  if (expr.kind === 'sum') {
    for (const [k, term] of expr.terms.entries()) {
      const others = expr.terms.map((other) => derive(other.expr, by));
      if (others.includes(null)) continue;
      for (const changed of variants(term.expr, by, wrong)) {
        yield sum(...expr.terms.map((other, at) => withSign(other.sign, at === k ? changed : (others[at] as Expr))));
      }
    }
  }
  if (expr.kind === 'product') {
    const right = expr.factors.map((factor) => derive(factor, by));
    if (right.includes(null)) return;
    for (const [k, factor] of expr.factors.entries()) {
      for (const changed of variants(factor, by, wrong)) {
        const parts = expr.factors.map((_, at) =>
          product(
            ...expr.factors.map((other, place) => (place !== at ? other : at === k ? changed : (right[at] as Expr))),
          ),
        );
        yield sum(...parts);
      }
    }
  }
}

function withSign(sign: string, expr: Expr): Expr {
  return sign === 'minus' ? neg(expr) : expr;
}

function onDerivatives(wrong: WrongDerivative): readonly Rewrite[] {
  return [
    needing('derivative', function* rewrite(part) {
      if (part.kind === 'derivative' && part.order === 1) yield* variants(part.operand, part.variable, wrong);
    }),
  ];
}

function* productOfDerivatives(part: Expr, by: string): Generator<Expr> {
  if (part.kind !== 'product') return;
  const factors = part.factors.map((factor) => (lettersOf(factor).includes(by) ? derive(factor, by) : factor));
  if (!factors.includes(null)) yield product(...(factors as Expr[]));
}

function* quotientOfDerivatives(part: Expr, by: string): Generator<Expr> {
  if (part.kind !== 'quotient') return;
  const [top, bottom] = [derive(part.numerator, by), derive(part.denominator, by)];
  if (top && bottom && !isZero(bottom)) yield quotient(top, bottom);
}

function* quotientInWrongOrder(part: Expr, by: string): Generator<Expr> {
  if (part.kind !== 'quotient') return;
  const right = derive(part, by);
  if (right) yield negated(right);
}

function negated(expr: Expr): Expr {
  return sum(...termsOf(expr).map((term) => (term.sign === 'minus' ? term.expr : neg(term.expr))));
}

/** Outer derivatives without inner ones, each at its own argument. */
function outerOf(part: Expr, by: string): { outer: Expr; inner: Expr; at: (x: Expr) => Expr } | null {
  if (part.kind === 'call' && part.args.length === 1) {
    const inner = part.args[0] as Expr;
    const outer = derivativeOf(part.name, inner);
    return outer && { outer, inner, at: (x) => derivativeOf(part.name, x) ?? outer };
  }
  if (part.kind !== 'power') return null;
  const { base, exponent } = part;
  if (lettersOf(base).includes(by)) {
    const at = (x: Expr): Expr => product(exponent, power(x, lessOne(exponent)));
    return { outer: at(base), inner: base, at };
  }
  if (!lettersOf(exponent).includes(by)) return null;
  const isE = base.kind === 'constant' && base.name === 'e';
  const at = (x: Expr): Expr => (isE ? power(base, x) : product(power(base, x), call('ln', base)));
  return { outer: at(exponent), inner: exponent, at };
}

function* withoutInner(part: Expr, by: string): Generator<Expr> {
  const found = outerOf(part, by);
  if (found && found.inner.kind !== 'letter') yield found.outer;
}

function* withInnerReplaced(part: Expr, by: string): Generator<Expr> {
  const found = outerOf(part, by);
  const inner = found && derive(found.inner, by);
  if (found && inner && found.inner.kind !== 'letter') yield found.at(inner);
}

function* inDegrees(part: Expr): Generator<Expr> {
  const [inner] = part.kind === 'call' ? part.args : [];
  if (part.kind === 'call' && inner?.kind === 'call' && inner.name === 'degrees') {
    const outer = derivativeOf(part.name, inner);
    if (outer) yield outer;
  }
}

function* powerRuleOnExponential(part: Expr, by: string): Generator<Expr> {
  if (part.kind !== 'power' || lettersOf(part.base).includes(by) || !lettersOf(part.exponent).includes(by)) return;
  yield product(part.exponent, power(part.base, lessOne(part.exponent)));
}

function* constantKept(part: Expr, by: string): Generator<Expr> {
  if (!lettersOf(part).includes(by) && (part.kind === 'number' || part.kind === 'letter' || part.kind === 'constant'))
    yield part;
}

function* signLost(part: Expr, by: string): Generator<Expr> {
  const names = ['cos', 'cot', 'csc', 'arccos', 'sin', 'tan'];
  if (part.kind !== 'call' || !names.includes(part.name)) return;
  const right = derive(part, by);
  if (right) yield negated(right);
}

/** -n x^{-n+1} for the derivative of x^{-n}. */
function* exponentRaised(part: Expr, by: string): Generator<Expr> {
  if (part.kind !== 'power' || !lettersOf(part.base).includes(by)) return;
  const inner = derive(part.base, by);
  const raised = neg(lessOne(neg(part.exponent)));
  if (inner && !lettersOf(part.exponent).includes(by)) yield product(part.exponent, power(part.base, raised), inner);
}

function* exponentKept(part: Expr, by: string): Generator<Expr> {
  if (part.kind === 'power' && lettersOf(part.base).includes(by) && !lettersOf(part.exponent).includes(by))
    yield product(part.exponent, part);
}

/** Another letter, a function of the variable by custom, differentiated as if by itself or as if fixed. */
function* otherLetterFixed(part: Expr, by: string): Generator<Expr> {
  for (const name of lettersOf(part)) {
    if (name === by || part.kind !== 'power') continue;
    const own = derive(part, name);
    if (own) yield own;
    yield whole(0);
    yield product(own ?? whole(0), letter(by));
  }
}

export const derivativeSlips: readonly Slip[] = [
  slip(
    'the derivative of a product was taken as the product of the derivatives',
    'calculus',
    `${memory}; Dawkins, Common Math Errors: Calculus Errors`,
    { rank: 7, rewrites: onDerivatives(productOfDerivatives) },
  ),
  slip(
    'the derivative of a quotient was taken as the quotient of the derivatives',
    'calculus',
    'Dawkins, Common Math Errors: Calculus Errors',
    { rank: 7, rewrites: onDerivatives(quotientOfDerivatives) },
  ),
  slip('the numerator of the quotient rule was in the wrong order', 'calculus', memory, {
    rank: 6,
    rewrites: onDerivatives(quotientInWrongOrder),
  }),
  slip('degrees were used where radians are needed', 'calculus', memory, {
    rank: 8,
    rewrites: onDerivatives(inDegrees),
  }),
  slip(
    'the inner derivative was left out',
    'calculus',
    'Clark et al. 1997, chain rule (from memory); common practice, from memory',
    { rank: 7, rewrites: onDerivatives(withoutInner) },
  ),
  slip('the inner function was replaced by its derivative', 'calculus', memory, {
    rank: 6,
    rewrites: onDerivatives(withInnerReplaced),
  }),
  slip('the power rule was used on an exponential', 'calculus', memory, {
    rank: 7,
    rewrites: onDerivatives(powerRuleOnExponential),
  }),
  slip(
    'a constant was kept on differentiating',
    'calculus',
    'Orton 1983, Educ. Stud. Math. 14, integration / differentiation (from memory)',
    { rank: 6, rewrites: onDerivatives(constantKept) },
  ),
  slip('a sign was lost in the derivative of a function', 'calculus', memory, {
    rank: 6,
    rewrites: onDerivatives(signLost),
  }),
  slip('the exponent was moved the wrong way on differentiating', 'calculus', memory, {
    rank: 6,
    rewrites: onDerivatives(exponentRaised),
  }),
  slip('the exponent was not lowered on differentiating', 'calculus', memory, {
    rank: 5,
    rewrites: onDerivatives(exponentKept),
  }),
  slip('another letter was treated as a constant in implicit differentiation', 'calculus', memory, {
    rank: 6,
    rewrites: onDerivatives(otherLetterFixed),
  }),
];
