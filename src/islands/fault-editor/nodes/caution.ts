import { Node } from '@tiptap/core';

/** A caution: the amber bar across the note. Enter leaves it. */
export const Caution = Node.create({
  name: 'caution',
  group: 'block',
  content: 'inline*',
  defining: true,
  parseHTML: () => [{ tag: 'div[data-caution]', contentElement: 'p' }],
  renderHTML: () => [
    'div',
    { class: 'bar bar-caution note-caution', 'data-caution': '' },
    ['strong', { contenteditable: 'false' }, 'Caution'],
    ['p', 0],
  ],
  addKeyboardShortcuts() {
    return {
      Enter: () => {
        const { editor } = this;
        const { $from } = editor.state.selection;
        if ($from.parent.type.name !== 'caution') return false;
        const next = editor.state.doc.resolve($from.after()).nodeAfter;
        const atEnd = $from.parentOffset === $from.parent.content.size;
        if (atEnd && next?.type.name === 'paragraph' && next.content.size === 0)
          return editor.commands.setTextSelection($from.after() + 1);
        return editor
          .chain()
          .splitBlock()
          .command(({ commands }) => commands.setNode('paragraph'))
          .run();
      },
      Backspace: () => {
        const { editor } = this;
        const { $from, empty } = editor.state.selection;
        if (!empty || $from.parent.type.name !== 'caution' || $from.parentOffset > 0) return false;
        return editor.commands.setNode('paragraph');
      },
    };
  },
});
