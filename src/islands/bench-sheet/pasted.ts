/** Readings pasted from a spreadsheet: lines of from, to, switch, reading. */
import { parseResistance } from '@/domain/quantities/parse';
import { EMPTY, type Cells } from './rows';

export type Pasted =
  /** Plain text for the cell it was pasted into. */
  | { kind: 'cell'; text: string }
  /** One column of values, for the cells from here down. */
  | { kind: 'column'; values: string[] }
  /** `lines` are the numbers of the rows' lines in the text. */
  | { kind: 'rows'; rows: Cells[]; lines: number[] };

/** Cells of one line longer than this are cut: no name and no reading is. */
const LONGEST = 40;

/**
 * Reads what a spreadsheet puts on the clipboard (tabs), or a CSV text (semicolons, or commas). A line is
 * `from, to, switch, reading`, `from, to, switch, lifted, reading`, `from, to, reading` or `part, reading`; a line of
 * headings is left out. Quoted cells may hold separators and line ends.
 */
export function readPasted(text: string): Pasted {
  const separator = text.includes('\t') ? '\t' : text.includes(';') ? ';' : ',';
  const numbered = split(text, separator)
    .map((line, i) => ({ line, number: i + 1 }))
    .filter(({ line }) => line.some((cell) => cell !== ''));
  const grid = numbered.map(({ line }) => line);
  const width = Math.max(0, ...grid.map((line) => line.length));
  const [only] = grid;
  const sentence = separator !== '\t' && !isReading(only?.at(-1) ?? '');
  if (grid.length <= 1 && (width <= 1 || isReading(text.trim()) || sentence))
    return { kind: 'cell', text: text.trim().slice(0, LONGEST) };
  const lone = width <= 1 || (separator === ',' && grid.every((line) => isReading(line.join(','))));
  if (lone) return { kind: 'column', values: grid.map((line) => line.join(separator)) };
  const rows = numbered.filter(({ line }) => !isHeading(line));
  return {
    kind: 'rows',
    rows: rows.map(({ line }) => cellsFrom(line)),
    lines: rows.map(({ number }) => number),
  };
}

const isReading = (text: string) => {
  const read = parseResistance(text);
  return read.ok || (read.could?.length ?? 0) > 0;
};

/** A first line such as `From, To, Switch, Reading`: its last cell is no reading but a word. */
function isHeading(line: readonly string[]): boolean {
  const last = line.at(-1) ?? '';
  return (
    /^(reading|value|ohms?|resistance|measured)\b/i.test(last) &&
    /^(from|part|point)/i.test(line[0] ?? '')
  );
}

function cellsFrom(line: readonly string[]): Cells {
  const [a = '', b = '', c = '', d = '', e = ''] = line;
  switch (line.length) {
    case 1:
      return { ...EMPTY, from: a };
    case 2:
      return { ...EMPTY, from: a, typed: b };
    case 3:
      return { ...EMPTY, from: a, to: b, typed: c };
    case 4:
      return { ...EMPTY, from: a, to: b, position: c, typed: d };
    default:
      return { from: a, to: b, position: c, lifted: d, typed: e };
  }
}

/** Lines and cells by RFC 4180, with any separator. */
function split(text: string, separator: string): string[][] {
  const lines: string[][] = [[]];
  let cell = '';
  let quoted = false;
  const close = () => {
    lines.at(-1)?.push(cell.trim().slice(0, LONGEST));
    cell = '';
  };
  const normal = text.replace(/\r\n?/g, '\n');
  for (let at = 0; at < normal.length; at += 1) {
    const char = normal.charAt(at);
    if (quoted && char === '"' && normal.charAt(at + 1) === '"') {
      cell += '"';
      at += 1;
    } else if (char === '"' && (quoted || cell.trim() === '')) quoted = !quoted;
    else if (!quoted && char === separator) close();
    else if (!quoted && char === '\n') {
      close();
      lines.push([]);
    } else cell += char;
  }
  close();
  return lines;
}
