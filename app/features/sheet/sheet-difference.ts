import { proseOf, stepOf, type SheetDocument, type SheetNode } from '../../../shared/schemas/sheet.ts';
import { newStepId } from './step-id.ts';

/** One row of two sheets laid beside each other; a block that only one of them has stands alone. */
export interface Beside {
  readonly mine: SheetNode | null;
  readonly theirs: SheetNode | null;
}

/** Whether two sheets say the same; ids of lines do not count. */
export function saysTheSame(one: SheetDocument, other: SheetDocument): boolean {
  const a = meaningful(one);
  const b = meaningful(other);
  return a.length === b.length && a.every((block, i) => keyOf(block) === keyOf(b[i] as SheetNode));
}

/** The blocks of two sheets side by side: a longest common run of equal blocks, and what stands between. */
export function layBeside(mine: SheetDocument, theirs: SheetDocument): Beside[] {
  const a = meaningful(mine);
  const b = meaningful(theirs);
  const common = commonLengths(a, b);
  const rows: Beside[] = [];
  let i = 0;
  let j = 0;
  while (i < a.length || j < b.length) {
    const here = a[i];
    const there = b[j];
    if (here && there && keyOf(here) === keyOf(there)) {
      rows.push({ mine: here, theirs: there });
      i += 1;
      j += 1;
    } else if (there && (!here || (common[i]?.[j + 1] ?? 0) > (common[i + 1]?.[j] ?? 0))) {
      rows.push({ mine: null, theirs: there });
      j += 1;
    } else {
      rows.push({ mine: here ?? null, theirs: null });
      i += 1;
    }
  }
  return rows;
}

/** Mine, and behind it what only theirs has; its lines become lines of their own. */
export function keepBoth(mine: SheetDocument, theirs: SheetDocument): SheetDocument {
  const added = layBeside(mine, theirs).flatMap((row) => (row.mine || !row.theirs ? [] : [withNewId(row.theirs)]));
  const last = mine.content.at(-1);
  // An empty line at the end waits to be written on: what is added goes before it.
  const at = last && stepOf(last)?.tex === '' ? mine.content.length - 1 : mine.content.length;
  return { type: 'doc', content: [...mine.content.slice(0, at), ...added, ...mine.content.slice(at)] };
}

function withNewId(block: SheetNode): SheetNode {
  return stepOf(block) ? { ...block, attrs: { ...block.attrs, stepId: newStepId() } } : block;
}

function meaningful({ content }: SheetDocument): SheetNode[] {
  return content.filter((block) => {
    const step = stepOf(block);
    return step ? step.tex.trim() !== '' || step.reason.trim() !== '' : proseOf(block).trim() !== '';
  });
}

function keyOf(block: SheetNode): string {
  const step = stepOf(block);
  return step
    ? `= ${step.tex.trim()} | ${step.reason.trim()} | ${step.uses?.join() ?? ''}`
    : `: ${proseOf(block).trim()}`;
}

function commonLengths(a: readonly SheetNode[], b: readonly SheetNode[]): number[][] {
  const lengths = Array.from({ length: a.length + 1 }, () => Array.from({ length: b.length + 1 }, () => 0));
  for (let i = a.length - 1; i >= 0; i -= 1) {
    for (let j = b.length - 1; j >= 0; j -= 1) {
      const same = keyOf(a[i] as SheetNode) === keyOf(b[j] as SheetNode);
      const row = lengths[i] as number[];
      row[j] = same ? (lengths[i + 1]?.[j + 1] ?? 0) + 1 : Math.max(lengths[i + 1]?.[j] ?? 0, lengths[i]?.[j + 1] ?? 0);
    }
  }
  return lengths;
}
