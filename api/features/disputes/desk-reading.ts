import { In, IsNull, type DataSource } from 'typeorm';
import type { Decision, DisputeCase, DisputeItem, DisputeNames } from '../../../shared/schemas/dispute.ts';
import { ProblemError } from '../../http/problem-error.ts';
import type { Viewer } from '../../http/route.ts';
import { recordAudit } from '../audit/record.ts';
import { Membership } from '../classes/classes.entity.ts';
import { DerivationVersion } from '../derivations/derivations.entity.ts';
import { Review } from '../reviews/reviews.entity.ts';
import { buildCase, buildItems, type DeskDeps } from './desk-views.ts';
import { Dispute } from './disputes.entity.ts';
import { getCase, seesNames } from './open-case.ts';
import { findEffect } from './ruling-effect.ts';

export interface DeskReadingDeps extends DeskDeps {
  readonly db: DataSource;
  readonly now: () => Date;
}

/** What is read on the desk: the queue, a case, its names on demand, and what a ruling would change. */
export function createDeskReading(deps: DeskReadingDeps) {
  const { db, now, scoring } = deps;

  async function list(viewer: Viewer, classId: string | undefined): Promise<DisputeItem[]> {
    const { manager } = db;
    const desks = await manager.find(Membership, {
      where: {
        userId: viewer.userId,
        role: In(['teacher', 'assistant']),
        removedAt: IsNull(),
        ...(classId && { classId }),
      },
    });
    if (desks.length === 0) return [];
    const disputes = await manager.find(Dispute, {
      where: { closedAt: IsNull(), round: { classId: In(desks.map((desk) => desk.classId)) } },
      relations: { round: { class: true }, version: true },
      order: { openedAt: 'ASC', id: 'ASC' },
    });
    return await buildItems(deps, manager, disputes);
  }

  async function read(viewer: Viewer, disputeId: string): Promise<DisputeCase> {
    const { manager } = db;
    const { dispute, membership } = await getCase(manager, disputeId, viewer);
    return await buildCase(deps, manager, dispute, seesNames(membership));
  }

  /** Tells the names, and keeps that they were asked for. */
  async function revealNames(viewer: Viewer, disputeId: string): Promise<DisputeNames> {
    return await db.transaction(async (manager) => {
      const { dispute, membership } = await getCase(manager, disputeId, viewer);
      if (!seesNames(membership))
        throw new ProblemError('not-allowed', { detail: 'The teacher of this class keeps names hidden.' });
      const version = await manager.findOneOrFail(DerivationVersion, {
        where: { id: dispute.versionId },
        relations: { derivation: { author: true } },
      });
      const reviews = await manager.find(Review, {
        where: { versionId: dispute.versionId },
        relations: { reviewer: true },
      });
      const findings = await deps.findFindingsInForce(
        manager,
        reviews.map((review) => review.id),
      );
      await recordAudit(manager, {
        schoolId: viewer.schoolId,
        actorId: viewer.userId,
        at: now(),
        action: 'dispute.names-shown',
        objectKind: 'dispute',
        objectId: dispute.id,
      });
      return {
        author: version.derivation?.author?.name ?? null,
        reviewers: Object.fromEntries(
          reviews.flatMap((review) => {
            const finding = findings.get(review.id);
            return finding && review.reviewer ? [[finding.id, review.reviewer.name]] : [];
          }),
        ),
      };
    });
  }

  return {
    list,
    read,
    revealNames,
    findEffect: (viewer: Viewer, disputeId: string, decision: Decision, along: boolean) =>
      findEffect(scoring, db.manager, { viewer, disputeId, decision, along }),
  };
}
