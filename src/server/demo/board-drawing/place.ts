/**
 * Places the parts of a board: those that share a net come near each other, so protection comes to lie at the jacks. A
 * cooling search on a grid of 1.27 mm; the same board is placed the same way every time.
 */
import type { Chance } from '../chance';
import { at, turned, type Box } from './geometry';
import { goesThrough } from './footprint';
import type { Floor } from './floors/floor';
import { forbidden } from './forbidden';
import { roomOn, type Room } from './room';
import type { Part } from './types';

const GRID = 1.27;
const ROUNDS = 22_000;
const GAP = 0.6;

const snapped = (value: number) => Math.round(value / GRID) * GRID;

/** A part as the search moves it. */
type Piece = {
  x: number;
  y: number;
  /** Quarter turns. */
  quarter: number;
  fixed: boolean;
  through: boolean;
  front: boolean;
  look: string;
  /** Half of its room, lying and standing. */
  half: readonly [number, number];
  /** Nets by number, and where their pads are in each of the four turns. */
  pads: { net: number; x: number[]; y: number[] }[];
  nets: number[];
  shut: Box[];
  /** Cost of a millimetre away from the jacks: protection belongs there, other things do not. */
  pull: number;
};

function pieceOf(part: Part, floor: Floor, numbers: Map<string, number>): Piece {
  const named = part.pads.filter((pad) => pad.net !== null);
  const pads = named.map((pad) => {
    const spots = [0, 90, 180, 270].map((degrees) => turned(at(pad.x, pad.y), degrees));
    return {
      net: numbers.get(pad.net ?? '') ?? 0,
      x: spots.map((p) => p.x),
      y: spots.map((p) => p.y),
    };
  });
  return {
    x: part.at.x,
    y: part.at.y,
    quarter: part.turn / 90,
    fixed: part.fixed,
    through: goesThrough(part),
    front: part.side === 'front',
    look: part.body.look,
    half: [part.width / 2, part.height / 2],
    pads,
    nets: [...new Set(pads.map((pad) => pad.net))],
    shut: forbidden(floor, part),
    pull: part.protection ? 1 : part.aside ? -0.5 : 0,
  };
}

/** Half the girth of each net, weighed. */
function netLength(pieces: readonly Piece[], members: readonly number[], net: number): number {
  let [x0, y0, x1, y1] = [Infinity, Infinity, -Infinity, -Infinity];
  for (const i of members) {
    const piece = pieces[i];
    if (!piece) continue;
    for (const pad of piece.pads) {
      if (pad.net !== net) continue;
      const x = piece.x + (pad.x[piece.quarter] ?? 0);
      const y = piece.y + (pad.y[piece.quarter] ?? 0);
      if (x < x0) x0 = x;
      if (x > x1) x1 = x;
      if (y < y0) y0 = y;
      if (y > y1) y1 = y;
    }
  }
  return x1 < x0 ? 0 : x1 - x0 + (y1 - y0);
}

function crowding(pieces: readonly Piece[], index: number, room: Room): number {
  const piece = pieces[index];
  if (!piece) return 0;
  const { x, y } = piece;
  const lying = piece.quarter % 2;
  const [w, h] = [piece.half[lying] ?? 0, piece.half[1 - lying] ?? 0];
  let sum = piece.pull * x;
  // A notch may lie between the corners of a long part.
  const [across, down] = [w > 6 ? 0.4 : 1, h > 6 ? 0.4 : 1];
  for (let i = -1; i <= 1.01; i += across)
    for (let j = -1; j <= 1.01; j += down) if (!room(x + i * w, y + j * h)) sum += 60;
  for (const shut of piece.shut) {
    const sharedX = Math.min(x + w, shut.x1) - Math.max(x - w, shut.x0);
    const sharedY = Math.min(y + h, shut.y1) - Math.max(y - h, shut.y0);
    if (sharedX > 0 && sharedY > 0) sum += sharedX * sharedY * 6;
  }
  for (let i = 0; i < pieces.length; i++) {
    const other = pieces[i];
    if (!other || i === index) continue;
    const [dx, dy] = [Math.abs(x - other.x), Math.abs(y - other.y)];
    if (dx + dy > 70) continue;
    const standing = other.quarter % 2;
    const sharedX = w + (other.half[standing] ?? 0) + GAP - dx;
    const sharedY = h + (other.half[1 - standing] ?? 0) + GAP - dy;
    const meet = piece.front === other.front || (piece.through && other.through);
    if (meet && sharedX > 0 && sharedY > 0)
      sum += 30 + Math.min(sharedX, 40) * Math.min(sharedY, 40) * 6;
    // Rows and columns please the eye, and the person who solders.
    if (lying === standing && piece.look === other.look && dx + dy < 20 && (dx < 0.1 || dy < 0.1))
      sum -= 5;
  }
  return sum;
}

/** The parts with their places; fixed ones stay. */
export function placed(parts: readonly Part[], floor: Floor, chance: Chance): Part[] {
  const names = [...new Set(parts.flatMap((p) => p.pads.flatMap((pad) => pad.net ?? [])))];
  const numbers = new Map(names.map((name, i) => [name, i]));
  const pieces = parts.map((part) => pieceOf(part, floor, numbers));
  const members = names.map((_, net) =>
    pieces.flatMap((p, i) => (p.nets.includes(net) ? [i] : [])),
  );
  const weights = names.map((name) => (name === floor.ground ? 0.15 : 1));
  const room = roomOn(floor);
  const free = pieces.filter((piece) => !piece.fixed);
  for (const piece of free) {
    piece.x = snapped(chance.between(20, floor.width - 20));
    piece.y = snapped(chance.between(10, floor.height - 10));
  }
  const cost = (index: number): number => {
    let sum = crowding(pieces, index, room);
    for (const net of pieces[index]?.nets ?? [])
      sum += netLength(pieces, members[net] ?? [], net) * (weights[net] ?? 1);
    return sum;
  };
  for (let round = 0; round < ROUNDS && free.length > 0; round++) {
    const heat = (1 - round / ROUNDS) ** 2;
    const piece = chance.pick(free);
    const index = pieces.indexOf(piece);
    const { x, y, quarter } = piece;
    const before = cost(index);
    const roll = chance.next();
    const reach = 2.6 + heat * 40;
    if (roll < 0.22) piece.quarter = (quarter + 1 + Math.floor(chance.next() * 3)) % 4;
    else if (roll < 0.3) {
      piece.x = snapped(chance.between(4, floor.width - 4));
      piece.y = snapped(chance.between(4, floor.height - 4));
    } else {
      piece.x = snapped(x + chance.between(-reach, reach));
      piece.y = snapped(y + chance.between(-reach, reach));
    }
    const rise = cost(index) - before;
    if (rise > 0 && chance.next() >= Math.exp(-rise / (0.05 + heat * 40)))
      Object.assign(piece, { x, y, quarter });
  }
  return parts.map((part, i) => {
    const piece = pieces[i];
    return piece && !part.fixed
      ? { ...part, at: at(piece.x, piece.y), turn: piece.quarter * 90 }
      : part;
  });
}
