import type { DataSource } from 'typeorm';
import type { z } from 'zod';
import type { overruleSchema, rulingFormSchema } from '../../../shared/schemas/dispute.ts';
import { notFound, ProblemError } from '../../http/problem-error.ts';
import type { Viewer } from '../../http/route.ts';
import { lockRound } from '../../lib/lock-round.ts';
import { recordAudit } from '../audit/record.ts';
import { Derivation, DerivationVersion } from '../derivations/derivations.entity.ts';
import { createDeskReading } from './desk-reading.ts';
import type { DeskDeps } from './desk-views.ts';
import { Dispute } from './disputes.entity.ts';
import { findMembership, findSteps, getCase, toOrders } from './open-case.ts';
import { ruleFirstFault } from './rule-steps.ts';
import { applyRuling, mailQuestion, type RulingDeps } from './ruling.service.ts';

export interface DisputesDeps extends RulingDeps, DeskDeps {
  readonly db: DataSource;
}

export type DisputesService = ReturnType<typeof createDisputesService>;

/** The desk on which teachers and assistants settle what is contested or undecided. */
export function createDisputesService(deps: DisputesDeps) {
  const { db, now, scoring } = deps;

  async function rule(viewer: Viewer, disputeId: string, form: z.infer<typeof rulingFormSchema>): Promise<void> {
    await db.transaction(async (manager) => {
      const found = await getCase(manager, disputeId, viewer);
      const round = await lockRound(manager, found.dispute.roundId, 'write');
      const { dispute } = await getCase(manager, disputeId, viewer);
      if (dispute.closedAt) throw new ProblemError('conflict', { detail: 'This was settled in the meantime.' });
      for (const order of await toOrders(scoring, manager, dispute, form, viewer))
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
      await mailQuestion(deps, manager, round, version.derivation);
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
      const steps = await findSteps(scoring, manager, derivation.currentVersionId);
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

  return { ...createDeskReading(deps), rule, ask, overrule };
}
