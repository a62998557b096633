import type { Editor } from '@tiptap/core';
import type { Node as Block, Schema } from '@tiptap/pm/model';
import { linesFromPaste } from '../../../shared/maths/plain-input.ts';
import { readLine } from '../../../shared/maths/read.ts';
import { insertBlocks, makeStep } from './sheet-commands.ts';
import { run } from './sheet-keys.ts';

/** Pasted text as blocks of the sheet: lines of maths, and words where a line is not maths. */
export function blocksFromPaste(text: string, schema: Schema): Block[] {
  return linesFromPaste(text).map((line) => {
    const reading = readLine(line);
    const isWords = !reading.ok && reading.error.code === 'text';
    return isWords
      ? (schema.nodes['paragraph']?.create(null, schema.text(line)) ?? makeStep(schema, { tex: line }))
      : makeStep(schema, { tex: line });
  });
}

/**
 * Pastes into a line: one line goes in at the caret, several become lines of their own behind it. Answers whether
 * there was anything to paste.
 */
export function pasteInto(editor: Editor, text: string, insertHere: (tex: string) => void): boolean {
  const lines = linesFromPaste(text);
  const [first] = lines;
  if (first === undefined) return false;
  if (lines.length === 1) insertHere(first);
  else run(editor, insertBlocks(blocksFromPaste(text, editor.schema)));
  return true;
}
