import { z } from 'zod';
import { texSchema } from './task.ts';
import { spanSchema } from './verdict.ts';

/** The kinds of slip, the same list for every derivation; every slip of the catalogue belongs to one. */
export const SLIP_KINDS = [
  'sign',
  'brackets',
  'like-terms',
  'powers-and-roots',
  'fractions',
  'both-sides',
  'solutions',
  'functions',
  'calculus',
  'copying',
] as const;
export const slipKindSchema = z.enum(SLIP_KINDS);
export type SlipKind = z.infer<typeof slipKindSchema>;

/** A reviewer's finding while it is being made: everything may be missing. */
export const findingDraftSchema = z.object({
  /** A step number, 'none' for "no fault", null for not chosen yet. */
  pick: z.union([z.number().int().min(1).max(400), z.literal('none'), z.null()]),
  /** The marked part of the picked line, as a span of its TeX. */
  markedSpan: spanSchema.nullable(),
  slipKind: slipKindSchema.nullable(),
  shouldBe: texSchema,
  why: z.string().max(2000, 'Why holds at most 2000 characters.'),
  /** Tenths: 0 (can't tell) to 8 (certain). */
  sureness: z.number().int().min(0).max(8),
});
export type FindingDraft = z.infer<typeof findingDraftSchema>;
