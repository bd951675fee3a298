import type { PinView } from '@/contracts/photos';
import type { PartKind } from '@/domain/parts/kinds';
import { kindLabels } from '@/domain/parts/words';
import { PartGlyph, type PartState } from '../shared/PartSymbol';
import { GLYPH, PAD, type Plate } from './pin-layout';
import type { Point } from './view';

/** The nearest corner of the plate, where the stem meets it. */
const stemTo = ({ x, y, width, height }: Plate) =>
  `M0 0L${x < 0 ? x + width : x} ${y < 0 ? y + height : y}`;

/**
 * A pin: a ring on the place and a plate with the part's symbol and reference, of one size however far the photo is
 * zoomed.
 */
export function PinMark({
  id,
  label,
  kind,
  state,
  at,
  plate,
  lit,
}: {
  id: string;
  label: string;
  /** Null for a mark with a label of its own. */
  kind: PartKind | null;
  state: PartState;
  at: Point;
  /** Undefined where there is no room for it. */
  plate: Plate | undefined;
  lit: boolean;
}) {
  return (
    <g
      id={id}
      className={lit ? 'pin pin-lit' : 'pin'}
      transform={`translate(${at.x.toFixed(1)} ${at.y.toFixed(1)})`}
    >
      {plate && <path className="pin-halo" d={stemTo(plate)} />}
      {plate && <path className="pin-stem" d={stemTo(plate)} />}
      <circle className="pin-halo" r="6" />
      <circle className="pin-ring" r="6" />
      <circle className="pin-reach" r="14" />
      {plate && (
        <g transform={`translate(${plate.x} ${plate.y})`}>
          <rect className="pin-plate" width={plate.width} height={plate.height} />
          {kind && plate.drawn && (
            <g transform={`translate(${PAD} 1.5) scale(${GLYPH / 64})`}>
              <PartGlyph kind={kind} state={state} />
            </g>
          )}
          <text className="pin-label" x={plate.width - PAD} y="17.5" textAnchor="end">
            {label}
          </text>
        </g>
      )}
    </g>
  );
}

/** What a pin is, in words. */
export const pinWords = (pin: Pick<PinView, 'label'>, kind: PartKind | null): string =>
  kind ? `${pin.label}, ${kindLabels[kind]}` : pin.label;
