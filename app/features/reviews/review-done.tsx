import type { ReviewAnswer } from '../../../shared/schemas/review.ts';
import { slipKindLabel } from '../../lib/finding-words.ts';
import { toEdgeLines } from '../../lib/edge-lines.ts';
import { Derivation } from '../../ui/derivation.tsx';
import { SURE_WORDS } from '../../ui/how-sure.tsx';
import { Maths } from '../../ui/maths.tsx';
import { Time } from '../../ui/time.tsx';

/** A review that can no longer be changed, while its round is not settled: what was handed in, and when more is known. */
export function ReviewDone({ review }: { readonly review: ReviewAnswer }) {
  const { finding, lines } = review;
  const pick = finding?.pick;
  return (
    <Derivation
      layout="review"
      className="full"
      label="The derivation, step by step"
      lines={toEdgeLines(lines, ({ number }) => ({
        state: number === 0 ? undefined : 'plain',
        bracket: number !== 0 && number === pick ? true : undefined,
        isMuted: typeof pick === 'number' && number !== pick && number !== pick - 1,
        spans: number === pick && finding?.markedSpan ? [{ ...finding.markedSpan, as: 'marked' }] : undefined,
      }))}
      aside={<HandedIn review={review} />}
    />
  );
}

function HandedIn({ review }: { review: ReviewAnswer }) {
  const { finding, round, setAside } = review;
  return (
    <div className="finding stack">
      <h2>{setAside ? 'Set aside' : finding ? 'Your finding' : 'Nothing handed in'}</h2>
      {setAside ? (
        <p className="small">
          {setAside === 'cannot-read'
            ? 'You could not read this one. Your teacher sees that, and it costs you nothing.'
            : 'You know whose this is. Your teacher sees that, and it costs you nothing.'}
        </p>
      ) : finding ? (
        <FindingFacts review={review} />
      ) : (
        <p className="small">A review that is not handed in counts as nothing, unless your teacher excuses it.</p>
      )}
      {setAside ? null : (
        <p className="small muted">
          The verdict comes when the round settles, <Time iso={round.settlesAt} />.
        </p>
      )}
    </div>
  );
}

function FindingFacts({ review }: { review: ReviewAnswer }) {
  const { finding } = review;
  if (!finding) return null;
  const kind = slipKindLabel(finding.slipKind);
  const place = finding.pick === 'none' ? 'No fault' : finding.pick === null ? 'Can’t tell' : `Step ${finding.pick}`;
  return (
    <>
      <p>
        <b>{place}</b>
        {finding.pick === null ? null : `, ${SURE_WORDS[finding.sureness]}`}
      </p>
      {kind ? <p className="small">Kind of slip: {kind.toLowerCase()}.</p> : null}
      {finding.shouldBe ? (
        <p className="small">
          Should be: <Maths tex={finding.shouldBe} display />
        </p>
      ) : null}
      {finding.why ? <p className="small">“{finding.why}”</p> : null}
    </>
  );
}
