import { useId, useState } from 'react';
import { kindLabels } from '@/domain/parts/words';
import { Field } from '../shared/Field';
import type { PinnablePart } from './panel-props';

export type PinChoice = { partId: number } | { label: string };

/** What a pin stands for: one of the board's parts, found by its reference, or any label. */
export function PinForm({
  parts,
  given,
  busy,
  error,
  onChoose,
  onCancel,
}: {
  parts: readonly PinnablePart[];
  given: string;
  busy: boolean;
  error: string;
  onChoose: (choice: PinChoice) => void;
  onCancel: () => void;
}) {
  const [text, setText] = useState(given);
  const [empty, setEmpty] = useState(false);
  const id = useId();
  const typed = text.trim();
  const part = parts.find(({ ref }) => ref.toLowerCase() === typed.toLowerCase());
  const hint = part
    ? `${kindLabels[part.kind]}${part.value ? `, ${part.value}` : ''}`
    : typed
      ? 'No part of this board has that reference: it becomes a label.'
      : 'A reference such as R1, or a label such as TP3.';
  return (
    <form
      className="pin-form floating"
      onSubmit={(event) => {
        event.preventDefault();
        setEmpty(!typed);
        if (typed) onChoose(part ? { partId: part.id } : { label: typed });
      }}
      onKeyDown={(event) => {
        if (event.key !== 'Escape') return;
        event.stopPropagation();
        onCancel();
      }}
    >
      <Field
        name="pin"
        prefix={id}
        label="Part or label"
        hint={hint}
        error={
          empty && !typed ? 'Nothing was given: a part or a label is needed.' : error || undefined
        }
      >
        {(control) => (
          <input
            {...control}
            value={text}
            list={`${id}-parts`}
            maxLength={40}
            autoComplete="off"
            autoCapitalize="characters"
            spellCheck={false}
            autoFocus
            onChange={(event) => setText(event.target.value)}
          />
        )}
      </Field>
      <datalist id={`${id}-parts`}>
        {parts.map(({ id: key, ref, kind, value }) => (
          <option key={key} value={ref}>
            {[kindLabels[kind], value].filter(Boolean).join(', ')}
          </option>
        ))}
      </datalist>
      <div className="button-row">
        <button className="button button-small" type="submit" disabled={busy}>
          Set pin
        </button>
        <button className="button button-small" type="button" onClick={onCancel}>
          Cancel
        </button>
      </div>
    </form>
  );
}
