/** What a fault leaves to be seen of a part. */
import type { PartKind } from '@/domain/parts/kinds';
import type { Wear } from './bodies/brush';

/** Below this a part that should hold off has broken down, Ω. */
const BROKEN_DOWN = 100;

/** How a part with this fault looks: `OL` or what it reads (Ω). Leaky and slightly drifted parts show nothing. */
export function wearOf(kind: PartKind, ohms: number | 'OL'): Wear {
  const open = ohms === 'OL';
  switch (kind) {
    case 'ptc':
      return open ? 'burnt' : 'baked';
    case 'mov':
    case 'clamp':
      return !open && ohms < BROKEN_DOWN ? 'split' : 'good';
    case 'diode':
      return !open && ohms < BROKEN_DOWN ? 'cracked' : 'good';
    case 'resistor':
      return open ? 'cracked' : 'good';
    case 'shunt':
      return open ? 'cracked' : 'baked';
    case 'fuse':
      return 'blown';
    case 'contact':
    case 'trimmer':
      return 'dull';
    case 'inductor':
      return 'torn';
    default:
      return 'good';
  }
}
