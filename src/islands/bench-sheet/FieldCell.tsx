import { useId, useRef } from 'react';
import { formatOhms } from '@/domain/quantities/format';
import { parseResistance } from '@/domain/quantities/parse';
import { Aligned } from './Aligned';
import { COLUMN_NAMES } from './moves';
import { liftedOf, type Field, type Row } from './rows';
import type { Grid } from './use-grid';

/** `1.2 kΩ` for what was typed; empty while it is none, and for a plain OL. */
function writtenOut(typed: string): string {
  const read = parseResistance(typed);
  if (!read.ok) return '';
  if (read.kind === 'over-range') return typed === 'OL' ? '' : 'OL';
  return formatOhms(read.ohms, read.resolution);
}

const EDIT_HINTS = { autoComplete: 'off', autoCapitalize: 'off', autoCorrect: 'off' } as const;

/** One cell that can be typed into: its text, or the input with the names it may hold. */
export function FieldCell({
  row,
  number,
  field,
  grid,
  current,
  wrong,
}: {
  row: Row;
  number: number;
  field: Field;
  grid: Grid;
  /** The sheet's one tab stop. */
  current: boolean;
  /** Id of the note that says what is wrong with this cell. */
  wrong: string | undefined;
}) {
  const list = useId();
  const opens = useRef(false);
  const edit = current ? grid.edit : null;
  const text = edit ? edit.text : row.cells[field];
  const name = `Row ${number}, ${COLUMN_NAMES[field]}`;
  const at = { key: row.key, column: field };
  const options = edit && field !== 'typed' ? grid.choices(field, text, edit.touched) : [];
  const typing = edit !== null && edit.touched && edit.text.trim() !== '';
  const active = edit && edit.pick >= 0 ? edit.pick : typing && options.length > 0 ? 0 : -1;
  const written = field === 'typed' ? writtenOut(text) : '';
  const described = wrong === undefined ? {} : { 'aria-describedby': wrong };

  const input = edit && (
    <input
      className="bench-input"
      {...EDIT_HINTS}
      spellCheck={false}
      enterKeyHint="next"
      maxLength={field === 'lifted' ? 200 : 40}
      aria-label={name}
      aria-invalid={wrong !== undefined || undefined}
      {...described}
      {...(field === 'typed'
        ? {}
        : {
            role: 'combobox',
            'aria-expanded': options.length > 0,
            'aria-autocomplete': 'list' as const,
            'aria-controls': list,
            'aria-activedescendant': active >= 0 ? `${list}-${active}` : undefined,
          })}
      value={edit.text}
      onChange={(event) => grid.change(event.currentTarget.value, -1)}
      onKeyDown={(event) => grid.onEditKey(event, options.length, active)}
      onBlur={() => grid.commit()}
      onFocus={(event) => !edit.touched && event.currentTarget.select()}
    />
  );
  return (
    <td
      role="gridcell"
      className={`bench-cell bench-${field}`}
      data-row={row.key}
      data-column={field}
      data-label={COLUMN_NAMES[field]}
      tabIndex={current && !edit ? 0 : -1}
      aria-label={edit ? undefined : `${name}: ${text || 'empty'}`}
      aria-selected={current}
      {...(edit ? {} : described)}
      onFocus={(event) => event.target === event.currentTarget && !current && grid.setCursor(at)}
      onPointerDown={(event) => {
        // A mouse opens the cell that the cursor is on already; a finger or pen opens any.
        const here = event.currentTarget === document.activeElement;
        opens.current = event.pointerType !== 'mouse' || here;
      }}
      onClick={() => !edit && opens.current && grid.open(at, true)}
    >
      {field === 'typed' ? (
        <span className="bench-reading">
          {input ?? <strong className="bench-text">{text}</strong>}
          <span className="bench-written">{written !== '' && <Aligned text={written} />}</span>
        </span>
      ) : (
        (input ?? (
          <span className="bench-text" title={text || undefined}>
            {field === 'lifted' ? liftedOf(text).join(' ') : text}
          </span>
        ))
      )}
      {options.length > 0 && (
        <ul id={list} role="listbox" aria-label={name} className="bench-options floating">
          {options.map((option, i) => (
            <li
              key={option.name}
              id={`${list}-${i}`}
              role="option"
              aria-selected={i === active}
              onPointerDown={(event) => event.preventDefault()}
              onClick={(event) => {
                const { pointerType } = event.nativeEvent as PointerEvent;
                grid.choose(option.name, pointerType !== 'mouse');
              }}
            >
              <span className="mono">{option.name}</span>
              <span className="remark">{option.about}</span>
            </li>
          ))}
        </ul>
      )}
    </td>
  );
}
