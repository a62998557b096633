import type { Expr, Line } from '../../../shared/maths/expression.ts';
import { lettersOf } from '../../../shared/maths/letters.ts';
import { readLine } from '../../../shared/maths/read.ts';
import type { Goal } from '../../../shared/schemas/verdict.ts';
import { letterNamed } from '../letter-named.ts';
import type { Meaning } from '../rules/meaning.ts';
import { isLetter, type Statement } from '../statements/statement.ts';
import type { Route, WalkState } from '../walk-derivation.ts';
import { isExpanded } from './expanded.ts';
import { isFactored } from './factored.ts';
import { layoutOf } from './layout.ts';

/** Whether the last line has the form that the task asks for; simplified is for the teacher to judge. */
export function isGoalReached(goal: Goal, last: WalkState, route: Route): boolean {
  const meaning = [...last.meanings].reverse().find((found) => found !== null) ?? null;
  switch (goal.kind) {
    case 'free':
    case 'simplified':
      return true;
    case 'expanded':
      return sidesOf(meaning).some(isExpanded);
    case 'factored':
      return sidesOf(meaning).some(isFactored);
    case 'solved':
      return meaning?.kind === 'statement' && isSolved(meaning.statement, letterNamed(goal.letter));
    case 'target':
      return isTarget(goal.target, route);
  }
}

/** The expression itself, or the last side of a relation. */
function sidesOf(meaning: Meaning | null): Expr[] {
  if (meaning?.kind === 'expression') return [meaning.expr];
  return meaning?.last ? [meaning.last] : [];
}

/** letter = expression without it, such lists, sets, inequalities of the letter alone, "no solution". */
export function isSolved(statement: Statement, letter: string): boolean {
  switch (statement.kind) {
    case 'compare':
      return (
        (isLetter(statement.left, letter) && !lettersOf(statement.right).includes(letter)) ||
        (isLetter(statement.right, letter) && !lettersOf(statement.left).includes(letter))
      );
    case 'any':
      return statement.parts.every((part) => isSolved(part, letter));
    case 'all':
      return (
        statement.parts.some((part) => isSolved(part, letter)) &&
        statement.parts.every((part) => isSolvedOrOther(part, letter))
      );
    case 'member':
      return statement.letter === null || isLetter(statement.letter, letter);
    case 'never':
    case 'always':
      return true;
  }
}

/** In a system the other letters may be solved beside the one asked for. */
function isSolvedOrOther(statement: Statement, letter: string): boolean {
  if (isSolved(statement, letter)) return true;
  return (
    statement.kind === 'compare' &&
    statement.left.kind === 'letter' &&
    !lettersOf(statement.right).includes(statement.left.name)
  );
}

function isTarget(tex: string, route: Route): boolean {
  const target = readLine(tex, route.read.settings);
  const final = [...route.read.lines].reverse().find((result) => result.ok);
  if (!target.ok || !final?.ok) return false;
  const line = asWritten(final.line);
  return layoutOf(target.line) === layoutOf(line) || layoutOf(target.line) === layoutOf(lastSide(line));
}

/** A line that continues another counts by its last member. */
function asWritten(line: Line): Line {
  if (line.kind !== 'continuation') return line;
  return { kind: 'expression', expr: line.members[line.members.length - 1] as Expr, span: line.span };
}

function lastSide(line: Line): Line {
  if (line.kind === 'relation' && line.sign === '=') return { kind: 'expression', expr: line.right, span: line.span };
  return line.kind === 'chain'
    ? { kind: 'expression', expr: line.members[line.members.length - 1] as Expr, span: line.span }
    : line;
}
