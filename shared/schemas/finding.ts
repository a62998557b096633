import { z } from 'zod';
import { storableText } from '../lib/storable-text.ts';
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

/** How sure, in tenths: 0 is can't tell, 8 is certain. */
export const MAX_SURENESS = 8;

const pickSchema = z.union([z.number().int().min(1).max(400), z.literal('none'), z.null()]);
const whySchema = z.string().overwrite(storableText).max(2000, 'Why holds at most 2000 characters.');
const surenessSchema = z.number().int().min(0).max(MAX_SURENESS);

/** A reviewer's finding while it is being made: everything may be missing. */
export const findingDraftSchema = z.object({
  /** A step number, 'none' for "no fault", null for not chosen yet. */
  pick: pickSchema,
  /** The marked part of the picked line, as a span of its TeX. */
  markedSpan: spanSchema.nullable(),
  slipKind: slipKindSchema.nullable(),
  shouldBe: texSchema,
  why: whySchema,
  /** Tenths: 0 (can't tell) to 8 (certain). */
  sureness: surenessSchema,
});
export type FindingDraft = z.infer<typeof findingDraftSchema>;

/** What is handed in: a pick with how sure, or nothing picked and "can't tell". */
export const findingSchema = findingDraftSchema.superRefine((finding, context) => {
  if (finding.sureness > 0 && finding.pick === null) {
    context.addIssue({ code: 'custom', path: ['pick'], message: 'Choose a step, or say that there is no fault.' });
  }
  if (finding.markedSpan && finding.markedSpan.end <= finding.markedSpan.start) {
    context.addIssue({ code: 'custom', path: ['markedSpan'], message: 'The marked part is empty.' });
  }
});

export const EMPTY_DRAFT: FindingDraft = {
  pick: null,
  markedSpan: null,
  slipKind: null,
  shouldBe: '',
  why: '',
  sureness: 0,
};

export const draftSaveSchema = z.object({ draft: findingDraftSchema, version: z.number().int().min(0) });

export const setAsideSchema = z.object({ reason: z.enum(['cannot-read', 'know-the-author']) });

export const answerSchema = z
  .object({
    kind: z.enum(['accept', 'contest']),
    reason: z.string().trim().max(2000, 'A reason holds at most 2000 characters.').default(''),
  })
  .superRefine((answer, context) => {
    if (answer.kind === 'contest' && answer.reason === '') {
      context.addIssue({ code: 'custom', path: ['reason'], message: 'Say why you contest it.' });
    }
  });
export type AnswerForm = z.infer<typeof answerSchema>;

/**
 * How sure a reviewer was, as the author reads it. Fewer words than places on the scale, so that nobody can reckon a
 * reviewer's points from them.
 */
export const SURE_WORDS = ['cannot-tell', 'a-little', 'half', 'nearly', 'certain'] as const;
export type SureWord = (typeof SURE_WORDS)[number];

export function sureWordOf(tenths: number): SureWord {
  if (tenths <= 0) return 'cannot-tell';
  if (tenths <= 2) return 'a-little';
  if (tenths <= 5) return 'half';
  return tenths <= 7 ? 'nearly' : 'certain';
}
