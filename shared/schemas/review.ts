import type { FindingDraft, SureWord } from './finding.ts';
import type { TaskSettings } from './task.ts';
import type { Evidence, Goal, Note, StepRuling, Verdict } from './verdict.ts';
import type { Span } from '../maths/expression.ts';

export type Stage = 'planned' | 'writing' | 'reviewing' | 'answering' | 'settled';

export type ScoreOutcome =
  'right' | 'carried' | 'not-first' | 'missed' | 'false-alarm' | 'no-pick' | 'void' | 'not-handed-in' | 'excused';

/** One line as a reviewer, an author or a teacher reads it; `number` is its place, 0 the given. */
export interface ReadLine {
  readonly number: number;
  readonly tex: string;
  readonly reason: string;
  readonly prose: string;
  /** Lines that it is judged from, where the author named some. */
  readonly uses: readonly number[] | null;
}

export interface ReadTask {
  readonly title: string;
  readonly instructions: string;
  readonly given: string;
  readonly goal: Goal;
  readonly assumptions: readonly string[];
  readonly settings: TaskSettings;
}

export interface ReadRound {
  readonly id: string;
  readonly number: number;
  readonly stage: Stage;
  readonly className: string;
  readonly timeZone: string;
  readonly reviewingEndsAt: string;
  readonly answeringEndsAt: string;
  readonly settlesAt: string;
  readonly settledAt: string | null;
}

/** How a step stands in a settled verdict. */
export type StepState = 'holds' | 'fault' | 'carried' | 'also-fails' | 'undecided';

export interface ReadStep {
  readonly step: number;
  readonly state: StepState;
  readonly reached: StepRuling['reached'];
  readonly notes: readonly Note[];
  readonly evidence: Evidence;
}

/** A verdict as people read it once the round is settled. */
export interface ReadVerdict {
  readonly outcome: Verdict['outcome'];
  readonly firstFault: number | null;
  readonly steps: readonly ReadStep[];
  readonly decidedBy: 'checker' | 'teacher';
  /** The teacher's reason, where a ruling stands behind the verdict. */
  readonly reason: string | null;
}

/** Contesting after settling, as the person concerned sees it. */
export interface ReadContest {
  /** Until when; null when it is over. */
  readonly openUntil: string | null;
  readonly mine: {
    readonly words: string;
    readonly open: boolean;
    readonly question: string | null;
    readonly answer: string | null;
  } | null;
}

export interface ReviewResult {
  readonly verdict: ReadVerdict;
  readonly outcome: ScoreOutcome;
  /** Whole points. */
  readonly points: number;
  readonly counted: boolean;
  readonly slipNamed: boolean | null;
  readonly termMarked: boolean | null;
  readonly rescored: boolean;
  /** Whether what the reviewer would have written follows from the line above; null where nothing was written. */
  readonly shouldBe: 'holds' | 'fails' | 'undecided' | null;
  readonly contest: ReadContest;
}

/** Everything that a reviewer is sent about a review. */
export interface ReviewAnswer {
  readonly as: 'reviewer';
  readonly reviewId: string;
  readonly position: number;
  readonly total: number;
  readonly round: ReadRound;
  readonly task: ReadTask;
  readonly lines: readonly ReadLine[];
  readonly draft: FindingDraft | null;
  readonly draftVersion: number;
  /** What is handed in now. */
  readonly finding: FindingDraft | null;
  readonly setAside: 'cannot-read' | 'know-the-author' | null;
  readonly canEdit: boolean;
  readonly result: ReviewResult | null;
}

export interface DraftSaved {
  readonly version: number;
  /** Names of classmates that stand in the text: the reviewer is asked to take them out. */
  readonly names: readonly string[];
}

/** A finding as the author meets it. */
export interface AuthorFinding {
  readonly key: string;
  readonly pick: number | null;
  readonly noFault: boolean;
  readonly markedSpan: Span | null;
  readonly sure: SureWord;
  readonly slipKind: string | null;
  readonly shouldBe: string;
  readonly why: string;
  readonly answer: { readonly kind: 'accept' | 'contest'; readonly reason: string } | null;
  /** After settling only. */
  readonly outcome: ScoreOutcome | null;
  readonly slipNamed: boolean | null;
  readonly termMarked: boolean | null;
}

/** Everything that an author is sent about the own derivation. */
export interface AuthorDerivation {
  readonly as: 'author';
  readonly derivationId: string;
  readonly round: ReadRound;
  readonly task: ReadTask;
  readonly lines: readonly ReadLine[];
  readonly canAnswer: boolean;
  readonly findings: readonly AuthorFinding[];
  readonly settled: { readonly verdict: ReadVerdict; readonly contest: ReadContest } | null;
}

/** A derivation from the teacher's side, with both names. */
export interface TeacherDerivation {
  readonly as: 'teacher';
  readonly derivationId: string;
  readonly round: ReadRound;
  readonly task: ReadTask;
  readonly lines: readonly ReadLine[];
  readonly author: string | null;
  readonly planted: boolean;
  readonly verdict: ReadVerdict | null;
  readonly findings: readonly TeacherFinding[];
  readonly rulings: readonly EarlierRuling[];
}

export interface TeacherFinding {
  readonly findingId: string;
  readonly reviewer: string | null;
  readonly pick: number | null;
  readonly noFault: boolean;
  readonly markedSpan: Span | null;
  readonly sureness: number;
  readonly slipKind: string | null;
  readonly shouldBe: string;
  readonly why: string;
  readonly answer: { readonly kind: 'accept' | 'contest'; readonly reason: string } | null;
  readonly outcome: ScoreOutcome | null;
  /** Whole points as they stand, or as they would by the present verdict; null while it is undecided. */
  readonly points: number | null;
}

export interface EarlierRuling {
  readonly rulingId: string;
  readonly roundNumber: number;
  readonly taskTitle: string;
  readonly step: number | null;
  readonly decision: 'holds' | 'fails' | 'presentation' | 'stands';
  readonly reason: string;
  readonly at: string;
}
