import type { RoundListItem, Stage } from './round.ts';

interface Thing {
  readonly roundId: string;
  readonly title: string;
  readonly className: string;
  readonly timeZone: string;
  readonly number: number;
}

/** A derivation to write or to finish. */
export interface WriteThing extends Thing {
  readonly kind: 'write';
  readonly dueAt: string;
  readonly begun: boolean;
  /** The last line typed; numbers count from the given, which is 0. */
  readonly last: { readonly number: number; readonly tex: string; readonly decimal: 'point' | 'comma' } | null;
  readonly unread: readonly number[];
  readonly twoWays: readonly number[];
}

/** Derivations to review; nothing here tells whose they are. */
export interface ReviewThing extends Thing {
  readonly kind: 'review';
  readonly dueAt: string;
  readonly reviews: readonly {
    readonly reviewId: string;
    readonly steps: number;
    readonly state: 'not-begun' | 'begun' | 'handed-in' | 'set-aside';
  }[];
}

/** Findings that pick a step of one's own derivation and wait for an answer. */
export interface AnswerThing extends Thing {
  readonly kind: 'answer';
  readonly dueAt: string;
  readonly derivationId: string;
  readonly count: number;
  readonly first: { readonly step: number; readonly why: string } | null;
}

/** A round that settled within the week in which it can be contested. */
export interface LookThing extends Thing {
  readonly kind: 'look';
  readonly settledAt: string;
  readonly contestUntil: string;
  readonly own: {
    readonly derivationId: string;
    readonly steps: number;
    readonly outcome: 'sound' | 'faulty' | 'undecided';
    readonly firstFault: number | null;
    readonly mend: 'none' | 'begun' | 'handed-in';
  } | null;
  readonly reviews: readonly { readonly reviewId: string; readonly outcome: string | null }[];
}

export type TodayThing = WriteThing | ReviewThing | AnswerThing | LookThing;

/** A round that goes on without the reader for now. */
export interface WaitingRound extends Thing {
  readonly stage: Stage;
  readonly nextAt: string;
  readonly handedIn: boolean;
}

/** How one's own findings fared; shown to oneself and the teacher only. */
export interface OwnProgress {
  /** Settled rounds with counted findings, oldest first, at most ten. */
  readonly rounds: readonly { readonly number: number; readonly right: number; readonly total: number }[];
  /** Findings given with a sureness of at least 0.6. */
  readonly nearlyCertain: { readonly right: number; readonly total: number };
}

export interface TodayAnswer {
  readonly now: string;
  readonly things: readonly TodayThing[];
  readonly waiting: readonly WaitingRound[];
  readonly progress: OwnProgress | null;
  /** For teachers and assistants: rounds that run, are planned, or settled lately. */
  readonly rounds: readonly RoundListItem[];
  readonly joinRequests: readonly { readonly classId: string; readonly className: string; readonly count: number }[];
}
