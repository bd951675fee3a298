import type { PhotoView, PinView } from '@/contracts/photos';
import { PartSymbol } from '../shared/PartSymbol';
import { pointing } from '../shared/pointing';
import type { PinnablePart } from './panel-props';
import type { PinDrawing } from './StagePins';

/** The pins of a photo in words; the chosen one with what can be done to it. */
export function PinList({
  photo,
  partOf,
  drawing,
  canEdit,
  onChoose,
  onMove,
  onRename,
  onRemove,
}: {
  photo: PhotoView;
  partOf: (pin: PinView) => PinnablePart | undefined;
  drawing: PinDrawing;
  canEdit: boolean;
  onChoose: (pin: PinView) => void;
  onMove: (pin: PinView) => void;
  onRename: (pin: PinView) => void;
  onRemove: (pin: PinView) => void;
}) {
  const { kindOf, stateOf, litRef, chosenPin: chosen } = drawing;
  return (
    <ul className="pin-list">
      {photo.pins.map((pin) => {
        const kind = kindOf(pin);
        const value = partOf(pin)?.value ?? '';
        return (
          <li
            key={pin.id}
            className={litRef === pin.label || chosen === pin.id ? 'pin-list-lit' : undefined}
          >
            <button
              type="button"
              aria-pressed={chosen === pin.id}
              onClick={() => onChoose(pin)}
              {...pointing(pin.label)}
            >
              {kind ? (
                <PartSymbol kind={kind} state={stateOf(pin)} size={44} />
              ) : (
                <span className="pin-list-plain" aria-hidden="true" />
              )}
              <span className="mono">{pin.label}</span>
              <span className="remark">{value}</span>
            </button>
            {canEdit && chosen === pin.id && (
              <div className="button-row">
                <button className="button button-small" type="button" onClick={() => onMove(pin)}>
                  Move
                </button>
                <button className="button button-small" type="button" onClick={() => onRename(pin)}>
                  Change
                </button>
                <button className="button button-small" type="button" onClick={() => onRemove(pin)}>
                  Take off
                </button>
              </div>
            )}
          </li>
        );
      })}
    </ul>
  );
}
