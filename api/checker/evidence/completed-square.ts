import type { Line } from '../../../shared/maths/expression.ts';
import { lettersOf } from '../../../shared/maths/letters.ts';
import * as Q from '../numbers/rational.ts';
import type { Candidate } from './edits.ts';
import { numberText } from './leaf-edits.ts';
import { outer } from './mend-question.ts';
import { expanded, keyOf } from './monomials.ts';

const cost = 0.8;

/**
 * `(x-1)^2=8` below another quadratic equation in x: the square completed for that one. Null where the line is no such
 * square, or the equation above does not begin with one times the square.
 */
export function completedSquare(above: Line, below: Line): Candidate | null {
  if (above.kind !== 'relation' || below.kind !== 'relation' || above.sign !== '=' || below.sign !== '=') return null;
  const { left: square, right } = below;
  if (square.kind !== 'power' || square.base.kind !== 'sum' || lettersOf(right).length > 0) return null;
  const [first, second, ...more] = square.base.terms;
  if (!second || more.length > 0 || first?.expr.kind !== 'letter') return null;
  if (lettersOf(second.expr).length > 0) return null;
  const letter = first.expr.name;
  const [left, other] = [expanded(above.left), expanded(above.right)];
  if (!left || !other) return null;
  const coefficient = (key: string): Q.Rational => {
    const of = (terms: typeof left) => terms.find((term) => keyOf(term) === key)?.coefficient ?? Q.zero;
    return Q.sub(of(left), of(other));
  };
  if (!Q.equals(coefficient(`${letter}^2`), Q.one)) return null;
  const shift = Q.div(coefficient(`${letter}^1`), Q.rational(2));
  if (Q.isZero(shift)) return null;
  const value = Q.sub(Q.mul(shift, shift), coefficient(''));
  const text = `${shift.num < 0n ? '-' : '+'}${numberText(Q.absolute(shift))}`;
  return {
    edits: [
      { start: second.span.start, end: outer(second.expr).end, text },
      { ...outer(right), text: numberText(value) },
    ],
    cost,
    touchesRight: false,
  };
}
