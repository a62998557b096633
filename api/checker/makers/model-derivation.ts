import type { Expr, Line } from '../../../shared/maths/expression.ts';
import { lettersOf } from '../../../shared/maths/letters.ts';
import { printLine } from '../../../shared/maths/print.ts';
import { exprsOf } from '../../../shared/maths/walk.ts';
import type { Goal } from '../../../shared/schemas/verdict.ts';
import { isFiniteNumber } from '../evidence/complex-double.ts';
import { estimate, type Place } from '../evidence/estimate.ts';
import { listOf } from '../slips/may-follow.ts';
import { any } from '../slips/relations.ts';
import { nextExpression, type ExpressionAim } from './next-expression.ts';
import { nextStatement } from './next-statement.ts';
import { nextSystem } from './next-system.ts';

const mostLines = 14;
const longestLine = 400;

/** The lines that lead from a line to the goal by the rules of a first course; those after the line only. */
export function carryFrom(start: Line, goal: Goal): Line[] {
  const lines: Line[] = [];
  const seen = new Set([printLine(start)]);
  let line: Line | null = start;
  while (line && lines.length < mostLines) {
    line = nextLine(line, goal);
    const text = line ? printLine(line) : '';
    if (!line || seen.has(text) || text.length > longestLine) break;
    seen.add(text);
    lines.push(line);
  }
  const checked = rejectValues(start, lines[lines.length - 1] ?? start);
  return checked ? [...lines, checked] : lines;
}

function nextLine(line: Line, goal: Goal): Line | null {
  if (line.kind === 'expression') {
    const expr = nextExpression(line.expr, aimOf(goal));
    return expr && { ...line, expr };
  }
  if (line.kind === 'all') return nextSystem(line);
  const name = goal.kind === 'solved' ? goal.letter : exprsOf(line).flatMap((expr) => [...lettersOf(expr)])[0];
  return name ? nextStatement(line, name) : null;
}

function aimOf(goal: Goal): ExpressionAim {
  return goal.kind === 'expanded' || goal.kind === 'factored' ? goal.kind : 'simplified';
}

/** The values listed last without those that do not satisfy the first line; null where all of them do. */
function rejectValues(start: Line, last: Line): Line | null {
  const listed = listOf(last);
  if (!listed || start.kind !== 'relation') return null;
  const kept = listed.values.filter((value) => satisfies(start.left, start.right, listed.name, value));
  if (kept.length === listed.values.length) return null;
  const span = { start: 0, end: 0 };
  if (kept.length === 0) return { kind: 'none', span };
  const left: Expr = { kind: 'letter', name: listed.name, span };
  return any(kept.map((right) => ({ kind: 'relation', left, sign: '=', right, span })));
}

const noDefinitions = { letters: new Map(), functions: new Map() };

function satisfies(left: Expr, right: Expr, name: string, value: Expr): boolean {
  const at: Place = {
    letters: new Map([[name, estimate(value, { letters: new Map(), definitions: noDefinitions })]]),
    definitions: noDefinitions,
  };
  const [a, b] = [estimate(left, at), estimate(right, at)];
  if (!isFiniteNumber(a) || !isFiniteNumber(b)) return false;
  return Math.hypot(a.re - b.re, a.im - b.im) <= 1e-7 * (1 + Math.hypot(a.re, a.im));
}
