import type { Expr, Line } from '../../../shared/maths/expression.ts';
import { sameExpr } from '../../../shared/maths/same.ts';
import { childrenOf, exprsOf } from '../../../shared/maths/walk.ts';
import { splice, type Candidate, type Edit } from './edits.ts';

interface Changed {
  readonly line: Line;
  readonly tex: string;
  readonly edits: readonly Edit[];
}

const cost = 0.85;
const mostCarried = 6;

/**
 * Where the author took a part over from one line to the next, what was changed of it in the first is changed in the
 * second: the part itself, everywhere it stands, and a case that was put in.
 */
export function changesAgain(above: Changed, below: { readonly line: Line; readonly tex: string }): Candidate[] {
  const found: Candidate[] = [];
  const [only, ...more] = above.edits;
  if (only && more.length === 0 && only.start === only.end && only.text.includes('\\text{ or }')) {
    const at = only.start === 0 ? 0 : below.tex.length;
    found.push({ edits: [{ start: at, end: at, text: only.text }], cost: cost + 0.3, touchesRight: false });
  }
  // A letter that a line is solved for stays alone.
  const solved = below.line.kind === 'relation' && below.line.left.kind === 'letter' ? below.line.left : null;
  const own = exprsOf(below.line)
    .filter((expr) => expr !== solved)
    .flatMap(partsOf);
  for (const part of exprsOf(above.line).flatMap(partsOf)) {
    const within = above.edits.filter((edit) => part.span.start <= edit.start && edit.end <= part.span.end);
    const same = within.length > 0 ? own.filter((other) => sameExpr(other, part)) : [];
    const text = same.length > 0 ? changedText(above.tex, part, within) : null;
    if (text === null || text === '') continue;
    const here = cost + 0.01 * found.length;
    const edits = same.map(({ span }) => ({ ...span, text }));
    for (const edit of edits) found.push({ edits: [edit], cost: here, touchesRight: false });
    if (edits.length > 1) found.push({ edits, cost: here + 0.05, touchesRight: false });
    if (found.length >= mostCarried) break;
  }
  const together = found.flatMap(({ edits }) => edits).filter((edit, k, all) => !overlaps(edit, all.slice(0, k)));
  if (together.length > 1) found.push({ edits: together, cost: cost + 0.05, touchesRight: false });
  return found;
}

function overlaps(edit: Edit, others: readonly Edit[]): boolean {
  return others.some((other) => edit.start < other.end && other.start < edit.end);
}

/** Largest first. */
function partsOf(expr: Expr): Expr[] {
  return [expr, ...childrenOf(expr).flatMap(partsOf)];
}

function changedText(tex: string, { span }: Expr, edits: readonly Edit[]): string | null {
  const inner = edits.map((edit) => ({ ...edit, start: edit.start - span.start, end: edit.end - span.start }));
  return splice(tex.slice(span.start, span.end), inner)?.tex ?? null;
}
