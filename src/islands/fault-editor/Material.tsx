/** What the ticket offers: its readings and photos, to be put into the section written in; and a reading by hand. */
import { useState, type DragEvent } from 'react';
import { betweenWords, type ReadingWords } from '../shared/NoteReading';
import { Field } from '../shared/Field';
import type { TicketMaterial } from './types';

type Insert = (node: { type: 'reading' | 'photo'; attrs: Record<string, string> }) => void;

const readingAttrs = ({ expected, ...words }: ReadingWords) => ({
  ...words,
  expected: expected ?? '',
});

/** Dragged as the markup the editor reads from its own clipboard, built by the browser, so that nothing needs escaping. */
function drag(event: DragEvent, kind: 'reading' | 'photo', attrs: Record<string, string>): void {
  const carried = document.createElement('div');
  carried.setAttribute(`data-${kind}`, '');
  for (const [name, value] of Object.entries(attrs)) carried.setAttribute(`data-${name}`, value);
  event.dataTransfer.setData('text/html', carried.outerHTML);
  event.dataTransfer.effectAllowed = 'copy';
}

export function Material({
  ticket,
  section,
  onInsert,
}: {
  ticket: TicketMaterial | null;
  /** Where it will go. */
  section: string;
  onInsert: Insert;
}) {
  return (
    <>
      {ticket && (
        <section className="sheet">
          <header className="sheet-head">
            <h2>
              From ticket <a href={`/tickets/${ticket.number}`}>{ticket.number}</a>
            </h2>
            <p className="remark">goes into {section}</p>
          </header>
          {ticket.readings.length === 0 && ticket.photos.length === 0 && (
            <p className="empty">This ticket has no readings and no photos yet.</p>
          )}
          <ul className="rows material">
            {ticket.readings.map((reading, i) => (
              <li
                key={i}
                draggable
                onDragStart={(event) => drag(event, 'reading', readingAttrs(reading))}
              >
                <span>
                  <strong className="mono">{betweenWords(reading)}</strong> {reading.position}{' '}
                  <span className="mono">{reading.typed}</span>
                  {reading.expected !== null && (
                    <span className="remark"> expected {reading.expected}</span>
                  )}
                </span>
                <button
                  type="button"
                  className="button button-small"
                  aria-label={`Put in the reading ${betweenWords(reading)} ${reading.typed}`}
                  onClick={() => onInsert({ type: 'reading', attrs: readingAttrs(reading) })}
                >
                  Put in
                </button>
              </li>
            ))}
            {ticket.photos.map(({ id, caption }) => (
              <li key={id} draggable onDragStart={(event) => drag(event, 'photo', { id, caption })}>
                <img src={`/api/photos/${id}/thumb`} alt="" loading="lazy" />
                <span>{caption || 'Photo without a caption'}</span>
                <button
                  type="button"
                  className="button button-small"
                  aria-label={`Put in the photo ${caption}`}
                  onClick={() => onInsert({ type: 'photo', attrs: { id, caption } })}
                >
                  Put in
                </button>
              </li>
            ))}
          </ul>
        </section>
      )}
      <ReadingByHand section={section} onInsert={onInsert} />
    </>
  );
}

const EMPTY = { from: '', to: '', position: '', typed: '', expected: '' };

function ReadingByHand({ section, onInsert }: { section: string; onInsert: Insert }) {
  const [words, setWords] = useState(EMPTY);
  const [asked, setAsked] = useState(false);
  const missing = (name: 'from' | 'typed') =>
    asked && words[name].trim() === '' ? 'Nothing was given: this is needed.' : undefined;
  const field = (name: keyof typeof EMPTY, label: string, option?: string, error?: string) => (
    <Field name={name} prefix="hand-" label={label} option={option} error={error}>
      {(control) => (
        <input
          {...control}
          value={words[name]}
          maxLength={40}
          autoComplete="off"
          onChange={(event) => setWords({ ...words, [name]: event.target.value })}
        />
      )}
    </Field>
  );
  return (
    <form
      className="sheet"
      onSubmit={(event) => {
        event.preventDefault();
        const attrs = Object.fromEntries(
          Object.entries(words).map(([name, value]) => [name, value.trim()]),
        );
        if (!attrs['from'] || !attrs['typed']) {
          setAsked(true);
          return;
        }
        onInsert({ type: 'reading', attrs });
        setWords(EMPTY);
        setAsked(false);
      }}
    >
      <header className="sheet-head">
        <h2>A reading by hand</h2>
        <p className="remark">goes into {section}</p>
      </header>
      <div className="sheet-body stack">
        <div className="field-row material-reading">
          {field('from', 'From, or the part', undefined, missing('from'))}
          {field('to', 'To', 'if between two points')}
          {field('position', 'Switch, conditions', 'if it matters')}
          {field('typed', 'Reading', undefined, missing('typed'))}
          {field('expected', 'Expected', 'if known')}
        </div>
        <div className="button-row">
          <button className="button">Put in</button>
        </div>
      </div>
    </form>
  );
}
