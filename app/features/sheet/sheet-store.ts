import type { Editor } from '@tiptap/core';
import { NodeSelection, type EditorState } from '@tiptap/pm/state';
import { createContext, useContext, useSyncExternalStore } from 'react';
import type { Reading, ReadSettings } from '../../../shared/maths/expression.ts';
import { readInPlace } from '../../../shared/maths/read-in-place.ts';
import { createLineReader, type Place } from '../../../shared/maths/read-lines.ts';
import { LINE_PART, placesOf, stepAttributes, type LinePart } from './sheet-commands.ts';

/** What a line shows beside its own attributes; the same object as long as nothing of it changes. */
export interface LineFacts {
  readonly number: number;
  /** null while the line is empty. */
  readonly reading: Reading | null;
  /** Where the caret is in this line. */
  readonly part: LinePart | null;
  /** Goes up each time that the caret is sent into this line. */
  readonly sent: number;
  /** The lines that this one names, by number; null: the line above. */
  readonly uses: readonly number[] | null;
}

export interface SheetFacts {
  readonly lines: ReadonlyMap<string, LineFacts>;
  readonly activeId: string | null;
  /** Each line's number, in order. */
  readonly numbers: ReadonlyMap<string, number>;
  /** Numbers of the lines that cannot be read, and of those that can be read in two ways. */
  readonly unread: readonly number[];
  readonly twoWays: readonly number[];
  readonly written: number;
}

export type LineSettings = Omit<ReadSettings, 'functions'>;

export interface SheetStore {
  readonly settings: LineSettings;
  readonly facts: SheetFacts;
  follow(editor: Editor): () => void;
  subscribe(listener: () => void): () => void;
}

const NONE: SheetFacts = { lines: new Map(), activeId: null, numbers: new Map(), unread: [], twoWays: [], written: 0 };

/**
 * What the lines show, derived from the editor's state after every change. Only lines whose facts change are drawn
 * again, so that a long sheet stays as quick as a short one. `fixed`: how many lines stand before the first.
 */
export function createSheetStore(settings: LineSettings, fixed: readonly string[]): SheetStore {
  const listeners = new Set<() => void>();
  const readings = new Map<string, Reading>();
  let facts = NONE;

  function read(tex: string, { before, functions, key: place }: Place): Reading {
    const key = `${place} ${tex}`;
    const known = readings.get(key);
    if (known) return known;
    const reading = readInPlace(tex, { ...settings, functions }, before);
    if (readings.size > 2_000) readings.clear();
    readings.set(key, reading);
    return reading;
  }

  return {
    settings,
    get facts() {
      return facts;
    },
    follow(editor) {
      // Nobody has entered a line yet: on a touch screen the keys would come up unasked.
      let caret: Caret = { part: null, sent: 0 };
      facts = factsOf(editor.state, facts, caret, fixed, read);
      const onTransaction = ({ transaction }: { transaction: { getMeta(key: string): unknown } }) => {
        const meta = transaction.getMeta(LINE_PART) as LinePart | undefined;
        if (meta) caret = { part: meta, sent: caret.sent + 1 };
        let next = factsOf(editor.state, facts, caret, fixed, read);
        if (!meta && next.activeId !== facts.activeId && next.activeId !== null) {
          caret = { part: 'end', sent: caret.sent + 1 };
          next = factsOf(editor.state, facts, caret, fixed, read);
        }
        if (sameFacts(facts, next)) return;
        facts = next;
        for (const listener of listeners) listener();
      };
      editor.on('transaction', onTransaction);
      for (const listener of listeners) listener();
      return () => editor.off('transaction', onTransaction);
    },
    subscribe(listener) {
      listeners.add(listener);
      return () => listeners.delete(listener);
    },
  };
}

interface Caret {
  readonly part: LinePart | null;
  readonly sent: number;
}

function factsOf(
  state: EditorState,
  before: SheetFacts,
  caret: Caret,
  fixed: readonly string[],
  read: (tex: string, place: Place) => Reading,
): SheetFacts {
  const readNext = createLineReader(read);
  fixed.forEach(readNext);
  const lines = new Map<string, LineFacts>();
  const numbers = new Map<string, number>([['given', 0]]);
  const unread: number[] = [];
  const twoWays: number[] = [];
  let number = fixed.length - 1;
  let written = 0;
  let activeId: string | null = null;
  for (const { node, pos } of placesOf(state.doc)) {
    if (node.type.name !== 'step') continue;
    const { stepId, tex, uses } = stepAttributes(node);
    number += 1;
    const isHere = state.selection instanceof NodeSelection && state.selection.from === pos;
    if (isHere) activeId = stepId;
    const reading = tex.trim() === '' ? null : readNext(tex);
    if (reading) {
      written += 1;
      if (!reading.ok) unread.push(number);
      else if (reading.alternatives.length > 0) twoWays.push(number);
    }
    const next: LineFacts = {
      number,
      reading,
      part: isHere ? caret.part : null,
      sent: isHere ? caret.sent : 0,
      uses: usesOf(uses, numbers),
    };
    const known = before.lines.get(stepId);
    lines.set(stepId, known && sameLineFacts(known, next) ? known : next);
    numbers.set(stepId, number);
  }
  return { lines, activeId, numbers, unread, twoWays, written };
}

function usesOf(uses: readonly string[] | null, above: ReadonlyMap<string, number>): number[] | null {
  if (!uses) return null;
  const named = uses.flatMap((id) => above.get(id) ?? []).sort((one, other) => one - other);
  return named.length === 0 ? null : named;
}

function sameLineFacts(one: LineFacts, other: LineFacts): boolean {
  return (
    one.number === other.number &&
    one.reading === other.reading &&
    one.part === other.part &&
    one.sent === other.sent &&
    one.uses?.join() === other.uses?.join()
  );
}

function sameFacts(one: SheetFacts, other: SheetFacts): boolean {
  return (
    one.activeId === other.activeId &&
    one.lines.size === other.lines.size &&
    [...other.lines].every(([id, line]) => one.lines.get(id) === line)
  );
}

const StoreContext = createContext<SheetStore | null>(null);
export const SheetStoreProvider = StoreContext.Provider;

export function useSheetStore(): SheetStore {
  const store = useContext(StoreContext);
  if (!store) throw new Error('A line stands outside of a sheet');
  return store;
}

export function useLineFacts(stepId: string): LineFacts | null {
  const store = useSheetStore();
  return useSyncExternalStore(store.subscribe, () => store.facts.lines.get(stepId) ?? null);
}

export function useSheetFacts(store: SheetStore): SheetFacts {
  return useSyncExternalStore(store.subscribe, () => store.facts);
}
