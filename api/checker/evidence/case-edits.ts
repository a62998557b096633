import { sameExpr } from '../../../shared/maths/same.ts';
import { printExpr } from '../../../shared/maths/print.ts';
import { commonFactors } from '../slips/relations.ts';
import { childrenOf } from '../../../shared/maths/walk.ts';
import type { Expr, RelationSign } from '../../../shared/maths/expression.ts';
import { isZero, neg } from './build.ts';
import type { Candidate } from './edits.ts';
import { outer, type MendQuestion } from './mend-question.ts';

/** Divided by a factor that can be zero: the case in which it is, beside what was left. */
export function* lostCases({ above, line, tex }: MendQuestion): Generator<Candidate> {
  if (above.kind !== 'relation' || above.sign !== '=' || line.kind !== 'relation' || line.sign !== '=') return;
  for (const factor of commonFactors(above.left, above.right, sameExpr)) {
    // The whole of a side is no factor of it.
    if (sameExpr(factor, above.left) || sameExpr(factor, above.right)) continue;
    const own = `${printExpr(factor)}=0`;
    const edit =
      factor.kind === 'letter'
        ? { start: 0, end: 0, text: `${own}\\text{ or }` }
        : { start: tex.length, end: tex.length, text: `\\text{ or }${own}` };
    yield { edits: [edit], cost: 1.3, touchesRight: false };
  }
}

const turned: Partial<Record<RelationSign, string>> = { '>': '<', '>=': '\\le ', '<': '<', '<=': '\\le ' };

/** Only one case of an absolute value or a square below an inequality: the other beside it. */
export function* otherCases({ above, line, tex }: MendQuestion): Generator<Candidate> {
  if (above.kind !== 'relation' || line.kind !== 'relation' || line.left.kind === 'letter') return;
  const text = turned[line.sign];
  if (!text || isZero(line.right) || ![above.left, above.right].some(hasTwoCases)) return;
  const [left, right] = [tex.slice(outer(line.left).start, outer(line.left).end), printExpr(neg(line.right))];
  const isBetween = line.sign === '<' || line.sign === '<=';
  const at = isBetween ? outer(line.left).start : tex.length;
  yield {
    edits: [{ start: at, end: at, text: isBetween ? `${right}${text}` : `\\text{ or }${left}${text}${right}` }],
    cost: 1.2,
    touchesRight: false,
  };
}

/** Bars or an even power. */
export function hasTwoCases(expr: Expr): boolean {
  if (expr.kind === 'call' && expr.name === 'abs') return true;
  const { kind } = expr;
  const isEven = kind === 'power' && expr.exponent.kind === 'number' && expr.exponent.numerator % 2n === 0n;
  return isEven || childrenOf(expr).some(hasTwoCases);
}
