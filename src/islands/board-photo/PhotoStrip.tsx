import type { PhotoView } from '@/contracts/photos';
import { usePointed } from '../shared/pointing';
import { counted, photoTitle } from './words';

/** The photos as a contact sheet; those that show the part pointed at say so. Links, so that without script each opens in full. */
export function PhotoStrip({
  photos,
  chosen,
  titleOf = photoTitle,
  onChoose,
}: {
  photos: readonly PhotoView[];
  chosen: string | undefined;
  titleOf?: (photo: PhotoView) => string;
  onChoose: (id: string) => void;
}) {
  const pointed = usePointed();
  return (
    <ul className="contact-sheet">
      {photos.map((photo) => (
        <li
          key={photo.id}
          className={
            photo.pins.some(({ label }) => label === pointed) ? 'contact-sheet-lit' : undefined
          }
        >
          <a
            href={`/api/photos/${photo.id}/full`}
            aria-current={photo.id === chosen ? 'true' : undefined}
            onClick={(event) => {
              if (event.ctrlKey || event.metaKey || event.shiftKey) return;
              event.preventDefault();
              onChoose(photo.id);
            }}
          >
            <img
              src={`/api/photos/${photo.id}/thumb`}
              alt={photo.caption}
              width={photo.width}
              height={photo.height}
              loading="lazy"
              decoding="async"
            />
            <span className="contact-sheet-words">
              <span>{titleOf(photo)}</span>
              {photo.pins.length > 0 && <span>{counted(photo.pins.length, 'pin')}</span>}
              {photo.shared && <span className="tag tag-copper">shared</span>}
            </span>
          </a>
        </li>
      ))}
    </ul>
  );
}
