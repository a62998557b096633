import { In, IsNull, type EntityManager } from 'typeorm';
import type { Decision } from '../../../shared/schemas/dispute.ts';
import type { StepRuling } from '../../../shared/schemas/verdict.ts';
import { notFound } from '../../http/problem-error.ts';
import type { Viewer } from '../../http/route.ts';
import { Membership } from '../classes/classes.entity.ts';
import { DerivationVersion } from '../derivations/derivations.entity.ts';
import { Dispute } from './disputes.entity.ts';
import { ruleStep, undecidedSteps } from './rule-steps.ts';
import type { RulingOrder, Scoring } from './ruling.service.ts';
import { loadSameSteps, type StepPlace } from './same-steps.ts';

export interface OpenCase {
  readonly dispute: Dispute;
  readonly membership: Membership;
}

/** @throws {ProblemError} not-found for everyone who is neither teacher nor assistant of the class. */
export async function getCase(manager: EntityManager, disputeId: string, viewer: Viewer): Promise<OpenCase> {
  const dispute = await manager.findOne(Dispute, {
    where: { id: disputeId },
    relations: { round: { class: true }, version: true },
  });
  const membership =
    dispute?.round && (await findMembership(manager, dispute.round.classId, viewer, ['teacher', 'assistant']));
  if (!dispute || !membership) throw notFound();
  return { dispute, membership };
}

/** The viewer's place in the class, in one of these roles. */
export async function findMembership(
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

/** Teachers always; assistants where the class allows it. */
export function seesNames({ role, class: of }: Membership): boolean {
  return role === 'teacher' || (role === 'assistant' && of?.assistantsSeeNames === true);
}

/** What one decision on a dispute's step means for each derivation that it is applied to. */
export async function toOrders(
  scoring: Scoring,
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
      verdict: ruleStep(await findSteps(scoring, manager, versionId), step, form.decision),
      reason: form.reason,
      disputeId: versionId === own.versionId ? dispute.id : null,
      ruledById: viewer.userId,
    });
  }
  return orders;
}

/** The steps of a version as they are ruled now. */
export async function findSteps(
  scoring: Scoring,
  manager: EntityManager,
  versionId: string,
): Promise<readonly StepRuling[]> {
  const verdict = (await scoring.findCurrentVerdicts(manager, [versionId])).get(versionId);
  if (verdict) return verdict.steps;
  const version = await manager.findOneByOrFail(DerivationVersion, { id: versionId });
  return undecidedSteps(version.lines.length - 1);
}
