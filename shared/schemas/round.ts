import { z } from 'zod';

export const STAGES = ['planned', 'writing', 'reviewing', 'answering', 'settled'] as const;
export type Stage = (typeof STAGES)[number];

export const LATE_RULES = ['closed', 'until-reviewing', 'late-batch'] as const;
export type LateRule = (typeof LATE_RULES)[number];

/** The five instants, in order. */
export const INSTANTS = ['opensAt', 'writingEndsAt', 'reviewingEndsAt', 'answeringEndsAt', 'settlesAt'] as const;
export type InstantName = (typeof INSTANTS)[number];
export type Instants = Record<InstantName, string>;

const instant = z.iso.datetime({ offset: true, error: 'Choose a day and a time.' });

const OUT_OF_ORDER: Record<InstantName, string> = {
  opensAt: '',
  writingEndsAt: 'Writing must end after the round opens.',
  reviewingEndsAt: 'Reviewing must end after writing ends.',
  answeringEndsAt: 'Answering must end after reviewing ends.',
  settlesAt: 'The round cannot settle before answering ends.',
};

const instantsShape = {
  opensAt: instant,
  writingEndsAt: instant,
  reviewingEndsAt: instant,
  answeringEndsAt: instant,
  settlesAt: instant,
};

/** Opens < writing ends < reviewing ends < answering ends <= settles; names each instant that stands too early. */
export function findDisorder(instants: Instants): { field: InstantName; detail: string }[] {
  return INSTANTS.flatMap((field, i) => {
    const before = INSTANTS[i - 1];
    if (!before) return [];
    const gap = Date.parse(instants[field]) - Date.parse(instants[before]);
    return gap > 0 || (gap === 0 && field === 'settlesAt') ? [] : [{ field, detail: OUT_OF_ORDER[field] }];
  });
}

const planShape = {
  ...instantsShape,
  reviewsPerDerivation: z.number().int().min(1, 'At least one review.').max(4, 'At most four reviews.').default(2),
  lateRule: z.enum(LATE_RULES).default('closed'),
};

function inOrder<Plan extends Instants>(plan: Plan, context: z.core.$RefinementCtx<Plan>): void {
  for (const { field, detail } of findDisorder(plan)) {
    context.addIssue({ code: 'custom', path: [field], message: detail });
  }
}

export const roundFormSchema = z
  .object({ classId: z.uuid('Choose a class.'), taskId: z.uuid('Choose a task.'), ...planShape })
  .superRefine(inOrder);
export type RoundForm = z.infer<typeof roundFormSchema>;

/** The class stays; the task can change while the round is planned. */
export const roundChangeSchema = z
  .object({ taskId: z.uuid('Choose a task.'), ...planShape, version: z.number().int().min(1) })
  .superRefine(inOrder);
export type RoundChange = z.infer<typeof roundChangeSchema>;

export const stageMoveSchema = z
  .object({
    to: z.enum(['writing', 'reviewing', 'answering', 'settled']),
    /** Settles although disputes are open, which voids the findings they touch. */
    force: z.boolean().default(false),
    reason: z.string().trim().max(300, 'A reason holds at most 300 characters.').default(''),
  })
  .refine(({ force, reason }) => !force || reason !== '', {
    path: ['reason'],
    message: 'Say why; it is kept in the trail.',
  });
export type StageMove = z.infer<typeof stageMoveSchema>;

/** The end of the running stage and every later instant move by this much. */
export const moreTimeSchema = z.object({
  minutes: z.number().int().min(5, 'Give at least 5 minutes.').max(43_200, 'Give at most 30 days.'),
  reason: z.string().trim().max(300, 'A reason holds at most 300 characters.').default(''),
});
export type MoreTime = z.infer<typeof moreTimeSchema>;

export const extensionSchema = z
  .object({
    writingEndsAt: instant.nullable().default(null),
    reviewingEndsAt: instant.nullable().default(null),
    reason: z.string().trim().max(300, 'A reason holds at most 300 characters.').default(''),
  })
  .refine((form) => form.writingEndsAt !== null || form.reviewingEndsAt !== null, {
    error: 'Choose until when.',
    path: ['writingEndsAt'],
  });
export type ExtensionForm = z.infer<typeof extensionSchema>;

export const excuseSchema = z.object({
  excused: z.boolean(),
  reason: z.string().trim().max(300, 'A reason holds at most 300 characters.').default(''),
});

export const roundListSchema = z.object({ classId: z.uuid().optional() });

/** Something the planner should know before going on; `kind` is worded by the client. */
export interface RoundWarning {
  readonly kind:
    | 'names-guessable'
    | 'few-derivations'
    | 'reviews-cut'
    | 'nothing-to-review'
    | 'not-dealt'
    | 'still-writing'
    | 'reviews-open'
    | 'answers-open'
    | 'disputes-open'
    | 'checks-waiting';
  readonly count: number;
}

/** What moving the round on will do. */
export interface StagePreview {
  readonly from: Stage;
  readonly to: Exclude<Stage, 'planned'> | null;
  /** When it happens by itself. */
  readonly at: string | null;
  readonly effects: readonly StageEffect[];
  readonly warnings: readonly RoundWarning[];
  /** Disputes stand in the way; settling now voids the findings they touch. */
  readonly needsForce: boolean;
}

export interface StageEffect {
  readonly kind:
    | 'freezes-task'
    | 'opens-writing'
    | 'closes-writing'
    | 'deals'
    | 'closes-reviewing'
    | 'shows-findings'
    | 'closes-answering'
    | 'shows-verdicts'
    | 'voids'
    | 'mails';
  /** People, derivations or findings concerned. */
  readonly count: number;
  /** Reviews each, where derivations are dealt. */
  readonly each?: number;
}

export interface RoundListItem {
  readonly id: string;
  readonly classId: string;
  readonly className: string;
  readonly timeZone: string;
  readonly number: number;
  readonly title: string;
  readonly stage: Stage;
  readonly instants: Instants;
  readonly people: number;
  readonly handedIn: number;
  readonly reviewsDealt: number;
  readonly reviewsDone: number;
  readonly disputesOpen: number;
  readonly waitingForRulings: boolean;
}

export interface RoundAnswer {
  readonly id: string;
  readonly classId: string;
  readonly className: string;
  readonly timeZone: string;
  readonly number: number;
  readonly taskId: string;
  readonly title: string;
  readonly stage: Stage;
  readonly instants: Instants;
  readonly reviewsPerDerivation: number;
  readonly lateRule: LateRule;
  readonly waitingForRulings: boolean;
  readonly version: number;
  /** Teachers plan and move; assistants look. */
  readonly role: 'teacher' | 'assistant';
  readonly warnings: readonly RoundWarning[];
}

/** What a round can be planned from. */
export interface RoundChoices {
  readonly classes: readonly {
    readonly id: string;
    readonly name: string;
    readonly timeZone: string;
    readonly students: number;
  }[];
  readonly tasks: readonly { readonly id: string; readonly title: string; readonly given: string }[];
}

/** A student on the board. Ids and names are the staff's; an assistant who sees no names gets neither. */
export interface BoardPerson {
  readonly userId: string | null;
  readonly name: string;
  readonly state: 'stuck' | 'not-begun' | 'writing' | 'handed-in' | 'excused';
  /** Only of what was handed in. */
  readonly derivationId: string | null;
  /** Lines written or handed in, without the given. */
  readonly lines: number;
  readonly hasOpened: boolean;
  readonly savedAt: string | null;
  /** When the last line was begun. */
  readonly lineAddedAt: string | null;
  readonly handedInAt: string | null;
  readonly late: boolean;
  /** Handed in, but with fewer than two steps: it is not dealt. */
  readonly tooShort: boolean;
  readonly ownWritingEndsAt: string | null;
  readonly ownReviewingEndsAt: string | null;
  readonly reviews: { readonly dealt: number; readonly begun: number; readonly done: number };
  /** Those that pick a step: “no fault” and “can't tell” ask for no answer. */
  readonly findings: { readonly received: number; readonly accepted: number; readonly contested: number };
}

/** Something that waits for the teacher; the client words it and offers the act. */
export type BoardAlert =
  | { readonly kind: 'line-stops'; readonly line: number; readonly texts: readonly string[] }
  | {
      readonly kind:
        | 'not-begun'
        | 'too-short'
        | 'few-derivations'
        | 'late-waiting'
        | 'reviews-not-begun'
        | 'disputes-open'
        | 'waiting-for-rulings'
        | 'names-guessable';
      readonly count: number;
    };

export interface BoardAnswer {
  readonly round: RoundAnswer;
  /** The server's time, against which the board counts. */
  readonly now: string;
  /** When the running stage ends by itself, the grace included. */
  readonly stageEndsAt: string | null;
  readonly seesNames: boolean;
  readonly decimal: 'point' | 'comma';
  readonly people: readonly BoardPerson[];
  readonly alerts: readonly BoardAlert[];
  readonly disputesOpen: number;
}
