/**
 * Finds a customer or an instrument while the counter types, and fills the form's fields with the one chosen. The
 * form works without it: then every customer is written anew and the server finds the one with the same e-mail.
 */
import { useEffect, useId, useRef, useState } from 'react';
import { fillForm } from './fill-form';
import { search, type Found, type FoundCustomer } from './search';

type Props = { what: 'customer' | 'instrument'; chosen: FoundCustomer | null };

const LABELS = {
  customer: 'Find a customer by name, e-mail or phone',
  instrument: 'Find an instrument by serial number',
} as const;

export function IntakeFinder({ what, chosen: first }: Props) {
  const id = useId();
  const [text, setText] = useState('');
  const [found, setFound] = useState<Found[] | null>(null);
  const [at, setAt] = useState(0);
  const [chosen, setChosen] = useState<FoundCustomer | null>(first);
  const [failed, setFailed] = useState(false);
  const box = useRef<HTMLInputElement>(null);

  useEffect(() => {
    if (text.trim().length < 2) {
      setFound(null);
      return;
    }
    const stop = new AbortController();
    const wait = setTimeout(() => {
      search(what, text.trim(), stop.signal).then(
        (items) => {
          setFound(items);
          setAt(0);
          setFailed(false);
        },
        () => {
          if (!stop.signal.aborted) setFailed(true);
        },
      );
    }, 150);
    return () => {
      clearTimeout(wait);
      stop.abort();
    };
  }, [text, what]);

  // A found instrument brings its customer along; this finder then shows the choice.
  useEffect(() => {
    if (what !== 'customer') return;
    const listen = (event: Event) => setChosen((event as CustomEvent<FoundCustomer>).detail);
    window.addEventListener('mw:customer', listen);
    return () => window.removeEventListener('mw:customer', listen);
  }, [what]);

  useEffect(() => {
    if (what === 'customer')
      document.querySelector('[data-new-customer]')?.toggleAttribute('hidden', chosen !== null);
  }, [chosen, what]);

  function choose(item: Found) {
    setText('');
    setFound(null);
    if (item.kind === 'customer') {
      setChosen(item);
      return;
    }
    fillForm({ maker: item.maker, model: item.model, serial: item.serial });
    window.dispatchEvent(new CustomEvent('mw:customer', { detail: item.customer }));
    document.getElementById('serial')?.focus();
  }

  if (what === 'customer' && chosen)
    return (
      <div className="found-one">
        <input type="hidden" name="customerId" value={chosen.id} />
        <p>
          <strong>{chosen.name}</strong>
          <span className="remark">{chosen.detail}</span>
        </p>
        <button
          type="button"
          className="button-text"
          onClick={() => {
            setChosen(null);
            setTimeout(() => box.current?.focus());
          }}
        >
          Choose another
        </button>
      </div>
    );

  const open = found !== null;
  return (
    <div className="field field-long finder">
      <label className="field-label" htmlFor={id}>
        {LABELS[what]}
      </label>
      <div className="field-box">
        <input
          ref={box}
          id={id}
          className="field-input"
          type="search"
          autoComplete="off"
          maxLength={100}
          role="combobox"
          aria-expanded={open}
          aria-controls={`${id}-list`}
          aria-activedescendant={open && found.length > 0 ? `${id}-${at}` : undefined}
          value={text}
          onChange={(e) => setText(e.target.value)}
          onKeyDown={(e) => {
            if (e.key === 'Enter') {
              // Enter in a finder never sends the form.
              e.preventDefault();
              const item = found?.[at];
              if (item) choose(item);
            } else if (e.key === 'ArrowDown' && found) {
              e.preventDefault();
              setAt(Math.min(at + 1, found.length - 1));
            } else if (e.key === 'ArrowUp' && found) {
              e.preventDefault();
              setAt(Math.max(at - 1, 0));
            } else if (e.key === 'Escape') setFound(null);
          }}
        />
      </div>
      {failed && <p className="field-error">The search did not answer: type again.</p>}
      <ul
        id={`${id}-list`}
        role="listbox"
        aria-label={LABELS[what]}
        className="finder-list"
        hidden={!open || found.length === 0}
      >
        {found?.map((item, i) => (
          <li
            key={`${item.kind}-${item.id}`}
            id={`${id}-${i}`}
            role="option"
            aria-selected={i === at}
            onMouseDown={(e) => e.preventDefault()}
            onClick={() => choose(item)}
          >
            <strong>{item.name}</strong> <span className="remark">{item.detail}</span>
          </li>
        ))}
      </ul>
      <p className="field-hint" role="status">
        {open && found.length === 0
          ? what === 'customer'
            ? 'Nobody by that name yet: write them in below.'
            : 'Not seen before: write it in below.'
          : ''}
      </p>
    </div>
  );
}
