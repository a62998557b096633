import type { HandedInLine } from '../../../shared/schemas/sheet.ts';
import type { Verdict } from '../../../shared/schemas/verdict.ts';
import { Derivation } from '../../ui/derivation.tsx';
import { StepEvidence } from './step-evidence.tsx';
import { edgeStates, stepWords, verdictHeadline } from '../../../shared/lib/step-words.ts';

interface CheckedDerivationProps {
  readonly lines: readonly HandedInLine[];
  readonly verdict: Pick<Verdict, 'outcome' | 'firstFault' | 'steps'>;
  readonly label: string;
}

/** A derivation with its verdict along the edge, and what shows each step that does not simply hold. */
export function CheckedDerivation({ lines, verdict, label }: CheckedDerivationProps) {
  const states = edgeStates(verdict);
  return (
    <>
      <h2>{verdictHeadline(verdict)}</h2>
      <Derivation
        label={label}
        lines={lines.map((line, number) => {
          const ruling = verdict.steps.find(({ step }) => step === number);
          const state = states[number - 1];
          const words = ruling && state && stepWords(ruling, state);
          const isWorthSaying = words && (words.evidence.length > 0 || words.notes.length > 0);
          return {
            id: line.stepId,
            tex: line.tex,
            state,
            reason: line.reason,
            isEvidence: state === 'fault',
            note: isWorthSaying ? <StepEvidence words={words} summary={state === 'fault'} /> : undefined,
          };
        })}
      />
    </>
  );
}
