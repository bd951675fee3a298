/** Writing a fault note: facts, four sections under one toolbar, the ticket's material beside them. */
import type { Editor } from '@tiptap/react';
import { useCallback, useEffect, useMemo, useRef, useState } from 'react';
import { SECTIONS, type Block, type Section as Name } from '@/domain/faults/body';
import { SECTION_LABELS } from '@/domain/faults/complete';
import { partsOf } from './calls';
import { Conflict } from './Conflict';
import { FactsForm } from './FactsForm';
import { Material } from './Material';
import { putIn } from './put-in';
import { SaveBar } from './SaveBar';
import { Section } from './Section';
import { Toolbar } from './Toolbar';
import type { BoardPart, EditorProps } from './types';
import { useNote } from './use-note';

/** The parts of the chosen board; those of the ticket's own board came with the page. */
function useParts(boardId: number | null, { ticket }: EditorProps): BoardPart[] {
  const [read, setRead] = useState<{ boardId: number; parts: BoardPart[] } | null>(null);
  const given = ticket !== null && ticket.boardId === boardId ? ticket.parts : null;
  useEffect(() => {
    if (boardId === null || given) return;
    let wanted = true;
    void partsOf(boardId).then((parts) => {
      if (wanted) setRead({ boardId, parts });
    });
    return () => {
      wanted = false;
    };
  }, [boardId, given]);
  return useMemo(
    () => given ?? (read?.boardId === boardId ? read.parts : []),
    [given, read, boardId],
  );
}

export function FaultEditor(props: EditorProps) {
  const it = useNote(props);
  const { draft, wrong, change } = it;
  const [section, setSection] = useState<Name>('symptom');
  const [editors, setEditors] = useState<Partial<Record<Name, Editor>>>({});
  // What each section was last given from outside: a new array replaces what is written in it.
  const [given, setGiven] = useState(draft.body);
  const parts = useParts(draft.boardId, props);
  const top = useRef<HTMLDivElement>(null);

  const ready = useCallback((name: Name, editor: Editor) => {
    setEditors((all) => (all[name] === editor ? all : { ...all, [name]: editor }));
  }, []);
  const written = useCallback(
    (name: Name, blocks: Block[]) =>
      change((now) => ({ ...now, body: { ...now.body, [name]: blocks } })),
    [change],
  );
  const refill = (body: typeof given) => setGiven(structuredClone(body));

  // The first thing that is wrong gets the focus; two versions get it before all.
  useEffect(() => {
    if (it.status !== 'refused') return;
    const [first] = Object.keys(wrong);
    const field = it.theirs
      ? document.getElementById('two-versions')
      : first?.startsWith('body.')
        ? document.getElementById(`section-${first.slice(5)}`)
        : first
          ? document.getElementById(first)
          : top.current;
    field?.focus();
  }, [it.status, it.theirs, wrong]);

  useEffect(() => {
    const onKeyDown = (event: KeyboardEvent) => {
      if (event.key.toLowerCase() !== 's' || !(event.ctrlKey || event.metaKey)) return;
      event.preventDefault();
      void it.save();
    };
    window.addEventListener('keydown', onKeyDown);
    return () => window.removeEventListener('keydown', onKeyDown);
  });

  return (
    <div className="columns">
      <div className="stack">
        <div ref={top} tabIndex={-1} className="editor-messages">
          {it.status === 'refused' && !it.theirs && (
            <div className="bar bar-danger" role="alert">
              <strong>{it.dirty ? 'Not saved' : 'Not done'}</strong> <span>{it.reason}</span>
            </div>
          )}
          {it.restored && (
            <div className="bar" role="status">
              <strong>What you wrote earlier and did not save is back.</strong>
              <button
                type="button"
                className="button-text"
                onClick={() => {
                  it.throwAway();
                  refill(props.note?.body ?? { symptom: [], cause: [], proof: [], repair: [] });
                }}
              >
                Throw it away
              </button>
            </div>
          )}
        </div>
        {it.theirs && (
          <Conflict
            theirs={it.theirs}
            mine={draft}
            onMine={() => void it.save(it.theirs?.version)}
            onTheirs={() => {
              if (!it.theirs) return;
              refill(it.theirs.body);
              it.takeOver(it.theirs);
            }}
          />
        )}
        <div className="sheet">
          <FactsForm
            facts={draft}
            boards={props.boards}
            wrong={wrong}
            onChange={(part) => change((now) => ({ ...now, ...part }))}
          />
          <Toolbar editor={editors[section] ?? null} section={SECTION_LABELS[section]} />
          {SECTIONS.map((name) => (
            <Section
              key={name}
              name={name}
              blocks={given[name]}
              parts={parts}
              error={wrong[`body.${name}`]}
              onChange={written}
              onReady={ready}
              onFocus={setSection}
            />
          ))}
          <SaveBar
            note={it.note}
            status={it.status}
            dirty={it.dirty}
            keeps={it.keeps}
            offered={it.offered}
            onSave={() => void it.save()}
            onMove={(step) => void it.move(step)}
          />
        </div>
      </div>
      <div className="stack">
        <Material
          ticket={props.ticket}
          section={SECTION_LABELS[section]}
          onInsert={(node) => {
            const editor = editors[section];
            if (editor) putIn(editor, node);
          }}
        />
        <section className="sheet editor-keys">
          <header className="sheet-head">
            <h2>Keys</h2>
          </header>
          <dl className="sheet-body facts facts-column">
            <div>
              <dt>
                <kbd>@</kbd>
              </dt>
              <dd>a part of the board: type @RT, choose, Enter</dd>
            </div>
            <div>
              <dt>
                <kbd>Ctrl S</kbd>
              </dt>
              <dd>save</dd>
            </div>
            <div>
              <dt>
                <kbd>- </kbd> <kbd>1. </kbd>
              </dt>
              <dd>with a space begin a list, numbered steps</dd>
            </div>
          </dl>
        </section>
      </div>
    </div>
  );
}
