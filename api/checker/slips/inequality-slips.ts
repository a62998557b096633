import type { Expr, Line, RelationSign } from '../../../shared/maths/expression.ts';
import { lettersOf } from '../../../shared/maths/letters.ts';
import { neg, product, root, whole } from '../evidence/build.ts';
import { real } from '../evidence/complex-double.ts';
import { estimate } from '../evidence/estimate.ts';
import { factorsOf } from './match.ts';
import { any, bothWays, mirrored, relation, type Relation } from './relations.ts';
import { memory, slip, type Slip } from './slip.ts';

const tsamir = 'Tsamir & Bazzini 2004 (from memory)';
const noDefinitions = { letters: new Map(), functions: new Map() };

export function isOrder(sign: RelationSign): boolean {
  return sign !== '=' && sign !== '!=' && sign !== 'approx';
}

/** Growth of left minus right from one place to another; its sign tells whether both sides were multiplied by a negative. */
function slopeSign(line: Relation): number {
  const [name] = [...lettersOf(line.left), ...lettersOf(line.right)];
  const at = (x: number): number => {
    const place = { letters: new Map(name ? [[name, real(x)]] : []), definitions: noDefinitions };
    return estimate(line.left, place).re - estimate(line.right, place).re;
  };
  return Math.sign(at(3) - at(2));
}

/** The sign of the line above turned round, where the two lines are (or are not) a negative multiple of each other. */
function turned(wantsNegative: boolean): (above: Line, below: Line) => Generator<Line> {
  return function* lines(above, below) {
    if (above.kind !== 'relation' || below.kind !== 'relation' || !isOrder(above.sign) || !isOrder(below.sign)) return;
    const isNegative = slopeSign(above) * slopeSign(below) < 0;
    if (isNegative === wantsNegative) yield relation(above.left, mirrored(above.sign), above.right);
  };
}

function* rooted(above: Line): Generator<Line> {
  for (const { left, sign, right } of bothWays(above)) {
    const isSquare = left.kind === 'power' && left.exponent.kind === 'number' && left.exponent.numerator === 2n;
    if (!isOrder(sign) || !isSquare) continue;
    yield relation(left.base, sign, root(right));
    const less = sign === '<' || sign === '<=';
    if (!less) yield any([relation(left.base, sign, root(right)), relation(left.base, sign, neg(root(right)))]);
  }
}

function* multipliedThrough(above: Line): Generator<Line> {
  for (const { left, sign, right } of bothWays(above)) {
    if (isOrder(sign) && left.kind === 'quotient' && lettersOf(left.denominator).length > 0) {
      yield relation(left.numerator, sign, product(right, left.denominator));
    }
  }
}

/** AB > 0 read as A > 0 and B > 0; with or as a milder form. */
function* factorByFactor(above: Line): Generator<Line> {
  for (const { left, sign, right } of bothWays(above)) {
    const factors = factorsOf(left).filter((factor) => lettersOf(factor).length > 0);
    if (!isOrder(sign) || factors.length < 2) continue;
    const parts = factors.map((factor) => relation(factor, sign, right));
    yield { kind: 'all', parts, span: above.span };
    yield any(parts);
  }
}

/** |A| < k read as A < k, |A| = k as A = k. */
function* oneCase(above: Line): Generator<Line> {
  for (const { left, sign, right } of bothWays(above)) {
    const [inner] = left.kind === 'call' && left.name === 'abs' ? left.args : [];
    if (inner) yield relation(inner as Expr, sign, right);
  }
}

/** Strict for not strict or the other way round. */
function* otherStrictness(above: Line): Generator<Line> {
  if (above.kind !== 'relation') return;
  const other: Partial<Record<RelationSign, RelationSign>> = { '<': '<=', '<=': '<', '>': '>=', '>=': '>' };
  const sign = other[above.sign];
  if (sign) yield relation(above.left, sign, above.right);
}

/** 0 on the right, so that a product of two sides is looked at. */
function* zeroProduct(above: Line): Generator<Line> {
  if (above.kind !== 'relation' || !isOrder(above.sign)) return;
  const factors = factorsOf(above.left).filter((factor) => lettersOf(factor).length > 0);
  if (factors.length < 2) return;
  yield any(factors.map((factor) => relation(factor, '=', whole(0))));
}

export const inequalitySlips: readonly Slip[] = [
  slip('the inequality was not reversed on dividing by a negative', 'both-sides', memory, {
    rank: 7,
    lines: turned(true),
  }),
  slip('the inequality was reversed when nothing negative was divided by', 'both-sides', memory, {
    rank: 6,
    lines: turned(false),
  }),
  slip('the square root of an inequality was taken as of an equation', 'solutions', memory, { rank: 7, lines: rooted }),
  slip('an inequality was multiplied by an expression of unknown sign', 'both-sides', tsamir, {
    rank: 7,
    lines: multipliedThrough,
  }),
  slip('the zero-product rule was used with an inequality', 'solutions', tsamir, {
    rank: 7,
    *lines(above) {
      yield* factorByFactor(above);
      yield* zeroProduct(above);
    },
  }),
  slip('only one case of an absolute value was taken', 'solutions', memory, { rank: 7, lines: oneCase }),
  slip('a strict inequality and one that is not were exchanged', 'copying', memory, {
    rank: 5,
    lines: otherStrictness,
  }),
];
