/** Where a floor has board, as tables of quarter millimetres made once. */
import type { Floor } from './floors/floor';
import type { Point } from './geometry';

const PER_MM = 4;

/** Answers whether a point lies on the board and this far (mm) from its edge, straight up, down, left and right. */
export type Room = (x: number, y: number, margin?: number) => boolean;

type Table = { columns: number; rows: number; cells: Uint8Array };

/** Where a level line crosses the outline, from left to right. */
function crossings(outline: readonly Point[], y: number): number[] {
  const found: number[] = [];
  let before = outline[outline.length - 1];
  for (const corner of outline) {
    if (before && corner.y > y !== before.y > y)
      found.push(
        corner.x + ((before.x - corner.x) * (y - corner.y)) / (before.y - corner.y || 1e-9),
      );
    before = corner;
  }
  return found.sort((a, b) => a - b);
}

function boardTable({ width, height, outline }: Floor): Table {
  const columns = width * PER_MM + 1;
  const rows = height * PER_MM + 1;
  const cells = new Uint8Array(columns * rows);
  for (let row = 0; row < rows; row++) {
    const edges = crossings(outline, row / PER_MM);
    for (let i = 0; i + 1 < edges.length; i += 2) {
      const from = Math.max(0, Math.ceil((edges[i] ?? 0) * PER_MM));
      const to = Math.min(columns - 1, Math.floor((edges[i + 1] ?? 0) * PER_MM));
      cells.fill(1, row * columns + from, row * columns + to + 1);
    }
  }
  return { columns, rows, cells };
}

function onTable({ columns, rows, cells }: Table, x: number, y: number): boolean {
  const column = Math.round(x * PER_MM);
  const row = Math.round(y * PER_MM);
  if (column < 0 || row < 0 || column >= columns || row >= rows) return false;
  return cells[row * columns + column] === 1;
}

/** The table less what lies within the margin of an edge. */
function narrowed(table: Table, margin: number): Table {
  const { columns, rows } = table;
  const cells = new Uint8Array(columns * rows);
  for (let row = 0; row < rows; row++)
    for (let column = 0; column < columns; column++) {
      const [x, y] = [column / PER_MM, row / PER_MM];
      const inside =
        onTable(table, x - margin, y) &&
        onTable(table, x + margin, y) &&
        onTable(table, x, y - margin) &&
        onTable(table, x, y + margin);
      if (inside) cells[row * columns + column] = 1;
    }
  return { columns, rows, cells };
}

const rooms = new WeakMap<Floor, Room>();

export function roomOn(floor: Floor): Room {
  const known = rooms.get(floor);
  if (known) return known;
  const whole = boardTable(floor);
  const byMargin = new Map<number, Table>();
  const room: Room = (x, y, margin = 1) => {
    let table = byMargin.get(margin);
    if (!table) byMargin.set(margin, (table = narrowed(whole, margin)));
    return onTable(table, x, y);
  };
  rooms.set(floor, room);
  return room;
}
