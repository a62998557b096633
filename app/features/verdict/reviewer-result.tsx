import type { ReviewAnswer, ReviewResult } from '../../../shared/schemas/review.ts';
import { slipKindLabel } from '../../lib/finding-words.ts';
import { paths } from '../../lib/paths.ts';
import { LinkButton } from '../../ui/button.tsx';
import { SURE_WORDS } from '../../ui/how-sure.tsx';
import { Maths } from '../../ui/maths.tsx';
import { signed } from '../../ui/num.tsx';
import { Both, Head } from '../../ui/page.tsx';
import { Decides } from './decides.tsx';
import { VerdictEdge, type WordStep } from './verdict-edge.tsx';
import { headline, resultHeadline, resultLead } from './verdict-words.ts';

export interface ReviewerResultProps {
  readonly review: ReviewAnswer;
  readonly result: ReviewResult;
  readonly wordStep: WordStep;
  readonly onContest: (words: string) => Promise<unknown>;
}

/** What came of a review: the own pick against the verdict, the points and why. */
export function ReviewerResult({ review, result, wordStep, onContest }: ReviewerResultProps) {
  const { finding, round, lines } = review;
  const pick = finding?.pick;
  return (
    <>
      <Head
        both
        where={
          <>
            Round {round.number} · {review.task.title} · your review
          </>
        }
        h1={resultHeadline(result, pick ?? null)}
        lead={resultLead(result, pick ?? null)}
      />
      <VerdictEdge
        lines={lines}
        verdict={result.verdict}
        wordStep={wordStep}
        reveal
        beside={(step) => (step === pick ? <p className="own-pick">your pick</p> : null)}
      />
      <Both className="own-finding">
        <div className="stack">
          <h2>{result.outcome === 'void' || result.outcome === 'excused' ? 'No points' : 'Your points'}</h2>
          <div className="result-figures">
            <p>
              <b>{signed(result.points)}</b> {result.counted ? 'points' : 'points, not counted'}
            </p>
            <p>{whyPoints(result, finding?.sureness ?? 0)}</p>
          </div>
          {apartWords(result) ? <p className="small">{apartWords(result)}</p> : null}
          {result.rescored ? (
            <p className="small">
              Your points were reckoned again after a ruling. The earlier ones are kept on record.
            </p>
          ) : null}
          {finding ? <OwnWords review={review} /> : null}
          {result.verdict.reason ? (
            <div className="ruled-words">
              <p className="small muted">Your teacher ruled: {headline(result.verdict)}</p>
              <p>“{result.verdict.reason}”</p>
            </div>
          ) : null}
          <Decides what="these points" contest={result.contest} onContest={onContest} />
          <LinkButton to={paths.today()}>Back to today</LinkButton>
        </div>
      </Both>
    </>
  );
}

function OwnWords({ review }: { review: ReviewAnswer }) {
  const { finding } = review;
  if (!finding) return null;
  const kind = slipKindLabel(finding.slipKind);
  return (
    <div className="small stack">
      {finding.why ? <p>You wrote: “{finding.why}”</p> : null}
      {finding.shouldBe ? (
        <p>
          You would have written <Maths tex={finding.shouldBe} display />
          {review.result?.shouldBe ? SHOULD_BE[review.result.shouldBe] : '.'}
        </p>
      ) : null}
      {kind ? <p>Kind of slip you named: {kind.toLowerCase()}.</p> : null}
    </div>
  );
}

const SHOULD_BE = {
  holds: ': it follows from the line above.',
  fails: ': it does not follow from the line above either.',
  undecided: '. Whether it follows could not be decided.',
} as const;

function whyPoints({ outcome }: ReviewResult, sureness: number): string {
  if (outcome === 'not-handed-in') return 'A review that is not handed in counts as nothing.';
  if (outcome === 'excused') return 'It counts neither for nor against you.';
  if (outcome === 'void') return 'It counts neither for nor against you.';
  if (outcome === 'no-pick') return 'You said that you could not tell.';
  return `You were ${SURE_WORDS[sureness]}${outcome === 'right' ? ', and right' : ''}.`;
}

function apartWords({ slipNamed, termMarked }: ReviewResult): string | null {
  const slip =
    slipNamed === null ? null : slipNamed ? 'You named the kind of slip.' : 'The kind of slip was another one.';
  const term =
    termMarked === null ? null : termMarked ? 'You marked the very term.' : 'The fault lies in another term.';
  return slip || term ? [slip, term, 'This earns no points; it is counted apart.'].filter(Boolean).join(' ') : null;
}
