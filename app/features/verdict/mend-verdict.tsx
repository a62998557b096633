import { toReadSteps } from '../../../shared/lib/judge-finding.ts';
import type { HandedInLine } from '../../../shared/schemas/sheet.ts';
import type { Verdict } from '../../../shared/schemas/verdict.ts';
import { Both } from '../../ui/page.tsx';
import { VerdictEdge, type WordStep } from './verdict-edge.tsx';
import { headline } from './verdict-words.ts';

export interface MendVerdictProps {
  readonly lines: readonly HandedInLine[];
  readonly verdict: Verdict;
  readonly wordStep: WordStep;
}

/** The verdict on a mend, along an edge of its own. */
export function MendVerdict({ lines, verdict, wordStep }: MendVerdictProps) {
  const read = {
    outcome: verdict.outcome,
    firstFault: verdict.firstFault,
    steps: toReadSteps(verdict),
    decidedBy: 'checker' as const,
    reason: null,
  };
  return (
    <>
      <Both className="mended-head">
        <h2>
          {verdict.outcome === 'sound'
            ? 'The mend holds: every step follows.'
            : `The mend: ${headline(read).toLowerCase()}`}
        </h2>
      </Both>
      <VerdictEdge
        lines={lines.map(({ tex, reason, prose, uses }, number) => ({ number, tex, reason, prose, uses }))}
        verdict={read}
        wordStep={wordStep}
      />
    </>
  );
}
