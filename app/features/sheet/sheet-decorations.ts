import { Plugin, PluginKey, type EditorState } from '@tiptap/pm/state';
import { Decoration, DecorationSet } from '@tiptap/pm/view';
import { placesOf } from './sheet-commands.ts';

/**
 * Where the edge ends, and which words are still missing, as classes. Set here rather than found by the stylesheet:
 * a selector that looks at what follows would weigh every line at each change.
 */
export function sheetDecorations(): Plugin {
  const key = new PluginKey<DecorationSet>('sheetDecorations');
  return new Plugin({
    key,
    state: {
      init: (_config, state) => decorate(state),
      apply: (tr, known, _before, state) => (tr.docChanged ? decorate(state) : known),
    },
    props: { decorations: (state) => key.getState(state) },
  });
}

function decorate({ doc }: EditorState): DecorationSet {
  const places = placesOf(doc);
  const last = places.findLastIndex(({ node }) => node.type.name === 'step');
  const decorations = places.flatMap(({ node, pos, index }) => {
    const isEmptyWords = node.type.name !== 'step' && node.content.size === 0;
    const names = [index === last && 'sheet-last', index > last && 'sheet-beyond', isEmptyWords && 'sheet-words-empty'];
    const name = names.filter(Boolean).join(' ');
    return name ? [Decoration.node(pos, pos + node.nodeSize, { class: name })] : [];
  });
  return DecorationSet.create(doc, decorations);
}
