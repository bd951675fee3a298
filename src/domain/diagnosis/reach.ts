import { blocks } from '@/domain/network/connectivity';
import { drive, prepare } from '@/domain/network/drive';
import type { Aim, Scene, Setting } from './scene';

/**
 * For each single fault, the readings that can notice it: 60 readings in two words of 30 bits. A bridged
 * contact makes a circuit of its own, in which other parts may matter: it has its own reach for every part.
 */
export interface Reach {
  readonly first: Int32Array;
  readonly second: Int32Array;
  /** Per mode: 1 for a bridged contact that acts in some reading. */
  readonly bridging: Uint8Array;
  /** Per bridging mode, reach of every part beside it: two words per part. */
  readonly beside: ReadonlyMap<number, Int32Array>;
}

const FLOWS = 1e-9;

export function reachOf(scene: Scene): Reach {
  const count = scene.modes.length;
  const first = new Int32Array(count);
  const second = new Int32Array(count);
  const bridging = new Uint8Array(count);
  const beside = new Map<number, Int32Array>();
  const known = new Map<number, Int32Array>();
  scene.modes.forEach(({ part, bridges }, m) => {
    if (bridges) {
      const words = known.get(part) ?? besideBridge(scene, part, m);
      known.set(part, words);
      first[m] = words[2 * part]!;
      second[m] = words[2 * part + 1]!;
      bridging[m] = 1;
      beside.set(m, words);
      return;
    }
    scene.aims.forEach((aim, r) => {
      const acts = scene.settings[aim.setting]!.acts[m] === 1;
      if (!acts || aim.touches[part] === 0) return;
      if (r < 30) first[m]! |= 1 << r;
      else second[m]! |= 1 << (r - 30);
    });
  });
  return { first, second, bridging, beside };
}

/** The reach of every part where this contact is bridged. */
function besideBridge(scene: Scene, contact: number, mode: number): Int32Array {
  const words = new Int32Array(2 * scene.parts);
  const touched = scene.settings.map((setting) =>
    setting.acts[mode] === 1 ? bridgedTouch(setting, contact) : undefined,
  );
  scene.aims.forEach((aim, r) => {
    const touch = touched[aim.setting];
    if (touch === undefined) return;
    touch(aim).forEach((on, part) => {
      if (on) words[2 * part + (r < 30 ? 0 : 1)]! |= 1 << (r < 30 ? r : r - 30);
    });
  });
  return words;
}

function bridgedTouch(setting: Setting, contact: number): (aim: Aim) => boolean[] {
  const { circuit } = setting.base.prepared;
  const edges = circuit.edges.map((edge, k) => {
    if (k === contact) return { ...edge, siemens: 1 };
    // Open contacts leak in the base solution only.
    return setting.block[k]! < 0 ? { ...edge, siemens: 0 } : edge;
  });
  const bridged = { nets: circuit.nets, edges };
  const block = blocks(bridged);
  const prepared = prepare(bridged, setting.base.prepared);
  return ({ a, b }) => {
    const { volts } = drive(prepared, a, b);
    const live = new Set<number>();
    edges.forEach((edge, k) => {
      const flow = Math.abs(volts[edge.a]! - volts[edge.b]!) * edge.siemens;
      if (block[k]! >= 0 && flow > FLOWS) live.add(block[k]!);
    });
    return [...block].map((number) => number >= 0 && live.has(number));
  };
}

/** The readings that depend on both faults, first and second word written to `both`. */
export function reachBoth(
  scene: Scene,
  reach: Reach,
  j: number,
  k: number,
  both: Int32Array,
): void {
  if (reach.bridging[j] === 1 && reach.bridging[k] === 1) {
    both[0] = both[1] = -1;
    return;
  }
  let [ofJ0, ofJ1] = [reach.first[j]!, reach.second[j]!];
  let [ofK0, ofK1] = [reach.first[k]!, reach.second[k]!];
  const besideJ = reach.beside.get(j);
  const besideK = reach.beside.get(k);
  if (besideK !== undefined) {
    ofJ0 = besideK[2 * scene.modes[j]!.part]!;
    ofJ1 = besideK[2 * scene.modes[j]!.part + 1]!;
  } else if (besideJ !== undefined) {
    ofK0 = besideJ[2 * scene.modes[k]!.part]!;
    ofK1 = besideJ[2 * scene.modes[k]!.part + 1]!;
  }
  both[0] = ofJ0 & ofK0;
  both[1] = ofJ1 & ofK1;
}
