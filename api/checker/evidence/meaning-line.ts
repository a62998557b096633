import type { Line } from '../../../shared/maths/expression.ts';
import type { Meaning } from '../rules/meaning.ts';
import type { WalkState } from '../walk-derivation.ts';
import type { Statement } from '../statements/statement.ts';

const span = { start: 0, end: 0 };

/** What a step starts from, as a line that stands nowhere in the text. */
export function meaningToLine(meaning: Meaning): Line | null {
  return meaning.kind === 'expression'
    ? { kind: 'expression', expr: meaning.expr, span }
    : statementToLine(meaning.statement);
}

/** What a derivation knows before a step, as lines. */
export function knownLines({ known }: Pick<WalkState, 'known'>): Line[] {
  return known.flatMap((statement) => statementToLine(statement) ?? []);
}

function statementToLine(statement: Statement): Line | null {
  switch (statement.kind) {
    case 'compare':
      return { kind: 'relation', left: statement.left, sign: statement.sign, right: statement.right, span };
    case 'all':
    case 'any': {
      const parts = statement.parts.map(statementToLine);
      return parts.includes(null)
        ? null
        : { kind: statement.kind, parts: parts.flatMap((part) => (part ? [part] : [])), span };
    }
    case 'member':
      return { kind: 'membership', letter: statement.letter, set: statement.set, negated: statement.negated, span };
    default:
      return null;
  }
}
