/** Adding photos: dropped, chosen or taken on the spot; side and phase are set for all that follow. */
import { useEffect, useId, useMemo, useRef, useState } from 'react';
import { useDropzone } from 'react-dropzone';
import type { PhotoView } from '@/contracts/photos';
import {
  PHOTO_PHASES,
  PHOTO_SIDES,
  PHOTO_TYPES,
  type PhotoPhase,
  type PhotoSide,
} from '@/domain/photos/files';
import { Choices } from './Choices';
import { UploadList } from './UploadList';
import { uploadQueue, type UploadRow } from './upload-queue';
import { PHASE_LABELS, SIDE_LABELS } from './words';

// Phones turn HEIC into JPEG by themselves when only these are asked for.
const ACCEPT = PHOTO_TYPES.join(',');

export function PhotoUpload({
  ticketNumber,
  live,
  onReady,
}: {
  ticketNumber: string;
  /** False until the page's script runs. */
  live: boolean;
  onReady: (photo: PhotoView) => void;
}) {
  const [side, setSide] = useState<PhotoSide>('front');
  const [phase, setPhase] = useState<PhotoPhase>('before');
  const [rows, setRows] = useState<UploadRow[]>([]);
  const ready = useRef(onReady);
  ready.current = onReady;
  const queue = useMemo(
    () => uploadQueue(ticketNumber, setRows, (photo) => ready.current(photo)),
    [ticketNumber],
  );
  const camera = useRef<HTMLInputElement>(null);
  const id = useId();
  const { getRootProps, getInputProps, isDragActive, open } = useDropzone({
    noClick: true,
    noKeyboard: true,
    disabled: !live,
    onDrop: (files) => queue.add(files, side, phase),
  });
  const going = rows.some(({ state }) => state !== 'refused' && state !== 'failed');
  useEffect(() => {
    if (!going) return;
    const ask = (event: BeforeUnloadEvent) => event.preventDefault();
    window.addEventListener('beforeunload', ask);
    return () => window.removeEventListener('beforeunload', ask);
  }, [going]);

  return (
    <div
      {...getRootProps({ role: 'group', 'aria-labelledby': `${id}-title` })}
      className={`photo-drop${isDragActive ? ' photo-drop-over' : ''}`}
    >
      <input {...getInputProps({ accept: ACCEPT, 'aria-label': 'Photo files', tabIndex: -1 })} />
      <h3 id={`${id}-title`}>Add photos</h3>
      <div className="photo-drop-choices">
        <Choices
          legend="They show the"
          options={PHOTO_SIDES}
          labels={SIDE_LABELS}
          value={side}
          onChange={setSide}
        />
        <Choices
          legend="Taken"
          options={PHOTO_PHASES}
          labels={PHASE_LABELS}
          value={phase}
          onChange={setPhase}
        />
      </div>
      <div className="button-row">
        <button className="button" type="button" disabled={!live} onClick={open}>
          Choose photos
        </button>
        <button
          className="button photo-camera"
          type="button"
          disabled={!live}
          onClick={() => camera.current?.click()}
        >
          Take a photo
        </button>
        <input
          ref={camera}
          className="hidden"
          type="file"
          accept="image/*"
          capture="environment"
          aria-label="Camera"
          tabIndex={-1}
          onChange={(event) => {
            queue.add([...(event.target.files ?? [])], side, phase);
            event.target.value = '';
          }}
        />
        <p className="field-hint">
          {isDragActive
            ? 'Let go to add them.'
            : 'Or drop them here: JPEG, PNG or WebP, 25 MB at most. Location and camera data are taken out.'}
        </p>
      </div>
      <noscript>
        <p className="field-hint">Adding photos and pins needs JavaScript in the browser.</p>
      </noscript>
      <UploadList rows={rows} onRetry={queue.retry} onRemove={queue.remove} />
    </div>
  );
}
