import type { LateRule, Stage } from '../schemas/round.ts';

/** What arrives this long after an instant still counts as in time. */
export const GRACE_MS = 120_000;

/** Verdict and points can be contested this long after settling. */
export const CONTEST_MS = 7 * 86_400_000;

export interface RoundTimes {
  readonly stage: Stage;
  readonly writingEndsAt: Date;
  readonly reviewingEndsAt: Date;
  readonly lateRule: LateRule;
}

/** One person's own times. */
export interface OwnTimes {
  readonly writingEndsAt: Date | null;
  readonly reviewingEndsAt: Date | null;
}

function graced(instant: Date): number {
  return instant.getTime() + GRACE_MS;
}

/** When late derivations are dealt in one batch: half way through reviewing. */
export function lateBatchAt(round: Pick<RoundTimes, 'writingEndsAt' | 'reviewingEndsAt'>): Date {
  return new Date((round.writingEndsAt.getTime() + round.reviewingEndsAt.getTime()) / 2);
}

/** The instant until which this person is told to write. */
export function ownWritingEnd(round: RoundTimes, own: OwnTimes | null): Date {
  const extended = own?.writingEndsAt;
  return extended && extended > round.writingEndsAt ? extended : round.writingEndsAt;
}

/** The instant until which this person is told to review. */
export function ownReviewingEnd(round: RoundTimes, own: OwnTimes | null): Date {
  const extended = own?.reviewingEndsAt;
  return extended && extended > round.reviewingEndsAt ? extended : round.reviewingEndsAt;
}

/**
 * Whether a derivation received now is taken, and whether it counts as late. One that comes when reviewing is open
 * already waits for the late batch.
 */
export function judgeHandIn(round: RoundTimes, own: OwnTimes | null, receivedAt: Date): 'in-time' | 'late' | 'closed' {
  const inOwnTime = receivedAt.getTime() <= graced(ownWritingEnd(round, own));
  if (round.stage === 'writing') return inOwnTime ? 'in-time' : round.lateRule === 'closed' ? 'closed' : 'late';
  if (round.stage !== 'reviewing') return 'closed';
  if (own?.writingEndsAt && receivedAt.getTime() <= graced(own.writingEndsAt)) return 'in-time';
  return round.lateRule === 'late-batch' && receivedAt <= lateBatchAt(round) ? 'late' : 'closed';
}

/** Whether a finding received now is taken: while reviewing, or in a person's own longer time while answering. */
export function acceptsFinding(round: RoundTimes, own: OwnTimes | null, receivedAt: Date): boolean {
  if (receivedAt.getTime() > graced(ownReviewingEnd(round, own))) return false;
  return round.stage === 'reviewing' || (round.stage === 'answering' && Boolean(own?.reviewingEndsAt));
}
