import { glued } from './glued';

type Doubt = { row: number; reason: string };

/** Blocks that stand open; more would push the rest of the panel out of sight. */
const OPEN = 3;

/** The reason without the call to measure again, which stands before it. */
function whyAgain(reason: string): string {
  const why = reason.split(' again: ').at(-1) ?? reason;
  return why.charAt(0).toUpperCase() + why.slice(1);
}

function DoubtRows({ doubts }: { doubts: readonly Doubt[] }) {
  return (
    <ul className="rows">
      {doubts.map(({ row, reason }, i) => (
        <li key={i}>
          <strong className="doubtful">Row {row}: measure this one again.</strong>{' '}
          <span className="remark">{glued(whyAgain(reason))}</span>
        </li>
      ))}
    </ul>
  );
}

/** Rows to be measured again: the first three, the others folded. */
export function Doubts({ doubts }: { doubts: readonly Doubt[] }) {
  const more = doubts.slice(OPEN);
  return (
    <div className="suspect-doubts">
      <DoubtRows doubts={doubts.slice(0, OPEN)} />
      {more.length > 0 && (
        <details className="suspect-fold">
          <summary>{more.length} more to measure again</summary>
          <DoubtRows doubts={more} />
        </details>
      )}
    </div>
  );
}
