import type { HandedInLine } from '../../../shared/schemas/sheet.ts';
import { Derivation } from '../../ui/derivation.tsx';
import type { EdgeLine } from '../../ui/edge-line.tsx';

/** What was handed in, along a plain edge: nothing is known of it yet. */
export function HandedIn({ lines }: { readonly lines: readonly HandedInLine[] }) {
  return <Derivation lines={lines.flatMap(toRows)} label="Your derivation" />;
}

function toRows(line: HandedInLine, number: number): EdgeLine[] {
  const row: EdgeLine = {
    id: line.stepId,
    tex: line.tex,
    state: number === 0 ? undefined : 'plain',
    reason: number === 0 ? 'the given line' : line.reason,
  };
  return line.prose ? [{ id: `${line.stepId}-words`, isWords: true, content: line.prose }, row] : [row];
}
