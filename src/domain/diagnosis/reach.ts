import type { Scene } from './scene';

/** For each single fault, the readings that can notice it: 60 readings in two words of 30 bits. */
export interface Reach {
  readonly first: Int32Array;
  readonly second: Int32Array;
  /** 1 for a bridged contact that acts in some reading: it may join what was apart, so nothing is ruled out. */
  readonly bridging: Uint8Array;
}

export function reachOf(scene: Scene): Reach {
  const count = scene.modes.length;
  const reach = {
    first: new Int32Array(count),
    second: new Int32Array(count),
    bridging: new Uint8Array(count),
  };
  scene.modes.forEach(({ part, mode }, index) => {
    const contact = scene.network.parts[part]!.kind === 'contact';
    const bridges = contact && (mode === 'short' || mode === 'leaky');
    scene.aims.forEach((aim, r) => {
      if (scene.settings[aim.setting]!.acts[index] === 0) return;
      if (bridges) reach.bridging[index] = 1;
      else if (aim.touches[part] === 1) {
        if (r < 30) reach.first[index]! |= 1 << r;
        else reach.second[index]! |= 1 << (r - 30);
      }
    });
  });
  return reach;
}

/** True when no reading depends on both faults: their likelihoods then multiply. */
export function apart(reach: Reach, j: number, k: number): boolean {
  if (reach.bridging[j] === 1 || reach.bridging[k] === 1) return false;
  return (reach.first[j]! & reach.first[k]!) === 0 && (reach.second[j]! & reach.second[k]!) === 0;
}
