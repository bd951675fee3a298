import { useEffect, useId, useState } from 'react';
import type { EditPhoto, PhotoView } from '@/contracts/photos';
import { PHOTO_PHASES, PHOTO_SIDES } from '@/domain/photos/files';
import { Field } from '../shared/Field';
import { Choices } from './Choices';
import { PHASE_LABELS, SIDE_LABELS } from './words';

/** What is known of a photo; every change is kept at once. */
export function PhotoFacts({
  photo,
  error,
  onEdit,
  onRemove,
}: {
  photo: PhotoView;
  error: string;
  onEdit: (change: EditPhoto) => void;
  onRemove: () => void;
}) {
  const [caption, setCaption] = useState(photo.caption);
  const [leaving, setLeaving] = useState(false);
  const id = useId();
  useEffect(() => setCaption(photo.caption), [photo.caption]);
  const keepCaption = () => {
    if (caption.trim() !== photo.caption) onEdit({ caption: caption.trim() });
  };
  return (
    <div className="photo-facts">
      <Choices
        legend="Shows the"
        options={PHOTO_SIDES}
        labels={SIDE_LABELS}
        value={photo.side}
        onChange={(side) => onEdit({ side })}
      />
      <Choices
        legend="Taken"
        options={PHOTO_PHASES}
        labels={PHASE_LABELS}
        value={photo.phase}
        onChange={(phase) => onEdit({ phase })}
      />
      <Field name="caption" prefix={id} label="Caption" option="the customer reads it when shared">
        {(control) => (
          <input
            {...control}
            value={caption}
            maxLength={200}
            onChange={(event) => setCaption(event.target.value)}
            onBlur={keepCaption}
            onKeyDown={(event) => event.key === 'Enter' && keepCaption()}
          />
        )}
      </Field>
      <label className="choice">
        <input
          type="checkbox"
          checked={photo.shared}
          onChange={(event) => onEdit({ shared: event.target.checked })}
        />
        The customer sees this photo
      </label>
      {error && (
        <p className="field-error" role="alert">
          {error}
        </p>
      )}
      {leaving ? (
        <div className="button-row">
          <button className="button-danger button-small" type="button" onClick={onRemove}>
            Remove photo and pins
          </button>
          <button className="button button-small" type="button" onClick={() => setLeaving(false)}>
            Keep it
          </button>
        </div>
      ) : (
        <div className="button-row">
          <button className="button button-small" type="button" onClick={() => setLeaving(true)}>
            Remove photo
          </button>
        </div>
      )}
    </div>
  );
}
