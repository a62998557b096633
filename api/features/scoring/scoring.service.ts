import { In, IsNull, Not, type EntityManager } from 'typeorm';
import type { Span } from '../../../shared/maths/expression.ts';
import { judgeFinding, type Judgement } from '../../../shared/lib/judge-finding.ts';
import type { TaskSettings } from '../../../shared/schemas/task.ts';
import type { Verdict } from '../../../shared/schemas/verdict.ts';
import { laterThan } from '../../lib/later-than.ts';
import { Dispute } from '../disputes/disputes.entity.ts';
import { Excuse } from '../rounds/rounds.entity.ts';
import { Finding, Review, Score } from '../reviews/reviews.entity.ts';
import type { VerdictRecord } from '../verdicts/verdicts.entity.ts';
import { findCurrentVerdicts, findFindingsInForce } from './current-verdicts.ts';

export interface ScoringDeps {
  readonly now: () => Date;
  /** Whether a marked part lies within one term of a line. */
  readonly isWithinOneTerm: (tex: string, span: Span, settings: Pick<TaskSettings, 'decimal' | 'numbers'>) => boolean;
}

/** One review with what it would be worth by a verdict, and what it is worth now. */
export interface ScoredReview {
  readonly review: Review;
  readonly finding: Finding | null;
  readonly judgement: Judgement;
  readonly latest: Score | null;
}

export interface ScoringService {
  findCurrentVerdicts(manager: EntityManager, versionIds: readonly string[]): Promise<Map<string, VerdictRecord>>;
  findFindingsInForce(manager: EntityManager, reviewIds: readonly string[]): Promise<Map<string, Finding>>;
  /** Judges the reviews of these versions; verdicts given here stand in for those in force. Writes nothing. */
  judge(
    manager: EntityManager,
    versionIds: readonly string[],
    instead?: ReadonlyMap<string, Verdict>,
  ): Promise<ScoredReview[]>;
  /** Adds a score for each; nothing old is changed. */
  add(manager: EntityManager, scored: readonly ScoredReview[], verdictIds: ReadonlyMap<string, string>): Promise<void>;
}

const NOT_HANDED_IN: Judgement = {
  outcome: 'not-handed-in',
  points: 0,
  counted: true,
  slipNamed: null,
  termMarked: null,
};
const EXCUSED: Judgement = { outcome: 'excused', points: 0, counted: false, slipNamed: null, termMarked: null };
const UNDECIDED: Verdict = { outcome: 'undecided', firstFault: null, steps: [] };

/** Scoring of findings, by the verdicts in force. */
export function createScoringService({ now, isWithinOneTerm }: ScoringDeps): ScoringService {
  return {
    findCurrentVerdicts,
    findFindingsInForce,

    async judge(manager, versionIds, instead = new Map()) {
      if (versionIds.length === 0) return [];
      const reviews = await manager.find(Review, {
        where: { versionId: In([...versionIds]) },
        relations: { version: true, round: true },
        order: { createdAt: 'ASC', id: 'ASC' },
      });
      const ids = reviews.map((review) => review.id);
      const verdicts = await findCurrentVerdicts(manager, versionIds);
      const findings = await findFindingsInForce(manager, ids);
      const latest = await findLatestScores(manager, ids);
      const excused = await findExcused(manager, reviews);
      const unruled = await findUnruled(manager, versionIds);
      return reviews.map((review) => {
        const finding = findings.get(review.id) ?? null;
        const verdict = instead.get(review.versionId) ?? verdicts.get(review.versionId) ?? UNDECIDED;
        const ruledSince =
          instead.has(review.versionId) ||
          isRuledSince(verdicts.get(review.versionId), finding && unruled.get(finding.id));
        const voided = finding !== null && unruled.has(finding.id) && !ruledSince;
        return {
          review,
          finding,
          latest: latest.get(review.id) ?? null,
          judgement: judgeReview(review, finding, verdict, voided, excused),
        };
      });
    },

    async add(manager, scored, verdictIds) {
      if (scored.length === 0) return;
      const rows = scored.map(({ review, finding, judgement, latest }) => ({
        reviewId: review.id,
        findingId: finding?.id ?? null,
        verdictId: verdictIds.get(review.versionId) ?? null,
        ...judgement,
        createdAt: laterThan(now(), latest?.createdAt),
      }));
      await manager.insert(Score, rows);
    },
  };

  function judgeReview(
    review: Review,
    finding: Finding | null,
    verdict: Verdict,
    voided: boolean,
    excused: ReadonlySet<string>,
  ): Judgement {
    if (!finding) {
      const isExcused = review.setAside !== null || excused.has(`${review.roundId} ${review.reviewerId}`);
      return isExcused ? EXCUSED : NOT_HANDED_IN;
    }
    const settings = review.round?.frozen?.settings ?? { decimal: 'point', numbers: 'real' };
    const within = (span: Span, line: number) =>
      isWithinOneTerm(review.version?.lines[line]?.tex ?? '', span, settings);
    return judgeFinding(finding, verdict, within, voided);
  }
}

async function findLatestScores(manager: EntityManager, reviewIds: readonly string[]): Promise<Map<string, Score>> {
  if (reviewIds.length === 0) return new Map();
  const rows = await manager.find(Score, {
    where: { reviewId: In([...reviewIds]) },
    order: { createdAt: 'ASC', id: 'ASC' },
  });
  return new Map(rows.map((row) => [row.reviewId, row]));
}

async function findExcused(manager: EntityManager, reviews: readonly Review[]): Promise<Set<string>> {
  const roundIds = [...new Set(reviews.map((review) => review.roundId))];
  if (roundIds.length === 0) return new Set();
  const rows = await manager.find(Excuse, { where: { roundId: In(roundIds) } });
  return new Set(rows.map((row) => `${row.roundId} ${row.userId}`));
}

/** Findings whose dispute was closed without a ruling, with the instant of that. */
async function findUnruled(manager: EntityManager, versionIds: readonly string[]): Promise<Map<string, Date>> {
  const rows = await manager.find(Dispute, {
    where: { versionId: In([...versionIds]), closedBy: 'void', findingId: Not(IsNull()) },
  });
  return new Map(rows.flatMap((row) => (row.findingId && row.closedAt ? [[row.findingId, row.closedAt]] : [])));
}

function isRuledSince(verdict: VerdictRecord | undefined, voidedAt: Date | null | undefined): boolean {
  return verdict?.source === 'ruling' && voidedAt != null && verdict.createdAt > voidedAt;
}
