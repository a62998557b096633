import { z } from 'zod';

/** What a weekly sheet of standings keeps; only `alias`, `place` and the whole standing of those shown reach the class. */
export interface StandingsBody {
  /** The upper third, best first; places count among those shown. Ties share a place. */
  readonly listed: readonly {
    readonly userId: string;
    readonly alias: string;
    readonly place: number;
    readonly standing: number;
  }[];
  /** Why there is no list, where there is none. */
  readonly withheld: 'too-few' | 'no-spread' | 'off' | null;
  readonly reviewers: number;
}

export const optOutSchema = z.object({ optOut: z.boolean() });

/** Why a class sees no list. */
export type Withheld = 'too-few' | 'no-spread' | 'off' | 'not-yet';

/** One's own line: for the person alone. */
export interface OwnStanding {
  readonly alias: string;
  readonly optedOut: boolean;
  /** Whole points; null without any counted finding. */
  readonly standing: number | null;
  /** Against a week ago; null where there was nothing then. */
  readonly change: number | null;
  readonly rounds: readonly { readonly number: number; readonly mean: number; readonly classMean: number | null }[];
  /** How often one was right, by how sure one was; `expected` is the share that honest sureness would give. */
  readonly sureness: readonly {
    readonly sure: 'a-little' | 'half' | 'nearly' | 'certain';
    readonly right: number;
    readonly of: number;
    readonly expected: number;
  }[];
}

export interface StandingsAnswer {
  readonly classId: string;
  readonly className: string;
  readonly withheld: Withheld | null;
  readonly listed: readonly { readonly place: number; readonly alias: string; readonly standing: number }[];
  readonly madeAt: string | null;
  readonly timeZone: string;
  /** null for teachers and assistants. */
  readonly own: OwnStanding | null;
}
