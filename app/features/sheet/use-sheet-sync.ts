import type { Editor, JSONContent } from '@tiptap/core';
import { useEffect, useRef, useState, useSyncExternalStore } from 'react';
import type { SaveAnswer, SavedDraft, SaveSheet } from '../../../shared/schemas/derivation.ts';
import type { SheetDocument } from '../../../shared/schemas/sheet.ts';
import { openLocalCopies, openStore } from './local-copies.ts';
import { toWritable } from './sheet-editor.tsx';
import { createSheetSync, type SheetSync, type SyncState } from './sheet-sync.ts';
import { newStepId } from './step-id.ts';

export interface SheetSyncOptions {
  /** Person, derivation and purpose. */
  readonly scope: string;
  readonly draft: SavedDraft;
  readonly save: (body: SaveSheet) => Promise<SaveAnswer>;
}

export interface RunningSync {
  readonly sync: SheetSync | null;
  readonly state: SyncState;
  readonly onChange: (document: SheetDocument) => void;
  readonly onReady: (editor: Editor) => void;
}

/** Keeps the editor, this browser and the server in step for as long as the page is open. */
export function useSheetSync({ scope, draft, save }: SheetSyncOptions): RunningSync {
  const [sync, setSync] = useState<SheetSync | null>(null);
  const running = useRef<SheetSync | null>(null);
  const editor = useRef<Editor | null>(null);
  const latest = useRef({ draft, save });
  useEffect(() => {
    latest.current = { draft, save };
  });
  useEffect(() => {
    const made = createSheetSync({
      draft: latest.current.draft,
      copies: openLocalCopies({
        scope,
        pageId: newStepId(),
        storage: openStore(() => localStorage),
        tab: openStore(() => sessionStorage),
        locks: navigator.locks,
        now: Date.now,
      }),
      send: (document, baseVersion) => latest.current.save({ document, baseVersion }),
      onReplace: (document) => editor.current && replaceContent(editor.current, document),
      now: Date.now,
    });
    running.current = made;
    setSync(made);
    void made.recover();
    const retry = () => made.retry();
    window.addEventListener('online', retry);
    window.addEventListener('focus', retry);
    return () => {
      window.removeEventListener('online', retry);
      window.removeEventListener('focus', retry);
      made.close();
    };
  }, [scope]);
  useEffect(() => sync?.serverHas(draft), [sync, draft]);
  const state = useSyncExternalStore(
    (listener) => sync?.subscribe(listener) ?? (() => {}),
    () => sync?.state ?? null,
  );
  return {
    sync,
    state: state ?? { kind: 'saved', at: draft.savedAt },
    onChange: (document) => running.current?.edit(document),
    onReady: (made) => {
      editor.current = made;
      // What a crashed page left may have been found before the editor stood.
      const known = running.current?.document;
      if (known && known !== latest.current.draft.document) replaceContent(made, known);
    },
  };
}

function replaceContent(editor: Editor, document: SheetDocument): void {
  editor
    .chain()
    .setContent(toWritable(document) as JSONContent, { emitUpdate: false })
    .run();
}
