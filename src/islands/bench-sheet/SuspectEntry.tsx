import { modeWords } from '@/domain/bench/sentences';
import { PartSymbol } from '../shared/PartSymbol';
import { pointing } from '../shared/pointing';
import { ProbabilityScale } from '../shared/ProbabilityScale';
import type { BoardPart } from './panel-props';
import { glued } from './glued';
import type { Standing } from './suspect-order';

/** One suspect: its symbol as it failed, why, and how likely it is. */
export function SuspectEntry({
  standing,
  part,
  words,
  lit,
}: {
  standing: Standing;
  part: BoardPart;
  words: string;
  lit: boolean;
}) {
  const { mode, words: failed } = modeWords(standing);
  return (
    <div
      className={`suspect${lit ? ' bench-lit' : ''}`}
      tabIndex={0}
      role="group"
      aria-label={`${part.ref} ${failed}`}
      {...pointing(part.ref)}
    >
      <PartSymbol kind={part.kind} state={mode ?? 'plain'} label="" />
      <div className="suspect-words">
        <p>
          <strong className="mono">{part.ref}</strong> {glued(part.value)}{' '}
          <strong className="failed">{failed}</strong>
        </p>
        <p className="remark">{glued(words)}</p>
      </div>
      <ProbabilityScale value={standing.fault} label={`${part.ref} ${failed}`} tone="danger" />
    </div>
  );
}
