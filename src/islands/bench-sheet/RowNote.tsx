import { parseResistance } from '@/domain/quantities/parse';
import { cellsOf, type Cells, type Row } from './rows';

export type Note = {
  kind: 'danger' | 'caution' | 'soft';
  words: string;
  /** Readings that the text may have meant. */
  could?: string[];
  retry?: true;
  clash?: true;
};

const inWords = ({ from, to, position, lifted, typed }: Cells) =>
  [to === '' ? from : `${from} to ${to}`, position, lifted === '' ? '' : `${lifted} lifted`, typed]
    .filter(Boolean)
    .join(', ');

/** What a row has to say beside its cells; null when all is well. `typed` is the reading as it stands just now. */
export function noteOf(
  row: Row,
  about: {
    typed: string;
    editing: boolean;
    missing: string | null;
    unusable: string | null;
  },
): Note | null {
  const { state, cells } = row;
  const read = parseResistance(about.typed);
  if (!read.ok && about.typed !== '' && (read.could || !about.editing)) {
    const reason = `${read.reason.charAt(0).toUpperCase()}${read.reason.slice(1)}.`;
    return { kind: 'danger', words: reason, ...(read.could ? { could: read.could } : {}) };
  }
  switch (state.is) {
    case 'failed':
      return { kind: 'danger', words: `Not saved yet. ${state.words}`, retry: true };
    case 'refused':
      return { kind: 'danger', words: `Not saved. ${state.words}`, retry: true };
    case 'stale': {
      const theirs = inWords(cellsOf(state.theirs));
      const mine = state.doing === 'strike' ? 'strike it out' : inWords(cells);
      return {
        kind: 'danger',
        words: `${state.theirs.by} changed this reading meanwhile to: ${theirs}. Yours: ${mine}.`,
        clash: true,
      };
    }
  }
  if (cells.typed !== '' && about.missing !== null && !about.editing)
    return { kind: 'caution', words: `Not saved yet. ${about.missing}` };
  if (about.unusable !== null && (row.saved || cells.typed !== ''))
    return { kind: 'caution', words: `Not used in the ranking: ${about.unusable}` };
  return null;
}

/** The line under a row that says what is wrong and offers what can be done. */
export function RowNote({
  id,
  number,
  note,
  columns,
  onChoose,
  onRetry,
  onSettle,
}: {
  id: string;
  number: number;
  note: Note;
  columns: number;
  onChoose: (typed: string) => void;
  onRetry: () => void;
  onSettle: (choice: 'mine' | 'theirs') => void;
}) {
  return (
    <tr role="row" className={`bench-note bench-note-${note.kind}`}>
      <td role="gridcell" colSpan={columns}>
        <div className="bench-note-line">
          <span id={id} role={note.kind === 'danger' ? 'alert' : undefined}>
            {note.words}
          </span>
          {note.could?.map((typed) => (
            <button
              key={typed}
              type="button"
              className="button button-small mono"
              onPointerDown={(event) => event.preventDefault()}
              onClick={() => onChoose(typed)}
            >
              {typed}
            </button>
          ))}
          {note.retry && (
            <button
              type="button"
              className="button button-small"
              aria-label={`Try to save row ${number} again`}
              onClick={onRetry}
            >
              Try again
            </button>
          )}
          {note.clash && (
            <>
              <button
                type="button"
                className="button button-small"
                onClick={() => onSettle('theirs')}
              >
                Take theirs
              </button>
              <button
                type="button"
                className="button button-small"
                onClick={() => onSettle('mine')}
              >
                Keep mine
              </button>
            </>
          )}
        </div>
      </td>
    </tr>
  );
}
