import type { Suspects } from '@/contracts/bench';
import { modeLabels } from '@/domain/parts/words';
import { PartSymbol, type PartState } from '../shared/PartSymbol';
import { ProbabilityScale } from '../shared/ProbabilityScale';
import { pointing } from '../shared/pointing';
import { glued } from './glued';

type Verdict = Suspects['alone'][number];

const LOOKS = {
  suspect: { tone: 'danger', word: 'failed' },
  fits: { tone: 'ok', word: 'passed' },
  inconclusive: { tone: 'caution', word: 'doubtful' },
} as const;

function wordOf({ verdict, mode }: Verdict): string {
  if (verdict === 'suspect') return mode ? modeLabels[mode] : 'suspect';
  return verdict === 'fits' ? 'fits' : 'not settled';
}

function stateOf({ verdict, mode }: Verdict): PartState {
  if (verdict === 'suspect') return mode ?? 'plain';
  return verdict === 'fits' ? 'cleared' : 'untouched';
}

/** A part that no network holds, judged by its own reading: the verdict, why, and what would settle it. */
export function AloneEntry({
  verdict,
  value,
  row,
  lit,
}: {
  verdict: Verdict;
  value: string;
  /** Number of the row it rests on; 0 when that row has just gone. */
  row: number;
  lit: boolean;
}) {
  const { tone, word } = LOOKS[verdict.verdict];
  const said = wordOf(verdict);
  return (
    <div
      className={`suspect${lit ? ' bench-lit' : ''}`}
      tabIndex={0}
      role="group"
      aria-label={`${verdict.ref} ${said}`}
      {...pointing(verdict.ref)}
    >
      <PartSymbol kind={verdict.kind} state={stateOf(verdict)} label="" />
      <div className="suspect-words">
        <p>
          <strong className="mono">{verdict.ref}</strong> {value}{' '}
          <strong className={word}>{said}</strong>
          {row > 0 && <span className="remark"> by row {row} alone</span>}
        </p>
        <p className="remark">{glued(verdict.reasons.join(' '))}</p>
        {verdict.next && <p className="suspect-next">{verdict.next}</p>}
      </div>
      <ProbabilityScale value={verdict.probability} label={`${verdict.ref} failed`} tone={tone} />
    </div>
  );
}
