import type { PhotoView } from '@/contracts/photos';
import { counted, photoTitle } from './words';

/** The photos as a contact sheet. Links, so that without script each opens in full. */
export function PhotoStrip({
  photos,
  chosen,
  onChoose,
}: {
  photos: readonly PhotoView[];
  chosen: string | undefined;
  onChoose: (id: string) => void;
}) {
  return (
    <ul className="contact-sheet">
      {photos.map((photo) => (
        <li key={photo.id}>
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
              <span>{photoTitle(photo)}</span>
              {photo.pins.length > 0 && <span>{counted(photo.pins.length, 'pin')}</span>}
              {photo.shared && <span className="tag tag-copper">shared</span>}
            </span>
          </a>
        </li>
      ))}
    </ul>
  );
}
