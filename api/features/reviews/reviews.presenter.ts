import type { FindingDraft, SlipKind } from '../../../shared/schemas/finding.ts';
import type { ReviewAnswer, ReviewResult } from '../../../shared/schemas/review.ts';
import type { HandedInLine } from '../../../shared/schemas/sheet.ts';
import { toReadLines, toReadRound, toReadTask } from '../../lib/present-round.ts';
import type { Round } from '../rounds/rounds.entity.ts';
import type { Finding, Review } from './reviews.entity.ts';

export interface PresentedReview {
  readonly review: Review;
  readonly round: Round;
  readonly lines: readonly HandedInLine[];
  readonly total: number;
  readonly finding: Finding | null;
  readonly canEdit: boolean;
  /** Given only for a settled round. */
  readonly result: ReviewResult | null;
}

/** All that a reviewer is sent; nothing of the author, and nothing of a verdict before settling. */
export function toReviewAnswer({
  review,
  round,
  lines,
  total,
  finding,
  canEdit,
  result,
}: PresentedReview): ReviewAnswer {
  return {
    as: 'reviewer',
    reviewId: review.id,
    position: review.position,
    total,
    round: toReadRound(round),
    task: toReadTask(round),
    lines: toReadLines(lines),
    draft: review.draft,
    draftVersion: review.draftVersion,
    finding: finding && toOwnFinding(finding),
    setAside: review.setAside,
    canEdit,
    result,
  };
}

/** "Can't tell" picks nothing: whatever was still chosen is not handed in. */
export function toFinding(
  given: FindingDraft,
): Pick<Finding, 'pick' | 'noFault' | 'sureness' | 'markedSpan' | 'slipKind' | 'shouldBe' | 'why'> {
  const said = given.sureness > 0;
  const pick = said && typeof given.pick === 'number' ? given.pick : null;
  return {
    pick,
    noFault: said && given.pick === 'none',
    sureness: given.sureness,
    markedSpan: pick === null ? null : given.markedSpan,
    slipKind: pick === null ? null : given.slipKind,
    shouldBe: pick === null ? '' : given.shouldBe,
    why: given.why,
  };
}

function toOwnFinding(finding: Finding): FindingDraft {
  return {
    pick: finding.noFault ? 'none' : finding.pick,
    markedSpan: finding.markedSpan,
    slipKind: finding.slipKind as SlipKind | null,
    shouldBe: finding.shouldBe,
    why: finding.why,
    sureness: finding.sureness,
  };
}
