/** One stage's stretch of the line with its graduations, drawn for both directions; the style sheet shows one. */

const MINOR = [0, 10, 20, 30, 40, 60, 70, 80, 90];
/** A column's stretch is short: quarters are fine enough. */
const MINOR_DOWN = [0, 25, 75];
const BASE = 34.5;
const SIDE = 30.5;

export function StageMark({
  line,
  needle,
  first = false,
  last = false,
}: {
  line: 'passed' | 'reached' | 'ahead' | 'exit';
  needle: boolean;
  first?: boolean;
  last?: boolean;
}) {
  const from = first ? '10%' : '0%';
  // A hair over the edge, so that no gap shows where two stretches meet between pixels.
  const to = last ? '90%' : '100.4%';
  const minor = MINOR.filter((at) => !(first && at < 10) && !(last && at > 90));
  const minorDown = MINOR_DOWN.filter((at) => !(first && at < 10));
  const exit = line === 'exit';
  const gone = line === 'passed' ? to : line === 'reached' ? '50%' : null;
  return (
    <svg className="stage-mark" aria-hidden="true">
      <g className="stage-across">
        {!(exit && last) && <line x1={from} x2={to} y1={BASE} y2={BASE} />}
        {gone && <line className="stage-gone" x1={from} x2={gone} y1={BASE} y2={BASE} />}
        {exit ? (
          <>
            <line className="stage-branch" x1="0%" y1={BASE} x2="28%" y2={BASE + 24} />
            <line className="stage-branch" x1="28%" y1={BASE + 24} x2="72%" y2={BASE + 24} />
          </>
        ) : (
          <>
            {minor.map((at) => (
              <line
                key={at}
                className="scale-minor"
                x1={`${at}%`}
                x2={`${at}%`}
                y1={BASE - 5}
                y2={BASE}
              />
            ))}
            <line className="stage-tick" x1="50%" x2="50%" y1={BASE - 12} y2={BASE} />
          </>
        )}
        {needle && (
          <svg x="50%" y={exit ? 24 : 0} overflow="visible" className="stage-needle">
            <path d="M-6 2h12L1.25 13V34.5h-2.5V13z" />
          </svg>
        )}
      </g>
      <g className="stage-down">
        <line y1={from} y2={exit && last ? '0%' : to} x1={SIDE} x2={SIDE} />
        {gone && <line className="stage-gone" y1={from} y2={gone} x1={SIDE} x2={SIDE} />}
        {exit ? (
          <>
            <line className="stage-branch" x1={SIDE} y1="0%" x2={SIDE + 16} y2="50%" />
            <line className="stage-branch" x1={SIDE + 16} y1="50%" x2={SIDE + 24} y2="50%" />
          </>
        ) : (
          <>
            {minorDown.map((at) => (
              <line
                key={at}
                className="scale-minor"
                y1={`${at}%`}
                y2={`${at}%`}
                x1={SIDE}
                x2={SIDE + 6}
              />
            ))}
            <line className="stage-tick" y1="50%" y2="50%" x1={SIDE} x2={SIDE + 15} />
          </>
        )}
        {needle && (
          <svg y="50%" x={exit ? 16 : 0} overflow="visible" className="stage-needle">
            <path d="M2 -6v12L13 1.25H30.5v-2.5H13z" />
          </svg>
        )}
      </g>
    </svg>
  );
}
