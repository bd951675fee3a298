/** Where a floor has board, as a table of quarter millimetres made once. */
import { at } from './geometry';
import { onBoard, type Floor } from './floors';

const PER_MM = 4;

/** Answers whether a point lies on the board and this far (mm) from its edge, straight up, down, left and right. */
export type Room = (x: number, y: number, margin?: number) => boolean;

const tables = new WeakMap<Floor, Room>();

export function roomOn(floor: Floor): Room {
  const known = tables.get(floor);
  if (known) return known;
  const columns = floor.width * PER_MM + 1;
  const rows = floor.height * PER_MM + 1;
  const table = new Uint8Array(columns * rows);
  for (let row = 0; row < rows; row++)
    for (let column = 0; column < columns; column++)
      if (onBoard(floor, at(column / PER_MM, row / PER_MM))) table[row * columns + column] = 1;
  const on = (x: number, y: number): boolean => {
    const column = Math.round(x * PER_MM);
    const row = Math.round(y * PER_MM);
    if (column < 0 || row < 0 || column >= columns || row >= rows) return false;
    return table[row * columns + column] === 1;
  };
  const room: Room = (x, y, margin = 1) =>
    on(x - margin, y) && on(x + margin, y) && on(x, y - margin) && on(x, y + margin);
  tables.set(floor, room);
  return room;
}
