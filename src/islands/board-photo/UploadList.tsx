import { FULL, linearGraduations } from '../shared/scale-geometry';
import { Graduations, Needle, Scale } from '../shared/ScaleParts';
import type { UploadRow } from './upload-queue';

const MARKS = linearGraduations(10, 10);

const WORDS: Readonly<Record<UploadRow['state'], string>> = {
  waiting: 'Waits for its turn',
  sending: 'Being sent',
  checking: 'Sent; being checked and made ready',
  failed: 'Not sent',
  refused: 'Not taken',
};

/** How far one file is, as a needle with its number. */
function Progress({ row }: { row: UploadRow }) {
  const percent = Math.round(row.share * 100);
  return (
    <Scale
      name={`${row.name}: ${percent} % sent`}
      number={`${percent} %`}
      tone="copper"
      size="short"
    >
      <Graduations marks={MARKS} span={FULL} />
      <Needle at={percent} tone="copper" />
    </Scale>
  );
}

/** The files on their way and those that did not make it, each with what can be done about it. */
export function UploadList({
  rows,
  onRetry,
  onRemove,
}: {
  rows: readonly UploadRow[];
  onRetry: (id: number) => void;
  onRemove: (id: number) => void;
}) {
  const settled = rows.filter(({ state }) => state === 'failed' || state === 'refused');
  return (
    <>
      <ul className="photo-uploads">
        {rows.map((row) => {
          const over = row.state === 'failed' || row.state === 'refused';
          return (
            <li key={row.id}>
              <p className="photo-upload-name mono">{row.name}</p>
              {over ? (
                <p className="field-error">
                  {WORDS[row.state]}: {row.sentence}
                </p>
              ) : (
                <p className="photo-upload-state">
                  {row.state === 'waiting' ? null : <Progress row={row} />}
                  <span className="remark">{WORDS[row.state]}</span>
                </p>
              )}
              <div className="button-row">
                {row.state === 'failed' && (
                  <button
                    className="button button-small"
                    type="button"
                    onClick={() => onRetry(row.id)}
                  >
                    Try again<span className="sr-only">: {row.name}</span>
                  </button>
                )}
                <button
                  className="button button-small"
                  type="button"
                  onClick={() => onRemove(row.id)}
                >
                  {over ? 'Clear' : 'Cancel'}
                  <span className="sr-only">: {row.name}</span>
                </button>
              </div>
            </li>
          );
        })}
      </ul>
      <p className="sr-only" role="status">
        {settled.map(({ name, sentence }) => `${name}: ${sentence}`).join(' ')}
      </p>
    </>
  );
}
