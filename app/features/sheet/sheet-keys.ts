import type { Editor } from '@tiptap/core';
import { TextSelection } from '@tiptap/pm/state';
import { copyAbove, deleteBlock, insertLine, insertWords, moveBlock, type Command } from './sheet-commands.ts';

/** What the kind of node is told of its sheet. */
export interface StepOptions {
  /** The line that the first one goes on from. */
  readonly above: string;
}

/** Runs a command on the editor; false where it has nothing to do. */
export function run(editor: Editor, command: Command): boolean {
  const tr = editor.isEditable ? command(editor.state) : null;
  if (!tr) return false;
  editor.view.dispatch(tr);
  // A line takes the focus into its field by itself; words are written in the sheet.
  if (editor.state.selection instanceof TextSelection) editor.view.focus();
  return true;
}

/** Keys that act on the line in hand, in a maths field as in words; written as TipTap writes them. */
export function sheetKeys(above: string): Readonly<Record<string, Command>> {
  return {
    'Mod-Enter': insertLine('below'),
    'Mod-Shift-Enter': insertLine('above'),
    'Shift-Enter': insertWords,
    'Alt-ArrowUp': moveBlock(-1),
    'Alt-ArrowDown': moveBlock(1),
    'Mod-d': copyAbove(above),
    'Mod-Backspace': deleteBlock,
  };
}

type Pressed = Pick<KeyboardEvent, 'key' | 'ctrlKey' | 'metaKey' | 'altKey' | 'shiftKey'>;

function nameOf({ key, ctrlKey, metaKey, altKey, shiftKey }: Pressed): string {
  const parts = [(ctrlKey || metaKey) && 'Mod', altKey && 'Alt', shiftKey && 'Shift'];
  return [...parts.filter(Boolean), key.length === 1 ? key.toLowerCase() : key].join('-');
}

/** Acts on a key pressed within a field, which the editor itself does not see. Answers whether it was one of ours. */
export function pressKey(editor: Editor, event: Pressed, above: string): boolean {
  const name = nameOf(event);
  if (name === 'Mod-z') return editor.commands.undo() || true;
  if (name === 'Mod-Shift-z' || name === 'Mod-y') return editor.commands.redo() || true;
  const command = sheetKeys(above)[name];
  if (!command) return false;
  run(editor, command);
  return true;
}
