import './findings.css';
import type { ReactNode } from 'react';
import type { AuthorFinding, ReadLine, ScoreOutcome } from '../../../shared/schemas/review.ts';
import { OUTCOME_WORDS, slipKindLabel, SURE_WORD_WORDS } from '../../lib/finding-words.ts';
import { Maths } from '../../ui/maths.tsx';

export interface FindingNoteProps {
  readonly finding: AuthorFinding;
  readonly lines: readonly ReadLine[];
  /** What can be done with it, or what was. */
  readonly children?: ReactNode;
}

/** A finding as its author reads it: where, how it fared, why, how sure; nobody's name and no points. */
export function FindingNote({ finding, lines, children }: FindingNoteProps) {
  const kind = slipKindLabel(finding.slipKind);
  return (
    <article className="fnote">
      <h3>
        <FindingPlace finding={finding} lines={lines} />
      </h3>
      {finding.outcome && finding.outcome !== 'no-pick' ? (
        <p className={`fstate is-${finding.outcome}`}>{OUTCOME_WORDS[finding.outcome]}</p>
      ) : null}
      {finding.why ? <p className="fwhy">“{finding.why}”</p> : null}
      {finding.shouldBe ? (
        <p className="small">
          Should be: <Maths tex={finding.shouldBe} display />
        </p>
      ) : null}
      <p className="small muted">
        <b>{SURE_WORD_WORDS[finding.sure]}.</b>
        {kind ? ` Kind of slip: ${kind.toLowerCase()}.` : null} {namedWords(finding)}
      </p>
      {children}
    </article>
  );
}

/** `Step 2, the term +8`, `No fault`, or that the reviewer could not tell. */
export function FindingPlace({
  finding,
  lines,
}: {
  finding: Pick<AuthorFinding, 'pick' | 'noFault' | 'markedSpan'>;
  lines: readonly ReadLine[];
}) {
  const { pick, noFault, markedSpan } = finding;
  if (noFault) return <>No fault</>;
  if (pick === null) return <>No step named</>;
  const marked = markedSpan && lines[pick]?.tex.slice(markedSpan.start, markedSpan.end);
  return (
    <>
      Step {pick}
      {marked ? (
        <>
          , the term <Maths tex={marked} />
        </>
      ) : null}
    </>
  );
}

function namedWords({ outcome, slipNamed, termMarked }: AuthorFinding): string | null {
  if (!isRight(outcome)) return null;
  if (slipNamed && termMarked) return 'Named the slip and the very term.';
  if (slipNamed) return 'Named the slip.';
  return termMarked ? 'Marked the very term.' : null;
}

function isRight(outcome: ScoreOutcome | null): boolean {
  return outcome === 'right';
}
