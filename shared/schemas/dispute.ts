import { z } from 'zod';
import type { EarlierRuling, ReadRound, ReadStep, ReadTask, ReadLine, ReadVerdict, TeacherFinding } from './review.ts';

export type DisputeKind = 'undecided' | 'contested-finding' | 'contested-verdict' | 'contested-points';

const reasonSchema = z
  .string()
  .trim()
  .min(1, 'Give the reason: everyone concerned will read it.')
  .max(2000, 'A reason holds at most 2000 characters.');
const wordsSchema = z
  .string()
  .trim()
  .min(1, 'Say what is contested, and why.')
  .max(2000, 'This holds at most 2000 characters.');

export const decisionSchema = z.enum(['holds', 'fails', 'presentation']);
export type Decision = z.infer<typeof decisionSchema>;

/** A ruling on the step that a dispute is about. */
export const rulingFormSchema = z.object({
  decision: decisionSchema,
  reason: reasonSchema,
  /** Also rule the same step (equal line above, equal line) in the round's other derivations. */
  along: z.boolean().default(false),
});

export const effectQuerySchema = z.object({
  decision: decisionSchema,
  along: z
    .enum(['true', 'false'])
    .default('false')
    .transform((value) => value === 'true'),
});

export const questionSchema = z.object({
  question: z.string().trim().min(1, 'Write the question.').max(2000, 'A question holds at most 2000 characters.'),
});
export const questionAnswerSchema = z.object({ answer: wordsSchema });

/** A teacher's own verdict on a whole derivation: where the first fault is, or that there is none. */
export const overruleSchema = z.object({
  firstFault: z.number().int().min(1).max(400).nullable(),
  reason: reasonSchema,
});

export const contestVerdictSchema = z.object({ step: z.number().int().min(1).max(400), words: wordsSchema });
export const contestPointsSchema = z.object({ words: wordsSchema });

/** One entry of the desk's queue. */
export interface DisputeItem {
  readonly disputeId: string;
  readonly kind: DisputeKind;
  readonly className: string;
  readonly timeZone: string;
  readonly roundNumber: number;
  readonly taskTitle: string;
  readonly step: number;
  /** Authors and reviewers whom a ruling would touch, those with the same step included. */
  readonly people: number;
  readonly openedAt: string;
  readonly states: readonly ReadStep['state'][];
  /** Waiting for the author's reply to a question. */
  readonly asked: boolean;
}

/** One dispute with all that is needed to rule on it; no names. */
export interface DisputeCase extends DisputeItem {
  readonly round: ReadRound;
  readonly task: ReadTask;
  readonly lines: readonly ReadLine[];
  readonly verdict: ReadVerdict | null;
  /** What was said by whoever raised it. */
  readonly words: string;
  readonly raisedBy: 'author' | 'reviewer' | null;
  /** The finding in question. */
  readonly findingId: string | null;
  readonly findings: readonly TeacherFinding[];
  /** Other derivations of the round with the same step. */
  readonly sameStep: number;
  readonly question: string | null;
  readonly questionAnswer: string | null;
  readonly mayAsk: boolean;
  readonly mayReveal: boolean;
  readonly earlier: readonly EarlierRuling[];
}

export interface DisputeNames {
  readonly author: string | null;
  readonly reviewers: Readonly<Record<string, string>>;
}

/** What a ruling would change. */
export interface RulingEffect {
  readonly people: number;
  readonly becomes: { readonly sound: number; readonly faulty: number; readonly undecided: number };
  readonly unchanged: number;
  readonly findings: number;
  readonly settled: boolean;
}
