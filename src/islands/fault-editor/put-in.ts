import type { Editor, JSONContent } from '@tiptap/core';
import { GapCursor } from '@tiptap/pm/gapcursor';
import { NodeSelection, TextSelection } from '@tiptap/pm/state';

/**
 * Puts a reading or photo after the line the caret stands in (in its place, when the line is empty), and the caret
 * into the line after it, so that typing goes on and a second one follows the first.
 */
export function putIn(editor: Editor, node: JSONContent): void {
  const { selection } = editor.state;
  const { $from } = selection;
  const chosen = selection instanceof NodeSelection && selection.node.isBlock;
  // Between two readings there is no line: the caret stands in the gap.
  const loose = $from.depth === 0;
  const emptyLine = !chosen && !loose && $from.parent.content.size === 0;
  // A list entry begins with a line, even an empty one.
  const replace = emptyLine && $from.node(-1).type.name !== 'listItem';
  const from = chosen ? selection.to : loose ? $from.pos : replace ? $from.before() : $from.after();
  editor
    .chain()
    .insertContentAt({ from, to: replace ? $from.after() : from }, node)
    .command(({ tr, state }) => {
      const after = tr.doc.resolve(from + 1);
      const paragraph = state.schema.nodes['paragraph'];
      if (after.nodeAfter && !after.nodeAfter.isTextblock) {
        tr.setSelection(new GapCursor(after));
        return true;
      }
      if (!after.nodeAfter && paragraph) tr.insert(after.pos, paragraph.create());
      tr.setSelection(TextSelection.near(tr.doc.resolve(after.pos + 1)));
      return true;
    })
    .focus()
    .run();
}
