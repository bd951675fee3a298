import type { ReactNode } from 'react';

/** What a control inside a field needs so that its label, hint and error belong to it. */
export interface ControlProps {
  id: string;
  name: string;
  className: string;
  'aria-describedby': string | undefined;
  'aria-invalid': true | undefined;
}

/** One field of a printed form, as `FormField.astro` draws it. `prefix` keeps ids apart when an island repeats. */
export function Field({
  name,
  label,
  error,
  hint,
  unit,
  option,
  prefix = '',
  long = false,
  children,
}: {
  name: string;
  label: string;
  error?: string | undefined;
  hint?: string | undefined;
  unit?: string | undefined;
  /** What an optional field says after its name. */
  option?: string | undefined;
  prefix?: string;
  long?: boolean;
  /** Draws the control: `{(control) => <input {...control} value={…} />}`. */
  children: (control: ControlProps) => ReactNode;
}) {
  const id = prefix + name;
  const described = [hint && `${id}-hint`, error && `${id}-error`].filter(Boolean).join(' ');
  return (
    <div className={`field${error ? ' field-wrong' : ''}${long ? ' field-long' : ''}`}>
      <label className="field-label" htmlFor={id}>
        {label}
        {option !== undefined && <span className="field-option"> · {option}</span>}
      </label>
      <div className="field-box">
        {children({
          id,
          name,
          className: 'field-input',
          'aria-describedby': described || undefined,
          'aria-invalid': error ? true : undefined,
        })}
        {unit !== undefined && <span className="field-unit">{unit}</span>}
      </div>
      {hint && (
        <p className="field-hint" id={`${id}-hint`}>
          {hint}
        </p>
      )}
      {error && (
        <p className="field-error" id={`${id}-error`}>
          {error}
        </p>
      )}
    </div>
  );
}
