import { In, IsNull, type EntityManager } from 'typeorm';
import { GRACE_MS } from '../../../shared/lib/round-times.ts';
import { judgeFinding, type Judgement } from '../../../shared/lib/judge-finding.ts';
import type {
  AuthorDerivation,
  EarlierRuling,
  ReadContest,
  TeacherDerivation,
} from '../../../shared/schemas/review.ts';
import { contestEndsAt } from '../../lib/contest-window.ts';
import { toReadLines, toReadRound, toReadTask, toReadVerdict } from '../../lib/present-round.ts';
import { DerivationVersion, type Derivation } from '../derivations/derivations.entity.ts';
import { Dispute, Ruling } from '../disputes/disputes.entity.ts';
import { User } from '../people/people.entity.ts';
import { Answer, Review, Score, type Finding } from '../reviews/reviews.entity.ts';
import type { Round } from '../rounds/rounds.entity.ts';
import type { VerdictRecord } from '../verdicts/verdicts.entity.ts';
import { toAuthorFinding, toTeacherFinding } from './answers.presenter.ts';

export interface ViewDeps {
  readonly now: () => Date;
  readonly findCurrentVerdicts: (
    manager: EntityManager,
    versionIds: readonly string[],
  ) => Promise<Map<string, VerdictRecord>>;
  readonly findFindingsInForce: (manager: EntityManager, reviewIds: readonly string[]) => Promise<Map<string, Finding>>;
}

interface Gathered {
  readonly round: Round;
  readonly version: DerivationVersion | null;
  readonly verdict: VerdictRecord | null;
  readonly entries: readonly {
    readonly review: Review;
    readonly finding: Finding;
    readonly answer: Answer | null;
    readonly score: Score | null;
  }[];
}

/** The derivation as its author meets it at the round's present stage. */
export async function findAuthorView(
  deps: ViewDeps,
  manager: EntityManager,
  derivation: Derivation,
): Promise<AuthorDerivation> {
  const { round, version, verdict, entries } = await gather(deps, manager, derivation);
  const settled = round.stage === 'settled' && round.settledAt !== null;
  const sees = round.stage === 'answering' || settled;
  const findings = sees
    ? entries.map(({ finding, answer, score }) => toAuthorFinding(finding, answer, settled ? score : null))
    : [];
  return {
    as: 'author',
    derivationId: derivation.id,
    round: toReadRound(round),
    task: toReadTask(round),
    lines: toReadLines(version?.lines ?? []),
    canAnswer: round.stage === 'answering' && deps.now().getTime() <= round.answeringEndsAt.getTime() + GRACE_MS,
    // By random key: the order says nothing about who handed in first.
    findings: findings.sort((a, b) => (a.key < b.key ? -1 : 1)),
    settled:
      settled && round.settledAt && version
        ? {
            verdict: toReadVerdict(verdict ?? { outcome: 'undecided', firstFault: null, steps: [], source: 'checker' }),
            contest: await findContest(
              manager,
              version.id,
              derivation.authorId,
              contestEndsAt(round.settledAt),
              deps.now(),
            ),
          }
        : null,
  };
}

/** The derivation from the teacher's side, with both names. */
export async function findTeacherView(
  deps: ViewDeps,
  manager: EntityManager,
  derivation: Derivation,
): Promise<TeacherDerivation> {
  const { round, version, verdict, entries } = await gather(deps, manager, derivation);
  const ids = [
    ...entries.map(({ review }) => review.reviewerId),
    ...(derivation.authorId ? [derivation.authorId] : []),
  ];
  const people = ids.length === 0 ? [] : await manager.find(User, { where: { id: In(ids) } });
  const names = new Map(people.map((person) => [person.id, person.name]));
  return {
    as: 'teacher',
    derivationId: derivation.id,
    round: toReadRound(round),
    task: toReadTask(round),
    lines: toReadLines(version?.lines ?? []),
    author: derivation.authorId ? (names.get(derivation.authorId) ?? null) : null,
    planted: derivation.kind === 'planted',
    verdict: verdict && toReadVerdict(verdict),
    findings: entries.map(({ review, finding, answer, score }) =>
      toTeacherFinding(
        finding,
        answer,
        names.get(review.reviewerId) ?? null,
        score ? toStanding(score) : prospective(finding, verdict),
      ),
    ),
    rulings: version ? await findRulings(manager, version.id, round) : [],
  };
}

/** What a finding would earn by the present verdict; null while nothing is decided. */
function prospective(finding: Finding, verdict: VerdictRecord | null): Pick<Judgement, 'outcome' | 'points'> | null {
  if (!verdict || verdict.outcome === 'undecided') return null;
  return judgeFinding(finding, verdict, () => true);
}

function toStanding({ outcome, points }: Score): Pick<Judgement, 'outcome' | 'points'> {
  return { outcome, points };
}

async function gather(deps: ViewDeps, manager: EntityManager, derivation: Derivation): Promise<Gathered> {
  const { round } = derivation;
  if (!round) throw new Error('The derivation was loaded without its round');
  const version = derivation.currentVersionId
    ? await manager.findOneBy(DerivationVersion, { id: derivation.currentVersionId })
    : null;
  const reviews = await manager.find(Review, {
    where: { derivationId: derivation.id },
    order: { createdAt: 'ASC', id: 'ASC' },
  });
  const ids = reviews.map((review) => review.id);
  const findings = await deps.findFindingsInForce(manager, ids);
  const findingIds = [...findings.values()].map((finding) => finding.id);
  const answers = findingIds.length === 0 ? [] : await manager.find(Answer, { where: { findingId: In(findingIds) } });
  const scores =
    ids.length === 0
      ? []
      : await manager.find(Score, { where: { reviewId: In(ids) }, order: { createdAt: 'ASC', id: 'ASC' } });
  const answerOf = new Map(answers.map((answer) => [answer.findingId, answer]));
  const scoreOf = new Map(scores.map((score) => [score.reviewId, score]));
  const verdicts = version ? await deps.findCurrentVerdicts(manager, [version.id]) : new Map<string, VerdictRecord>();
  const entries = reviews.flatMap((review) => {
    const finding = findings.get(review.id);
    return finding
      ? [{ review, finding, answer: answerOf.get(finding.id) ?? null, score: scoreOf.get(review.id) ?? null }]
      : [];
  });
  return { round, version, verdict: (version && verdicts.get(version.id)) ?? null, entries };
}

async function findContest(
  manager: EntityManager,
  versionId: string,
  authorId: string | null,
  endsAt: Date,
  at: Date,
): Promise<ReadContest> {
  const openUntil = at <= endsAt ? endsAt.toISOString() : null;
  const mine = await manager.findOne(Dispute, {
    where: { versionId, raisedById: authorId ?? IsNull(), kind: 'contested-verdict' },
    order: { openedAt: 'DESC', id: 'DESC' },
  });
  const asked = await manager
    .createQueryBuilder(Dispute, 'dispute')
    .where('dispute.versionId = :versionId and dispute.question is not null and dispute.closedAt is null', {
      versionId,
    })
    .orderBy('dispute.openedAt', 'ASC')
    .getOne();
  if (!mine && !asked) return { openUntil, mine: null };
  return {
    openUntil,
    mine: {
      words: mine?.words ?? '',
      open: (mine?.closedAt ?? null) === null,
      question: asked?.question ?? null,
      answer: asked?.questionAnswer ?? null,
    },
  };
}

async function findRulings(manager: EntityManager, versionId: string, round: Round): Promise<EarlierRuling[]> {
  const rows = await manager.find(Ruling, { where: { versionId }, order: { createdAt: 'DESC' } });
  return rows.map((ruling) => ({
    rulingId: ruling.id,
    roundNumber: round.number,
    taskTitle: round.frozen?.title ?? '',
    step: ruling.step,
    decision: ruling.decision,
    reason: ruling.reason,
    at: ruling.createdAt.toISOString(),
  }));
}
