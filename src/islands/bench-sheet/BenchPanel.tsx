/** The bench of a ticket: its readings, and beside them what they say of the parts. */
import { formatOhms } from '@/domain/quantities/format';
import type { BenchPanelProps } from './panel-props';
import { SuspectsPanel } from './SuspectsPanel';

export function BenchPanel({ parts, readings, suspects }: BenchPanelProps) {
  const expected = new Map(suspects.asFound.expected.map((e) => [e.reading, e.ohms]));
  const rows = readings.filter((r) => r.phase === 'as-found');
  const written = (ohms: number | 'OL' | undefined) =>
    ohms === undefined ? '' : ohms === 'OL' ? 'OL' : formatOhms(Number(ohms.toPrecision(3)));
  return (
    <div className="columns">
      <section className="sheet" aria-label="Bench sheet">
        <div className="sheet-head">
          <h2>Bench sheet</h2>
          <p className="remark">as found</p>
        </div>
        <table className="table-dense">
          <thead>
            <tr>
              <th>From</th>
              <th>To</th>
              <th>Switch</th>
              <th className="num">Reading</th>
              <th className="num">Expected</th>
            </tr>
          </thead>
          <tbody>
            {rows.map((r) => (
              <tr key={r.id}>
                <td className="mono">{r.part ?? r.from}</td>
                <td className="mono">{r.to}</td>
                <td className="mono">{r.position}</td>
                <td className="num">{r.typed}</td>
                <td className="num">{written(expected.get(r.id))}</td>
              </tr>
            ))}
          </tbody>
        </table>
      </section>
      <SuspectsPanel suspects={suspects.asFound} parts={parts} />
    </div>
  );
}
