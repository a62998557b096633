import { NodeViewWrapper, type NodeViewProps } from '@tiptap/react';
import { memo, useEffect, useId, useRef, useState, type KeyboardEvent, type MouseEvent, type RefObject } from 'react';
import { EdgeColumn } from '../../ui/edge-pieces.tsx';
import type { EdgeRow } from '../../ui/edge-strokes.ts';
import { Maths } from '../../ui/maths.tsx';
import { MathsFieldKeys } from '../../ui/maths-field-keys.tsx';
import { MathsReading } from '../../ui/maths-reading.tsx';
import { MathsField, type MathsFieldHandle } from '../../ui/maths-field.tsx';
import { pasteInto } from './paste-steps.ts';
import { deleteBlock, enterLine, leaveLine, nextLine, stepAttributes, writeStep } from './sheet-commands.ts';
import { pressKey, run, type StepOptions } from './sheet-keys.ts';
import { useLineFacts, useSheetStore, type LineFacts } from './sheet-store.ts';
import { useSettled } from './use-settled.ts';

const PLAIN: EdgeRow = {
  step: { above: 'plain', knot: null, below: 'plain' },
  upper: 'plain',
  lower: 'plain',
  tick: 'plain',
  isArm: false,
};

const OWN_PARTS = 'math-field, input, button, label, select, textarea, a, .maths-field, .under';

/** One line of the sheet. Only the one under the caret holds a live field; all others are set maths. */
export const StepView = memo(function StepView({ editor, node, extension }: NodeViewProps) {
  const { stepId, tex, reason } = stepAttributes(node);
  const { above } = extension.options as StepOptions;
  const facts = useLineFacts(stepId);
  const { settings } = useSheetStore();
  const notesId = useId();
  const field = useRef<MathsFieldHandle>(null);
  const [isInHand, setInHand] = useState(false);
  const number = facts?.number ?? 0;
  const isLive = editor.isEditable && facts?.part != null && facts.part !== 'reason';
  const isSettled = useSettled(tex, isLive && isInHand);
  const write = (next: string) => run(editor, writeStep(stepId, { tex: next }));
  const beforeNumber = wordBefore(facts);
  // A press anywhere on a written line enters it, by mouse, finger or pen.
  const onClick = (event: MouseEvent) => {
    const isOther = event.target instanceof Element && event.target.closest(OWN_PARTS);
    if (!isOther && editor.isEditable) run(editor, enterLine(stepId, 'end'));
  };
  return (
    <NodeViewWrapper className="contents" onClick={onClick}>
      <span className="no" data-drag-handle="">
        {beforeNumber ? <span className="nr">{beforeNumber}</span> : null}
        <span className="sr-only">line </span>
        {number}
      </span>
      <EdgeColumn row={PLAIN} />
      <div className={isLive ? 'mx sheet-live' : 'mx'}>
        {isLive && facts ? (
          <LiveLine {...{ editor, tex, facts, above, notesId, field, setInHand, write }} decimal={settings.decimal} />
        ) : (
          <WrittenLine tex={tex} facts={facts} />
        )}
        {isLive || !editor.isEditable ? null : (
          <button type="button" className="sheet-write" onClick={() => run(editor, enterLine(stepId, 'end'))}>
            Write on line {number}
          </button>
        )}
      </div>
      <div className={isLive ? 'under has-keys' : 'under'}>
        {isLive ? <MathsFieldKeys onPress={(piece) => field.current?.insert(piece)} /> : null}
        {facts?.reading && isSettled ? (
          <MathsReading id={notesId} tex={tex} reading={facts.reading} decimal={settings.decimal} onChange={write} />
        ) : null}
        {facts?.uses ? <p className="small muted">{usesWords(facts.uses)}</p> : null}
        {isLive && tex === '' ? <p className="small muted">Enter once more copies the line above.</p> : null}
      </div>
      <Reason {...{ editor, stepId, reason, number, facts, above }} />
    </NodeViewWrapper>
  );
});

interface LiveLineProps {
  readonly editor: NodeViewProps['editor'];
  readonly tex: string;
  readonly facts: LineFacts;
  readonly above: string;
  readonly notesId: string;
  readonly decimal: 'point' | 'comma';
  readonly field: RefObject<MathsFieldHandle | null>;
  readonly setInHand: (isInHand: boolean) => void;
  readonly write: (tex: string) => void;
}

function LiveLine({ editor, tex, facts, above, notesId, decimal, field, setInHand, write }: LiveLineProps) {
  const { sent } = facts;
  useEffect(() => field.current?.focus(), [field, sent]);
  const onKeyDownCapture = (event: KeyboardEvent) => {
    const isDelete = event.key === 'Backspace' && tex === '' && !event.ctrlKey && !event.metaKey && !event.altKey;
    if (isDelete) run(editor, deleteBlock);
    else if (!pressKey(editor, event, above)) return;
    event.preventDefault();
    event.stopPropagation();
  };
  return (
    <div
      className="slate"
      onKeyDownCapture={onKeyDownCapture}
      onPasteCapture={(event) => {
        const text = event.clipboardData.getData('text/plain');
        if (!pasteInto(editor, text, (piece) => field.current?.insert(piece))) return;
        event.preventDefault();
        event.stopPropagation();
      }}
    >
      <MathsField
        handle={field}
        value={tex}
        onChange={write}
        label={`line ${facts.number}`}
        describedBy={notesId}
        decimal={decimal}
        focusOnMount
        caret={facts.part === 'start' ? 'start' : 'end'}
        onFocus={() => setInHand(true)}
        onBlur={() => setInHand(false)}
        onEnter={() => run(editor, nextLine)}
        onMoveOut={(direction) => run(editor, leaveLine(direction))}
      />
    </div>
  );
}

const GAP_LENGTH = '{\\phantom{x}}'.length;

/** The line as it will look; what could not be read is ruled twice. */
function WrittenLine({ tex, facts }: { readonly tex: string; readonly facts: LineFacts | null }) {
  if (tex.trim() === '') return <span className="sheet-empty">nothing yet</span>;
  const reading = facts?.reading;
  if (!reading || reading.ok) return <Maths tex={tex} display />;
  const { start, end } = reading.refusal.span;
  if (start < end) return <Maths tex={tex} display spans={[{ start, end, as: 'bad' }]} />;
  // What is missing has no width: a gap stands for it.
  const shown = `${tex.slice(0, start)}{\\phantom{x}}${tex.slice(start)}`;
  return <Maths tex={shown} display spans={[{ start, end: start + GAP_LENGTH, as: 'bad' }]} />;
}

interface ReasonProps {
  readonly editor: NodeViewProps['editor'];
  readonly stepId: string;
  readonly reason: string;
  readonly number: number;
  readonly facts: LineFacts | null;
  readonly above: string;
}

function Reason({ editor, stepId, reason, number, facts, above }: ReasonProps) {
  const input = useRef<HTMLInputElement>(null);
  const isHere = facts?.part === 'reason';
  useEffect(() => {
    if (isHere) input.current?.focus();
  }, [isHere]);
  const onKeyDown = (event: KeyboardEvent) => {
    if (event.nativeEvent.isComposing) return;
    if (event.key === 'Enter' && !event.shiftKey && !event.ctrlKey && !event.metaKey) run(editor, nextLine);
    else if (event.key === 'ArrowUp' && !event.altKey) run(editor, leaveLine('upward'));
    else if (event.key === 'ArrowDown' && !event.altKey) run(editor, leaveLine('downward'));
    else if (event.key === 'Backspace' || !pressKey(editor, event, above)) return;
    event.preventDefault();
  };
  return (
    <div className="reason sheet-reason">
      <input
        ref={input}
        className="in reason-in"
        type="text"
        value={reason}
        maxLength={300}
        readOnly={!editor.isEditable}
        placeholder="reason, if you like"
        aria-label={`reason for line ${number}`}
        autoComplete="off"
        onFocus={() => isHere || run(editor, enterLine(stepId, 'reason'))}
        onChange={(event) => run(editor, writeStep(stepId, { reason: event.target.value }))}
        onKeyDown={onKeyDown}
      />
    </div>
  );
}

function wordBefore(facts: LineFacts | null): string | null {
  if (!facts?.reading || (facts.part !== null && facts.part !== 'reason')) return null;
  if (!facts.reading.ok) return 'not read';
  return facts.reading.alternatives.length > 0 ? 'which?' : null;
}

function usesWords(uses: readonly number[]): string {
  const words = uses.map((number) => (number === 0 ? 'the given' : `line ${number}`));
  return `from ${words.length === 1 ? words[0] : `${words.slice(0, -1).join(', ')} and ${words.at(-1)}`}`;
}
