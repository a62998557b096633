import type { Node as Block, NodeType, Schema } from '@tiptap/pm/model';
import { closeHistory } from '@tiptap/pm/history';
import { NodeSelection, Selection, TextSelection, type EditorState, type Transaction } from '@tiptap/pm/state';
import type { StepAttributes } from '../../../shared/schemas/sheet.ts';
import { newStepId } from './step-id.ts';

/** What a command did to the sheet, or null where it has nothing to do. */
export type Command = (state: EditorState) => Transaction | null;

/** Where in a line the caret goes: its maths at either end, or its reason. */
export type LinePart = 'start' | 'end' | 'reason';
/** Transaction meta under which the line's part is handed to the store. */
export const LINE_PART = 'linePart';

export interface Place {
  readonly node: Block;
  readonly pos: number;
  readonly index: number;
}

export function stepAttributes(node: Block): StepAttributes {
  return node.attrs as StepAttributes;
}

/** The blocks of the sheet with their positions. */
export function placesOf(doc: Block): Place[] {
  const places: Place[] = [];
  doc.forEach((node, pos, index) => places.push({ node, pos, index }));
  return places;
}

export function findStep(doc: Block, stepId: string): Place | null {
  return placesOf(doc).find(({ node }) => node.type.name === 'step' && stepAttributes(node).stepId === stepId) ?? null;
}

/** The block that the caret is in. */
export function currentPlace({ doc, selection }: EditorState): Place | null {
  const index = selection.$from.index(0);
  return placesOf(doc)[index] ?? null;
}

export function makeStep(schema: Schema, attributes: Partial<StepAttributes> = {}): Block {
  return stepType(schema).create({ tex: '', reason: '', uses: null, ...attributes, stepId: newStepId() });
}

function stepType(schema: Schema): NodeType {
  const type = schema.nodes['step'];
  if (!type) throw new Error('The sheet has no steps');
  return type;
}

/** Puts the caret into a block. What was done on the way is undone by itself, apart from typing before and after it. */
export function goTo(tr: Transaction, pos: number, part: LinePart = 'end'): Transaction {
  const node = tr.doc.nodeAt(pos);
  if (!node) return tr;
  if (node.type.name === 'step') tr.setSelection(NodeSelection.create(tr.doc, pos));
  else {
    const at = part === 'start' ? pos + 1 : pos + node.nodeSize - 1;
    tr.setSelection(TextSelection.create(tr.doc, at));
  }
  return closeHistory(tr).setMeta(LINE_PART, part).scrollIntoView();
}

/** Writes into a line. Typing within half a second is undone together. */
export function writeStep(stepId: string, change: Partial<Pick<StepAttributes, 'tex' | 'reason' | 'uses'>>): Command {
  return ({ doc, tr, selection }) => {
    const place = findStep(doc, stepId);
    if (!place) return null;
    const wasSelected = selection instanceof NodeSelection && selection.from === place.pos;
    // Replaced rather than given new attributes, because only replaced stretches are undone in groups.
    tr.replaceWith(place.pos, place.pos + 1, place.node.type.create({ ...place.node.attrs, ...change }));
    if (wasSelected) tr.setSelection(NodeSelection.create(tr.doc, place.pos));
    return tr;
  };
}

export const enterLine =
  (stepId: string, part: LinePart): Command =>
  ({ doc, tr }) => {
    const place = findStep(doc, stepId);
    return place && goTo(tr, place.pos, part);
  };

/** A new line above or below the block with the caret. */
export const insertLine =
  (side: 'above' | 'below', attributes: Partial<StepAttributes> = {}): Command =>
  (state) => {
    const place = currentPlace(state);
    const at = place ? (side === 'above' ? place.pos : place.pos + place.node.nodeSize) : state.doc.content.size;
    return goTo(state.tr.insert(at, makeStep(state.schema, attributes)), at);
  };

/** Words below the block with the caret. */
export const insertWords: Command = (state) => {
  const place = currentPlace(state);
  const at = place ? place.pos + place.node.nodeSize : state.doc.content.size;
  const paragraph = state.schema.nodes['paragraph']?.create();
  return paragraph ? goTo(state.tr.insert(at, paragraph), at) : null;
};

/**
 * Enter: the next line. On a line still empty: the line above is copied into it, because the next line is most often
 * that one with a change.
 */
export const nextLine: Command = (state) => {
  const place = currentPlace(state);
  if (place?.node.type.name === 'step' && stepAttributes(place.node).tex === '') return copyFromAbove(state);
  return insertLine('below')(state);
};

/** Copies the maths of the nearest line above into the current one. The given counts as line 0. */
export function copyAbove(given: string): Command {
  return (state) => {
    const place = currentPlace(state);
    if (!place || place.node.type.name !== 'step') return null;
    const above = placesOf(state.doc)
      .slice(0, place.index)
      .findLast(({ node }) => node.type.name === 'step' && stepAttributes(node).tex !== '');
    const tex = above ? stepAttributes(above.node).tex : given;
    return writeStep(stepAttributes(place.node).stepId, { tex })(state)?.setMeta(LINE_PART, 'end') ?? null;
  };
}

function copyFromAbove(state: EditorState): Transaction | null {
  return copyAbove('')(state);
}

/** Moves the block with the caret one place up or down. */
export const moveBlock =
  (direction: -1 | 1): Command =>
  (state) => {
    const place = currentPlace(state);
    const other = place && placesOf(state.doc)[place.index + direction];
    if (!place || !other) return null;
    const { tr, selection } = state;
    const offset = selection.from - place.pos;
    tr.delete(place.pos, place.pos + place.node.nodeSize);
    const at = direction === -1 ? other.pos : other.pos + other.node.nodeSize - place.node.nodeSize;
    tr.insert(at, place.node);
    if (selection instanceof NodeSelection) return goTo(tr, at);
    return tr.setSelection(TextSelection.create(tr.doc, at + offset)).scrollIntoView();
  };

/** Deletes the block with the caret; the caret goes to the one above. A sheet keeps at least one line. */
export const deleteBlock: Command = (state) => {
  const place = currentPlace(state);
  if (!place) return null;
  const { tr, doc } = state;
  if (doc.childCount === 1) {
    return goTo(tr.replaceWith(0, doc.content.size, makeStep(state.schema)), 0);
  }
  tr.delete(place.pos, place.pos + place.node.nodeSize);
  const before = placesOf(tr.doc)[Math.max(place.index - 1, 0)];
  return before ? goTo(tr, before.pos) : tr;
};

/** Leaves a line by an arrow key; null at the ends of the sheet. */
export const leaveLine =
  (direction: 'forward' | 'backward' | 'upward' | 'downward'): Command =>
  (state) => {
    const place = currentPlace(state);
    const isBack = direction === 'backward' || direction === 'upward';
    const next = place && placesOf(state.doc)[place.index + (isBack ? -1 : 1)];
    if (!next) return null;
    return goTo(state.tr, next.pos, direction === 'forward' ? 'start' : 'end');
  };

/** Several lines and words at once, behind the current block; an empty current line takes the first of them. */
export function insertBlocks(blocks: readonly Block[]): Command {
  return (state) => {
    const [first] = blocks;
    const place = currentPlace(state);
    if (!first) return null;
    const isOnEmpty =
      place?.node.type.name === 'step' &&
      stepAttributes(place.node).tex === '' &&
      stepAttributes(place.node).reason === '';
    const from = !place ? state.doc.content.size : isOnEmpty ? place.pos : place.pos + place.node.nodeSize;
    const to = place && isOnEmpty ? place.pos + place.node.nodeSize : from;
    const tr = state.tr.replaceWith(from, to, blocks);
    const size = blocks.reduce((sum, block) => sum + block.nodeSize, 0);
    const last = blocks.at(-1) ?? first;
    return goTo(tr, from + size - last.nodeSize);
  };
}

/** Gives every line an id of its own again, after a copy within the sheet. */
export const mendIds: Command = ({ doc, tr }) => {
  const seen = new Set<string>();
  for (const { node, pos } of placesOf(doc)) {
    if (node.type.name !== 'step') continue;
    const { stepId } = stepAttributes(node);
    if (!stepId || seen.has(stepId)) tr.setNodeMarkup(pos, null, { ...node.attrs, stepId: newStepId() });
    seen.add(stepId);
  }
  return tr.docChanged ? tr : null;
};

/** The caret where the work goes on: at the last line. */
export function atEnd(state: EditorState): Transaction {
  const last = placesOf(state.doc).at(-1);
  return last ? goTo(state.tr, last.pos) : state.tr.setSelection(Selection.atEnd(state.doc));
}
