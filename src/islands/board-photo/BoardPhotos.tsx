/** The photos of a board file with their pins: looked at, not changed. */
import { useEffect, useState } from 'react';
import type { PhotoView } from '@/contracts/photos';
import type { PinnablePart } from './panel-props';
import { PhotoStrip } from './PhotoStrip';
import { PhotoViewer } from './PhotoViewer';
import { useEdits } from './use-edits';
import { boardPhotoTitle, counted } from './words';

const nothing = () => undefined;

export function BoardPhotos({
  photos,
  parts,
}: {
  photos: readonly PhotoView[];
  parts: readonly PinnablePart[];
}) {
  const [wanted, setWanted] = useState<string | null>(null);
  const [live, setLive] = useState(false);
  useEffect(() => setLive(true), []);
  const photo = photos.find(({ id }) => id === wanted) ?? photos[0];
  const edits = useEdits(photo?.id ?? '', nothing, nothing, nothing);
  return (
    <section className="sheet photo-panel" aria-label="Board photos">
      <div className="sheet-head">
        <h2>Board photos</h2>
        <p className="remark">{counted(photos.length, 'photo')}</p>
      </div>
      {photo && (
        <PhotoViewer
          photo={photo}
          canEdit={false}
          live={live}
          parts={parts}
          edits={edits}
          title={boardPhotoTitle(photo)}
        >
          <PhotoStrip
            photos={photos}
            chosen={photo.id}
            titleOf={boardPhotoTitle}
            onChoose={setWanted}
          />
        </PhotoViewer>
      )}
    </section>
  );
}
