/** The strokes every scale is drawn with. Lines stay crisp because nothing but positions is in per cent. */
import type { ReactNode } from 'react';
import type { Graduation, Span } from './scale-geometry';

/** Height of the drawing and of its baseline, CSS pixels. */
export const HEIGHT = 27;
export const BASE = 20.5;
/** With numbers printed under the graduations. */
const HEIGHT_NUMBERED = 42;

const RISE = [10, 7, 4] as const;

export type Tone = 'copper' | 'danger' | 'caution' | 'ok' | 'plain';

export function Graduations({ marks, span }: { marks: readonly Graduation[]; span: Span }) {
  return (
    <g className="scale-print">
      <line x1={`${span.from}%`} x2={`${span.to}%`} y1={BASE} y2={BASE} />
      {marks.map(({ at, rank }) => (
        <line
          key={at}
          x1={`${at}%`}
          x2={`${at}%`}
          y1={BASE - RISE[rank]}
          y2={BASE}
          className={rank === 0 ? undefined : 'scale-minor'}
        />
      ))}
    </g>
  );
}

/** A shaded stretch of the scale; never thinner than its two edges. */
export function Band({ span, className }: { span: Span; className: string }) {
  return (
    <rect
      className={className}
      x={`${span.from}%`}
      width={`${Math.max(0, span.to - span.from)}%`}
      y={BASE - 13}
      height={13}
    />
  );
}

/** The needle's uncertainty: a thin sector that opens from its foot, as its two halves. */
export function Sector({ at, span }: { at: number; span: Span }) {
  if (span.to <= span.from) return null;
  const half = (from: number, to: number, side: string) => (
    <rect
      className={`scale-sector scale-sector-${side}`}
      x={`${from}%`}
      width={`${Math.max(0, to - from)}%`}
      y={2}
      height={BASE - 2}
    />
  );
  return (
    <>
      {half(span.from, at, 'left')}
      {half(at, span.to, 'right')}
    </>
  );
}

/** A pointed head and its stem, cut from one rectangle: a rectangle's place is what browsers let glide. */
export function Needle({ at, tone }: { at: number; tone: Tone }) {
  return (
    <rect
      className={`scale-needle tone-${tone}`}
      x={`${at}%`}
      width={9}
      height={BASE}
      transform="translate(-4.5 0)"
    />
  );
}

/** Numbers printed under a wide scale, centred on their graduations. */
export function Print({ words }: { words: readonly { at: number; text: string }[] }) {
  return (
    <g className="scale-words">
      {words.map(({ at, text }) => (
        <text key={at} x={`${at}%`} y={HEIGHT_NUMBERED - 4} textAnchor="middle">
          {text}
        </text>
      ))}
    </g>
  );
}

/** What was predicted: an open arrow that points up at the scale from below, where no needle is. */
export function Predicted({ at }: { at: number }) {
  return (
    <svg className="scale-predicted" x={`${at}%`} overflow="visible" width="1" height={HEIGHT}>
      <path d={`M0 ${BASE + 1.5}l3.5 4.5h-7z`} />
    </svg>
  );
}

/** The frame: drawing, its name for those who do not see it, the number beside it. */
export function Scale(props: {
  name: string;
  number: string | null;
  tone: Tone;
  size?: 'short' | 'wide' | undefined;
  children: ReactNode;
}) {
  return (
    <span className={props.size ? `scale scale-${props.size}` : 'scale'}>
      <svg
        className="scale-drawing"
        height={props.size === 'wide' ? HEIGHT_NUMBERED : HEIGHT}
        role="img"
        aria-label={props.name}
      >
        {props.children}
      </svg>
      {props.number !== null && (
        <span className={`scale-number tone-${props.tone}`}>{props.number}</span>
      )}
    </span>
  );
}
