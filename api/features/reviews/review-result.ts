import { IsNull, type EntityManager } from 'typeorm';
import { shownPoints } from '../../../shared/lib/scoring.ts';
import type { ReadContest, ReviewResult } from '../../../shared/schemas/review.ts';
import type { HandedInLine } from '../../../shared/schemas/sheet.ts';
import type { FrozenTask } from '../../../shared/schemas/task.ts';
import type { Verdict } from '../../../shared/schemas/verdict.ts';
import { ProblemError } from '../../http/problem-error.ts';
import { contestEndsAt } from '../../lib/contest-window.ts';
import { toReadVerdict } from '../../lib/present-round.ts';
import { Dispute } from '../disputes/disputes.entity.ts';
import type { VerdictRecord } from '../verdicts/verdicts.entity.ts';
import { Score, type Finding, type Review } from './reviews.entity.ts';

export interface ResultDeps {
  readonly now: () => Date;
  /** Rules on the lines of a finding under a task's terms, once. */
  readonly checkLines: (
    findingId: string,
    task: FrozenTask,
    lines: readonly Pick<HandedInLine, 'tex' | 'uses'>[],
  ) => Promise<Pick<Verdict, 'steps'>>;
  readonly findCurrentVerdicts: (
    manager: EntityManager,
    versionIds: readonly string[],
  ) => Promise<Map<string, VerdictRecord>>;
}

/** What came of a review; call only when its round is settled. Null for one that was never scored. */
export async function findReviewResult(
  { now, findCurrentVerdicts, checkLines }: ResultDeps,
  manager: EntityManager,
  review: Review,
  finding: Finding | null,
): Promise<ReviewResult | null> {
  const settledAt = review.round?.settledAt;
  const scores = await manager.find(Score, { where: { reviewId: review.id }, order: { createdAt: 'ASC', id: 'ASC' } });
  const score = scores.at(-1);
  if (!score || !settledAt) return null;
  const verdict = (await findCurrentVerdicts(manager, [review.versionId])).get(review.versionId);
  return {
    verdict: toReadVerdict(verdict ?? { outcome: 'undecided', firstFault: null, steps: [], source: 'checker' }),
    outcome: score.outcome,
    points: shownPoints(score.points),
    counted: score.counted,
    slipNamed: score.slipNamed,
    termMarked: score.termMarked,
    rescored: scores.length > 1,
    shouldBe: await ruleShouldBe(checkLines, review, finding),
    contest: await findContest(
      manager,
      review.reviewerId,
      review.versionId,
      contestEndsAt(settledAt),
      finding !== null,
      now(),
    ),
  };
}

/** The reviewer's own line, as it was handed in, against the line above it. */
async function ruleShouldBe(
  checkLines: ResultDeps['checkLines'],
  { round, version }: Review,
  finding: Finding | null,
): Promise<ReviewResult['shouldBe']> {
  const pick = finding?.pick;
  if (!finding || !pick || finding.shouldBe.trim() === '' || !round?.frozen || !version) return null;
  const lines = [...version.lines.slice(0, pick), { tex: finding.shouldBe, uses: version.lines[pick]?.uses ?? null }];
  const { steps } = await checkLines(finding.id, round.frozen, lines);
  return steps.find(({ step }) => step === pick)?.ruling ?? 'undecided';
}

async function findContest(
  manager: EntityManager,
  userId: string,
  versionId: string,
  endsAt: Date,
  possible: boolean,
  at: Date,
): Promise<ReadContest> {
  const mine = await manager.findOne(Dispute, {
    where: { versionId, raisedById: userId, kind: 'contested-points' },
    order: { openedAt: 'DESC', id: 'DESC' },
  });
  return {
    openUntil: possible && at <= endsAt ? endsAt.toISOString() : null,
    mine: mine && { words: mine.words, open: mine.closedAt === null, question: null, answer: null },
  };
}

/** Puts the points of a review on the teacher's desk. Needs the review with its round, and the round locked. */
export async function contestPoints(
  deps: ResultDeps,
  manager: EntityManager,
  review: Review,
  finding: Finding | null,
  words: string,
): Promise<void> {
  const settledAt = review.round?.settledAt;
  if (review.round?.stage !== 'settled' || !settledAt)
    throw new ProblemError('wrong-stage', { detail: 'The round is not settled yet.' });
  if (!finding)
    throw new ProblemError('conflict', { detail: 'Nothing was handed in, so there are no points to contest.' });
  if (deps.now() > contestEndsAt(settledAt))
    throw new ProblemError('too-late', { detail: 'The week for contesting is over.' });
  const verdict = (await deps.findCurrentVerdicts(manager, [review.versionId])).get(review.versionId);
  const undecided = verdict?.steps.find((step) => step.ruling === 'undecided')?.step;
  const isOpen = await manager.existsBy(Dispute, {
    versionId: review.versionId,
    raisedById: review.reviewerId,
    closedAt: IsNull(),
  });
  if (isOpen)
    throw new ProblemError('conflict', { detail: 'You have contested this already; your teacher will look at it.' });
  await manager.insert(Dispute, {
    roundId: review.roundId,
    versionId: review.versionId,
    kind: 'contested-points',
    step: verdict?.firstFault ?? undecided ?? finding.pick ?? 1,
    findingId: finding.id,
    raisedById: review.reviewerId,
    words,
    openedAt: deps.now(),
  });
}
