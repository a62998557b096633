import { IsNull, type EntityManager } from 'typeorm';
import type { AnswerForm } from '../../../shared/schemas/finding.ts';
import type { Verdict } from '../../../shared/schemas/verdict.ts';
import { Dispute } from '../disputes/disputes.entity.ts';
import { Answer, type Finding, type Review } from '../reviews/reviews.entity.ts';
import type { ViewDeps } from './derivation-views.ts';

/** The last answer counts. */
export async function saveAnswer(manager: EntityManager, findingId: string, form: AnswerForm, at: Date): Promise<void> {
  const known = await manager.findOneBy(Answer, { findingId });
  if (known) await manager.update(Answer, known.id, { ...form, updatedAt: at });
  else await manager.insert(Answer, { findingId, ...form, createdAt: at, updatedAt: at });
}

/**
 * A contested finding goes to the desk only where the verdict is undecided or the finding agrees with it; otherwise
 * the verdict answers it at settling. The author is answered the same in every case.
 */
export async function syncDispute(
  { now, findCurrentVerdicts }: ViewDeps,
  manager: EntityManager,
  { finding, review }: { readonly finding: Finding; readonly review: Review },
  form: AnswerForm,
  authorId: string,
): Promise<void> {
  const open = await manager.findOneBy(Dispute, {
    findingId: finding.id,
    kind: 'contested-finding',
    closedAt: IsNull(),
  });
  if (form.kind === 'accept') {
    if (open) await manager.update(Dispute, open.id, { closedAt: now(), closedBy: 'withdrawn' });
    return;
  }
  if (open) {
    await manager.update(Dispute, open.id, { words: form.reason });
    return;
  }
  // The teacher has ruled on it: saying the same again does not bring it back to the desk.
  const asked = { findingId: finding.id, kind: 'contested-finding' as const };
  if (await manager.existsBy(Dispute, { ...asked, closedBy: 'ruling' })) return;
  const verdict = (await findCurrentVerdicts(manager, [review.versionId])).get(review.versionId) ?? null;
  if (!isForTheDesk(finding, verdict)) return;
  await manager.insert(Dispute, {
    roundId: review.roundId,
    versionId: review.versionId,
    kind: 'contested-finding',
    step: finding.pick ?? verdict?.steps.find((step) => step.ruling === 'undecided')?.step ?? 1,
    findingId: finding.id,
    raisedById: authorId,
    words: form.reason,
    openedAt: now(),
  });
}

/** Whether a contested finding needs a ruling: nothing is decided yet, or the finding says what the verdict says. */
export function isForTheDesk(
  finding: Pick<Finding, 'pick' | 'noFault'>,
  verdict: Pick<Verdict, 'outcome' | 'firstFault'> | null,
): boolean {
  if (!verdict || verdict.outcome === 'undecided') return true;
  return verdict.firstFault === null ? finding.noFault : finding.pick === verdict.firstFault;
}
