import { EditorContent, useEditor, type Editor, type JSONContent } from '@tiptap/react';
import StarterKit from '@tiptap/starter-kit';
import { useEffect, useMemo, useRef, useState } from 'react';
import { EMPTY_SHEET, type HandedInLine, type SheetDocument } from '../../../shared/schemas/sheet.ts';
import { Button } from '../../ui/button.tsx';
import { Kbd } from '../../ui/kbd.tsx';
import { loadMathsFields } from '../../ui/maths-field-library.ts';
import { FixedLines } from './fixed-lines.tsx';
import { LineAnnouncer } from './line-announcer.tsx';
import { LineTools } from './line-tools.tsx';
import { atEnd, findStep, insertWords, nextLine, stepAttributes } from './sheet-commands.ts';
import { run } from './sheet-keys.ts';
import {
  createSheetStore,
  SheetStoreProvider,
  useSheetFacts,
  type LineSettings,
  type SheetStore,
} from './sheet-store.ts';
import { newStepId } from './step-id.ts';
import { StepNode } from './step-node.ts';
import './sheet.css';

export interface SheetEditorProps {
  /** What it begins with; later changes from outside go through the editor that `onReady` hands over. */
  readonly document: SheetDocument;
  /** The given, and for a mend the lines before the fault. */
  readonly fixed: readonly HandedInLine[];
  readonly editable: boolean;
  readonly store: SheetStore;
  readonly onChange: (document: SheetDocument) => void;
  readonly onReady: (editor: Editor) => void;
}

function extensionsFor(above: string) {
  return [
    StarterKit.configure({
      blockquote: false,
      bulletList: false,
      code: false,
      codeBlock: false,
      gapcursor: false,
      heading: false,
      horizontalRule: false,
      link: false,
      listItem: false,
      listKeymap: false,
      orderedList: false,
      paragraph: { HTMLAttributes: { class: 'sheet-words', role: 'listitem' } },
      strike: false,
      trailingNode: false,
      underline: false,
    }),
    StepNode.configure({ above }),
  ];
}

/** A sheet to write on holds at least one line. */
export function toWritable(document: SheetDocument): SheetDocument {
  if (document.content.length > 0) return document;
  const attrs = { stepId: newStepId(), tex: '', reason: '', uses: null };
  return { ...EMPTY_SHEET, content: [{ type: 'step', attrs }] };
}

/** The store that a sheet's lines read their facts from; one for each sheet. */
export function useNewSheetStore(settings: LineSettings, fixed: readonly HandedInLine[]): SheetStore {
  const [store] = useState(() =>
    createSheetStore(
      settings,
      fixed.map(({ tex }) => tex),
    ),
  );
  return store;
}

/** The sheet: fixed lines, then what is written, along one plain edge. */
export function SheetEditor({ document, fixed, editable, store, onChange, onReady }: SheetEditorProps) {
  const above = fixed.at(-1)?.tex ?? '';
  const extensions = useMemo(() => extensionsFor(above), [above]);
  const editor = useEditor({
    extensions,
    content: toWritable(document) as JSONContent,
    editable,
    injectCSS: false,
    immediatelyRender: true,
    shouldRerenderOnTransaction: false,
    editorProps: {
      attributes: { class: 'deriv sheet-lines', role: 'list', 'aria-label': 'Your lines' },
    },
    onUpdate: ({ editor: changed }) => onChange(changed.getJSON() as SheetDocument),
  });
  const ready = useRef(onReady);
  useEffect(() => {
    const stop = store.follow(editor);
    ready.current(editor);
    return stop;
  }, [store, editor]);
  useEffect(() => {
    if (editable && matchMedia('(pointer: fine)').matches) editor.view.dispatch(atEnd(editor.state));
  }, [editor, editable]);
  useEffect(() => editor.setEditable(editable, false), [editor, editable]);
  useEffect(() => {
    // Asked for before the first line is entered, so that it can be typed on at once.
    if (editable) loadMathsFields().catch(() => undefined);
  }, [editable]);
  return (
    <SheetStoreProvider value={store}>
      <FixedLines lines={fixed} />
      <EditorContent editor={editor} className="contents" />
      {editable ? <Acts editor={editor} store={store} above={above} /> : null}
      <LineAnnouncer store={store} />
    </SheetStoreProvider>
  );
}

function Acts({
  editor,
  store,
  above,
}: {
  readonly editor: Editor;
  readonly store: SheetStore;
  readonly above: string;
}) {
  const facts = useSheetFacts(store);
  const [shown, setShown] = useState(false);
  const { activeId } = facts;
  const place = activeId ? findStep(editor.state.doc, activeId) : null;
  return (
    <div className="sheet-acts">
      <div className="acts">
        <Button kind="quiet" onClick={() => run(editor, nextLine)}>
          Next line <Kbd>Enter</Kbd>
        </Button>
        <Button kind="quiet" onClick={() => run(editor, insertWords)}>
          Words between lines
        </Button>
        <Button kind="quiet" aria-expanded={shown} onClick={() => setShown(!shown)}>
          Change a line
        </Button>
      </div>
      {shown && activeId && place ? (
        <LineTools {...{ editor, facts, above }} stepId={activeId} uses={stepAttributes(place.node).uses} />
      ) : null}
      {shown && !activeId ? <p className="small muted">Put the caret into a line first.</p> : null}
    </div>
  );
}
