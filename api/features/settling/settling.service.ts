import { In, IsNull, type EntityManager } from 'typeorm';
import type { Verdict } from '../../../shared/schemas/verdict.ts';
import { Dispute } from '../disputes/disputes.entity.ts';
import { Finding, Review, type Score } from '../reviews/reviews.entity.ts';
import type { Round } from '../rounds/rounds.entity.ts';
import type { VerdictRecord } from '../verdicts/verdicts.entity.ts';
import type { Judgement } from '../../../shared/lib/judge-finding.ts';

interface ScoredReview {
  readonly review: Review;
  readonly finding: Finding | null;
  readonly judgement: Judgement;
  readonly latest: Score | null;
}

export interface SettlingDeps {
  readonly now: () => Date;
  readonly findCurrentVerdicts: (
    manager: EntityManager,
    versionIds: readonly string[],
  ) => Promise<Map<string, VerdictRecord>>;
  readonly judge: (manager: EntityManager, versionIds: readonly string[]) => Promise<ScoredReview[]>;
  readonly addScores: (
    manager: EntityManager,
    scored: readonly ScoredReview[],
    verdictIds: ReadonlyMap<string, string>,
  ) => Promise<void>;
}

export type SettlingService = ReturnType<typeof createSettlingService>;

/** What happens to a round's findings when answering opens and when it settles; the stage machine calls it under the round's lock. */
export function createSettlingService(deps: SettlingDeps) {
  const { now } = deps;

  /** Puts every dealt derivation that is undecided on the desk. Findings are final from here on. */
  async function openAnswering(manager: EntityManager, round: Round): Promise<void> {
    await refreshDisputes(manager, round);
  }

  /**
   * Scores every review of the round. With disputes open it waits, unless forced: then those disputes are closed
   * without a ruling, and their findings are void. Safe to run twice.
   */
  async function settle(
    manager: EntityManager,
    round: Round,
    { force }: { force: boolean },
  ): Promise<{ waiting: boolean }> {
    await refreshDisputes(manager, round);
    const open = await manager.find(Dispute, { where: { roundId: round.id, closedAt: IsNull() } });
    if (open.length > 0 && !force) return { waiting: true };
    if (open.length > 0) {
      await manager.update(Dispute, { id: In(open.map(({ id }) => id)) }, { closedAt: now(), closedBy: 'void' });
    }
    const versionIds = await findDealt(manager, round);
    const verdicts = await deps.findCurrentVerdicts(manager, versionIds);
    const scored = (await deps.judge(manager, versionIds)).filter(({ latest }) => latest === null);
    await deps.addScores(manager, scored, new Map([...verdicts].map(([versionId, { id }]) => [versionId, id])));
    return { waiting: false };
  }

  /** A verdict may have come late: what it decides leaves the desk, what it leaves open comes to it. */
  async function refreshDisputes(manager: EntityManager, round: Round): Promise<void> {
    const versionIds = await findDealt(manager, round);
    const verdicts = await deps.findCurrentVerdicts(manager, versionIds);
    const open = await manager.find(Dispute, {
      where: { roundId: round.id, closedAt: IsNull() },
      relations: { finding: true },
    });
    const answered = open.filter((dispute) => isAnswered(dispute, verdicts.get(dispute.versionId)));
    if (answered.length > 0) {
      await manager.update(
        Dispute,
        { id: In(answered.map(({ id }) => id)) },
        { closedAt: now(), closedBy: 'withdrawn' },
      );
    }
    const onDesk = new Set(open.filter(({ kind }) => kind === 'undecided').map(({ versionId }) => versionId));
    const missing = versionIds.filter((versionId) => isUndecided(verdicts.get(versionId)) && !onDesk.has(versionId));
    if (missing.length === 0) return;
    await manager.insert(
      Dispute,
      missing.map((versionId) => ({
        roundId: round.id,
        versionId,
        kind: 'undecided' as const,
        step: verdicts.get(versionId)?.steps.find(({ ruling }) => ruling === 'undecided')?.step ?? 1,
        openedAt: now(),
      })),
    );
  }

  return { openAnswering, settle };
}

async function findDealt(manager: EntityManager, round: Round): Promise<string[]> {
  const reviews = await manager.find(Review, { where: { roundId: round.id }, order: { createdAt: 'ASC', id: 'ASC' } });
  return [...new Set(reviews.map(({ versionId }) => versionId))];
}

function isUndecided(verdict: Pick<Verdict, 'outcome'> | undefined): boolean {
  return verdict === undefined || verdict.outcome === 'undecided';
}

/** Whether a verdict alone answers a dispute: it decides, and the contested finding says otherwise. */
function isAnswered({ kind, finding }: Dispute, verdict: VerdictRecord | undefined): boolean {
  if (verdict === undefined || verdict.outcome === 'undecided') return false;
  if (kind === 'undecided') return true;
  if (kind !== 'contested-finding' || !finding) return false;
  const agrees = verdict.firstFault === null ? finding.noFault : finding.pick === verdict.firstFault;
  return !agrees;
}
