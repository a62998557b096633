import type { Editor } from '@tiptap/core';
import type { Node as Block, Schema } from '@tiptap/pm/model';
import { linesFromPaste } from '../../../shared/maths/plain-input.ts';
import { printLine } from '../../../shared/maths/print.ts';
import { readLine } from '../../../shared/maths/read.ts';
import { explainRefusal } from '../../../shared/maths/refusals.ts';
import { insertBlocks, makeStep } from './sheet-commands.ts';
import { run } from './sheet-keys.ts';

/** Names that plain typing spells out; TeX drops the space behind them, so they have to become commands first. */
const SPELT_OUT =
  /(?<![a-zA-Z\\])(pi|alpha|beta|gamma|delta|theta|lambda|mu|sigma|phi|omega|sin|cos|tan|ln|log|exp)(?![a-zA-Z])/g;

/** One pasted line as TeX. Plain typing that can be read in one way only is set as maths; TeX stays as it is. */
function toTex(line: string): string {
  if (line.includes('\\')) return line;
  const reading = readLine(line);
  const isPlain = reading.ok && reading.alternatives.length === 0;
  return isPlain ? printLine(reading.line) : line.replace(SPELT_OUT, '\\$1 ');
}

/** Pasted text as blocks of the sheet: lines of maths, and words where a line is not maths. */
export function blocksFromPaste(text: string, schema: Schema): Block[] {
  return linesFromPaste(text).map((line) => {
    const reading = readLine(line);
    const isWords = !reading.ok && explainRefusal(reading.refusal).code === 'text';
    return isWords
      ? (schema.nodes['paragraph']?.create(null, schema.text(line)) ?? makeStep(schema, { tex: toTex(line) }))
      : makeStep(schema, { tex: toTex(line) });
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
  if (lines.length === 1) insertHere(toTex(first));
  else run(editor, insertBlocks(blocksFromPaste(text, editor.schema)));
  return true;
}
