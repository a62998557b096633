import type { Expr } from '../../../shared/maths/expression.ts';
import { sizeOf, real, isFiniteNumber } from '../evidence/complex-double.ts';
import { neg, quotient, whole } from '../evidence/build.ts';
import { derive } from '../evidence/derive.ts';
import { estimate } from '../evidence/estimate.ts';
import { substituteLetter } from '../evidence/substitute.ts';
import { needing, type Rewrite } from './rewrite.ts';
import { memory, slip, type Slip } from './slip.ts';

type Limit = Extract<Expr, { kind: 'limit' }>;

const nowhere = { letters: new Map(), functions: new Map() };

function onLimits(wrong: (limit: Limit) => Iterable<Expr>): readonly Rewrite[] {
  return [
    needing('limit', function* rewrite(part) {
      if (part.kind === 'limit') yield* wrong(part);
    }),
  ];
}

function vanishes(expr: Expr, { variable, to }: Limit): boolean {
  const place = estimate(to, { letters: new Map(), definitions: nowhere });
  const letters = new Map([[variable, place]]);
  const value = estimate(expr, { letters, definitions: nowhere });
  return isFiniteNumber(value) && sizeOf(value) < 1e-9;
}

function* zeroOverZero(limit: Limit): Generator<Expr> {
  const { operand } = limit;
  if (operand.kind !== 'quotient' || !vanishes(operand.numerator, limit) || !vanishes(operand.denominator, limit))
    return;
  yield whole(0);
  yield whole(1);
}

function* derivativesEverywhere(limit: Limit): Generator<Expr> {
  const { operand, variable, to } = limit;
  if (operand.kind !== 'quotient') return;
  if (vanishes(operand.numerator, limit) && vanishes(operand.denominator, limit)) return;
  const [top, bottom] = [derive(operand.numerator, variable), derive(operand.denominator, variable)];
  if (top && bottom) yield substituteLetter(quotient(top, bottom), variable, to);
}

/** A difference of two terms that both grow beyond all bounds. */
function* infinityMinusInfinity({ operand, variable, to }: Limit): Generator<Expr> {
  const isInfinite = to.kind === 'constant' && to.name === 'infinity';
  if (!isInfinite || operand.kind !== 'sum' || !operand.terms.some((term) => term.sign === 'minus')) return;
  const far = new Map([[variable, real(1e8)]]);
  const grows = operand.terms.filter(
    ({ expr }) => sizeOf(estimate(expr, { letters: far, definitions: nowhere })) > 1e3,
  );
  if (grows.length >= 2) yield whole(0);
}

function* signOfInfinity({ to, operand, variable }: Limit): Generator<Expr> {
  const value = substituteLetter(operand, variable, neg(to));
  if (to.kind === 'number') yield value;
}

export const limitSlips: readonly Slip[] = [
  slip('zero over zero was taken as zero or one', 'calculus', memory, { rank: 8, rewrites: onLimits(zeroOverZero) }),
  slip('derivatives were taken of a form that is not indeterminate', 'calculus', memory, {
    rank: 6,
    rewrites: onLimits(derivativesEverywhere),
  }),
  slip(
    'infinity minus infinity was taken as zero',
    'calculus',
    'Schechter, The Most Common Errors in Undergraduate Mathematics (jumping to conclusions about infinity)',
    { rank: 6, rewrites: onLimits(infinityMinusInfinity) },
  ),
  slip('the sign of the place of a limit was lost', 'calculus', memory, {
    rank: 3,
    rewrites: onLimits(signOfInfinity),
  }),
];
