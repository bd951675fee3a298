import { PartSymbol } from '../shared/PartSymbol';
import { pointing } from '../shared/pointing';
import { writeProbability } from '../shared/ProbabilityScale';
import type { BoardPart } from './panel-props';
import { glued } from './glued';
import type { Standing } from './suspect-order';

/** Parts of one standing behind their count. */
export function FoldedParts({
  standing,
  parts,
  board,
  said,
  pointed,
}: {
  standing: 'cleared' | 'untouched';
  parts: readonly Standing[];
  board: readonly BoardPart[];
  said: ReadonlyMap<string, string>;
  pointed: string | null;
}) {
  if (parts.length === 0) return null;
  const known = parts.flatMap((one) => {
    const part = board.find(({ ref }) => ref === one.ref);
    return part ? [{ ...one, part }] : [];
  });
  return (
    <details className="suspect-fold">
      <summary className={known.some(({ ref }) => ref === pointed) ? 'bench-lit' : undefined}>
        <span className={standing === 'cleared' ? 'passed' : undefined}>
          {standing === 'cleared' ? 'Cleared' : 'Untouched'}
        </span>{' '}
        <span className="mono">{known.length}</span>
        <span className="remark suspect-refs">{known.map(({ ref }) => ref).join(' ')}</span>
      </summary>
      <ul>
        {known.map(({ ref, part, fault }) => (
          <li key={ref} className={ref === pointed ? 'bench-lit' : undefined} {...pointing(ref)}>
            <PartSymbol kind={part.kind} state={standing} size={44} label="" />
            <div>
              <strong className="mono">{ref}</strong> {part.value}
              <p className="remark">{glued(said.get(ref) ?? 'No reading tells of it yet.')}</p>
            </div>
            <span className="mono">{writeProbability(fault)}</span>
          </li>
        ))}
      </ul>
    </details>
  );
}
