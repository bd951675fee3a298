/** Lists as files for a spreadsheet (RFC 4180): every column named, lines ended by CRLF, UTF-8. */

export type CsvValue = string | number | boolean | Date | null | undefined;
export type CsvColumn<Row> = { name: string; value: (row: Row) => CsvValue };

/** What a spreadsheet would take for the start of a formula. */
const FORMULA = /^[=+\-@\t\r\n\uff0b\uff0d\uff1d\uff20]/u;

/**
 * One cell. Text that a spreadsheet would run as a formula gets an apostrophe before it; numbers stay numbers.
 * Dates are written as RFC 3339 in UTC.
 *
 * @throws {RangeError} when a number is not finite.
 */
export function csvCell(value: CsvValue): string {
  if (value == null) return '';
  if (typeof value === 'number') {
    if (!Number.isFinite(value))
      throw new RangeError(`Cell given as ${value}; a finite number is needed.`);
    return String(value);
  }
  if (typeof value === 'boolean') return value ? 'yes' : 'no';
  if (value instanceof Date) return value.toISOString();
  const safe = FORMULA.test(value) ? `'${value}` : value;
  return /[",\r\n]/.test(safe) || safe !== safe.trim() ? `"${safe.replaceAll('"', '""')}"` : safe;
}

const csvLine = (cells: readonly CsvValue[]): string => `${cells.map(csvCell).join(',')}\r\n`;

async function* linesOf<Row>(
  columns: readonly CsvColumn<Row>[],
  rows: Iterable<Row> | AsyncIterable<Row>,
): AsyncGenerator<string> {
  yield csvLine(columns.map((column) => column.name));
  for await (const row of rows) yield csvLine(columns.map((column) => column.value(row)));
}

/** True when the request asks for a list as CSV: `?format=csv`, or an `Accept` that names it first. */
export function wantsCsv(request: Request): boolean {
  const format = new URL(request.url).searchParams.get('format');
  if (format !== null) return format === 'csv';
  return /^\s*text\/csv\b/i.test(request.headers.get('accept') ?? '');
}

/**
 * The list as an answer, written row by row as it is read. A file asked for by `?format=csv` begins with a byte
 * order mark, without which spreadsheets misread Ω and µ; an answer to `Accept: text/csv` does not.
 *
 * @param name of the file, without its ending: `people`.
 */
export function csvResponse<Row>(
  request: Request,
  name: string,
  columns: readonly CsvColumn<Row>[],
  rows: Iterable<Row> | AsyncIterable<Row>,
): Response {
  const asFile = new URL(request.url).searchParams.get('format') === 'csv';
  const encoder = new TextEncoder();
  const lines = linesOf(columns, rows);
  let first = asFile;
  const body = new ReadableStream<Uint8Array>({
    async pull(controller) {
      if (first) controller.enqueue(new Uint8Array([0xef, 0xbb, 0xbf]));
      first = false;
      const next = await lines.next();
      if (next.done) controller.close();
      else controller.enqueue(encoder.encode(next.value));
    },
    async cancel() {
      await lines.return(undefined);
    },
  });
  return new Response(body, {
    headers: {
      'content-type': 'text/csv; charset=utf-8; header=present',
      'content-disposition': `attachment; filename="${name}.csv"`,
      vary: 'accept',
    },
  });
}
