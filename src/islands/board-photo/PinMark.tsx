import type { PinView } from '@/contracts/photos';
import type { PartKind } from '@/domain/parts/kinds';
import { kindLabels } from '@/domain/parts/words';
import { PartGlyph, type PartState } from '../shared/PartSymbol';
import type { Point, Size } from './view';

/** Pixels of one mono character at the size of the plate, and of the plate's other parts. */
const LETTER = 7.9;
const GLYPH = 34;
const HIGH = 26;
const PAD = 7;
const STEM = 16;

const plateWidth = (label: string, drawn: boolean) =>
  PAD * 2 + label.length * LETTER + (drawn ? GLYPH + 5 : 0);

/**
 * A pin: a ring on the place and a plate with the part's symbol and reference, of one size however far the photo is
 * zoomed. The plate turns away from the edges of the stage.
 */
export function PinMark({
  pin,
  kind,
  state,
  at,
  stage,
  lit,
}: {
  pin: Pick<PinView, 'label'>;
  /** Null for a mark with a label of its own. */
  kind: PartKind | null;
  state: PartState;
  at: Point;
  stage: Size;
  lit: boolean;
}) {
  const width = plateWidth(pin.label, kind !== null);
  const left = at.x + STEM + width > stage.width;
  const below = at.y - STEM - HIGH < 0;
  const x = left ? -STEM - width : STEM;
  const y = below ? STEM : -STEM - HIGH;
  return (
    <g
      className={lit ? 'pin pin-lit' : 'pin'}
      transform={`translate(${at.x.toFixed(1)} ${at.y.toFixed(1)})`}
    >
      <path className="pin-halo" d={`M0 0L${left ? -STEM : STEM} ${below ? STEM : -STEM}`} />
      <path className="pin-stem" d={`M0 0L${left ? -STEM : STEM} ${below ? STEM : -STEM}`} />
      <circle className="pin-halo" r="6" />
      <circle className="pin-ring" r="6" />
      <rect className="pin-plate" x={x} y={y} width={width} height={HIGH} />
      {kind && (
        <g transform={`translate(${x + PAD} ${y + 1.5}) scale(${GLYPH / 64})`}>
          <PartGlyph kind={kind} state={state} />
        </g>
      )}
      <text className="pin-label" x={x + width - PAD} y={y + 17.5} textAnchor="end">
        {pin.label}
      </text>
    </g>
  );
}

/** What a pin is, in words. */
export const pinWords = (pin: Pick<PinView, 'label'>, kind: PartKind | null): string =>
  kind ? `${pin.label}, ${kindLabels[kind]}` : pin.label;
