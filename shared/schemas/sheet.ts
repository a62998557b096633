import { z } from 'zod';

/**
 * The sheet as TipTap keeps it: a doc of blocks, in which `step` nodes are atoms with attributes
 * `{stepId, tex, reason, uses}` and everything else is prose. Bounded here, read by `linesOf`.
 */
export const stepAttributesSchema = z.object({
  stepId: z.uuid(),
  tex: z.string().max(4000, 'A line holds at most 4000 characters.'),
  reason: z.string().max(300, 'A reason holds at most 300 characters.'),
  /** Step ids (or 'given') that the line is judged from; null: the line above. */
  uses: z.array(z.string().max(40)).max(20).nullable(),
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
