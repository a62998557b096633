import { IsNull, type DataSource, type EntityManager } from 'typeorm';
import { EMPTY_DRAFT, type FindingDraft } from '../../../shared/schemas/finding.ts';
import type { DraftSaved, ReviewAnswer } from '../../../shared/schemas/review.ts';
import { namesInText } from '../../../shared/lib/names-in-text.ts';
import { ProblemError } from '../../http/problem-error.ts';
import type { Viewer } from '../../http/route.ts';
import { laterThan } from '../../lib/later-than.ts';
import { lockRound } from '../../lib/lock-round.ts';
import { recordAudit } from '../audit/record.ts';
import { Membership } from '../classes/classes.entity.ts';
import { findEnd, findInForce, getReview, isOpen, loaded, lockOpenReview, requireOpen } from './open-review.ts';
import { Finding, Review } from './reviews.entity.ts';
import { toFinding, toReviewAnswer } from './reviews.presenter.ts';
import { contestPoints, findReviewResult, type ResultDeps } from './review-result.ts';

export interface ReviewsDeps extends ResultDeps {
  readonly db: DataSource;
  readonly now: () => Date;
}

export type ReviewsService = ReturnType<typeof createReviewsService>;

/** What a reviewer does with a derivation that was dealt to them. */
export function createReviewsService(deps: ReviewsDeps) {
  const { db, now } = deps;

  async function read(viewer: Viewer, reviewId: string): Promise<ReviewAnswer> {
    const { manager } = db;
    const review = await getReview(manager, reviewId, viewer);
    const round = loaded(review.round);
    const canEdit = isOpen(review, round, await findEnd(manager, review, round), now());
    if (canEdit && review.openedAt === null)
      await manager.update(Review, { id: reviewId, openedAt: IsNull() }, { openedAt: now() });
    const total = await manager.countBy(Review, { roundId: review.roundId, reviewerId: viewer.userId });
    const finding = await findInForce(manager, reviewId);
    const result = round.stage === 'settled' ? await findReviewResult(deps, manager, review, finding) : null;
    return toReviewAnswer({ review, round, lines: loaded(review.version).lines, total, finding, canEdit, result });
  }

  async function saveDraft(
    viewer: Viewer,
    reviewId: string,
    draft: FindingDraft,
    version: number,
  ): Promise<DraftSaved> {
    const { manager } = db;
    const review = await getReview(manager, reviewId, viewer);
    const round = loaded(review.round);
    requireOpen(review, round, await findEnd(manager, review, round), now());
    requireWithin(draft, review);
    await writeDraft(manager, reviewId, { draft, version, at: now() });
    return { version: version + 1, names: namesInText(draft.why, await findClassNames(manager, round.classId)) };
  }

  async function handIn(viewer: Viewer, reviewId: string, given: FindingDraft): Promise<ReviewAnswer> {
    await db.transaction(async (manager) => {
      const review = await lockOpenReview(manager, reviewId, viewer, now());
      requireWithin(given, review);
      const before = await findInForce(manager, reviewId);
      await manager.insert(Finding, {
        reviewId,
        ...toFinding(given),
        handedInAt: laterThan(now(), before?.handedInAt),
      });
      await manager.update(Review, reviewId, {
        draft: given as object,
        draftVersion: review.draftVersion + 1,
        draftSavedAt: now(),
      });
    });
    return await read(viewer, reviewId);
  }

  async function takeBack(viewer: Viewer, reviewId: string): Promise<ReviewAnswer> {
    await db.transaction(async (manager) => {
      await lockOpenReview(manager, reviewId, viewer, now());
      // All of them: an earlier one must not come back into force because the last was taken back.
      await manager.update(Finding, { reviewId, takenBackAt: IsNull() }, { takenBackAt: now() });
    });
    return await read(viewer, reviewId);
  }

  async function setAside(
    viewer: Viewer,
    reviewId: string,
    reason: NonNullable<Review['setAside']>,
  ): Promise<ReviewAnswer> {
    await db.transaction(async (manager) => {
      const review = await lockOpenReview(manager, reviewId, viewer, now());
      if (await findInForce(manager, reviewId)) {
        throw new ProblemError('conflict', { detail: 'Take your finding back first.' });
      }
      await manager.update(Review, reviewId, { setAside: reason });
      await recordSetAside(manager, viewer, review, reason, now());
    });
    return await read(viewer, reviewId);
  }

  async function contest(viewer: Viewer, reviewId: string, words: string): Promise<ReviewAnswer> {
    await db.transaction(async (manager) => {
      const found = await getReview(manager, reviewId, viewer);
      await lockRound(manager, found.roundId, 'write');
      const review = await getReview(manager, reviewId, viewer);
      await contestPoints(deps, manager, review, await findInForce(manager, reviewId), words);
    });
    return await read(viewer, reviewId);
  }

  return { read, saveDraft, handIn, takeBack, setAside, contest };
}

/** It takes the review out of the reviewer's mark, so it stands in the trail. */
async function recordSetAside(
  manager: EntityManager,
  viewer: Viewer,
  review: Review,
  reason: NonNullable<Review['setAside']>,
  at: Date,
): Promise<void> {
  await recordAudit(manager, {
    schoolId: viewer.schoolId,
    actorId: viewer.userId,
    at,
    action: 'review.set-aside',
    objectKind: 'review',
    objectId: review.id,
    before: { setAside: review.setAside },
    after: { setAside: reason },
    reason,
  });
}

/** @throws {ProblemError} conflict, with what stands there, when the draft is no longer at this version. */
async function writeDraft(
  manager: EntityManager,
  reviewId: string,
  { draft, version, at }: { draft: FindingDraft; version: number; at: Date },
): Promise<void> {
  const saved = await manager
    .createQueryBuilder()
    .update(Review)
    .set({ draft: () => ':draft::jsonb', draftVersion: version + 1, draftSavedAt: at })
    .where('id = :reviewId and draft_version = :version', { reviewId, version })
    .setParameter('draft', JSON.stringify(draft))
    .execute();
  if (saved.affected === 0) throw await toConflict(manager, reviewId);
}

async function findClassNames(manager: EntityManager, classId: string): Promise<string[]> {
  const members = await manager.find(Membership, {
    where: { classId, removedAt: IsNull() },
    relations: { user: true },
  });
  return members.flatMap((member) => (member.user ? [member.user.name] : []));
}

async function toConflict(manager: EntityManager, reviewId: string): Promise<ProblemError> {
  const { draft, draftVersion } = await manager.findOneByOrFail(Review, { id: reviewId });
  return new ProblemError('conflict', {
    detail: 'This review was changed in another window.',
    extra: { draft: draft ?? EMPTY_DRAFT, version: draftVersion },
  });
}

function requireWithin({ pick, markedSpan }: FindingDraft, review: Review): void {
  const lines = loaded(review.version).lines;
  if (typeof pick === 'number' && pick >= lines.length) {
    throw new ProblemError('invalid-fields', { errors: [{ pointer: '/pick', detail: 'There is no such step.' }] });
  }
  const length = typeof pick === 'number' ? (lines[pick]?.tex.length ?? 0) : 0;
  if (markedSpan && markedSpan.end > length) {
    throw new ProblemError('invalid-fields', {
      errors: [{ pointer: '/markedSpan', detail: 'The marked part is not in this line.' }],
    });
  }
}
