import { sureWordOf } from '../../../shared/schemas/finding.ts';
import { shownPoints } from '../../../shared/lib/scoring.ts';
import type { AuthorFinding, ScoreOutcome, TeacherFinding } from '../../../shared/schemas/review.ts';
import type { Answer, Finding, Score } from '../reviews/reviews.entity.ts';

/** A finding as the author meets it: no person, no time, no points, and how sure in words. */
export function toAuthorFinding(finding: Finding, answer: Answer | null, score: Score | null): AuthorFinding {
  return {
    key: finding.authorKey,
    pick: finding.pick,
    noFault: finding.noFault,
    markedSpan: finding.markedSpan,
    sure: sureWordOf(finding.sureness),
    slipKind: finding.slipKind,
    shouldBe: finding.shouldBe,
    why: finding.why,
    answer: toAnswer(answer),
    outcome: score?.outcome ?? null,
    slipNamed: score?.slipNamed ?? null,
    termMarked: score?.termMarked ?? null,
  };
}

/** A finding as those who rule meet it; the name only where it was asked for. */
export function toTeacherFinding(
  finding: Finding,
  answer: Answer | null,
  reviewer: string | null,
  worth: { outcome: ScoreOutcome; points: number } | null,
): TeacherFinding {
  return {
    findingId: finding.id,
    reviewer,
    pick: finding.pick,
    noFault: finding.noFault,
    markedSpan: finding.markedSpan,
    sureness: finding.sureness,
    slipKind: finding.slipKind,
    shouldBe: finding.shouldBe,
    why: finding.why,
    answer: toAnswer(answer),
    outcome: worth?.outcome ?? null,
    points: worth ? shownPoints(worth.points) : null,
  };
}

function toAnswer(answer: Answer | null): { kind: 'accept' | 'contest'; reason: string } | null {
  return answer && { kind: answer.kind, reason: answer.reason };
}
