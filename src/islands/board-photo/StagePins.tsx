import type { PinView } from '@/contracts/photos';
import type { PartKind } from '@/domain/parts/kinds';
import { pointing } from '../shared/pointing';
import type { PartState } from '../shared/PartSymbol';
import { layPlates } from './pin-layout';
import { PinMark, pinWords } from './PinMark';
import type { Point, Size } from './view';

export type PinDrawing = {
  kindOf: (pin: PinView) => PartKind | null;
  stateOf: (pin: PinView) => PartState;
  /** The reference pointed at anywhere on the page. */
  litRef: string | null;
  chosenPin: number | null;
};

/** The pins in the stage; those that are lit lie on top. */
export function StagePins({
  pins,
  place,
  stage,
  drawing,
  onPin,
}: {
  pins: readonly PinView[];
  /** Where a pin stands in the stage. */
  place: (pin: PinView) => Point;
  stage: Size;
  drawing: PinDrawing;
  onPin: (pin: PinView) => void;
}) {
  const { kindOf, stateOf, litRef, chosenPin } = drawing;
  const placed = pins.map((pin) => ({
    pin,
    id: pin.id,
    at: place(pin),
    label: pin.label,
    drawn: kindOf(pin) !== null,
    lit: chosenPin === pin.id || litRef === pin.label,
  }));
  const plates = layPlates(placed, stage);
  // The order in the document is that of the keyboard, so the lit ones are drawn once more by reference: the mark
  // alone, since what takes the focus would take it a second time there.
  return (
    <>
      {placed.map(({ pin, at, lit }) => (
        <g
          key={pin.id}
          data-pin={pin.id}
          className="pin-hold"
          tabIndex={0}
          role="button"
          aria-label={`Pin ${pinWords(pin, kindOf(pin))}`}
          aria-pressed={chosenPin === pin.id}
          {...pointing(pin.label)}
          onClick={() => onPin(pin)}
          onKeyDown={(event) => {
            if (event.key !== 'Enter' && event.key !== ' ') return;
            event.preventDefault();
            event.stopPropagation();
            onPin(pin);
          }}
        >
          <PinMark
            id={`photo-pin-${pin.id}`}
            label={pin.label}
            kind={kindOf(pin)}
            state={stateOf(pin)}
            at={at}
            plate={plates.get(pin.id)}
            lit={lit}
          />
        </g>
      ))}
      {placed
        .filter(({ lit }) => lit)
        .map(({ id, label }) => (
          <use
            key={id}
            href={`#photo-pin-${id}`}
            className={label === litRef ? 'pin-above pin-above-pointed' : 'pin-above'}
            aria-hidden="true"
          />
        ))}
    </>
  );
}
