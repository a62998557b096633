import { z } from 'zod';

/** What the checker answers. Values and lines are TeX; codes are worded by the client. */

export const spanSchema = z.object({ start: z.number().int().min(0), end: z.number().int().min(0) });

export const goalSchema = z.discriminatedUnion('kind', [
  z.object({ kind: z.literal('free') }),
  z.object({ kind: z.literal('expanded') }),
  z.object({ kind: z.literal('factored') }),
  z.object({ kind: z.literal('simplified') }),
  z.object({ kind: z.literal('solved'), letter: z.string().min(1).max(20) }),
  z.object({ kind: z.literal('target'), target: z.string().min(1).max(4000) }),
]);
export type Goal = z.infer<typeof goalSchema>;

export const checkSettingsSchema = z.object({
  /** Absent: complex when line 0 has a free i, else real. */
  numbers: z.enum(['real', 'complex']).optional(),
  /** Every gain of a solution fails where it happens. */
  reversible: z.boolean().optional(),
  /** 'fault': presentation faults count; 'note' (default): they are noted only. */
  presentation: z.enum(['note', 'fault']).optional(),
  /** true: a missing constant of integration is a fault. */
  constant: z.boolean().optional(),
  decimal: z.enum(['point', 'comma']).optional(),
  unknown: z.string().max(20).optional(),
  goal: goalSchema.optional(),
});
export type CheckSettings = z.infer<typeof checkSettingsSchema>;

export const noteSchema = z.enum([
  'given-miscopied',
  'domain',
  'constant',
  'one-way',
  'presentation',
  'empty',
  'meaningless',
  'unfinished',
  'candidates',
  'not-rejected',
  'remark',
  'cases',
  'definition',
  'continued',
]);
export type Note = z.infer<typeof noteSchema>;

export const undecidedReasonSchema = z.enum([
  'not-read',
  'not-covered',
  'change-of-kind',
  'no-unknown',
  'no-domain',
  'limit',
  'time',
  'not-settled',
  'no-agreed-meaning',
]);
export type UndecidedReason = z.infer<typeof undecidedReasonSchema>;

export const readErrorSchema = z.object({
  /** Index of the line that was not read, 0 for the given. */
  line: z.number().int().min(0),
  code: z.string(),
  place: spanSchema,
  found: z.string(),
  expected: z.array(z.string()),
});

export const evidenceSchema = z.object({
  /** Letters' values, and what the line above and this line are worth there ('true'/'false' for statements). */
  witness: z.object({ at: z.record(z.string(), z.string()), above: z.string(), below: z.string() }).optional(),
  /** Solutions of the line above that this line does not have. */
  lost: z.array(z.string()).optional(),
  /** Solutions of this line that the line above does not have. */
  gained: z.array(z.string()).optional(),
  /** The running set of solutions after this step, as TeX. */
  solutions: z.string().optional(),
  /** Where the line has no value though the line above does: TeX conditions such as `x \ne 2`. */
  excluded: z.array(z.string()).optional(),
  /** Line above minus this line, expanded, when short. */
  difference: z.string().optional(),
  /** The part of this line that is wrong, with what it should have been. */
  wrongPart: z.object({ span: spanSchema, is: z.string(), shouldBe: z.string() }).optional(),
  /** The author's line with the fewest leaves changed so that it follows from the line above. */
  mended: z.object({ line: z.string(), changed: z.array(spanSchema) }).optional(),
  /** Lines from this step to the end carried through from the mended line. */
  mendedEnding: z.array(z.string()).optional(),
  /** What the author likely did. */
  slip: z.object({ id: z.string(), kind: z.string() }).optional(),
  /** For presentation notes: the line with the brackets that were meant. */
  meant: z.string().optional(),
  /** Which link of a chain failed, 1 for the first. */
  link: z.number().int().min(1).optional(),
  /** The operation that gained solutions. */
  operation: z.enum(['power', 'multiply', 'logarithm', 'removed', 'differentiate']).optional(),
  reason: undecidedReasonSchema.optional(),
  error: readErrorSchema.optional(),
});
export type Evidence = z.infer<typeof evidenceSchema>;

export const stepRulingSchema = z.object({
  step: z.number().int().min(1),
  ruling: z.enum(['holds', 'fails', 'undecided']),
  reached: z.enum(['proved', 'sampled']).nullable(),
  notes: z.array(noteSchema),
  evidence: evidenceSchema,
});
export type StepRuling = z.infer<typeof stepRulingSchema>;

export const verdictSchema = z.object({
  outcome: z.enum(['sound', 'faulty', 'undecided']),
  /** Lowest step that fails when every earlier one holds; a number exactly when the outcome is faulty. */
  firstFault: z.number().int().min(1).nullable(),
  steps: z.array(stepRulingSchema),
});
export type Verdict = z.infer<typeof verdictSchema>;

/** One derivation as the checker takes it. `lines[0]` is the given; `uses[k]` are the lines that line k is judged from. */
export interface DerivationInput {
  readonly lines: readonly string[];
  readonly uses?: readonly (readonly number[] | null)[];
  readonly assume: readonly string[];
  readonly settings: CheckSettings;
}
