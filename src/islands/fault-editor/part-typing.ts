/** `@RT` before the caret opens the list of the board's parts. This plugin only says what is typed and where. */
import { Extension } from '@tiptap/core';
import { Plugin, PluginKey, type EditorState } from '@tiptap/pm/state';
import type { EditorView } from '@tiptap/pm/view';

export type Typing = {
  /** What stands after the @. */
  text: string;
  /** The document places of `@text`. */
  from: number;
  to: number;
  /** Where the list goes, in the window. */
  left: number;
  bottom: number;
};

/** The list's answers to keys; true when it used the key. */
export type PartListener = {
  typing: (typing: Typing | null) => void;
  key: (event: KeyboardEvent) => boolean;
};

const AT = /(?:^|[\s(,;–-])@([\p{L}\p{N}+_.-]{0,20})$/u;

function typingIn(state: EditorState, view: EditorView): Typing | null {
  const { $from, empty } = state.selection;
  if (!empty || !view.hasFocus()) return null;
  const before = $from.parent.textBetween(0, $from.parentOffset, undefined, '\ufffc');
  const text = AT.exec(before)?.[1];
  if (text === undefined) return null;
  const from = $from.pos - text.length - 1;
  const { left, bottom } = view.coordsAtPos(from);
  return { text, from, to: $from.pos, left, bottom };
}

export const PartTyping = Extension.create<{ listener: PartListener }>({
  name: 'partTyping',
  addOptions: () => ({ listener: { typing: () => undefined, key: () => false } }),
  addProseMirrorPlugins() {
    const { listener } = this.options;
    return [
      new Plugin({
        key: new PluginKey('partTyping'),
        view: () => ({
          update: (view) => listener.typing(typingIn(view.state, view)),
          destroy: () => listener.typing(null),
        }),
        props: {
          handleKeyDown: (_view, event) => listener.key(event),
          handleDOMEvents: {
            blur: () => {
              listener.typing(null);
              return false;
            },
          },
        },
      }),
    ];
  },
});
