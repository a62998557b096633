import { Fragment } from 'react';
import type { DisputeCase, DisputeNames } from '../../../shared/schemas/dispute.ts';
import type { ReadStep } from '../../../shared/schemas/review.ts';
import type { StepRuling } from '../../../shared/schemas/verdict.ts';
import { Derivation } from '../../ui/derivation.tsx';
import { Maths } from '../../ui/maths.tsx';
import { AuthorWords, Findings } from './case-words.tsx';

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
          Line above minus this line: <Maths tex={difference} display />
        </p>
      ) : null}
      {mended ? (
        <p>
          This would follow:{' '}
          <Maths tex={mended.line} display spans={mended.changed.map((span) => ({ ...span, as: 'right' as const }))} />
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
