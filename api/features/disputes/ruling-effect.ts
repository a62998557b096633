import { In, type EntityManager } from 'typeorm';
import type { Decision, RulingEffect } from '../../../shared/schemas/dispute.ts';
import type { Viewer } from '../../http/route.ts';
import { DerivationVersion } from '../derivations/derivations.entity.ts';
import { getCase, toOrders } from './open-case.ts';
import type { Scoring } from './ruling.service.ts';

/** What a ruling would change: whose, how many verdicts, how many findings. Writes nothing. */
export async function findEffect(
  scoring: Scoring,
  manager: EntityManager,
  asked: { viewer: Viewer; disputeId: string; decision: Decision; along: boolean },
): Promise<RulingEffect> {
  const { viewer, disputeId, decision, along } = asked;
  const { dispute } = await getCase(manager, disputeId, viewer);
  const orders = await toOrders(scoring, manager, dispute, { decision, along, reason: '' }, viewer);
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

async function findAuthors(manager: EntityManager, versionIds: readonly string[]): Promise<string[]> {
  const versions = await manager.find(DerivationVersion, {
    where: { id: In([...versionIds]) },
    relations: { derivation: true },
  });
  return versions.flatMap((version) => version.derivation?.authorId ?? []);
}
