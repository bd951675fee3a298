import type { Mode, PartKind } from '@/domain/parts/kinds';
import { kindLabels, modeLabels } from '@/domain/parts/words';
import { PART_BODIES } from './part-bodies';

/** What is drawn into the symbol: a failure mode, one of the other standings, or nothing (`plain`: board files). */
export type PartState = Mode | 'cleared' | 'untouched' | 'plain';

const stateLabels: Readonly<Record<PartState, string>> = {
  ...modeLabels,
  cleared: 'cleared',
  untouched: 'untouched',
  plain: '',
};

const STANDING: Readonly<Partial<Record<PartState, string>>> = {
  cleared: 'symbol-cleared',
  untouched: 'symbol-untouched',
  plain: 'symbol-plain',
};

/** How far a drifted body stands off its lead line. */
const DRIFT = 9;

/** "PTC thermistor, open". */
export function partName(kind: PartKind, state: PartState): string {
  return [kindLabels[kind], stateLabels[state]].filter(Boolean).join(', ');
}

/**
 * The symbol as a group, for a drawing of your own: a field of 64 by 44 whose leads end at (0, 22) and (64, 22). It
 * brings its colour by class; rotate and place it with a transform.
 */
export function PartGlyph({ kind, state }: { kind: PartKind; state: PartState }) {
  const { left, right, drawing } = PART_BODIES[kind];
  const shift = state === 'drifted-high' ? -DRIFT : state === 'drifted-low' ? DRIFT : 0;
  return (
    <g className={`symbol-glyph ${STANDING[state] ?? 'symbol-failed'}`}>
      {state === 'open' ? (
        <path d={`M0 22h2.5M.5 26l4-8M8.5 26l4-8M10.5 22H${left}`} />
      ) : state === 'untouched' ? null : (
        <path d={`M0 22H${left}`} />
      )}
      {state !== 'untouched' && <path d={`M${right} 22H64`} />}
      <g transform={shift ? `translate(0 ${shift})` : undefined}>{drawing}</g>
      {state === 'short' && <path className="symbol-bridge" d="M7 22V4.5H57V22" />}
      {state === 'leaky' && <path className="symbol-leak" d="M7 22V4.5H57V22" />}
      {state === 'cleared' && <path className="symbol-tick" d="M49 7l4 5 9-10.5" />}
    </g>
  );
}

/** A part's schematic symbol (IEC 60617) with what the readings say of it drawn in, so it reads without colour. */
export function PartSymbol({
  kind,
  state,
  size = 64,
  label = partName(kind, state),
}: {
  kind: PartKind;
  state: PartState;
  /** Width, CSS pixels. */
  size?: number;
  /** Accessible name; an empty one marks the symbol as decoration beside words that say the same. */
  label?: string;
}) {
  const name = label ? { role: 'img', 'aria-label': label } : { 'aria-hidden': true };
  return (
    <svg className="symbol" viewBox="0 0 64 44" width={size} height={(size * 44) / 64} {...name}>
      <PartGlyph kind={kind} state={state} />
    </svg>
  );
}
