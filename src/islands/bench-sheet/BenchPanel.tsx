/**
 * The bench of a ticket: its readings as a sheet, and beside it what they say of the parts.
 *
 * The sheet by keyboard alone (grid "Bench sheet", cells "Row 1, From", "Row 1, Reading" and so on):
 * - Focusing the grid puts the cursor on the first cell to fill in, usually "From" of the empty last row.
 * - Typing replaces the cell, Enter or F2 opens it with its text, Backspace empties it, Escape leaves it as it was.
 *   While typing, names of nets, parts and positions are offered: the marked one is taken on leaving the cell, the
 *   arrows mark another.
 * - Tab goes From → To → Switch → Reading and then leaves the sheet; Lifted is reached by the arrows. Enter goes to the
 *   next empty cell of the row, and from the reading to the row below. The row is saved as soon as nothing is missing.
 * - A part's reference in From with To left empty is a reading straight on the part.
 * - Below the last row there is always an empty one that copies From and Switch. So four readings in full:
 *   V Tab P Tab volts Tab OL Enter, then (From and Switch are copied, the cursor is on To)
 *   COM Enter 1k2 Enter · Q Enter 0R8 Enter · A Enter 4.99M Enter.
 * - Delete strikes the row, Ctrl+Z (or "Bring it back") undoes it; after a paste Ctrl+Z takes the whole paste back.
 * - M takes the proposed next reading, in Reading and in cells where no name begins with M; Alt+M everywhere; Enter on
 *   its row, or its button, as well. The cursor then stands on the reading of the new row.
 * - A reading with two meanings (1,600) stays open on Enter; Tab reaches the buttons that settle it.
 */
import { useEffect, useMemo, useState, useSyncExternalStore } from 'react';
import { usePointed } from '../shared/pointing';
import { tellStandings } from '../shared/standings';
import type { BenchPanelProps, Phase } from './panel-props';
import { newClientKey } from './client-key';
import { openSheet } from './sheet-store';
import { SheetPanel } from './SheetPanel';
import { standingsOf } from './standings-of';
import { SuspectsPanel } from './SuspectsPanel';
import { useSuspects } from './use-suspects';

/** Rows that did not reach the server are tried again this often, ms. */
const RETRY = 5_000;

export function BenchPanel(props: BenchPanelProps) {
  const { ticketNumber, canEdit, cautionsTicked, closed, readings, suspects } = props;
  const { positions, nets, parts } = props;
  const editable = canEdit && cautionsTicked && !closed;
  const board = useMemo(() => ({ positions, nets, parts }), [positions, nets, parts]);
  const [store] = useState(() =>
    openSheet({
      ticketNumber,
      board,
      readings,
      editable,
      ask: (address, request) => fetch(address, request),
      newClientKey,
    }),
  );
  const { sheets, saves, pasted } = useSyncExternalStore(
    store.subscribe,
    store.snapshot,
    store.snapshot,
  );
  const [phase, setPhase] = useState<Phase>('as-found');
  const first = { 'as-found': suspects.asFound, 'after-repair': suspects.afterRepair };
  const { told, failed, again } = useSuspects(ticketNumber, first, phase, saves[phase]);
  const pointed = usePointed();
  useEffect(() => tellStandings(standingsOf(told)), [told]);

  useEffect(() => {
    const warn = (event: BeforeUnloadEvent) => store.unsaved() && event.preventDefault();
    const retry = setInterval(store.retryAll, RETRY);
    window.addEventListener('beforeunload', warn);
    window.addEventListener('online', store.retryAll);
    return () => {
      clearInterval(retry);
      window.removeEventListener('beforeunload', warn);
      window.removeEventListener('online', store.retryAll);
    };
  }, [store]);

  const open = (next: Phase) => {
    if (next === 'after-repair') store.offer();
    setPhase(next);
  };
  const locked =
    canEdit && !closed && !cautionsTicked ? (
      <p className="bar bar-caution bench-locked">
        <span>
          Readings wait for the cautions: <a href="#cautions">tick all of them first</a>.
        </span>
      </p>
    ) : null;
  return (
    <div className="columns bench-columns">
      <SheetPanel
        sheets={sheets}
        phase={phase}
        onPhase={open}
        store={store}
        board={board}
        editable={editable}
        locked={locked}
        told={told}
        pointed={pointed}
        pasted={pasted[phase]}
      />
      <SuspectsPanel
        phase={phase}
        told={told}
        failed={failed}
        onAgain={again}
        board={board}
        rows={sheets[phase]}
        pointed={pointed}
      />
    </div>
  );
}
