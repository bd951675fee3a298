/** The photo itself: zoomed and moved by hand, wheel or keys, with its pins and the crosshair. */
import { useEffect, useRef, useState, type KeyboardEvent } from 'react';
import type { PhotoView, PinView } from '@/contracts/photos';
import { StagePins, type PinDrawing } from './StagePins';
import { useGestures } from './use-gestures';
import { isWhole, toPhoto, toStage, type Point, type Size, type View } from './view';
import { photoWords } from './words';

/** Width of the `page` variant; closer than that the full one is drawn over it. */
const PAGE = 1600;

export type StageProps = {
  photo: PhotoView;
  title: string;
  view: View;
  stage: Size;
  onSize: (size: Size) => void;
  onZoom: (factor: number, about: Point) => void;
  onPan: (by: Point) => void;
  onKey: (event: KeyboardEvent) => void;
  /** Where the crosshair stands in shares of the photo; null when nothing is being placed. */
  aim: Point | null;
  onAim: (at: Point) => void;
  onPlace: (at: Point) => void;
  /** Null where pins cannot be moved. */
  onMovePin: ((pin: PinView, to: Point) => void) | null;
  onPin: (pin: PinView) => void;
  drawing: PinDrawing;
  /** Told when the stage element is there, for giving it the keyboard. */
  stageRef: React.RefObject<HTMLDivElement | null>;
};

export function PhotoStage(props: StageProps) {
  const { photo, view, stage, aim, stageRef, onSize } = props;
  const [drag, setDrag] = useState<{ pin: number; at: Point } | null>(null);
  const [sharp, setSharp] = useState<string | null>(null);
  const whole = isWhole(view, photo, stage);

  const told = useRef(onSize);
  told.current = onSize;
  useEffect(() => {
    const element = stageRef.current;
    if (!element) return;
    const observer = new ResizeObserver(() => {
      const { clientWidth: width, clientHeight: height } = element;
      if (width > 0 && height > 0) told.current({ width, height });
    });
    observer.observe(element);
    return () => observer.disconnect();
  }, [stageRef]);

  const gestures = useGestures(stageRef, {
    onZoom: props.onZoom,
    onPan: props.onPan,
    idle: (factor) => factor <= 1 && whole,
    onHover: (at) => aim && props.onAim(toPhoto(at, view, photo)),
    onTap: (at) => aim && props.onPlace(toPhoto(at, view, photo)),
    onDrag: (pin, at) => props.onMovePin && setDrag({ pin, at: toPhoto(at, view, photo) }),
    onDrop: (key, at) => {
      setDrag(null);
      const pin = photo.pins.find(({ id }) => id === key);
      if (pin) props.onMovePin?.(pin, toPhoto(at, view, photo));
    },
  });

  const close = view.scale * photo.width > PAGE && Math.max(photo.width, photo.height) > PAGE;
  const wanted = close ? photo.id : null;
  useEffect(() => {
    if (wanted === null) return;
    const picture = new Image();
    picture.onload = () => setSharp(wanted);
    picture.src = `/api/photos/${wanted}/full`;
    return () => {
      picture.onload = null;
    };
  }, [wanted]);

  const frame = {
    x: view.x,
    y: view.y,
    width: photo.width * view.scale,
    height: photo.height * view.scale,
  };
  const cross = aim && toStage(aim, view, photo);

  return (
    <div
      ref={stageRef}
      className={`photo-stage${whole ? '' : ' photo-stage-close'}${aim ? ' photo-stage-aim' : ''}`}
      role="application"
      aria-label={`${photoWords(props.title, photo)}. Plus and minus zoom, arrow keys move, 0 shows the whole photo.${props.onMovePin ? ' P sets a pin.' : ''}`}
      tabIndex={0}
      onKeyDown={props.onKey}
      {...gestures}
    >
      <svg viewBox={`0 0 ${stage.width} ${stage.height}`}>
        <image {...frame} href={`/api/photos/${photo.id}/page`} preserveAspectRatio="none" />
        {close && sharp === photo.id && (
          <image {...frame} href={`/api/photos/${photo.id}/full`} preserveAspectRatio="none" />
        )}
        <StagePins
          pins={photo.pins}
          place={(pin) => toStage(drag?.pin === pin.id ? drag.at : pin, view, photo)}
          stage={stage}
          drawing={props.drawing}
          onPin={(pin) => !aim && props.onPin(pin)}
        />
        {cross && (
          <g className="crosshair" aria-hidden="true">
            {['pin-halo', 'crosshair-line'].map((stroke) => (
              <path
                key={stroke}
                className={stroke}
                d={`M0 ${cross.y}H${cross.x - 9}M${cross.x + 9} ${cross.y}H${stage.width}M${cross.x} 0V${cross.y - 9}M${cross.x} ${cross.y + 9}V${stage.height}`}
              />
            ))}
          </g>
        )}
      </svg>
    </div>
  );
}
