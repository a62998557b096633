import './verdict.css';
import { Fragment, type ReactNode } from 'react';
import type { ReadLine, ReadStep, ReadVerdict } from '../../../shared/schemas/review.ts';
import type { StepRuling } from '../../../shared/schemas/verdict.ts';
import { toEdgeLines } from '../../lib/edge-lines.ts';
import { Derivation } from '../../ui/derivation.tsx';
import type { MendedLine } from '../../ui/edge-line.tsx';
import { Maths } from '../../ui/maths.tsx';
import type { MarkedSpan } from '../../ui/tex-pieces.ts';

export type Sentence = readonly (string | { readonly tex: string })[];

/** Evidence and notes of a step as sentences; handed in by the page. */
export type WordStep = (
  ruling: StepRuling,
  state: ReadStep['state'],
) => { readonly evidence: readonly Sentence[]; readonly notes: readonly Sentence[]; readonly reached: string | null };

export interface VerdictEdgeProps {
  readonly lines: readonly ReadLine[];
  readonly verdict: ReadVerdict;
  readonly wordStep: WordStep;
  /** Opens the notch once. */
  readonly reveal?: boolean;
  /** What else stands at a step, such as the reader's own pick. */
  readonly beside?: (step: number) => ReactNode;
}

/** A derivation along its edge as it was judged: the notch, what is carried, the mended branch, the evidence in the margin. */
export function VerdictEdge({ lines, verdict, wordStep, reveal, beside }: VerdictEdgeProps) {
  const steps = new Map(verdict.steps.map((step) => [step.step, step]));
  const mended = mendedLines(lines, verdict);
  const edgeLines = toEdgeLines(lines, ({ number }) => {
    const step = steps.get(number);
    const extra = beside?.(number);
    const note = step ? <StepNote step={step} wordStep={wordStep} /> : null;
    const hasNote = step !== undefined && hasWords(step, wordStep);
    return {
      state: step?.state,
      spans: step ? wrongSpans(step) : undefined,
      note:
        hasNote || extra ? (
          <>
            {hasNote ? note : null}
            {extra}
          </>
        ) : undefined,
      isEvidence: hasNote && step.state === 'fault',
      mended: mended.get(number),
    };
  });
  return <Derivation label="The derivation as it was judged" lines={edgeLines} reveal={reveal} />;
}

function StepNote({ step, wordStep }: { step: ReadStep; wordStep: WordStep }) {
  const { evidence, notes, reached } = wordsOf(step, wordStep);
  const [first, ...rest] = evidence;
  const said = [...rest, ...notes];
  const how = evidence.length > 0 && reached ? <span className="muted"> {reached}</span> : null;
  return (
    <>
      {first ? (
        <p className="ev">
          <Said sentence={first} />
          {said.length === 0 ? how : null}
        </p>
      ) : null}
      {said.map((sentence, i) => (
        <p key={i}>
          <Said sentence={sentence} />
          {i === said.length - 1 ? how : null}
        </p>
      ))}
    </>
  );
}

/** A sentence with its maths set. */
export function Said({ sentence }: { sentence: Sentence }) {
  return sentence.map((part, i) => (
    <Fragment key={i}>{typeof part === 'string' ? part : <Maths tex={part.tex} />}</Fragment>
  ));
}

function hasWords(step: ReadStep, wordStep: WordStep): boolean {
  const { evidence, notes } = wordsOf(step, wordStep);
  return evidence.length + notes.length > 0;
}

/** Evidence of steps that do not hold; of the others the notes alone. */
function wordsOf(step: ReadStep, wordStep: WordStep) {
  const evidence = undrawn(step.evidence);
  const isFine = step.state === 'holds' || step.state === 'carried';
  const ruling = isFine ? 'holds' : step.state === 'undecided' ? 'undecided' : 'fails';
  const words = wordStep(
    { step: step.step, ruling, reached: step.reached, notes: [...step.notes], evidence },
    step.state,
  );
  return isFine ? { ...words, evidence: [] } : words;
}

/** Without what stands in the picture already: the mended line, and with it the part that was wrong. */
function undrawn({ mended, ...evidence }: ReadStep['evidence']): ReadStep['evidence'] {
  if (!mended) return evidence;
  const { wrongPart: _wrongPart, ...rest } = evidence;
  return rest;
}

function wrongSpans({ state, evidence }: ReadStep): MarkedSpan[] | undefined {
  if (state !== 'fault' || !evidence.wrongPart) return undefined;
  return [{ ...evidence.wrongPart.span, as: 'wrong' }];
}

/** From the fault on: the mended line, and what the author's later lines become when they start from it. */
function mendedLines(lines: readonly ReadLine[], { firstFault, steps }: ReadVerdict): Map<number, MendedLine> {
  const fault = steps.find(({ step }) => step === firstFault);
  const mended = new Map<number, MendedLine>();
  if (!fault?.evidence.mended || firstFault === null) return mended;
  const { line, changed } = fault.evidence.mended;
  const ending = fault.evidence.mendedEnding ?? [];
  const from = lines.length - ending.length;
  for (const [i, tex] of ending.entries()) if (from + i > firstFault) mended.set(from + i, { tex });
  mended.set(firstFault, { tex: line, spans: changed.map((span) => ({ ...span, as: 'right' as const })) });
  return mended;
}
