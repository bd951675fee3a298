/** The photos of a ticket: seen, pinned, shared and added to. */
import { useEffect, useRef, useState } from 'react';
import type { PhotoView } from '@/contracts/photos';
import type { PhotoPanelProps } from './panel-props';
import { PhotoStrip } from './PhotoStrip';
import { PhotoUpload } from './PhotoUpload';
import { PhotoViewer } from './PhotoViewer';
import { useEdits } from './use-edits';
import { counted } from './words';

export function PhotoPanel({ ticketNumber, canEdit, parts, initial }: PhotoPanelProps) {
  const [photos, setPhotos] = useState(initial);
  const [wanted, setWanted] = useState<string | null>(null);
  const [live, setLive] = useState(false);
  useEffect(() => setLive(true), []);
  // What answers of the server are merged into: state alone would be as old as the question.
  const latest = useRef(photos);

  const keep = (change: (before: PhotoView[]) => PhotoView[]) => {
    latest.current = change(latest.current);
    setPhotos(latest.current);
  };
  const onPhoto = (photo: PhotoView) =>
    keep((all) => all.map((other) => (other.id === photo.id ? photo : other)));
  const onGone = (id: string) => keep((all) => all.filter((other) => other.id !== id));
  // What somebody is looking at stays in the stage; the new one joins the others under it.
  const onReady = (photo: PhotoView) =>
    keep((all) => [...all.filter((other) => other.id !== photo.id), photo]);

  const photo = photos.find(({ id }) => id === wanted) ?? photos[0];
  const find = (id: string) => latest.current.find((other) => other.id === id);
  const edits = useEdits(photo?.id ?? '', find, onPhoto, onGone);
  const shared = photos.filter((one) => one.shared).length;

  return (
    <section className="sheet photo-panel" aria-label="Board photos">
      <div className="sheet-head">
        <h2>Board photos</h2>
        <p className="remark" role="status">
          {photos.length > 0 &&
            `${counted(photos.length, 'photo')}, ${shared === 0 ? 'none' : shared} shared with the customer`}
        </p>
      </div>
      {photo ? (
        <PhotoViewer photo={photo} canEdit={canEdit} live={live} parts={parts} edits={edits}>
          <PhotoStrip photos={photos} chosen={photo.id} onChoose={setWanted} />
        </PhotoViewer>
      ) : (
        <p className="empty">
          {canEdit
            ? 'No photos yet. A photo of each side of the board before anything is touched shows later what was there.'
            : 'No photos yet.'}
        </p>
      )}
      {canEdit && <PhotoUpload ticketNumber={ticketNumber} live={live} onReady={onReady} />}
    </section>
  );
}
