import { proseOf, stepOf, type SheetNode } from '../../../shared/schemas/sheet.ts';
import { Button } from '../../ui/button.tsx';
import { classNames } from '../../ui/class-names.ts';
import { Maths } from '../../ui/maths.tsx';
import { Notice } from '../../ui/notice.tsx';
import { layBeside } from './sheet-difference.ts';
import type { Keep, SyncState } from './sheet-sync.ts';

interface ConflictProps {
  readonly state: Extract<SyncState, { kind: 'conflict' }>;
  readonly onKeep: (keep: Keep) => void;
}

/** One sheet was changed in two places: both side by side, and which of them to go on with. */
export function Conflict({ state, onKeep }: ConflictProps) {
  const rows = layBeside(state.mine, state.theirs.document);
  return (
    <section className="sheet-conflict" aria-label="Changed in two windows">
      <Notice kind="grave" title="This sheet was changed in two windows." isLive>
        Nothing is lost. Choose what to go on with; the lines that differ are ruled.
      </Notice>
      <table className="table">
        <thead>
          <tr>
            <th scope="col">In this window</th>
            <th scope="col">In the other window</th>
          </tr>
        </thead>
        <tbody>
          {rows.map(({ mine, theirs }, i) => (
            <tr key={i}>
              <td className={classNames(mine && !theirs && 'differs')}>{mine ? <Shown block={mine} /> : null}</td>
              <td className={classNames(theirs && !mine && 'differs')}>{theirs ? <Shown block={theirs} /> : null}</td>
            </tr>
          ))}
        </tbody>
      </table>
      <div className="acts">
        <Button onClick={() => onKeep('mine')}>Keep this window’s</Button>
        <Button onClick={() => onKeep('theirs')}>Keep the other window’s</Button>
        <Button onClick={() => onKeep('both')}>Keep both, the other’s lines after mine</Button>
      </div>
    </section>
  );
}

function Shown({ block }: { readonly block: SheetNode }) {
  const step = stepOf(block);
  if (!step) return <span className="aside-words">{proseOf(block)}</span>;
  return (
    <>
      <Maths tex={step.tex} display />
      {step.reason ? <span className="aside-words"> {step.reason}</span> : null}
    </>
  );
}
