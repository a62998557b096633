import { sameExpr } from '../../../shared/maths/same.ts';
import { printExpr } from '../../../shared/maths/print.ts';
import { commonFactors } from '../slips/relations.ts';
import type { Candidate } from './edits.ts';
import type { MendQuestion } from './mend-question.ts';

/** Divided by a factor that can be zero: the case in which it is, beside what was left. */
export function* lostCases({ above, line, tex }: MendQuestion): Generator<Candidate> {
  if (above.kind !== 'relation' || above.sign !== '=' || line.kind !== 'relation' || line.sign !== '=') return;
  for (const factor of commonFactors(above.left, above.right, sameExpr)) {
    const own = `${printExpr(factor)}=0`;
    const edit =
      factor.kind === 'letter'
        ? { start: 0, end: 0, text: `${own}\\text{ or }` }
        : { start: tex.length, end: tex.length, text: `\\text{ or }${own}` };
    yield { edits: [edit], cost: 1.3, touchesRight: false };
  }
}
