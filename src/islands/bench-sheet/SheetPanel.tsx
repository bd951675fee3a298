import type { Suspects } from '@/contracts/bench';
import { MAX_READINGS } from '@/contracts/compute';
import type { Board, Phase } from './panel-props';
import { isStruck, type Row } from './rows';
import { pasteWords, type PasteReport } from './paste-report';
import { SheetGrid } from './SheetGrid';
import type { Sheets, SheetStore } from './sheet-store';

export const PHASE_NAMES: Readonly<Record<Phase, string>> = {
  'as-found': 'As found',
  'after-repair': 'After repair',
};
const PHASES = Object.keys(PHASE_NAMES) as Phase[];

const countOf = (rows: readonly Row[]) => rows.filter((row) => row.saved && !isStruck(row)).length;

/** Without script the tabs do not turn and nothing can be typed: the readings after the repair follow as text. */
function WithoutScript({ after, editable }: { after: readonly Row[]; editable: boolean }) {
  const saved = after.filter((row) => row.saved);
  return (
    <div className="sheet-foot">
      {editable && <p>Readings are entered with script, which is off here.</p>}
      {saved.length > 0 && (
        <>
          <p>After repair:</p>
          <ol>
            {saved.map(({ key, cells: { from, to, position, lifted, typed } }) => (
              <li key={key} className="mono">
                {[to ? `${from} to ${to}` : from, position, lifted && `${lifted} lifted`, typed]
                  .filter(Boolean)
                  .join(', ')}
              </li>
            ))}
          </ol>
        </>
      )}
    </div>
  );
}

export function SheetPanel({
  sheets,
  phase,
  onPhase,
  store,
  board,
  editable,
  locked,
  told,
  pointed,
  pasted,
}: {
  sheets: Sheets;
  phase: Phase;
  onPhase: (phase: Phase) => void;
  store: SheetStore;
  board: Board;
  editable: boolean;
  /** Why nothing can be entered; null when that needs no word. */
  locked: React.ReactNode;
  told: Suspects | null;
  pointed: string | null;
  /** What became of the last paste. */
  pasted: PasteReport | null;
}) {
  const full = sheets[phase].filter((row) => !isStruck(row)).length >= MAX_READINGS;
  const empty = sheets[phase].length === 0;
  return (
    <section className="sheet bench-sheet" aria-labelledby="bench-title" id="bench">
      <div className="sheet-head bench-head">
        <h2 id="bench-title">Bench sheet</h2>
        <div className="bench-tabs" role="tablist" aria-label="Phase">
          {PHASES.map((one) => (
            <button
              key={one}
              type="button"
              role="tab"
              id={`bench-tab-${one}`}
              aria-selected={one === phase}
              aria-controls="bench-rows"
              tabIndex={one === phase ? 0 : -1}
              onClick={() => onPhase(one)}
              onKeyDown={(event) => {
                if (event.key !== 'ArrowLeft' && event.key !== 'ArrowRight') return;
                const other = one === 'as-found' ? 'after-repair' : 'as-found';
                onPhase(other);
                document.getElementById(`bench-tab-${other}`)?.focus();
              }}
            >
              {PHASE_NAMES[one]} <span className="bench-tally">{countOf(sheets[one])}</span>
            </button>
          ))}
        </div>
      </div>
      {locked}
      <div id="bench-rows" role="tabpanel" aria-labelledby={`bench-tab-${phase}`}>
        {empty ? (
          <p className="empty">
            No reading yet. Readings are entered by the technician at the bench.
          </p>
        ) : (
          <SheetGrid
            key={phase}
            rows={sheets[phase]}
            phase={phase}
            store={store}
            board={board}
            editable={editable}
            told={told}
            pointed={pointed}
          />
        )}
      </div>
      <noscript>
        <WithoutScript after={sheets['after-repair']} editable={editable} />
      </noscript>
      {editable && (
        <p className="bench-pasted" role="status">
          {pasted && pasteWords(pasted)}
        </p>
      )}
      {editable && (
        <p className="sheet-foot bench-keys">
          {full ? (
            `The sheet holds ${MAX_READINGS} readings: strike one to enter another.`
          ) : (
            <>
              <span>
                <kbd>Enter</kbd> on
              </span>
              <span>
                <kbd>Tab</kbd> along
              </span>
              <span>
                <kbd>F2</kbd> edit
              </span>
              <span>
                <kbd>Esc</kbd> leave as it was
              </span>
              <span>
                <kbd>Del</kbd> strike
              </span>
              <span>OL, 1k2, 0R8, 4.99M as the meter shows it</span>
            </>
          )}
        </p>
      )}
    </section>
  );
}
