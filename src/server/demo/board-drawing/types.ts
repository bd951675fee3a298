/** What a drawn board is made of. Lengths in millimetres, seen from the front, y down. */
import type { PartKind } from '@/domain/parts/kinds';
import type { Point, Side } from './geometry';

/** How a part looks from above; sizes along and across its own axis. */
export type Body =
  | { look: 'disc'; diameter: number; thick: number; colour: string; print: string[]; ink: string }
  | { look: 'fuse'; length: number; diameter: number; glass: boolean; print: string }
  | {
      look: 'axial';
      length: number;
      diameter: number;
      colour: string;
      bands: string[];
      print: string;
      ink: string;
      waist: boolean;
      ends: 'none' | 'caps' | 'ring';
    }
  | { look: 'chip-resistor'; length: number; width: number; code: string }
  | { look: 'chip-capacitor'; length: number; width: number; colour: string }
  | { look: 'melf'; length: number; diameter: number; colour: string; bands: string[] }
  | { look: 'sot23'; code: string }
  | {
      look: 'legged';
      width: number;
      height: number;
      legs: number;
      fourSides: boolean;
      print: string[];
    }
  | { look: 'blob'; diameter: number }
  | { look: 'can'; diameter: number; tall: number; sleeve: string; print: string[] }
  | {
      look: 'box';
      width: number;
      height: number;
      tall: number;
      colour: string;
      ink: string;
      print: string[];
    }
  | { look: 'crystal'; length: number; width: number; print: string }
  | { look: 'buzzer'; diameter: number }
  | { look: 'header'; pins: number }
  | { look: 'loop'; span: number; wire: number }
  | { look: 'bead'; diameter: number }
  | { look: 'trimmer'; size: number }
  | { look: 'heatsink'; width: number; height: number }
  | { look: 'winding'; width: number; height: number }
  | { look: 'wires'; colours: string[]; spacing: number; reach: number }
  | { look: 'jack'; diameter: number }
  | { look: 'arcs' };

export type Pad = {
  /** From the part's middle, before it is turned. */
  x: number;
  y: number;
  net: string | null;
  width: number;
  height: number;
  round: boolean;
  /** Diameter of the hole; 0 for a pad on the surface. */
  drill: number;
};

export type Part = {
  ref: string;
  kind: PartKind | null;
  body: Body;
  pads: Pad[];
  /** Room it takes, before it is turned. */
  width: number;
  height: number;
  /** How far it stands up. */
  tall: number;
  side: Side;
  at: Point;
  turn: number;
  /** Fixed parts are not moved by the placing. */
  fixed: boolean;
  protection: boolean;
  /** Belongs to the quiet half, away from the jacks. */
  aside: boolean;
  /** Beside the reference in the silk-screen. */
  remark: string;
};

export type Layer = 0 | 1;
export const layerOf = (side: Side): Layer => (side === 'front' ? 0 : 1);

export type Track = { net: string; layer: Layer; width: number; points: Point[] };
export type Via = { net: string; at: Point };

export type Mask = {
  /** Where there is no copper below, where there is, and the cut edge. */
  bare: string;
  copper: string;
  edge: string;
  silk: string;
};
