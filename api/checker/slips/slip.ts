import type { Expr, Line } from '../../../shared/maths/expression.ts';
import type { SlipKind } from '../../../shared/schemas/finding.ts';
import type { CheckContext } from '../context.ts';
import { rule, type Rewrite } from './rewrite.ts';

/** A documented mistake: a wrong rule that, used once on the line above, gives the line below. */
export interface Slip {
  /** The name in words joined by hyphens. */
  readonly id: string;
  readonly name: string;
  readonly kind: SlipKind;
  /** Where it is described; `memory` for what teachers know from practice. */
  readonly source: string;
  /** Of several that fit, the highest is named; 5 for most, less for what explains nearly anything. */
  readonly rank: number;
  /** Also looked for after brackets were multiplied out and like terms joined. */
  readonly alsoExpanded?: boolean;
  /** What becomes of a part of an expression. */
  readonly rewrites?: readonly Rewrite[];
  /** What becomes of a whole statement: lines that the line below would then follow from. */
  readonly lines?: (above: Line, below: Line, context: CheckContext) => Iterable<Line>;
  /** What becomes of a whole expression, for mistakes that show only in the line below. */
  readonly whole?: (above: Expr, below: Expr, context: CheckContext) => Iterable<Expr>;
}

export const memory = 'common practice, from memory';

type Parts = Partial<Pick<Slip, 'rank' | 'rewrites' | 'lines' | 'whole'>>;

export function slip(name: string, kind: SlipKind, source: string, parts: Parts): Slip {
  const id = name
    .toLowerCase()
    .replace(/[^a-z0-9]+/g, '-')
    .replace(/^-|-$/g, '');
  return { id, name, kind, source, rank: 5, ...parts };
}

/** A slip that is one or more wrong rules written as `from -> to`. */
export function ruled(name: string, kind: SlipKind, source: string, rules: readonly string[], rank = 5): Slip {
  return slip(name, kind, source, { rank, rewrites: rules.map(toRule) });
}

export function toRule(text: string): Rewrite {
  const [from, to] = text.split('->');
  return rule(from?.trim() ?? '', to?.trim() ?? '');
}
