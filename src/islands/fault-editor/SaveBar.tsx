/** At the foot of the editor: what is saved and what is not, and the ways on. */
import type { FaultDetail } from '@/contracts/faults';
import { FAULT_STATE_LABELS, type FaultStep } from '@/domain/faults/states';
import type { Status } from './use-note';

function words(status: Status, dirty: boolean, note: FaultDetail | null, keeps: boolean): string {
  if (status === 'saving') return 'Saving …';
  if (status === 'moving') return 'On its way …';
  if (dirty)
    return keeps
      ? 'Not saved yet; kept in this browser.'
      : 'Not saved yet, and this browser keeps nothing: save soon.';
  if (!note) return 'Nothing written yet.';
  return `Revision ${note.revision} saved.`;
}

export function SaveBar({
  note,
  status,
  dirty,
  keeps,
  offered,
  onSave,
  onMove,
}: {
  note: FaultDetail | null;
  status: Status;
  dirty: boolean;
  keeps: boolean;
  offered: readonly { step: FaultStep; label: string }[];
  onSave: () => void;
  onMove: (step: FaultStep) => void;
}) {
  const busy = status === 'saving' || status === 'moving';
  const published = note?.state === 'published';
  return (
    <div className="save-bar">
      <p role="status" className={dirty && !busy ? 'doubtful' : undefined}>
        {words(status, dirty, note, keeps)}
        {note && <span className="remark"> This note is {FAULT_STATE_LABELS[note.state]}.</span>}
      </p>
      <div className="save-bar-buttons">
        {offered.map(({ step, label }) => (
          <button
            key={step}
            type="button"
            className="button"
            disabled={busy}
            onClick={() => onMove(step)}
          >
            {label}
          </button>
        ))}
        <button type="button" className="button-primary" disabled={busy} onClick={onSave}>
          {published ? 'Save the correction' : note ? 'Save' : 'Save as draft'}
        </button>
      </div>
    </div>
  );
}
