import { In, type EntityManager } from 'typeorm';
import { toReadSteps } from '../../../shared/lib/judge-finding.ts';
import { shownPoints } from '../../../shared/lib/scoring.ts';
import type { DisputeCase, DisputeItem } from '../../../shared/schemas/dispute.ts';
import type { EarlierRuling, TeacherFinding } from '../../../shared/schemas/review.ts';
import { toReadLines, toReadRound, toReadTask, toReadVerdict } from '../../lib/present-round.ts';
import { DerivationVersion } from '../derivations/derivations.entity.ts';
import { Answer, Review, type Finding } from '../reviews/reviews.entity.ts';
import type { VerdictRecord } from '../verdicts/verdicts.entity.ts';
import { Dispute, Ruling } from './disputes.entity.ts';
import { undecidedSteps } from './rule-steps.ts';
import type { Scoring } from './ruling.service.ts';
import { loadSameSteps, type SameSteps } from './same-steps.ts';

export interface DeskDeps {
  readonly scoring: Scoring;
  readonly findFindingsInForce: (manager: EntityManager, reviewIds: readonly string[]) => Promise<Map<string, Finding>>;
}

/** The queue: most people first, then the oldest; what waits for an author's reply last. Needs round, class and version. */
export async function buildItems(
  { scoring }: DeskDeps,
  manager: EntityManager,
  disputes: readonly Dispute[],
): Promise<DisputeItem[]> {
  const same = await loadSameSteps(
    manager,
    disputes.map((dispute) => dispute.roundId),
  );
  const verdicts = await scoring.findCurrentVerdicts(
    manager,
    disputes.map((dispute) => dispute.versionId),
  );
  const touched = disputes.map((dispute) => [
    dispute.versionId,
    ...same.find(toPlace(dispute)).map((place) => place.versionId),
  ]);
  const people = await findPeople(manager, touched.flat());
  return disputes
    .map((dispute, i) =>
      toItem(
        dispute,
        verdicts.get(dispute.versionId),
        new Set((touched[i] ?? []).flatMap((id) => people.get(id) ?? [])).size,
      ),
    )
    .sort((a, b) => Number(a.asked) - Number(b.asked) || b.people - a.people || a.openedAt.localeCompare(b.openedAt));
}

/** One dispute with everything that is needed to rule on it; names are not part of it. */
export async function buildCase(
  deps: DeskDeps,
  manager: EntityManager,
  dispute: Dispute,
  mayReveal: boolean,
): Promise<DisputeCase> {
  const { round, version } = dispute;
  if (!round || !version) throw new Error('The dispute was loaded without its round and version');
  const [item] = await buildItems(deps, manager, [dispute]);
  if (!item) throw new Error('No item was made');
  const verdict = (await deps.scoring.findCurrentVerdicts(manager, [version.id])).get(version.id) ?? null;
  const same: SameSteps = await loadSameSteps(manager, [round.id]);
  const derivation = await manager.findOneOrFail(DerivationVersion, {
    where: { id: version.id },
    relations: { derivation: true },
  });
  const authorId = derivation.derivation?.authorId ?? null;
  return {
    ...item,
    round: toReadRound(round),
    task: toReadTask(round),
    lines: toReadLines(version.lines),
    verdict: verdict && toReadVerdict(verdict),
    words: dispute.words,
    raisedBy: raisedBy(dispute, authorId),
    findingId: dispute.findingId,
    findings: await findFindings(deps, manager, version.id, verdict),
    sameStep: same.find(toPlace(dispute)).length,
    question: dispute.question,
    questionAnswer: dispute.questionAnswer,
    mayAsk: round.stage === 'settled' && authorId !== null,
    mayReveal,
    earlier: await findEarlier(manager, round.classId, dispute),
  };
}

function toPlace(dispute: Dispute) {
  return { versionId: dispute.versionId, step: dispute.step ?? 1 };
}

function toItem(dispute: Dispute, verdict: VerdictRecord | undefined, people: number): DisputeItem {
  const { round, version } = dispute;
  const steps = verdict ?? { firstFault: null, steps: undecidedSteps((version?.lines.length ?? 1) - 1) };
  return {
    disputeId: dispute.id,
    kind: dispute.kind,
    className: round?.class?.name ?? '',
    timeZone: round?.class?.timeZone ?? 'UTC',
    roundNumber: round?.number ?? 0,
    taskTitle: round?.frozen?.title ?? '',
    step: dispute.step ?? 1,
    people,
    openedAt: dispute.openedAt.toISOString(),
    states: toReadSteps(steps).map((step) => step.state),
    asked: dispute.question !== null && dispute.questionAnswer === null,
  };
}

/** Author and reviewers of each version. */
async function findPeople(manager: EntityManager, versionIds: readonly string[]): Promise<Map<string, string[]>> {
  if (versionIds.length === 0) return new Map();
  const ids = [...new Set(versionIds)];
  const versions = await manager.find(DerivationVersion, { where: { id: In(ids) }, relations: { derivation: true } });
  const reviews = await manager.find(Review, { where: { versionId: In(ids) } });
  const people = new Map(
    versions.map((version) => [version.id, version.derivation?.authorId ? [version.derivation.authorId] : []]),
  );
  for (const review of reviews) if (review.setAside === null) people.get(review.versionId)?.push(review.reviewerId);
  return people;
}

function raisedBy(dispute: Dispute, authorId: string | null): 'author' | 'reviewer' | null {
  if (dispute.raisedById === null) return null;
  return dispute.raisedById === authorId ? 'author' : 'reviewer';
}

async function findFindings(
  { scoring }: DeskDeps,
  manager: EntityManager,
  versionId: string,
  verdict: VerdictRecord | null,
): Promise<TeacherFinding[]> {
  const scored = (await scoring.judge(manager, [versionId])).flatMap((each) =>
    each.finding ? [{ ...each, finding: each.finding }] : [],
  );
  const ids = scored.map(({ finding }) => finding.id);
  const answers = ids.length === 0 ? [] : await manager.find(Answer, { where: { findingId: In(ids) } });
  const answerOf = new Map(answers.map((answer) => [answer.findingId, answer]));
  return scored.map(({ finding, judgement, latest }) => {
    const worth = latest ?? (verdict && verdict.outcome !== 'undecided' ? judgement : null);
    const answer = answerOf.get(finding.id);
    return {
      findingId: finding.id,
      reviewer: null,
      pick: finding.pick,
      noFault: finding.noFault,
      markedSpan: finding.markedSpan,
      sureness: finding.sureness,
      slipKind: finding.slipKind,
      shouldBe: finding.shouldBe,
      why: finding.why,
      answer: answer ? { kind: answer.kind, reason: answer.reason } : null,
      outcome: worth?.outcome ?? null,
      points: worth ? shownPoints(worth.points) : null,
    };
  });
}

/** The last rulings in this class, those on the same task first. */
async function findEarlier(manager: EntityManager, classId: string, dispute: Dispute): Promise<EarlierRuling[]> {
  const rows = await manager.find(Ruling, {
    where: { round: { classId } },
    relations: { round: true },
    order: { createdAt: 'DESC' },
    take: 40,
  });
  const sameTask = (ruling: Ruling) => (ruling.round?.taskId === dispute.round?.taskId ? 0 : 1);
  return [...rows]
    .sort((a, b) => sameTask(a) - sameTask(b))
    .slice(0, 4)
    .map((ruling) => ({
      rulingId: ruling.id,
      roundNumber: ruling.round?.number ?? 0,
      taskTitle: ruling.round?.frozen?.title ?? '',
      step: ruling.step,
      decision: ruling.decision,
      reason: ruling.reason,
      at: ruling.createdAt.toISOString(),
    }));
}
