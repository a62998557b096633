import { Fragment } from 'react';
import type { DisputeCase, DisputeNames } from '../../../shared/schemas/dispute.ts';
import type { ReadStep, TeacherFinding } from '../../../shared/schemas/review.ts';
import type { StepRuling } from '../../../shared/schemas/verdict.ts';
import { slipKindLabel } from '../../lib/finding-words.ts';
import { Button } from '../../ui/button.tsx';
import { Derivation } from '../../ui/derivation.tsx';
import { SURE_WORDS } from '../../ui/how-sure.tsx';
import { Maths } from '../../ui/maths.tsx';
import { signed } from '../../ui/num.tsx';
import { Time } from '../../ui/time.tsx';

type Sentence = readonly (string | { readonly tex: string })[];

export type WordStep = (
  ruling: StepRuling,
  state: ReadStep['state'],
) => { readonly evidence: readonly Sentence[]; readonly notes: readonly Sentence[]; readonly reached: string | null };

export interface CaseViewProps {
  readonly dispute: DisputeCase;
  readonly names: DisputeNames | null;
  readonly wordStep: WordStep;
  readonly onReveal: () => void;
}

/** The case itself: the question, the two lines on slate, evidence, algebra, the author's words and the findings. */
export function CaseView({ dispute, names, wordStep, onReveal }: CaseViewProps) {
  const { step, sameStep } = dispute;
  const ruled = dispute.verdict?.steps.find((each) => each.step === step) ?? null;
  return (
    <section className="case" aria-labelledby="case-question">
      <p className="where">
        {dispute.taskTitle} · round {dispute.roundNumber} · {dispute.className}
        {names?.author ? ` · ${names.author}` : null}
        {sameStep > 0 ? ` · and ${sameStep} more with the same step` : null}
      </p>
      <h1 id="case-question">Does step {step} follow?</h1>
      <TwoLines dispute={dispute} ruled={ruled} />
      <div className="evid">
        <Evidence dispute={dispute} ruled={ruled} wordStep={wordStep} />
        <Algebra ruled={ruled} />
      </div>
      <div className="words2">
        <AuthorWords dispute={dispute} names={names} />
        <Findings dispute={dispute} names={names} onReveal={onReveal} />
      </div>
      <WholeDerivation dispute={dispute} />
    </section>
  );
}

function TwoLines({ dispute, ruled }: { dispute: DisputeCase; ruled: ReadStep | null }) {
  const { lines, step } = dispute;
  const line = lines[step];
  const from = line?.uses?.at(-1) ?? step - 1;
  const above = lines[from];
  const state = ruled?.state ?? 'undecided';
  const words = {
    fault: `step ${step} fails`,
    'also-fails': `step ${step} fails`,
    undecided: 'undecided',
    holds: `step ${step} holds`,
    carried: 'carried',
  };
  return (
    <Derivation
      layout="ruling"
      className="slate"
      label={`Lines ${from} and ${step}`}
      lines={[
        { id: 'above', tex: above?.tex ?? '', label: from },
        {
          id: 'line',
          tex: line?.tex ?? '',
          label: step,
          state: state === 'also-fails' ? 'fault' : state,
          words: words[state],
          spans:
            ruled?.evidence.wrongPart && state === 'fault'
              ? [{ ...ruled.evidence.wrongPart.span, as: 'wrong' }]
              : undefined,
        },
      ]}
    />
  );
}

function Evidence({ dispute, ruled, wordStep }: { dispute: DisputeCase; ruled: ReadStep | null; wordStep: WordStep }) {
  const words = ruled ? wordsOf(ruled, wordStep) : null;
  const sentences = words ? [...words.evidence, ...words.notes] : [];
  return (
    <div>
      <h2>Evidence</h2>
      {sentences.length === 0 ? (
        <p>
          {ruled
            ? 'The checker found nothing against this step.'
            : 'The checker has not looked at this derivation yet.'}
        </p>
      ) : null}
      {sentences.map((sentence, i) => (
        <p key={i}>
          <Said sentence={sentence} />
        </p>
      ))}
      {words?.reached ? <p className="muted">{words.reached}</p> : null}
      {dispute.task.assumptions.length > 0 ? (
        <p className="small">
          The task states{' '}
          {dispute.task.assumptions.map((tex, i) => (
            <Fragment key={tex}>
              {i > 0 ? ', ' : null}
              <Maths tex={tex} />
            </Fragment>
          ))}
          .
        </p>
      ) : (
        <p className="small muted">The task states no assumption.</p>
      )}
    </div>
  );
}

function Algebra({ ruled }: { ruled: ReadStep | null }) {
  const { difference, mended, solutions } = ruled?.evidence ?? {};
  return (
    <div>
      <h2>The algebra</h2>
      {difference ? (
        <p>
          Line above minus this line: <Maths tex={difference} />
        </p>
      ) : null}
      {mended ? (
        <p>
          This would follow:{' '}
          <Maths tex={mended.line} spans={mended.changed.map((span) => ({ ...span, as: 'right' as const }))} />
        </p>
      ) : null}
      {solutions ? (
        <p>
          Solutions of this line: <Maths tex={solutions} />
        </p>
      ) : null}
      {difference || mended || solutions ? null : <p className="muted">Nothing short enough to show.</p>}
    </div>
  );
}

function AuthorWords({ dispute, names }: { dispute: DisputeCase; names: DisputeNames | null }) {
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
          {raisedBy === 'author' ? (names?.author ?? 'the author') : 'a reviewer'}, <Time iso={dispute.openedAt} />
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

function Findings({
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

function FindingEntry({ finding, name, isContested }: { finding: TeacherFinding; name: string; isContested: boolean }) {
  const kind = slipKindLabel(finding.slipKind);
  const place = finding.noFault ? 'no fault' : finding.pick === null ? 'can’t tell' : `step ${finding.pick}`;
  return (
    <>
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
          Should be: <Maths tex={finding.shouldBe} />
        </p>
      ) : null}
      {finding.answer?.kind === 'contest' ? <p className="small muted">The author: “{finding.answer.reason}”</p> : null}
    </>
  );
}

/** All lines, folded away until looked for. */
function WholeDerivation({ dispute }: { dispute: DisputeCase }) {
  const states = new Map(dispute.verdict?.steps.map((each) => [each.step, each.state]));
  return (
    <details className="whole">
      <summary className="lk s">The whole derivation</summary>
      <Derivation
        layout="narrow"
        label="The whole derivation"
        lines={dispute.lines.map((line) => ({
          id: String(line.number),
          tex: line.tex,
          state: line.number === 0 ? undefined : (states.get(line.number) ?? 'plain'),
          isCurrent: line.number === dispute.step,
        }))}
      />
    </details>
  );
}

function Said({ sentence }: { sentence: Sentence }) {
  return sentence.map((part, i) => (
    <Fragment key={i}>{typeof part === 'string' ? part : <Maths tex={part.tex} />}</Fragment>
  ));
}

function wordsOf(step: ReadStep, wordStep: WordStep) {
  const { mended: _mended, difference: _difference, solutions: _solutions, ...evidence } = step.evidence;
  const ruling =
    step.state === 'undecided' ? 'undecided' : step.state === 'holds' || step.state === 'carried' ? 'holds' : 'fails';
  return wordStep({ step: step.step, ruling, reached: step.reached, notes: [...step.notes], evidence }, step.state);
}
