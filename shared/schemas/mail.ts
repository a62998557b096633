import { z } from 'zod';

/** The kinds of letter that a person may switch off. */
export const optionalMailKindSchema = z.enum([
  'join-request',
  'writing-opened',
  'reviewing-opened',
  'review-due',
  'findings-to-answer',
  'round-settled',
  'ruling-after-settling',
  'author-asked',
]);
export type OptionalMailKind = z.infer<typeof optionalMailKindSchema>;

export const mailPreferenceSchema = z.object({ kind: optionalMailKindSchema, wanted: z.boolean() });
export type MailPreferenceForm = z.infer<typeof mailPreferenceSchema>;
