/** What the note stands on: title, board, part family, incident, symptoms. */
import { INCIDENTS, PART_KINDS, type Incident, type PartKind } from '@/domain/parts/kinds';
import { incidentLabels, kindLabels } from '@/domain/parts/words';
import { SYMPTOM_CODES, SYMPTOMS } from '@/domain/tickets/vocabulary';
import { Field } from '../shared/Field';
import type { Draft, Wrong } from './types';

type Facts = Omit<Draft, 'body'>;

export function FactsForm({
  facts,
  boards,
  wrong,
  onChange,
}: {
  facts: Facts;
  boards: readonly { id: number; label: string }[];
  wrong: Wrong;
  onChange: (change: Partial<Facts>) => void;
}) {
  const { title, boardId, partKind, incident, symptoms } = facts;
  return (
    <div className="editor-facts">
      <Field
        name="title"
        label="Title"
        hint="Symptom first, then the part: “Ohms dead, volts fine: RT1 open”."
        error={wrong['title']}
      >
        {(control) => (
          <input
            {...control}
            value={title}
            maxLength={160}
            onChange={(event) => onChange({ title: event.target.value })}
          />
        )}
      </Field>
      <div className="field-row">
        <Field name="boardId" label="Board" error={wrong['boardId']}>
          {(control) => (
            <select
              {...control}
              value={boardId ?? ''}
              onChange={(event) =>
                onChange({ boardId: event.target.value === '' ? null : Number(event.target.value) })
              }
            >
              <option value="">none: holds for a part family</option>
              {boards.map(({ id, label }) => (
                <option key={id} value={id}>
                  {label}
                </option>
              ))}
            </select>
          )}
        </Field>
        <Field name="partKind" label="Part family" error={wrong['partKind']}>
          {(control) => (
            <select
              {...control}
              value={partKind ?? ''}
              onChange={(event) =>
                onChange({ partKind: (event.target.value || null) as PartKind | null })
              }
            >
              <option value="">none</option>
              {PART_KINDS.map((kind) => (
                <option key={kind} value={kind}>
                  {kindLabels[kind]}
                </option>
              ))}
            </select>
          )}
        </Field>
        <Field name="incident" label="Incident" error={wrong['incident']}>
          {(control) => (
            <select
              {...control}
              value={incident ?? ''}
              onChange={(event) =>
                onChange({ incident: (event.target.value || null) as Incident | null })
              }
            >
              <option value="">any</option>
              {INCIDENTS.map((one) => (
                <option key={one} value={one}>
                  {incidentLabels[one]}
                </option>
              ))}
            </select>
          )}
        </Field>
      </div>
      <details className="step-reason">
        <summary>
          Symptoms:{' '}
          {symptoms.length === 0 ? 'none chosen' : symptoms.map((s) => SYMPTOMS[s]).join('; ')}
        </summary>
        <fieldset className="choices">
          <legend className="sr-only">Symptoms</legend>
          {SYMPTOM_CODES.map((code) => (
            <label key={code} className="choice">
              <input
                type="checkbox"
                checked={symptoms.includes(code)}
                onChange={(event) =>
                  onChange({
                    symptoms: event.target.checked
                      ? [...symptoms, code]
                      : symptoms.filter((s) => s !== code),
                  })
                }
              />
              {SYMPTOMS[code]}
            </label>
          ))}
        </fieldset>
      </details>
      {wrong['symptoms'] && <p className="field-error">{wrong['symptoms']}</p>}
    </div>
  );
}
