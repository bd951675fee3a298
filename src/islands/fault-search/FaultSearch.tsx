/** The search box of the fault base. Without script it is a plain field; with it, notes are suggested while typing. */
import { useRef, useState, type KeyboardEvent } from 'react';
import { loadSuggest, type Suggest, type Suggestion } from './suggest';

const MOST = 7;

export function FaultSearch({ query }: { query: string }) {
  const [found, setFound] = useState<Suggestion[]>([]);
  const [at, setAt] = useState(-1);
  const suggest = useRef<Suggest | null>(null);
  const asked = useRef(false);
  const open = found.length > 0;

  const load = () => {
    if (asked.current) return;
    asked.current = true;
    loadSuggest().then(
      (made) => {
        suggest.current = made;
      },
      // The plain search still works; the next focus tries again.
      () => {
        asked.current = false;
      },
    );
  };
  const close = () => {
    setFound([]);
    setAt(-1);
  };
  const typed = (text: string) => {
    setAt(-1);
    setFound(text.trim() === '' ? [] : (suggest.current?.(text, MOST) ?? []));
  };
  const onKeyDown = (event: KeyboardEvent) => {
    if (!open) return;
    if (event.key === 'Escape') {
      event.preventDefault();
      close();
    } else if (event.key === 'ArrowDown' || event.key === 'ArrowUp') {
      event.preventDefault();
      const step = event.key === 'ArrowDown' ? 1 : -1;
      // One place before the first stands for the typed text itself.
      setAt((now) => ((now + 1 + step + found.length + 1) % (found.length + 1)) - 1);
    } else if (event.key === 'Enter' && found[at]) {
      event.preventDefault();
      window.location.assign(`/faults/${found[at].id}`);
    }
  };

  return (
    <div className="field">
      <label className="field-label" htmlFor="q">
        Symptom, part, value, marking, model
      </label>
      <div className="field-box">
        <input
          className="field-input"
          id="q"
          name="q"
          type="search"
          defaultValue={query}
          maxLength={200}
          autoComplete="off"
          role="combobox"
          aria-autocomplete="list"
          aria-expanded={open}
          aria-controls="q-found"
          aria-activedescendant={at >= 0 ? `q-found-${at}` : undefined}
          onFocus={load}
          onBlur={close}
          onInput={(event) => typed(event.currentTarget.value)}
          onKeyDown={onKeyDown}
        />
      </div>
      <ul
        id="q-found"
        role="listbox"
        aria-label="Notes that fit"
        className="suggestions floating"
        hidden={!open}
      >
        {found.map(({ id, title, labels }, i) => (
          <li
            key={id}
            id={`q-found-${i}`}
            role="option"
            aria-selected={i === at}
            onPointerDown={(event) => {
              event.preventDefault();
              window.location.assign(`/faults/${id}`);
            }}
          >
            <span>
              {title.map(({ text, hit }, k) =>
                hit ? (
                  <mark key={k} className="found-mark">
                    {text}
                  </mark>
                ) : (
                  text
                ),
              )}
            </span>
            <span className="mono">{labels}</span>
          </li>
        ))}
      </ul>
    </div>
  );
}
