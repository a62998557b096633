/** What arrives this long after an instant still counts as in time. */
export const GRACE_MS = 120_000;

/** Verdict and points can be contested this long after settling. */
export const CONTEST_MS = 7 * 86_400_000;

export interface RoundTimes {
  readonly writingEndsAt: Date;
  readonly reviewingEndsAt: Date;
}

/** One person's own times. */
export interface OwnTimes {
  readonly writingEndsAt: Date | null;
  readonly reviewingEndsAt: Date | null;
}

/** When late derivations are dealt in one batch: half way through reviewing. */
export function lateBatchAt(round: RoundTimes): Date {
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
