import type { Line } from '../../../shared/maths/expression.ts';
import { fraction, isZero, letter, neg, sum, whole } from '../evidence/build.ts';
import * as Q from '../numbers/rational.ts';
import { factorsOf } from '../slips/match.ts';
import { any, mirrored, relation, signedTerms, type Relation } from '../slips/relations.ts';
import { factoredForm } from './next-expression.ts';
import { coefficientsOf, polynomialExpr, rationalRoots } from './polynomial-parts.ts';

const span = { start: 0, end: 0 };

/**
 * The next line of a quadratic inequality: all of it on the left, the square with a positive number, in factors, and the
 * interval between the roots or the two outside of them. Null for anything else.
 */
export function nextOfQuadraticOrder(line: Relation, name: string): Line | null {
  const { left, sign, right } = line;
  const coefficients = coefficientsOf(sum(left, ...signedTerms(right).map(neg)), name);
  const lead = coefficients?.[2];
  if (coefficients?.length !== 3 || !lead || sign === '=' || sign === '!=' || sign === 'approx') return null;
  if (!isZero(right)) return relation(polynomialExpr(coefficients, name), sign, whole(0));
  if (Q.sign(lead) < 0) return relation(polynomialExpr(coefficients.map(Q.negate), name), mirrored(sign), whole(0));
  const roots = rationalRoots(coefficients);
  const [low, high] = [...roots].sort((a, b) => Q.compare(a, b));
  if (!low || !high || roots.length !== 2 || Q.equals(low, high)) return null;
  const isFactored = factorsOf(left).some((factor) => factor.kind === 'sum' && factor.terms.length > 1);
  if (!isFactored || left.kind === 'sum') return relation(factoredForm(coefficients, name), sign, whole(0));
  const [x, a, b] = [letter(name), fraction(low), fraction(high)];
  if (sign === '<' || sign === '<=') return { kind: 'chain', members: [a, x, b], signs: [sign, sign], span };
  return any([relation(x, sign === '>' ? '<' : '<=', a), relation(x, sign, b)]);
}
