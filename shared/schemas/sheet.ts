import { z } from 'zod';
import { storableText } from '../lib/storable-text.ts';

/** Limits of one sheet. */
export const MAX_STEPS = 200;
export const MAX_BLOCKS = 600;
export const MAX_SHEET_BYTES = 200_000;

/**
 * The sheet as TipTap keeps it: a doc of blocks, in which `step` nodes are atoms with attributes
 * `{stepId, tex, reason, uses}` and everything else is prose. The given is not in it: it belongs to the task.
 */
export const stepAttributesSchema = z.object({
  stepId: z.uuid(),
  tex: z.string().overwrite(storableText).max(4000, 'A line holds at most 4000 characters.'),
  reason: z.string().overwrite(storableText).max(300, 'A reason holds at most 300 characters.'),
  /** Step ids (or 'given') that the line is judged from; null: the line above. */
  uses: z.array(z.string().max(40)).max(20, 'A line names at most 20 lines.').nullable(),
});
export type StepAttributes = z.infer<typeof stepAttributesSchema>;

export interface SheetNode {
  readonly type: string;
  readonly attrs?: Readonly<Record<string, unknown>>;
  readonly content?: readonly SheetNode[];
  readonly text?: string;
  readonly marks?: readonly { readonly type: string; readonly attrs?: Readonly<Record<string, unknown>> }[];
}

export interface SheetDocument extends SheetNode {
  readonly type: 'doc';
  readonly content: readonly SheetNode[];
}

/** One line of what was handed in; line 0 is the given, with `stepId` 'given'. */
export interface HandedInLine {
  readonly stepId: string;
  readonly tex: string;
  readonly reason: string;
  /** Indices of the lines that this one is judged from; null: the line above. */
  readonly uses: readonly number[] | null;
  /** Prose that stands between the line above and this one. */
  readonly prose: string;
}

const unknownNode = (where: string) => (issue: { readonly input?: unknown }) => {
  const type = (issue.input as { type?: unknown } | null | undefined)?.type;
  return typeof type === 'string' ? `${where}, not “${type.slice(0, 40)}”.` : `${where}.`;
};

const markSchema = z.object({
  type: z.enum(['bold', 'italic'], { error: 'Words can be bold or italic, nothing else.' }),
});

const inlineSchema = z.discriminatedUnion(
  'type',
  [
    z.object({
      type: z.literal('text'),
      // A space stands for text of which nothing can be kept, because a text node is never empty.
      text: z
        .string()
        .min(1)
        .overwrite((text) => storableText(text) || ' ')
        .max(10_000),
      marks: z.array(markSchema).max(2).optional(),
    }),
    z.object({ type: z.literal('hardBreak'), marks: z.array(markSchema).max(2).optional() }),
  ],
  { error: unknownNode('A paragraph holds words only') },
);

const blockSchema = z.discriminatedUnion(
  'type',
  [
    z.object({ type: z.literal('step'), attrs: stepAttributesSchema }),
    z.object({ type: z.literal('paragraph'), content: z.array(inlineSchema).max(400).optional() }),
  ],
  { error: unknownNode('A sheet holds lines of maths and paragraphs') },
);

/** Reads a sheet from outside. Its grammar is closed, so its depth is bounded. */
export const sheetDocumentSchema: z.ZodType<SheetDocument> = z
  .object({
    type: z.literal('doc', { error: 'This is not a sheet.' }),
    content: z.array(blockSchema).max(MAX_BLOCKS, `A sheet holds at most ${MAX_BLOCKS} lines and paragraphs.`),
  })
  .superRefine((document, context) => {
    const ids = document.content.flatMap((block) => (block.type === 'step' ? [block.attrs.stepId] : []));
    const refuse = (message: string) => context.addIssue({ code: 'custom', path: ['content'], message });
    if (ids.length > MAX_STEPS) refuse(`A sheet holds at most ${MAX_STEPS} lines.`);
    if (new Set(ids).size !== ids.length) refuse('Two lines share one id.');
    if (new TextEncoder().encode(JSON.stringify(document)).length > MAX_SHEET_BYTES) {
      refuse(`A sheet holds at most ${MAX_SHEET_BYTES / 1000} kB.`);
    }
  });

export const EMPTY_SHEET: SheetDocument = { type: 'doc', content: [] };

/** The step that a block is, null for prose. */
export function stepOf(block: SheetNode): StepAttributes | null {
  return block.type === 'step' ? (block.attrs as unknown as StepAttributes) : null;
}

/** The words of a block of prose. */
export function proseOf(block: SheetNode): string {
  if (block.type === 'text') return block.text ?? '';
  if (block.type === 'hardBreak') return '\n';
  return (block.content ?? []).map(proseOf).join('');
}

/** The line that every derivation begins with. */
export function givenLine(tex: string): HandedInLine {
  return { stepId: 'given', tex, reason: '', uses: null, prose: '' };
}

/**
 * The lines of a sheet as they are handed in, behind the fixed ones that they go on from (the given at least).
 * Lines without maths are left out; of the lines that a line names, those that stand above it count.
 */
export function linesOf(document: SheetDocument, fixed: readonly HandedInLine[]): HandedInLine[] {
  const lines = [...fixed];
  let prose: string[] = [];
  for (const block of document.content) {
    const step = stepOf(block);
    if (!step) {
      prose.push(proseOf(block).trim());
    } else if (step.tex.trim() === '') {
      prose.push(step.reason.trim());
    } else {
      lines.push({
        stepId: step.stepId,
        tex: step.tex.trim(),
        reason: step.reason.trim(),
        uses: usesOf(step, lines),
        prose: prose.filter(Boolean).join('\n'),
      });
      prose = [];
    }
  }
  return lines;
}

function usesOf(step: StepAttributes, above: readonly HandedInLine[]): number[] | null {
  if (!step.uses) return null;
  const named = above.flatMap((line, index) => (step.uses?.includes(line.stepId) ? [index] : []));
  return named.length === 0 ? null : named;
}
