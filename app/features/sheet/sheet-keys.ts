import type { Editor } from '@tiptap/core';
import { NodeSelection } from '@tiptap/pm/state';
import {
  copyAbove,
  deleteBlock,
  insertLine,
  insertWords,
  moveBlock,
  stepAttributes,
  type Command,
} from './sheet-commands.ts';

/** What the kind of node is told of its sheet. */
export interface StepOptions {
  /** The line that the first one goes on from. */
  readonly above: string;
}

/** Runs a command on the editor; false where it has nothing to do. */
export function run(editor: Editor, command: Command): boolean {
  const tr = editor.isEditable ? command(editor.state) : null;
  if (!tr) return false;
  keepFocus(editor, () => editor.view.dispatch(tr));
  return true;
}

/**
 * Words are written in the sheet itself. A line takes the focus into its field, a moment after the field before it is
 * gone: until then the sheet holds it, so that no key is lost. Not on touch screens, where that would bring up the
 * device's own keys.
 */
function keepFocus(editor: Editor, act: () => void): void {
  const before = selectedStep(editor);
  act();
  const after = selectedStep(editor);
  if (after === null || (after !== before && matchMedia('(pointer: fine)').matches)) editor.view.focus();
}

function selectedStep({ state }: Editor): string | null {
  return state.selection instanceof NodeSelection ? stepAttributes(state.selection.node).stepId : null;
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
  if (name === 'Mod-z' || name === 'Mod-Shift-z' || name === 'Mod-y') {
    keepFocus(editor, () => (name === 'Mod-z' ? editor.commands.undo() : editor.commands.redo()));
    return true;
  }
  const command = sheetKeys(above)[name];
  if (!command) return false;
  run(editor, command);
  return true;
}
