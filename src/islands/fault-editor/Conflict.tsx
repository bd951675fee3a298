/** Somebody saved meanwhile: both versions, side by side in one text, and what to do with them. Nothing typed is lost. */
import { SECTIONS, sectionLines } from '@/domain/faults/body';
import { compareTexts } from '@/domain/faults/compare';
import { SECTION_LABELS } from '@/domain/faults/complete';
import type { FaultDetail } from '@/contracts/faults';
import { ComparedText } from '../shared/ComparedText';
import type { Draft } from './types';

export function Conflict({
  theirs,
  mine,
  onMine,
  onTheirs,
}: {
  theirs: FaultDetail;
  mine: Draft;
  /** Saves what is typed here on top of theirs. */
  onMine: () => void;
  /** Takes theirs into the editor. */
  onTheirs: () => void;
}) {
  const parts = [
    { name: 'Title', before: theirs.title, after: mine.title },
    ...SECTIONS.map((s) => ({
      name: SECTION_LABELS[s],
      before: sectionLines(theirs.body[s]),
      after: sectionLines(mine.body[s]),
    })),
  ].filter(({ before, after }) => before !== after);
  return (
    <section className="sheet" aria-label="Two versions" id="two-versions" tabIndex={-1}>
      <div className="bar bar-caution" role="alert">
        <strong>Somebody saved revision {theirs.revision} while you wrote</strong>
        <span>
          Yours is still in the editor below, and not saved. Here is what yours changes in theirs:
          struck is theirs alone, ruled under is yours alone.
        </span>
      </div>
      {parts.length === 0 && <p className="sheet-body">Both say the same.</p>}
      {parts.map(({ name, before, after }) => (
        <div key={name} className="note-section">
          <h3>{name}</h3>
          <ComparedText changes={compareTexts(before, after)} />
        </div>
      ))}
      <div className="sheet-foot button-row">
        <button type="button" className="button" onClick={onMine}>
          Save mine as the newer revision
        </button>
        <button type="button" className="button" onClick={onTheirs}>
          Go on with theirs
        </button>
        <span className="remark">
          Or write on: take over what theirs has more, then save yours. Theirs stays as revision{' '}
          {theirs.revision} in any case.
        </span>
      </div>
    </section>
  );
}
