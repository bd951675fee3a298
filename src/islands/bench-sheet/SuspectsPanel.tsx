import type { Suspects } from '@/contracts/bench';
import { modeLabels } from '@/domain/parts/words';
import { PartSymbol } from '../shared/PartSymbol';
import { ProbabilityScale } from '../shared/ProbabilityScale';
import type { BoardPart } from './panel-props';

const likeliest = (modes: object) =>
  (Object.entries(modes) as [keyof typeof modeLabels, number][]).sort(
    (a, b) => b[1] - a[1],
  )[0]?.[0];

/** What the readings say of the parts: suspects first. */
export function SuspectsPanel({ suspects, parts }: { suspects: Suspects; parts: BoardPart[] }) {
  const { diagnosis } = suspects;
  const ranked = [...(diagnosis?.parts ?? [])]
    .filter((p) => p.standing === 'suspect')
    .sort((a, b) => b.fault - a.fault);
  return (
    <section className="sheet" aria-label="Suspects">
      <div className="sheet-head">
        <h2>Suspects</h2>
      </div>
      {ranked.length === 0 && <p className="empty">Readings show here what may have failed.</p>}
      <ul className="rows">
        {ranked.map((suspect) => {
          const part = parts.find((p) => p.ref === suspect.ref);
          const mode = likeliest(suspect.modes);
          if (!part || !mode) return null;
          return (
            <li key={suspect.ref}>
              <PartSymbol kind={part.kind} state={mode} />
              <strong className="mono">{suspect.ref}</strong> {part.value}{' '}
              <strong className="failed">{modeLabels[mode]}</strong>
              <ProbabilityScale
                value={suspect.fault}
                label={`${suspect.ref} ${modeLabels[mode]}`}
                tone="danger"
              />
            </li>
          );
        })}
      </ul>
    </section>
  );
}
