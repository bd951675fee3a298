import type { Suspects } from '@/contracts/bench';
import { LOOK_ELSEWHERE, summaryOf } from '@/domain/bench/summary';
import { ProbabilityScale } from '../shared/ProbabilityScale';
import { AloneEntry } from './AloneEntry';
import { Doubts } from './Doubts';
import { FoldedParts } from './FoldedParts';
import type { Board, Phase } from './panel-props';
import { isStruck, type Row } from './rows';
import { gathered } from './suspect-order';
import { SuspectEntry } from './SuspectEntry';

const WAITING: Readonly<Record<Phase, string>> = {
  'as-found': 'Readings show here what may have failed. Begin between the jacks.',
  'after-repair': 'Readings after the repair show here whether the network is sound again.',
};
const NO_BOARD =
  'The board of this instrument is not known: readings are kept, but nothing can be ranked.';

const listed = (refs: string[]) => `${refs.slice(0, -1).join(', ')} and ${refs.at(-1) ?? ''}`;

const count = (n: number, one: string, more: string) => `${n} ${n === 1 ? one : more}`;

/** What the readings of a phase say of the parts: suspects first, then what is cleared and what nothing tells of. */
export function SuspectsPanel({
  phase,
  told,
  failed,
  onAgain,
  board,
  rows,
  pointed,
}: {
  phase: Phase;
  told: Suspects | null;
  /** The last change could not be asked about. */
  failed: boolean;
  onAgain: () => void;
  board: Board;
  rows: readonly Row[];
  pointed: string | null;
}) {
  const live = rows.filter((row) => !isStruck(row));
  const numberOf = (reading: number | undefined) =>
    live.findIndex((row) => row.saved !== null && row.saved.id === reading) + 1;
  const partOf = (ref: string) => board.parts.find((part) => part.ref === ref);
  const diagnosis = told?.diagnosis ?? null;
  const said = new Map(told?.said.map(({ ref, words }) => [ref, words]));
  const alone = told?.alone ?? [];
  const used = (told?.expected.length ?? 0) + alone.length;
  const healthy = diagnosis?.healthy ?? 0;
  const ranked = diagnosis ? gathered(diagnosis) : [];
  const standing = (which: 'cleared' | 'untouched') =>
    diagnosis?.parts.filter((part) => part.standing === which) ?? [];
  return (
    <section className="sheet suspects" aria-labelledby="suspects-title" id="suspects">
      <div className="sheet-head">
        <h2 id="suspects-title">Suspects</h2>
        {failed ? (
          <p className="remark" role="alert">
            <span className="failed">Not up to date.</span>{' '}
            <button type="button" className="button-text suspects-again" onClick={onAgain}>
              Ask again
            </button>
          </p>
        ) : (
          used > 0 && <p className="remark">from {count(used, 'reading', 'readings')}</p>
        )}
      </div>
      <p className="sr-only" role="status">
        {told ? summaryOf(told) : ''}
      </p>
      {used === 0 && (
        <p className="empty">{board.parts.length === 0 ? NO_BOARD : WAITING[phase]}</p>
      )}
      {diagnosis && healthy >= LOOK_ELSEWHERE && (
        <div className="suspect-healthy">
          <p>
            <strong className="passed">The network looks sound.</strong> The readings fit it
            healthy: look elsewhere, or measure where no reading has been.
          </p>
          <ProbabilityScale value={healthy} label="Network healthy" tone="ok" />
        </div>
      )}
      {diagnosis && ranked.length === 0 && alone.length === 0 && healthy < LOOK_ELSEWHERE && (
        <p className="suspect-none">No part is a suspect by these readings.</p>
      )}
      {ranked.length > 0 && (
        <ol className="rows suspect-list">
          {ranked.map((members) => (
            <li key={members[0]?.ref} className={members.length > 1 ? 'suspect-group' : undefined}>
              {members.length > 1 && (
                <p className="suspect-alike">
                  {listed(members.map(({ ref }) => ref))} look alike to these readings: measure
                  between them.
                </p>
              )}
              {members.map((one) => {
                const part = partOf(one.ref);
                return (
                  part && (
                    <SuspectEntry
                      key={one.ref}
                      standing={one}
                      part={part}
                      words={said.get(one.ref) ?? ''}
                      lit={one.ref === pointed}
                    />
                  )
                );
              })}
            </li>
          ))}
        </ol>
      )}
      {alone.length > 0 && (
        <ul className="rows suspect-list">
          {alone.map((verdict) => (
            <li key={verdict.reading}>
              <AloneEntry
                verdict={verdict}
                value={partOf(verdict.ref)?.value ?? ''}
                row={numberOf(verdict.reading)}
                lit={verdict.ref === pointed}
              />
            </li>
          ))}
        </ul>
      )}
      {diagnosis && diagnosis.doubtful.length > 0 && (
        <Doubts
          doubts={diagnosis.doubtful.map(({ reading, reason }) => ({
            row: numberOf(told?.expected[reading]?.reading),
            reason,
          }))}
        />
      )}
      {diagnosis && (
        <div className="suspect-folds">
          {(['cleared', 'untouched'] as const).map((which) => (
            <FoldedParts
              key={which}
              standing={which}
              parts={standing(which)}
              board={board.parts}
              said={said}
              pointed={pointed}
            />
          ))}
          {healthy < LOOK_ELSEWHERE && (
            <div className="suspect-foot">
              <span className="remark">Nothing in this network failed</span>
              <ProbabilityScale value={healthy} label="Network healthy" tone="plain" />
            </div>
          )}
        </div>
      )}
    </section>
  );
}
