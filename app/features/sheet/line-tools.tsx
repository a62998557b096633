import type { Editor } from '@tiptap/core';
import { Button } from '../../ui/button.tsx';
import { copyAbove, deleteBlock, insertLine, moveBlock, writeStep, type Command } from './sheet-commands.ts';
import { run } from './sheet-keys.ts';
import type { SheetFacts } from './sheet-store.ts';

interface LineToolsProps {
  readonly editor: Editor;
  readonly facts: SheetFacts;
  readonly stepId: string;
  readonly uses: readonly string[] | null;
  /** The line that the first one goes on from. */
  readonly above: string;
}

/** Everything that can be done with the line in hand, for those who do not use the keys. */
export function LineTools({ editor, facts, stepId, uses, above }: LineToolsProps) {
  const acts: readonly (readonly [string, Command])[] = [
    ['Copy the line above', copyAbove(above)],
    ['Insert above', insertLine('above')],
    ['Insert below', insertLine('below')],
    ['Move up', moveBlock(-1)],
    ['Move down', moveBlock(1)],
    ['Delete', deleteBlock],
  ];
  return (
    <div className="sheet-tools">
      <div className="acts">
        {acts.map(([label, command]) => (
          <Button key={label} kind="quiet" small onClick={() => run(editor, command)}>
            {label}
          </Button>
        ))}
      </div>
      <LinesUsed editor={editor} facts={facts} stepId={stepId} uses={uses} />
    </div>
  );
}

function LinesUsed({ editor, facts, stepId, uses }: Omit<LineToolsProps, 'above'>) {
  const own = facts.numbers.get(stepId) ?? 0;
  const above = [...facts.numbers].filter(([, number]) => number < own);
  if (above.length < 2) return null;
  const toggle = (id: string) => {
    const named = uses ?? [];
    const next = named.includes(id) ? named.filter((each) => each !== id) : [...named, id];
    run(editor, writeStep(stepId, { uses: next.length === 0 ? null : next }));
  };
  return (
    <fieldset className="sheet-uses">
      <legend className="small muted">Follows from the line above, or from</legend>
      {above.map(([id, number]) => (
        <label key={id} className="small">
          <input type="checkbox" checked={uses?.includes(id) ?? false} onChange={() => toggle(id)} />
          {number === 0 ? 'the given' : `line ${number}`}
        </label>
      ))}
    </fieldset>
  );
}
