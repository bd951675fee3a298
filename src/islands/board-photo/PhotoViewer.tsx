/** One photo in its stage, its tools above it, its facts and pins beside it. */
import { useEffect, useRef, useState, type KeyboardEvent, type ReactNode } from 'react';
import type { PhotoView, PinView } from '@/contracts/photos';
import { newKey } from '../shared/ask';
import { usePointed } from '../shared/pointing';
import { useStandings } from '../shared/standings';
import type { PinnablePart } from './panel-props';
import { PhotoFacts } from './PhotoFacts';
import { PhotoStage } from './PhotoStage';
import { PinForm, type PinChoice } from './PinForm';
import { PinList } from './PinList';
import type { useEdits } from './use-edits';
import { useView } from './use-view';
import { toPhoto, type Point } from './view';
import { photoTitle } from './words';

type Mode =
  | { kind: 'look' }
  /** The crosshair is out: for a new pin, or to move one. */
  | { kind: 'aim'; at: Point; moving: PinView | null }
  /** The place is chosen, or the pin is to stand for something else. */
  | { kind: 'name'; at: Point; renaming: PinView | null; key: string };

const LOOK: Mode = { kind: 'look' };
const ARROWS: Readonly<Record<string, Point>> = {
  ArrowLeft: { x: -1, y: 0 },
  ArrowRight: { x: 1, y: 0 },
  ArrowUp: { x: 0, y: -1 },
  ArrowDown: { x: 0, y: 1 },
};
const STEP = 1.4;

export function PhotoViewer({
  photo,
  canEdit,
  live,
  parts,
  edits,
  title = photoTitle(photo),
  children,
}: {
  photo: PhotoView;
  canEdit: boolean;
  live: boolean;
  parts: readonly PinnablePart[];
  edits: ReturnType<typeof useEdits>;
  title?: string;
  /** What stands under the stage: the other photos. */
  children: ReactNode;
}) {
  const { stage, view, whole, percent, ...move } = useView(photo);
  const [mode, setMode] = useState<Mode>(LOOK);
  const [chosen, setChosen] = useState<number | null>(null);
  const stageRef = useRef<HTMLDivElement>(null);
  const litRef = usePointed();
  const standings = useStandings();
  const { clear } = edits;
  useEffect(() => {
    setMode(LOOK);
    setChosen(null);
    clear();
  }, [photo.id, clear]);

  const partOf = (pin: PinView) => parts.find(({ id }) => id === pin.partId);
  const kindOf = (pin: PinView) => partOf(pin)?.kind ?? null;
  const stateOf = (pin: PinView) =>
    pin.partId === null ? 'plain' : (standings[pin.label] ?? 'plain');
  const lookAgain = () => {
    setMode(LOOK);
    clear();
    stageRef.current?.focus();
  };
  const startAim = (moving: PinView | null) => {
    const middle = { x: stage.width / 2, y: stage.height / 2 };
    setMode({ kind: 'aim', moving, at: moving ?? toPhoto(middle, view, photo) });
    stageRef.current?.focus();
  };
  const place = (at: Point) => {
    if (mode.kind !== 'aim') return;
    if (!mode.moving) return setMode({ kind: 'name', at, renaming: null, key: newKey() });
    void edits.movePin(mode.moving, at);
    lookAgain();
  };
  const name = async (choice: PinChoice) => {
    if (mode.kind !== 'name') return;
    const { at, renaming, key } = mode;
    const kept = renaming ? edits.namePin(renaming, choice) : edits.addPin(at, choice, key);
    if (await kept) lookAgain();
  };

  function onKey(event: KeyboardEvent) {
    const arrow = ARROWS[event.key];
    if (event.ctrlKey || event.metaKey || event.altKey) return;
    if (arrow && mode.kind === 'aim') {
      const far = (event.shiftKey ? 40 : 8) / view.scale;
      const to = {
        x: mode.at.x + (arrow.x * far) / photo.width,
        y: mode.at.y + (arrow.y * far) / photo.height,
      };
      const at = { x: Math.min(1, Math.max(0, to.x)), y: Math.min(1, Math.max(0, to.y)) };
      setMode({ ...mode, at });
      if (!whole) move.centreOn(at);
    } else if (arrow) move.pan({ x: arrow.x * -60, y: arrow.y * -60 });
    else if (event.key === '+' || event.key === '=') move.zoom(STEP);
    else if (event.key === '-') move.zoom(1 / STEP);
    else if (event.key === '0') move.showAll();
    else if (event.key === 'p' && canEdit) startAim(null);
    else if (event.key === 'Enter' && mode.kind === 'aim') place(mode.at);
    else if (event.key === 'Escape' && mode.kind !== 'look') lookAgain();
    else return;
    event.preventDefault();
  }

  const choose = (pin: PinView) => {
    setChosen(pin.id);
    if (!whole) move.centreOn(pin);
  };
  const aiming = mode.kind === 'look' ? null : mode.at;
  const across =
    aiming && `${Math.round(aiming.x * 100)} % across, ${Math.round(aiming.y * 100)} % down`;

  return (
    <div className="photo-viewer">
      <div className="photo-main">
        <div className="photo-tools">
          <h3>{title}</h3>
          <div className="button-row">
            {canEdit && (
              <button
                className="button button-small"
                type="button"
                aria-keyshortcuts="p"
                disabled={!live}
                onClick={() => (mode.kind === 'aim' ? lookAgain() : startAim(null))}
              >
                {mode.kind === 'aim' ? 'Put no pin' : 'Add pin'}
              </button>
            )}
            <div className="photo-zoom" role="group" aria-label="Zoom">
              <button
                className="button button-small"
                type="button"
                aria-label="Zoom out"
                disabled={!live || whole}
                onClick={() => move.zoom(1 / STEP)}
              >
                −
              </button>
              <button
                className="button button-small mono"
                type="button"
                aria-label={`Show the whole photo, now at ${percent} %`}
                disabled={!live || whole}
                onClick={move.showAll}
              >
                {live ? `${percent} %` : 'whole'}
              </button>
              <button
                className="button button-small"
                type="button"
                aria-label="Zoom in"
                disabled={!live || view.scale >= 4}
                onClick={() => move.zoom(STEP)}
              >
                +
              </button>
            </div>
          </div>
        </div>
        <div className="photo-frame">
          <PhotoStage
            stageRef={stageRef}
            photo={photo}
            title={title}
            view={view}
            stage={stage}
            onSize={move.resize}
            onZoom={move.zoom}
            onPan={move.pan}
            onKey={onKey}
            aim={aiming}
            onAim={(at) => mode.kind === 'aim' && setMode({ ...mode, at })}
            onPlace={place}
            onMovePin={canEdit ? (pin, to) => void edits.movePin(pin, to) : null}
            onPin={choose}
            drawing={{ kindOf, stateOf, litRef, chosenPin: chosen }}
          />
          {mode.kind === 'name' && (
            <PinForm
              parts={parts}
              given={mode.renaming?.label ?? ''}
              busy={edits.busy}
              error={edits.error}
              onChoose={(choice) => void name(choice)}
              onCancel={lookAgain}
            />
          )}
        </div>
        <p className={mode.kind === 'aim' ? 'photo-hint' : 'photo-hint photo-hint-mouse'}>
          {mode.kind !== 'aim'
            ? `Wheel zooms, dragging moves; so do + − 0 and the arrow keys.${canEdit ? ' P sets a pin.' : ''}`
            : `${mode.moving ? `Click where ${mode.moving.label} belongs` : 'Click the part'}, or move the crosshair with the arrow keys and press Enter. Escape puts it away.`}
        </p>
        {children}
        <p className="sr-only" role="status">
          {across ? `Crosshair ${across}` : `Zoom ${percent} %`}
        </p>
      </div>
      <div className="photo-side">
        {canEdit && live ? (
          <PhotoFacts
            key={photo.id}
            photo={photo}
            error={mode.kind === 'name' ? '' : edits.error}
            onEdit={(change) => void edits.edit(change)}
            onRemove={() => void edits.remove()}
          />
        ) : (
          photo.caption && <p>{photo.caption}</p>
        )}
        <PinList
          photo={photo}
          partOf={partOf}
          drawing={{ kindOf, stateOf, litRef, chosenPin: chosen }}
          canEdit={canEdit && live}
          onChoose={choose}
          onMove={startAim}
          onRename={(pin) => setMode({ kind: 'name', at: pin, renaming: pin, key: '' })}
          onRemove={(pin) => void edits.removePin(pin)}
        />
      </div>
    </div>
  );
}
