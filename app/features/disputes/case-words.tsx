import type { DisputeCase, DisputeNames } from '../../../shared/schemas/dispute.ts';
import type { TeacherFinding } from '../../../shared/schemas/review.ts';
import { slipKindLabel } from '../../lib/finding-words.ts';
import { Button } from '../../ui/button.tsx';
import { SURE_WORDS } from '../../ui/how-sure.tsx';
import { Maths } from '../../ui/maths.tsx';
import { signed } from '../../ui/num.tsx';
import { Time } from '../../ui/time.tsx';

/** What was said by whoever raised it, and what the author wrote at the step. */
export function AuthorWords({ dispute, names }: { dispute: DisputeCase; names: DisputeNames | null }) {
  const { words, raisedBy, step, lines } = dispute;
  const line = lines[step];
  return (
    <div>
      <h2>{raisedBy === 'reviewer' ? 'The reviewer’s words' : 'The author’s words'}</h2>
      {words ? <p className="q">“{words}”</p> : null}
      {line?.prose ? <p className="q">{line.prose}</p> : null}
      {line?.reason ? (
        <p className="small">
          Beside line {step}: <em>{line.reason}</em>
        </p>
      ) : null}
      {words || line?.prose || line?.reason ? null : <p className="muted">None at this step.</p>}
      {raisedBy ? (
        <p className="small muted">
          {raisedBy === 'author' && names?.author ? `${names.author}, ` : null}
          <Time iso={dispute.openedAt} />
        </p>
      ) : null}
      {dispute.question ? (
        <p className="small">
          You asked: “{dispute.question}”{' '}
          {dispute.questionAnswer ? `The reply: “${dispute.questionAnswer}”` : 'No reply yet.'}
        </p>
      ) : null}
    </div>
  );
}

/** The findings on the derivation; names only once they were asked for. */
export function Findings({
  dispute,
  names,
  onReveal,
}: {
  dispute: DisputeCase;
  names: DisputeNames | null;
  onReveal: () => void;
}) {
  return (
    <div>
      <h2>The findings</h2>
      {dispute.findings.length === 0 ? <p className="muted">None was handed in.</p> : null}
      {dispute.findings.map((finding, i) => (
        <FindingEntry
          key={finding.findingId}
          finding={finding}
          name={names?.reviewers[finding.findingId] ?? `Reviewer ${i + 1}`}
          isContested={finding.findingId === dispute.findingId}
          said={dispute.raisedBy === 'author' ? dispute.words : null}
        />
      ))}
      {names ? null : dispute.mayReveal ? (
        <Button kind="quiet" small onClick={onReveal}>
          Show the names
        </Button>
      ) : (
        <p className="fine muted">Names stay hidden from assistants in this class.</p>
      )}
    </div>
  );
}

interface FindingEntryProps {
  readonly finding: TeacherFinding;
  readonly name: string;
  readonly isContested: boolean;
  /** The author's words that stand beside the findings already. */
  readonly said: string | null;
}

function FindingEntry({ finding, name, isContested, said }: FindingEntryProps) {
  const kind = slipKindLabel(finding.slipKind);
  const place = finding.noFault ? 'no fault' : finding.pick === null ? 'can’t tell' : `step ${finding.pick}`;
  return (
    <div className="found-entry">
      <p className="small">
        <b>{name}</b>: {place}
        {finding.pick !== null || finding.noFault ? `, ${SURE_WORDS[finding.sureness]}` : null}
        {kind ? (
          <>
            , <em>{kind.toLowerCase()}</em>
          </>
        ) : null}
        . {finding.points === null ? null : <span className="num">{signed(finding.points)}</span>}
        {isContested ? <span className="plum"> contested</span> : null}
      </p>
      {finding.why ? <p className="q s">“{finding.why}”</p> : null}
      {finding.shouldBe ? (
        <p className="small">
          Should be: <Maths tex={finding.shouldBe} display />
        </p>
      ) : null}
      {finding.answer?.kind === 'contest' && finding.answer.reason !== said ? (
        <p className="small muted">The author: “{finding.answer.reason}”</p>
      ) : null}
    </div>
  );
}
