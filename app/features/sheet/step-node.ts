import { mergeAttributes, Node, type Editor } from '@tiptap/core';
import { NodeSelection, Plugin } from '@tiptap/pm/state';
import { ReactNodeViewRenderer } from '@tiptap/react';
import { StepView } from './step-view.tsx';
import { blocksFromPaste } from './paste-steps.ts';
import { insertBlocks, mendIds, nextLine, stepAttributes, writeStep } from './sheet-commands.ts';
import { sheetDecorations } from './sheet-decorations.ts';
import { run, sheetKeys, type StepOptions } from './sheet-keys.ts';

/** One line of maths with its reason: an atom, whose field is drawn and run by its view. */
export const StepNode = Node.create<StepOptions>({
  name: 'step',
  group: 'block',
  atom: true,
  draggable: true,
  selectable: true,

  addOptions: () => ({ above: '' }),

  addAttributes: () => ({
    stepId: { default: '', parseHTML: () => '', renderHTML: () => ({}) },
    tex: {
      default: '',
      parseHTML: (element) => element.dataset['tex'] ?? '',
      renderHTML: ({ tex }) => ({ 'data-tex': tex }),
    },
    reason: {
      default: '',
      parseHTML: (element) => element.dataset['reason'] ?? '',
      renderHTML: ({ reason }) => ({ 'data-reason': reason }),
    },
    uses: { default: null, parseHTML: () => null, renderHTML: () => ({}) },
  }),

  parseHTML: () => [{ tag: 'div[data-tex]' }],
  renderHTML: ({ node, HTMLAttributes }) => ['div', mergeAttributes(HTMLAttributes), String(node.attrs['tex'])],
  renderText: ({ node }) => String(node.attrs['tex']),

  addNodeView() {
    return ReactNodeViewRenderer(StepView, {
      as: 'li',
      className: 'ln sheet-line',
      stopEvent: ({ event }) => isOwnEvent(event),
    });
  },

  addKeyboardShortcuts() {
    const keys = Object.entries(sheetKeys(this.options.above)).map(
      ([key, command]) => [key, ({ editor }: { editor: Editor }) => run(editor, command)] as const,
    );
    return {
      ...Object.fromEntries(keys),
      Enter: ({ editor }) => goOn(editor),
    };
  },

  addProseMirrorPlugins() {
    const { editor } = this;
    return [
      sheetDecorations(),
      new Plugin({
        appendTransaction: (transactions, _before, state) =>
          transactions.some(({ docChanged }) => docChanged) ? mendIds(state) : null,
        props: {
          // What is typed before the line's field has the focus goes to its end, and never replaces the line.
          handleTextInput: ({ state }, _from, _to, text) => {
            if (!(state.selection instanceof NodeSelection)) return false;
            const { stepId, tex } = stepAttributes(state.selection.node);
            return run(editor, writeStep(stepId, { tex: tex + text })) || true;
          },
          handlePaste: ({ state }, event) => {
            const text = event.clipboardData?.getData('text/plain') ?? '';
            if (!(state.selection instanceof NodeSelection) || text === '') return false;
            return run(editor, insertBlocks(blocksFromPaste(text, state.schema)));
          },
        },
      }),
    ];
  },
});

/** What happens in a line's fields and buttons is theirs; a press on written maths, and dragging, are the sheet's. */
function isOwnEvent(event: Event): boolean {
  if (/^(drag|drop)/.test(event.type)) return false;
  const target = event.target instanceof Element ? event.target : null;
  return target?.closest('math-field, input, button, label, select, textarea, a, .maths-field') !== null;
}

/** Enter at the end of words, or on a line: the next line. Within words it parts them. */
function goOn(editor: Editor): boolean {
  const { selection } = editor.state;
  const { $from, empty } = selection;
  const isAtEnd = empty && $from.parentOffset === $from.parent.content.size;
  return selection instanceof NodeSelection || isAtEnd ? run(editor, nextLine) : false;
}
