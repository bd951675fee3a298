import { parseResistance } from '@/domain/quantities/parse';
import { ReadingScale } from './ReadingScale';

export type ReadingWords = {
  from: string;
  /** Empty when one part was measured by itself. */
  to: string;
  position: string;
  typed: string;
  expected: string | null;
};

/** Ohms, OL, or null for a reading of something else. */
function ohmsOf(text: string): number | 'OL' | null {
  const read = parseResistance(text);
  if (!read.ok) return null;
  return read.kind === 'over-range' ? 'OL' : read.ohms;
}

export const betweenWords = ({ from, to }: Pick<ReadingWords, 'from' | 'to'>) =>
  to === '' ? from : `${from} – ${to}`;

/** A reading as a ruled line: between which points, switch, what was read; with its place on the scale when in ohms. */
export function NoteReading(reading: ReadingWords) {
  const { position, typed, expected } = reading;
  const between = betweenWords(reading);
  const measured = ohmsOf(typed);
  const predicted = expected === null ? null : ohmsOf(expected);
  return (
    <div className="note-reading">
      <span className="note-reading-where">{between}</span>
      <span className="note-reading-switch">{position}</span>
      <strong className="note-reading-value">{typed}</strong>
      <span className="note-reading-expected">
        {expected !== null && (
          <>
            <span>expected</span> {expected.replace(/ (?=\S+$)/, '\u00a0')}
          </>
        )}
      </span>
      {measured !== null && predicted !== null && (
        <span className="note-reading-scale">
          <ReadingScale
            measured={measured}
            predicted={predicted}
            text={typed}
            expectedText={expected ?? undefined}
            label={between}
            numberElsewhere
          />
        </span>
      )}
    </div>
  );
}
