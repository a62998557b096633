import { IsNull, type EntityManager } from 'typeorm';
import { GRACE_MS, ownReviewingEnd } from '../../../shared/lib/round-times.ts';
import { notFound, ProblemError } from '../../http/problem-error.ts';
import type { Viewer } from '../../http/route.ts';
import { lockRound } from '../../lib/lock-round.ts';
import { Membership } from '../classes/classes.entity.ts';
import { Extension, type Round } from '../rounds/rounds.entity.ts';
import { Finding, Review } from './reviews.entity.ts';

/** @throws {ProblemError} not-found for everyone but the reviewer, who must still be in the class until the round is settled. */
export async function getReview(manager: EntityManager, reviewId: string, viewer: Viewer): Promise<Review> {
  const review = await manager.findOne(Review, {
    where: { id: reviewId, reviewerId: viewer.userId },
    relations: { round: { class: true }, version: true },
  });
  if (!review) throw notFound();
  const { stage, classId } = loaded(review.round);
  if (stage !== 'settled' && !(await isStudent(manager, classId, viewer.userId))) throw notFound();
  return review;
}

async function isStudent(manager: EntityManager, classId: string, userId: string): Promise<boolean> {
  return await manager.existsBy(Membership, { classId, userId, role: 'student', removedAt: IsNull() });
}

/** What is handed in now. */
export async function findInForce(manager: EntityManager, reviewId: string): Promise<Finding | null> {
  return await manager.findOne(Finding, {
    where: { reviewId, takenBackAt: IsNull() },
    order: { handedInAt: 'DESC', id: 'DESC' },
  });
}

/** When reviewing ends for this reviewer. */
export async function findEnd(manager: EntityManager, review: Review, round: Round): Promise<Date> {
  const extension = await manager.findOneBy(Extension, { roundId: round.id, userId: review.reviewerId });
  return ownReviewingEnd(round, extension);
}

/** A relation that the query asked for. */
export function loaded<T>(relation: T | undefined): T {
  if (relation === undefined) throw new Error('A relation was not loaded');
  return relation;
}

/** Locks round and review, so that no finding lands after the stage has changed. */
export async function lockOpenReview(
  manager: EntityManager,
  reviewId: string,
  viewer: Viewer,
  at: Date,
): Promise<Review> {
  const found = await getReview(manager, reviewId, viewer);
  const round = await lockRound(manager, found.roundId, 'read');
  await manager.findOneOrFail(Review, { where: { id: reviewId }, lock: { mode: 'pessimistic_write' } });
  const review = await getReview(manager, reviewId, viewer);
  requireOpen(review, round, await findEnd(manager, review, round), at);
  return review;
}

/** Whether the review can be changed now. */
export function isOpen(review: Review, round: Round, endsAt: Date, at: Date): boolean {
  return round.stage === 'reviewing' && review.setAside === null && at.getTime() <= endsAt.getTime() + GRACE_MS;
}

/** @throws {ProblemError} saying why, unless the review can be changed now. */
export function requireOpen(review: Review, round: Round, endsAt: Date, at: Date): void {
  if (round.stage !== 'reviewing') throw new ProblemError('wrong-stage', { detail: 'Reviewing is over.' });
  if (review.setAside !== null) throw new ProblemError('conflict', { detail: 'You have set this review aside.' });
  if (!isOpen(review, round, endsAt, at)) throw new ProblemError('too-late', { detail: 'Reviewing has ended.' });
}
