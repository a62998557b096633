import { randomUUID } from 'node:crypto';
import { In, IsNull, type EntityManager } from 'typeorm';
import type { RulingTrail } from '../../../shared/schemas/ruling.ts';
import type { Verdict } from '../../../shared/schemas/verdict.ts';
import { laterThan } from '../../lib/later-than.ts';
import { recordAudit } from '../audit/record.ts';
import { DerivationVersion, type Derivation } from '../derivations/derivations.entity.ts';
import type { QueueMail, RoundMailData } from '../mail/queue-mail.ts';
import { User } from '../people/people.entity.ts';
import type { Finding, Review, Score } from '../reviews/reviews.entity.ts';
import { Round } from '../rounds/rounds.entity.ts';
import { VerdictRecord } from '../verdicts/verdicts.entity.ts';
import type { Judgement } from '../../../shared/lib/judge-finding.ts';
import { Dispute, Ruling } from './disputes.entity.ts';

export interface ScoredReview {
  readonly review: Review;
  readonly finding: Finding | null;
  readonly judgement: Judgement;
  readonly latest: Score | null;
}

/** What the scoring feature hands over. */
export interface Scoring {
  findCurrentVerdicts(manager: EntityManager, versionIds: readonly string[]): Promise<Map<string, VerdictRecord>>;
  judge(
    manager: EntityManager,
    versionIds: readonly string[],
    instead?: ReadonlyMap<string, Verdict>,
  ): Promise<ScoredReview[]>;
  add(manager: EntityManager, scored: readonly ScoredReview[], verdictIds: ReadonlyMap<string, string>): Promise<void>;
}

export interface RulingDeps {
  readonly now: () => Date;
  readonly scoring: Scoring;
  readonly queueMail: QueueMail;
}

/** A decision on one version, ready to be written down. */
export interface RulingOrder {
  readonly versionId: string;
  readonly step: number | null;
  readonly decision: Ruling['decision'];
  readonly verdict: Verdict;
  readonly reason: string;
  readonly disputeId: string | null;
  readonly ruledById: string;
}

/**
 * Writes a ruling with the verdict and the scores that follow from it, closes the disputes that it answers, and keeps
 * before and after. All in the caller's transaction, which holds the round's lock.
 */
export async function applyRuling(
  deps: RulingDeps,
  manager: EntityManager,
  round: Round,
  order: RulingOrder,
): Promise<void> {
  const { scoring, now } = deps;
  const { versionId, verdict } = order;
  const current = (await scoring.findCurrentVerdicts(manager, [versionId])).get(versionId) ?? null;
  const scored = await scoring.judge(manager, [versionId], new Map([[versionId, verdict]]));
  const settled = round.stage === 'settled';
  const verdictId = randomUUID();
  const createdAt = laterThan(now(), current?.createdAt);
  const before = toTrail(
    current,
    current?.id ?? null,
    settled ? scored.flatMap(({ latest }) => (latest ? [latest] : [])) : [],
  );
  const after = toTrail(
    verdict,
    verdictId,
    settled ? scored.map(({ review, judgement }) => ({ reviewId: review.id, ...judgement })) : [],
  );
  const rulingId = randomUUID();
  await manager.insert(Ruling, {
    id: rulingId,
    roundId: round.id,
    versionId,
    disputeId: order.disputeId,
    ruledById: order.ruledById,
    step: order.step,
    decision: order.decision,
    outcome: verdict.outcome,
    firstFault: verdict.firstFault,
    reason: order.reason,
    before: before as object,
    after: after as object,
    createdAt,
  });
  await insertVerdict(manager, {
    id: verdictId,
    versionId,
    rulingId,
    verdict,
    createdAt,
    checkerVersion: current?.checkerVersion ?? 'none',
  });
  if (settled) await scoring.add(manager, scored, new Map([[versionId, verdictId]]));
  const raisers = await closeAnswered(manager, order, now());
  await recordAudit(manager, {
    schoolId: round.schoolId,
    actorId: order.ruledById,
    at: now(),
    action: 'ruling.made',
    objectKind: 'derivation-version',
    objectId: versionId,
    before,
    after,
    reason: order.reason,
  });
  if (settled) await mailConcerned(deps, manager, round, { rulingId, versionId, raisers, scored });
}

async function insertVerdict(
  manager: EntityManager,
  given: { id: string; versionId: string; rulingId: string; verdict: Verdict; createdAt: Date; checkerVersion: string },
): Promise<void> {
  const { verdict, ...rest } = given;
  await manager.insert(VerdictRecord, {
    ...rest,
    source: 'ruling',
    outcome: verdict.outcome,
    firstFault: verdict.firstFault,
    steps: verdict.steps as object[],
    ms: 0,
  } as object);
}

/** Closes what this ruling answers and says who had raised it. An undecided step that is left keeps its dispute. */
async function closeAnswered(manager: EntityManager, order: RulingOrder, at: Date): Promise<string[]> {
  const open = await manager.find(Dispute, { where: { versionId: order.versionId, closedAt: IsNull() } });
  const decided = order.verdict.outcome !== 'undecided';
  const answered = open.filter(({ id, kind, step }) => {
    if (id === order.disputeId && (decided || kind !== 'undecided')) return true;
    if (kind === 'undecided' || kind === 'contested-finding') return decided;
    return order.step === null || step === order.step;
  });
  if (answered.length > 0) {
    await manager.update(Dispute, { id: In(answered.map(({ id }) => id)) }, { closedAt: at, closedBy: 'ruling' });
  }
  const next = order.verdict.steps.find(({ ruling }) => ruling === 'undecided')?.step;
  if (!decided && next !== undefined) {
    await manager.update(
      Dispute,
      { versionId: order.versionId, kind: 'undecided', closedAt: IsNull() },
      { step: next },
    );
  }
  return answered.flatMap(({ raisedById }) => raisedById ?? []);
}

/** After settling a ruling reaches everyone concerned at once: author, reviewers, and whoever had contested. */
async function mailConcerned(
  { queueMail }: RulingDeps,
  manager: EntityManager,
  round: Round,
  given: { rulingId: string; versionId: string; raisers: readonly string[]; scored: readonly ScoredReview[] },
): Promise<void> {
  const version = await manager.findOneOrFail(DerivationVersion, {
    where: { id: given.versionId },
    relations: { derivation: true },
  });
  const ids = new Set([...given.raisers, ...given.scored.map(({ review }) => review.reviewerId)]);
  if (version.derivation?.authorId) ids.add(version.derivation.authorId);
  const people = await manager.find(User, { where: { id: In([...ids]) }, order: { id: 'ASC' } });
  for (const person of people) {
    await queueMail(manager, {
      kind: 'ruling-after-settling',
      userId: person.id,
      data: await toRoundMail(manager, round, person),
      dedupeKey: `ruling ${given.rulingId} ${person.id}`,
    });
  }
}

/** The author learns that there is a question; it stands on the verdict's page. */
export async function mailQuestion(
  { queueMail }: Pick<RulingDeps, 'queueMail'>,
  manager: EntityManager,
  round: Round,
  derivation: Derivation,
): Promise<void> {
  if (!derivation.author) return;
  await queueMail(manager, {
    kind: 'author-asked',
    userId: derivation.author.id,
    data: { ...(await toRoundMail(manager, round, derivation.author)), derivationId: derivation.id },
  });
}

async function toRoundMail(manager: EntityManager, round: Round, person: User): Promise<RoundMailData> {
  const full = await manager.findOneOrFail(Round, { where: { id: round.id }, relations: { class: true } });
  return {
    name: person.name,
    className: full.class?.name ?? '',
    taskTitle: full.frozen?.title ?? '',
    roundId: round.id,
    timeZone: full.class?.timeZone ?? 'UTC',
  };
}

function toTrail(
  verdict: Pick<Verdict, 'outcome' | 'firstFault'> | null,
  verdictId: string | null,
  scores: readonly { reviewId: string; points: number; counted: boolean }[],
): RulingTrail {
  return {
    outcome: verdict?.outcome ?? 'undecided',
    firstFault: verdict?.firstFault ?? null,
    verdictId,
    scores: scores.map(({ reviewId, points, counted }) => ({ reviewId, points, counted })),
  };
}
