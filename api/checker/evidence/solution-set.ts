import type { Expr, Line, SetExpr } from '../../../shared/maths/expression.ts';
import { lettersOf } from '../../../shared/maths/letters.ts';
import { printExpr } from '../../../shared/maths/print.ts';
import { readLine } from '../../../shared/maths/read.ts';
import type { Candidate } from './edits.ts';
import type { MendQuestion } from './mend-question.ts';

/** An inequality that is solved for its letter: what the line above really says of it, written out. */
export function* solutionSet({ line, solutions, settings, tex }: MendQuestion): Generator<Candidate> {
  const name = solutions === null ? null : boundedLetter(line);
  if (name === null) return;
  const reading = readLine(`${name}\\in ${solutions}`, settings);
  if (!reading.ok || reading.line.kind !== 'membership') return;
  const text = describe(name, reading.line.set);
  if (text !== null) yield { edits: [{ start: 0, end: tex.length, text }], cost: 1.8, touchesRight: false };
}

/** The letter of a line such as x < 2, 1 < x < 2 or x < 1 or x > 2; null for any other. */
function boundedLetter(line: Line): string | null {
  if (line.kind === 'any' || line.kind === 'all') {
    const names = line.parts.map(boundedLetter);
    return names.every((name) => name === names[0]) ? (names[0] ?? null) : null;
  }
  if (line.kind === 'relation') {
    const isBounded = line.sign !== '=' && line.left.kind === 'letter' && lettersOf(line.right).length === 0;
    return isBounded && line.left.kind === 'letter' ? line.left.name : null;
  }
  const [low, middle, high] = line.kind === 'chain' ? line.members : [];
  if (line.kind !== 'chain' || line.members.length !== 3 || line.signs.includes('=')) return null;
  if (!low || !high || middle?.kind !== 'letter' || lettersOf(low).length + lettersOf(high).length > 0) return null;
  return middle.name;
}

function describe(name: string, set: SetExpr): string | null {
  if (set.kind === 'union') {
    const parts = set.parts.map((part) => describe(name, part));
    return parts.includes(null) ? null : parts.join('\\text{ or }');
  }
  if (set.kind === 'finite') return set.items.map((item) => `${name}=${printExpr(item)}`).join('\\text{ or }');
  if (set.kind !== 'interval') return null;
  const { from, to, fromClosed, toClosed } = set;
  const at = (end: Expr): string => printExpr(end);
  const below = (isClosed: boolean): string => (isClosed ? '\\le ' : '<');
  if (from && to) return `${at(from)}${below(fromClosed)}${name}${below(toClosed)}${at(to)}`;
  if (from) return `${name}${fromClosed ? '\\ge ' : '>'}${at(from)}`;
  return to ? `${name}${below(toClosed)}${at(to)}` : null;
}
