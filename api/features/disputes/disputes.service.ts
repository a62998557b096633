import { In, IsNull, type DataSource, type EntityManager } from 'typeorm';
import type { z } from 'zod';
import type {
  Decision,
  DisputeCase,
  DisputeItem,
  DisputeNames,
  overruleSchema,
  rulingFormSchema,
  RulingEffect,
} from '../../../shared/schemas/dispute.ts';
import { notFound, ProblemError } from '../../http/problem-error.ts';
import type { Viewer } from '../../http/route.ts';
import { lockRound } from '../../lib/lock-round.ts';
import { recordAudit } from '../audit/record.ts';
import { Membership } from '../classes/classes.entity.ts';
import { Derivation, DerivationVersion } from '../derivations/derivations.entity.ts';
import { Review } from '../reviews/reviews.entity.ts';
import { Dispute } from './disputes.entity.ts';
import { buildCase, buildItems, type DeskDeps } from './desk-views.ts';
import { ruleFirstFault, ruleStep, undecidedSteps } from './rule-steps.ts';
import { applyRuling, type RulingDeps, type RulingOrder } from './ruling.service.ts';
import { loadSameSteps, type StepPlace } from './same-steps.ts';

export interface DisputesDeps extends RulingDeps, DeskDeps {
  readonly db: DataSource;
}

export type DisputesService = ReturnType<typeof createDisputesService>;

interface OpenCase {
  readonly dispute: Dispute;
  readonly membership: Membership;
}

/** The desk on which teachers and assistants settle what is contested or undecided. */
export function createDisputesService(deps: DisputesDeps) {
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

  async function findEffect(
    viewer: Viewer,
    disputeId: string,
    decision: Decision,
    along: boolean,
  ): Promise<RulingEffect> {
    const { manager } = db;
    const { dispute } = await getCase(manager, disputeId, viewer);
    const orders = await toOrders(manager, dispute, { decision, along, reason: '' }, viewer);
    const before = await scoring.findCurrentVerdicts(
      manager,
      orders.map((order) => order.versionId),
    );
    const becomes = { sound: 0, faulty: 0, undecided: 0 };
    let unchanged = 0;
    for (const { versionId, verdict } of orders) {
      const old = before.get(versionId);
      const same = old?.outcome === verdict.outcome && old.firstFault === verdict.firstFault;
      if (same) unchanged += 1;
      else becomes[verdict.outcome] += 1;
    }
    const scored = await scoring.judge(
      manager,
      orders.map((order) => order.versionId),
    );
    const authors = await findAuthors(
      manager,
      orders.map((order) => order.versionId),
    );
    const people = new Set([
      ...authors,
      ...scored.filter(({ review }) => review.setAside === null).map(({ review }) => review.reviewerId),
    ]);
    return {
      people: people.size,
      becomes,
      unchanged,
      findings: scored.filter(({ finding }) => finding !== null).length,
      settled: dispute.round?.stage === 'settled',
    };
  }

  async function rule(viewer: Viewer, disputeId: string, form: z.infer<typeof rulingFormSchema>): Promise<void> {
    await db.transaction(async (manager) => {
      const found = await getCase(manager, disputeId, viewer);
      const round = await lockRound(manager, found.dispute.roundId, 'write');
      const { dispute } = await getCase(manager, disputeId, viewer);
      if (dispute.closedAt) throw new ProblemError('conflict', { detail: 'This was settled in the meantime.' });
      for (const order of await toOrders(manager, dispute, form, viewer))
        await applyRuling(deps, manager, round, order);
    });
  }

  /** @throws {ProblemError} wrong-stage before settling: a question would tell the author that something is amiss. */
  async function ask(viewer: Viewer, disputeId: string, question: string): Promise<void> {
    await db.transaction(async (manager) => {
      const found = await getCase(manager, disputeId, viewer);
      const round = await lockRound(manager, found.dispute.roundId, 'write');
      const { dispute } = await getCase(manager, disputeId, viewer);
      if (round.stage !== 'settled')
        throw new ProblemError('wrong-stage', { detail: 'The author can be asked only after settling.' });
      if (dispute.closedAt) throw new ProblemError('conflict', { detail: 'This was settled in the meantime.' });
      const version = await manager.findOneOrFail(DerivationVersion, {
        where: { id: dispute.versionId },
        relations: { derivation: { author: true } },
      });
      if (!version.derivation?.author)
        throw new ProblemError('conflict', { detail: 'This derivation has no author to ask.' });
      await manager.update(Dispute, dispute.id, { question, questionAnswer: null });
      await recordAudit(manager, {
        schoolId: round.schoolId,
        actorId: viewer.userId,
        at: now(),
        action: 'dispute.author-asked',
        objectKind: 'dispute',
        objectId: dispute.id,
        after: { question },
      });
    });
  }

  /** A teacher's verdict on any derivation of the class, whatever the checker says. */
  async function overrule(viewer: Viewer, derivationId: string, form: z.infer<typeof overruleSchema>): Promise<void> {
    await db.transaction(async (manager) => {
      const derivation = await manager.findOne(Derivation, { where: { id: derivationId }, relations: { round: true } });
      const teacher =
        derivation?.round && (await findMembership(manager, derivation.round.classId, viewer, ['teacher']));
      if (!derivation || !teacher) throw notFound();
      const round = await lockRound(manager, derivation.roundId, 'write');
      if (!derivation.currentVersionId) throw new ProblemError('wrong-stage', { detail: 'Nothing was handed in.' });
      if (round.stage === 'planned' || round.stage === 'writing')
        throw new ProblemError('wrong-stage', { detail: 'Writing is still open.' });
      const steps = await findSteps(manager, derivation.currentVersionId);
      if (form.firstFault !== null && form.firstFault > steps.length) {
        throw new ProblemError('invalid-fields', {
          errors: [{ pointer: '/firstFault', detail: 'There is no such step.' }],
        });
      }
      await applyRuling(deps, manager, round, {
        versionId: derivation.currentVersionId,
        step: form.firstFault,
        decision: form.firstFault === null ? 'holds' : 'fails',
        verdict: ruleFirstFault(steps, form.firstFault),
        reason: form.reason,
        disputeId: null,
        ruledById: viewer.userId,
      });
    });
  }

  async function toOrders(
    manager: EntityManager,
    dispute: Dispute,
    form: { decision: Decision; along: boolean; reason: string },
    viewer: Viewer,
  ): Promise<RulingOrder[]> {
    const own: StepPlace = { versionId: dispute.versionId, step: dispute.step ?? 1 };
    const others = form.along ? (await loadSameSteps(manager, [dispute.roundId])).find(own) : [];
    const orders: RulingOrder[] = [];
    for (const { versionId, step } of [own, ...others]) {
      orders.push({
        versionId,
        step,
        decision: form.decision,
        verdict: ruleStep(await findSteps(manager, versionId), step, form.decision),
        reason: form.reason,
        disputeId: versionId === own.versionId ? dispute.id : null,
        ruledById: viewer.userId,
      });
    }
    return orders;
  }

  async function findSteps(manager: EntityManager, versionId: string) {
    const verdict = (await scoring.findCurrentVerdicts(manager, [versionId])).get(versionId);
    if (verdict) return verdict.steps;
    const version = await manager.findOneByOrFail(DerivationVersion, { id: versionId });
    return undecidedSteps(version.lines.length - 1);
  }

  return { list, read, revealNames, findEffect, rule, ask, overrule };
}

async function getCase(manager: EntityManager, disputeId: string, viewer: Viewer): Promise<OpenCase> {
  const dispute = await manager.findOne(Dispute, {
    where: { id: disputeId },
    relations: { round: { class: true }, version: true },
  });
  const membership =
    dispute?.round && (await findMembership(manager, dispute.round.classId, viewer, ['teacher', 'assistant']));
  if (!dispute || !membership) throw notFound();
  return { dispute, membership };
}

async function findMembership(
  manager: EntityManager,
  classId: string,
  viewer: Viewer,
  roles: Membership['role'][],
): Promise<Membership | null> {
  return await manager.findOne(Membership, {
    where: { classId, userId: viewer.userId, role: In(roles), removedAt: IsNull() },
    relations: { class: true },
  });
}

function seesNames({ role, class: of }: Membership): boolean {
  return role === 'teacher' || (role === 'assistant' && of?.assistantsSeeNames === true);
}

async function findAuthors(manager: EntityManager, versionIds: readonly string[]): Promise<string[]> {
  const versions = await manager.find(DerivationVersion, {
    where: { id: In([...versionIds]) },
    relations: { derivation: true },
  });
  return versions.flatMap((version) => version.derivation?.authorId ?? []);
}
