import type { HandedInLine } from '../../../shared/schemas/sheet.ts';
import { EdgeColumn } from '../../ui/edge-pieces.tsx';
import { Maths } from '../../ui/maths.tsx';

/** The lines that the sheet goes on from: the given, and in a mend those before the fault. */
export function FixedLines({ lines }: { readonly lines: readonly HandedInLine[] }) {
  return (
    <ol className="deriv sheet-fixed" aria-label={lines.length > 1 ? 'Lines that stay' : 'The given line'}>
      {lines.map(({ stepId, tex, reason }, number) => (
        <li key={stepId} className={number === 0 ? 'ln first' : 'ln'}>
          <span className={number === 0 ? 'no given' : 'no'}>{number === 0 ? 'given' : number}</span>
          <EdgeColumn
            row={{
              step: number === 0 ? null : { above: 'plain', knot: null, below: 'plain' },
              upper: number === 0 ? 'none' : 'plain',
              lower: 'plain',
              tick: 'plain',
              isArm: false,
            }}
          />
          <div className="mx">
            <Maths tex={tex} display />
          </div>
          <div className="reason">{number === 0 ? 'the given line' : reason}</div>
        </li>
      ))}
    </ol>
  );
}
