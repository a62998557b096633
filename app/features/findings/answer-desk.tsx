import type { AuthorDerivation } from '../../../shared/schemas/review.ts';
import { countWord } from '../../lib/finding-words.ts';
import { toEdgeLines } from '../../lib/edge-lines.ts';
import { Derivation } from '../../ui/derivation.tsx';
import { Both, Head } from '../../ui/page.tsx';
import { EmptyState } from '../../ui/states.tsx';
import { Time } from '../../ui/time.tsx';
import { AnswerForm } from './answer-form.tsx';
import { FindingNote } from './finding-note.tsx';

/** The own derivation before settling: the plain edge, and the findings to answer once answering is open. */
export function AnswerDesk({ derivation }: { readonly derivation: AuthorDerivation }) {
  const { round, task, lines, findings, canAnswer } = derivation;
  // “No fault” and “can't tell” may be answered, and wait for nothing.
  const open = findings.filter((finding) => finding.answer === null && finding.pick !== null).length;
  return (
    <>
      <Head
        both
        where={
          <>
            Round {round.number} · {task.title} · your derivation
          </>
        }
        h1={headline(derivation, open)}
        lead={lead(derivation)}
      />
      <Derivation
        label="Your derivation"
        lines={toEdgeLines(lines, ({ number }) => ({ state: number === 0 ? undefined : 'plain' }))}
      />
      {findings.length > 0 ? (
        <Both className="found">
          <h2>What your {findings.length === 1 ? 'reviewer' : `${countWord(findings.length)} reviewers`} found</h2>
          <div className="f2">
            {findings.map((finding) => (
              <FindingNote key={finding.key} finding={finding} lines={lines}>
                {canAnswer ? (
                  <AnswerForm derivationId={derivation.derivationId} finding={finding} />
                ) : (
                  <Answered finding={finding} />
                )}
              </FindingNote>
            ))}
          </div>
          <p className="decides">
            <span>
              The checker advises, your teacher decides. The verdict comes to everyone at once when the round settles,{' '}
              <Time iso={round.settlesAt} />.
            </span>
          </p>
        </Both>
      ) : round.stage === 'answering' ? (
        <Both>
          <EmptyState title="No finding was handed in on this derivation.">
            The verdict comes when the round settles, <Time iso={round.settlesAt} />.
          </EmptyState>
        </Both>
      ) : null}
    </>
  );
}

/** What was answered, or that nothing was. */
export function Answered({ finding }: { finding: AuthorDerivation['findings'][number] }) {
  if (!finding.answer) return <p className="small muted">You did not answer.</p>;
  return (
    <p className="small muted">
      {finding.answer.kind === 'accept' ? 'You accepted it.' : `You contested it: “${finding.answer.reason}”`}
    </p>
  );
}

function headline({ round, findings, canAnswer }: AuthorDerivation, open: number): string {
  if (round.stage !== 'answering') return 'Your derivation is with its reviewers.';
  if (findings.every(({ pick }) => pick === null)) return 'Nobody found anything to answer.';
  if (!canAnswer) return 'Answering is over.';
  if (open === 0) return 'Every finding is answered.';
  const words = countWord(open);
  return `${words.charAt(0).toUpperCase()}${words.slice(1)} ${open === 1 ? 'finding waits' : 'findings wait'} for your answer.`;
}

function lead({ round, canAnswer, findings }: AuthorDerivation) {
  if (round.stage !== 'answering') {
    return (
      <>
        What they find comes to you when answering opens, after <Time iso={round.reviewingEndsAt} />.
      </>
    );
  }
  if (!canAnswer || findings.length === 0) return null;
  return (
    <>
      Accept what you see yourself; contest what you do not, with a reason. You can change an answer until{' '}
      <Time iso={round.answeringEndsAt} />.
    </>
  );
}
