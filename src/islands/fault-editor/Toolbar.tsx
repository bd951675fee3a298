/** The tools over the sections. One stop for the Tab key; arrow keys go along it. They act on the section last written in. */
import { useEditorState, type Editor } from '@tiptap/react';
import { useRef, useState, type KeyboardEvent, type ReactNode } from 'react';
import { isSafeLink } from '@/domain/faults/links';

type Tool = {
  name: string;
  face: ReactNode;
  key?: string;
  on?: boolean;
  off?: boolean;
  act: (editor: Editor) => void;
};

const NOTHING = {
  bold: false,
  italic: false,
  code: false,
  link: '',
  bullets: false,
  numbers: false,
  caution: false,
  undo: false,
  redo: false,
};

const stateOf = (editor: Editor | null) =>
  editor === null
    ? NOTHING
    : {
        bold: editor.isActive('bold'),
        italic: editor.isActive('italic'),
        code: editor.isActive('code'),
        link: String(editor.getAttributes('link')['href'] ?? ''),
        bullets: editor.isActive('bulletList'),
        numbers: editor.isActive('orderedList'),
        caution: editor.isActive('caution'),
        undo: editor.can().undo(),
        redo: editor.can().redo(),
      };

export function Toolbar({ editor, section }: { editor: Editor | null; section: string }) {
  const now = useEditorState({ editor, selector: ({ editor: e }) => stateOf(e) }) ?? NOTHING;
  const [linking, setLinking] = useState(false);
  const [at, setAt] = useState(0);
  const bar = useRef<HTMLDivElement>(null);

  const tools: Tool[] = [
    {
      name: 'Bold',
      key: 'Control+B',
      face: <strong>B</strong>,
      on: now.bold,
      act: (e) => e.chain().focus().toggleBold().run(),
    },
    {
      name: 'Italic',
      key: 'Control+I',
      face: <em>I</em>,
      on: now.italic,
      act: (e) => e.chain().focus().toggleItalic().run(),
    },
    {
      name: 'Marking, as printed',
      key: 'Control+E',
      face: <span className="mono">471K</span>,
      on: now.code,
      act: (e) => e.chain().focus().toggleCode().run(),
    },
    { name: 'Link', face: 'Link', on: now.link !== '', act: () => setLinking((open) => !open) },
    {
      name: 'List',
      face: '• List',
      on: now.bullets,
      act: (e) => e.chain().focus().toggleBulletList().run(),
    },
    {
      name: 'Numbered steps',
      face: '1. Steps',
      on: now.numbers,
      act: (e) => e.chain().focus().toggleOrderedList().run(),
    },
    {
      name: 'Caution',
      face: 'Caution',
      on: now.caution,
      act: (e) =>
        e
          .chain()
          .focus()
          .setNode(now.caution ? 'paragraph' : 'caution')
          .run(),
    },
    {
      name: 'Part reference',
      key: '@',
      face: '@ Part',
      act: (e) =>
        e
          .chain()
          .focus()
          .insertContent(needsSpace(e) ? ' @' : '@')
          .run(),
    },
    {
      name: 'Undo',
      key: 'Control+Z',
      face: '↶',
      off: !now.undo,
      act: (e) => e.chain().focus().undo().run(),
    },
    {
      name: 'Redo',
      key: 'Control+Shift+Z',
      face: '↷',
      off: !now.redo,
      act: (e) => e.chain().focus().redo().run(),
    },
  ];

  const onKeyDown = (event: KeyboardEvent) => {
    const step = { ArrowRight: 1, ArrowLeft: -1, Home: -at, End: tools.length - 1 - at }[event.key];
    if (step === undefined) return;
    event.preventDefault();
    const next = (at + step + tools.length) % tools.length;
    setAt(next);
    bar.current?.querySelectorAll('button')[next]?.focus();
  };

  return (
    <div className="editor-tools">
      <div
        ref={bar}
        role="toolbar"
        aria-label={`Tools for ${section}`}
        aria-orientation="horizontal"
        onKeyDown={onKeyDown}
      >
        {tools.map(({ name, face, key, on, off, act }, i) => (
          <button
            key={name}
            type="button"
            className="editor-tool"
            title={key ? `${name} (${key.replace('Control', 'Ctrl')})` : name}
            aria-label={name}
            aria-keyshortcuts={key?.length === 1 ? undefined : key}
            aria-pressed={on}
            aria-disabled={off || editor === null ? true : undefined}
            tabIndex={i === at ? 0 : -1}
            onMouseDown={(event) => event.preventDefault()}
            onClick={() => {
              setAt(i);
              if (editor && !off) act(editor);
            }}
          >
            {face}
          </button>
        ))}
      </div>
      {linking && editor && (
        <LinkForm editor={editor} href={now.link} onDone={() => setLinking(false)} />
      )}
    </div>
  );
}

/** An @ is a reference only after a space. */
function needsSpace(editor: Editor): boolean {
  const { $from } = editor.state.selection;
  const before = $from.parent.textBetween(Math.max(0, $from.parentOffset - 1), $from.parentOffset);
  return before !== '' && !/\s/.test(before);
}

function LinkForm({ editor, href, onDone }: { editor: Editor; href: string; onDone: () => void }) {
  const [typed, setTyped] = useState(href);
  const [wrong, setWrong] = useState('');
  const close = () => {
    onDone();
    editor.commands.focus();
  };
  const apply = () => {
    const wanted = typed.trim();
    if (!isSafeLink(wanted)) {
      setWrong('A web or mail address, or a path of this site, is needed: https://… or /boards/3');
      return;
    }
    const chain = editor.chain().focus().extendMarkRange('link');
    if (editor.state.selection.empty && href === '')
      chain
        .insertContent({
          type: 'text',
          text: wanted,
          marks: [{ type: 'link', attrs: { href: wanted } }],
        })
        .run();
    else chain.setLink({ href: wanted }).run();
    onDone();
  };
  return (
    <div
      className={`editor-link${wrong ? ' field-wrong' : ''}`}
      onKeyDown={(event) => {
        if (event.key === 'Escape') close();
        if (event.key === 'Enter') {
          event.preventDefault();
          apply();
        }
      }}
    >
      <label className="field-label" htmlFor="link-to">
        Leads to
      </label>
      <input
        id="link-to"
        className="field-input"
        autoFocus
        value={typed}
        maxLength={500}
        aria-invalid={wrong ? true : undefined}
        aria-describedby={wrong ? 'link-to-error' : undefined}
        onChange={(event) => setTyped(event.target.value)}
      />
      <button type="button" className="button button-small" onClick={apply}>
        Set link
      </button>
      {href !== '' && (
        <button
          type="button"
          className="button button-small"
          onClick={() => {
            editor.chain().focus().extendMarkRange('link').unsetLink().run();
            onDone();
          }}
        >
          Take link off
        </button>
      )}
      {wrong && (
        <p className="field-error" id="link-to-error">
          {wrong}
        </p>
      )}
    </div>
  );
}
