import { signAtPoint } from '../solving/point-value.ts';
import type { RealNumber } from '../solving/real-number.ts';
import { differenceGraph, isTrueFor, type SolveEnv } from './solve.ts';
import type { Statement } from './statement.ts';

export interface Truth {
  readonly isTrue: boolean;
  /** Whether exact arithmetic or certain digits say so; a number that is zero to 60 digits is not certain. */
  readonly certain: boolean;
}

/** Whether a statement is true at a point, by putting the point in; null where that cannot be told. */
export function truthAt(statement: Statement, at: RealNumber, env: SolveEnv): Truth | null {
  switch (statement.kind) {
    case 'always':
      return { isTrue: true, certain: true };
    case 'never':
      return { isTrue: false, certain: true };
    case 'all':
    case 'any':
      return joinTruths(statement, at, env);
    case 'compare': {
      if (statement.sign === 'approx') return null;
      const graph = differenceGraph(statement.left, statement.right, env);
      if (graph.nodes.some((node) => node.op === 'letter' && env.families.has(node.name))) return null;
      const found = signAtPoint(graph, env.letter, at, env.given, env.context);
      return found && { isTrue: isTrueFor(found.sign, statement.sign), certain: found.certain };
    }
    default:
      return null;
  }
}

function joinTruths(
  statement: Extract<Statement, { kind: 'all' | 'any' }>,
  at: RealNumber,
  env: SolveEnv,
): Truth | null {
  const wanted = statement.kind === 'any';
  let result: Truth | null = { isTrue: !wanted, certain: true };
  for (const part of statement.parts) {
    const truth = truthAt(part, at, env);
    if (truth?.isTrue === wanted && truth.certain) return truth;
    if (!truth || !result) result = null;
    else if (truth.isTrue === wanted) result = truth;
    else if (result.isTrue !== wanted) result = { isTrue: !wanted, certain: result.certain && truth.certain };
  }
  return result;
}
