/** One section of the note: an editor with its name in the margin, its error beside it. */
import { EditorContent, useEditor, type Editor } from '@tiptap/react';
import { useEffect, useMemo, useRef, useState } from 'react';
import type { Block, Section as Name } from '@/domain/faults/body';
import { SECTION_HINTS, SECTION_LABELS } from '@/domain/faults/complete';
import { toBlocks, toDocument } from './document';
import { extensionsFor } from './extensions';
import { PART_MENU_ID, PartMenu, partOptionId } from './PartMenu';
import type { Typing } from './part-typing';
import type { BoardPart } from './types';

const MOST = 8;

/** Parts whose reference begins so first, then those whose value or reference holds it. A new reference may be typed. */
function fitting(parts: readonly BoardPart[], text: string): BoardPart[] {
  const wanted = text.toLowerCase();
  const begins = parts.filter((p) => p.ref.toLowerCase().startsWith(wanted));
  const holds = parts.filter(
    (p) => !begins.includes(p) && `${p.ref} ${p.value}`.toLowerCase().includes(wanted),
  );
  const found = [...begins, ...holds].slice(0, MOST);
  const own = text !== '' && /^[\p{L}]/u.test(text) && !found.some((p) => p.ref === text);
  return own ? [...found, { ref: text, kind: 'resistor', value: 'as typed' }] : found;
}

const sameTyping = (a: Typing | null, b: Typing | null) =>
  a === b ||
  (a !== null &&
    b !== null &&
    a.text === b.text &&
    a.from === b.from &&
    a.left === b.left &&
    a.bottom === b.bottom);

const attributesOf = (name: Name) => ({
  id: `section-${name}`,
  role: 'textbox',
  'aria-multiline': 'true',
  'aria-label': SECTION_LABELS[name],
  'aria-describedby': `section-${name}-hint`,
  class: 'note-body editor-body',
});

export function Section({
  name,
  blocks,
  parts,
  error,
  onChange,
  onReady,
  onFocus,
}: {
  name: Name;
  /** What the section holds at first; another array replaces what is written. */
  blocks: readonly Block[];
  parts: readonly BoardPart[];
  error: string | undefined;
  onChange: (name: Name, blocks: Block[]) => void;
  onReady: (name: Name, editor: Editor) => void;
  onFocus: (name: Name) => void;
}) {
  const [typing, setTyping] = useState<Typing | null>(null);
  const [chosen, setChosen] = useState(0);
  // Escape closes the list for the word under the caret; another @ opens it again.
  const closedAt = useRef<number | null>(null);
  const live = useRef({ found: [] as BoardPart[], chosen: 0, choose: (_ref: string) => {} });

  const extensions = useMemo(
    () =>
      extensionsFor({
        typing: (now) => {
          if (now?.from !== closedAt.current) closedAt.current = null;
          setTyping((before) => {
            const next = now && closedAt.current === null ? now : null;
            if (before?.text !== next?.text) setChosen(0);
            return sameTyping(before, next) ? before : next;
          });
        },
        key: (event) => keyPressed(event),
      }),
    [],
  );
  // Kept from render to render: options that look new are set again, and that is an update in itself.
  const first = useRef(blocks);
  const content = useMemo(() => toDocument(first.current), []);
  const editorProps = useMemo(() => ({ attributes: attributesOf(name) }), [name]);
  const editor = useEditor({
    extensions,
    injectCSS: false,
    content,
    editorProps,
    onUpdate: ({ editor: now }) => onChange(name, toBlocks(now.getJSON())),
    onFocus: () => onFocus(name),
  });

  const found = typing ? fitting(parts, typing.text) : [];
  const choose = (ref: string) => {
    if (!typing) return;
    editor
      .chain()
      .focus()
      .insertContentAt({ from: typing.from, to: typing.to }, [
        { type: 'partRef', attrs: { ref } },
        { type: 'text', text: ' ' },
      ])
      .run();
    setTyping(null);
  };
  live.current = { found, chosen, choose };

  function keyPressed(event: KeyboardEvent): boolean {
    const now = live.current;
    if (now.found.length === 0) return false;
    if (event.key === 'ArrowDown' || event.key === 'ArrowUp') {
      const step = event.key === 'ArrowDown' ? 1 : now.found.length - 1;
      setChosen((i) => (i + step) % now.found.length);
      return true;
    }
    if (event.key === 'Enter' || event.key === 'Tab') {
      const part = now.found[now.chosen];
      if (!part) return false;
      now.choose(part.ref);
      return true;
    }
    if (event.key === 'Escape') {
      setTyping((t) => {
        closedAt.current = t?.from ?? null;
        return null;
      });
      return true;
    }
    return false;
  }

  useEffect(() => {
    onReady(name, editor);
  }, [editor, name, onReady]);

  useEffect(() => {
    if (first.current === blocks) return;
    first.current = blocks;
    editor.commands.setContent(toDocument(blocks), { emitUpdate: false });
  }, [blocks, editor]);

  useEffect(() => {
    const box = editor.view.dom;
    const option = found[chosen];
    const set = (attribute: string, value: string | null) =>
      value === null ? box.removeAttribute(attribute) : box.setAttribute(attribute, value);
    set('aria-controls', option ? PART_MENU_ID : null);
    set('aria-activedescendant', option ? partOptionId(option.ref) : null);
    set('aria-invalid', error ? 'true' : null);
    set('aria-describedby', `section-${name}-hint${error ? ` section-${name}-error` : ''}`);
  });

  return (
    <div className={`note-section${error ? ' field-wrong' : ''}`}>
      <h2>{SECTION_LABELS[name]}</h2>
      <div>
        <p className="field-hint" id={`section-${name}-hint`}>
          {SECTION_HINTS[name]}
        </p>
        <EditorContent editor={editor} className="editor-frame" />
        {error && (
          <p className="field-error" id={`section-${name}-error`}>
            {error}
          </p>
        )}
      </div>
      {typing && found.length > 0 && (
        <PartMenu
          parts={found}
          chosen={chosen}
          left={typing.left}
          top={typing.bottom + 4}
          onChoose={choose}
        />
      )}
    </div>
  );
}
