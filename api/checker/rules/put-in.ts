import type { Expr } from '../../../shared/maths/expression.ts';
import { lettersOf } from '../../../shared/maths/letters.ts';
import { sameExpr } from '../../../shared/maths/same.ts';
import { childrenOf } from '../../../shared/maths/walk.ts';
import type { Statement } from '../statements/statement.ts';

/**
 * Whether a line is the one above with numbers in the place of some letters, `y=2(4)+3` after `y=2x+3`, or chooses a
 * number for one of them, `x=4` after `y=2x+3`: where the numbers come from is not said, so that the step is neither right
 * nor wrong.
 */
export function isPutIn(above: Statement, below: Statement): boolean {
  if (above.kind !== 'compare' || below.kind !== 'compare' || above.sign !== below.sign) return false;
  if (isChosen(above, below)) return true;
  const isPut = (left: Expr, right: Expr): boolean => {
    const values = new Map<string, Expr>();
    return matches(above.left, left, values) && matches(above.right, right, values) && values.size > 0;
  };
  return isPut(below.left, below.right) || (above.sign === '=' && isPut(below.right, below.left));
}

type Compare = Extract<Statement, { kind: 'compare' }>;

/** A letter of a formula, which says one letter by others, is set to a number. */
function isChosen(above: Compare, below: Compare): boolean {
  if (above.sign !== '=' || above.left.kind !== 'letter' || below.left.kind !== 'letter') return false;
  const others = lettersOf(above.right);
  if (others.length === 0 || others.includes(above.left.name) || lettersOf(below.right).length > 0) return false;
  return below.left.name === above.left.name || others.includes(below.left.name);
}

function matches(above: Expr, below: Expr, values: Map<string, Expr>): boolean {
  if (above.kind === 'letter' && lettersOf(below).length === 0) {
    const known = values.get(above.name);
    values.set(above.name, known ?? below);
    return known === undefined || sameExpr(known, below);
  }
  const [parts, others] = [childrenOf(above), childrenOf(below)];
  if (above.kind !== below.kind || parts.length !== others.length) return false;
  if (parts.length === 0) return sameExpr(above, below);
  if (above.kind === 'sum' && below.kind === 'sum') {
    if (above.terms.some(({ sign }, k) => sign !== below.terms[k]?.sign)) return false;
  }
  return parts.every((part, k) => matches(part, others[k] as Expr, values));
}
