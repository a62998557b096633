import { holdsMatrix, resolveMatrices, sameSize } from '../compare/matrices.ts';
import { exprsOfStatement, type CompareStatement, type Statement } from '../statements/statement.ts';
import type { StatementQuestion } from './statement-question.ts';

/**
 * The question with every equation of matrices as the equations of their entries, and determinants and products written
 * out; null where no line has a matrix, or an operation is not known.
 */
export function withEntries(question: StatementQuestion): StatementQuestion | null {
  const { above, below, known, reference, given } = question;
  if (![above, below, ...known].some(hasMatrix)) return null;
  const [a, b, r] = [above, below, reference].map(entrywise);
  const earlier = known.map(entrywise);
  if (!a || !b || !r || earlier.includes(null)) return null;
  return {
    ...question,
    above: a,
    below: b,
    reference: r,
    known: earlier as Statement[],
    given: given && entrywise(given),
  };
}

function hasMatrix(statement: Statement): boolean {
  return exprsOfStatement(statement).some(holdsMatrix);
}

function entrywise(statement: Statement): Statement | null {
  if (statement.kind === 'all' || statement.kind === 'any') {
    const parts = statement.parts.map(entrywise);
    return parts.includes(null) ? null : { kind: statement.kind, parts: parts as Statement[] };
  }
  return statement.kind === 'compare' && hasMatrix(statement) ? ofEntries(statement) : statement;
}

function ofEntries({ left, sign, right }: CompareStatement): Statement | null {
  const [a, b] = [resolveMatrices(left), resolveMatrices(right)];
  if (a?.kind === 'scalar' && b?.kind === 'scalar') return { kind: 'compare', left: a.expr, sign, right: b.expr };
  if (a?.kind !== 'matrix' || b?.kind !== 'matrix' || sign !== '=' || !sameSize(a.rows, b.rows)) return null;
  const others = b.rows.flat();
  const parts = a.rows.flat().flatMap((entry, k): Statement[] => {
    const other = others[k];
    return other ? [{ kind: 'compare', left: entry, sign, right: other }] : [];
  });
  return parts.length === 1 ? (parts[0] as Statement) : { kind: 'all', parts };
}
