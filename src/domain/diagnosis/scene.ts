import { circuitAt, conductsAt, faultActs, netNumbers } from '@/domain/network/circuit';
import { blocks } from '@/domain/network/connectivity';
import type { Prepared } from '@/domain/network/drive';
import { healthyOhms, healthySpread, OPEN_CONTACT_SIEMENS } from '@/domain/network/healthy';
import type { EdgeTransfers } from '@/domain/network/transfer';
import { edgeTransfers, pairTransfer } from '@/domain/network/transfer';
import type { Network, Probe } from '@/domain/network/types';
import type { PartMode } from './modes';

/** One switch position with its lifted leads, solved once. Arrays have one more entry: a part that is none. */
export interface Setting {
  readonly position: string | undefined;
  readonly lifted: readonly string[];
  readonly base: EdgeTransfers;
  /** Healthy conductance, S. */
  readonly siemens: Float64Array;
  readonly ohms: Float64Array;
  readonly away: Float64Array;
  /** Transfer resistances between parts, Ω, row by row, rows of parts + 1. */
  readonly between: Float64Array;
  /** Per part mode: 1 where the fault changes the part here. */
  readonly acts: Uint8Array;
  /** Block of each part's edge without the leaks of open contacts, −1 where it does not conduct. */
  readonly block: Int32Array;
}

/** Where two leads stand in a setting. */
export interface Aim {
  readonly setting: number;
  readonly a: number;
  readonly b: number;
  /** Healthy resistance, Ω; Infinity when nothing joins the nets. */
  readonly ohms: number;
  /** Transfer resistance to each part, Ω, and 0 for the part that is none. */
  readonly toPart: Float64Array;
  /** 1 for parts of the blocks between the leads: no other can change what is read, bridged contacts apart. */
  readonly touches: Uint8Array;
  /** Those parts' indices. */
  readonly touched: Int32Array;
}

/** The network solved at every setting of the readings: everything that no hypothesis changes. */
export interface Scene {
  readonly network: Network;
  readonly parts: number;
  readonly modes: readonly PartMode[];
  readonly numbers: ReadonlyMap<string, number>;
  /** Healthy resistance, Ω, and standard deviation of its logarithm, per part. */
  readonly nominal: Float64Array;
  readonly spread: Float64Array;
  /** All part indices. */
  readonly all: Int32Array;
  readonly settings: Setting[];
  readonly aims: readonly Aim[];
}

/** Conductance of a part in a mode at this ln Ω, S. */
export function siemensIn(setting: Setting, part: number, mode: number, lnOhms: number): number {
  return setting.acts[mode] === 1 ? Math.exp(-lnOhms) : setting.siemens[part]!;
}

/**
 * Solves the network at every setting of the probes.
 * @throws RangeError when a probe names a net that is not in the network.
 */
export function sceneOf(
  network: Network,
  modes: readonly PartMode[],
  probes: readonly Probe[],
): Scene {
  const numbers = netNumbers(network);
  const settings: Setting[] = [];
  const aims = probes.map((probe) => {
    const index = settingIndex(network, modes, settings, probe);
    const [a, b] = [probe.from, probe.to].map((net) => {
      const number = numbers.get(net);
      if (number === undefined)
        throw new RangeError(`net ${net} given, a net of the network is needed`);
      return number;
    }) as [number, number];
    return aimAt(settings[index]!, index, a, b);
  });
  const nominal = Float64Array.from(network.parts, healthyOhms);
  const spread = Float64Array.from(network.parts, healthySpread);
  const parts = network.parts.length;
  const all = Int32Array.from(network.parts.keys());
  return { network, parts, all, modes, numbers, nominal, spread, settings, aims };
}

/** Finds or solves the setting of a probe. */
export function settingIndex(
  network: Network,
  modes: readonly PartMode[],
  settings: Setting[],
  probe: Pick<Probe, 'position' | 'lifted'>,
): number {
  const position = probe.position ?? network.positions[0];
  const lifted = [...new Set(probe.lifted ?? [])].sort();
  const known = settings.findIndex(
    (s) => s.position === position && s.lifted.join('\n') === lifted.join('\n'),
  );
  if (known >= 0) return known;
  const similar = settings[0]?.base.prepared;
  return settings.push(solveSetting(network, modes, position, lifted, similar)) - 1;
}

function padded(values: ArrayLike<number>, extra: number): Float64Array {
  const out = new Float64Array(values.length + 1);
  out.set(values);
  out[values.length] = extra;
  return out;
}

function solveSetting(
  network: Network,
  modes: readonly PartMode[],
  position: string | undefined,
  lifted: readonly string[],
  similar: Prepared | undefined,
): Setting {
  const exact = circuitAt(network, position, lifted);
  const conducts = network.parts.map((part) => conductsAt(part, position));
  const isLifted = network.parts.map((part) => lifted.includes(part.ref));
  // An open contact leaks a little here, so that a bridged one has a base solution to start from.
  const edges = exact.edges.map((edge, index) =>
    conducts[index] || isLifted[index] ? edge : { ...edge, siemens: OPEN_CONTACT_SIEMENS },
  );
  const base = edgeTransfers({ nets: exact.nets, edges }, similar);
  const count = edges.length;
  const between = new Float64Array((count + 1) * (count + 1));
  for (let k = 0; k < count; k++)
    between.set(base.between.subarray(k * count, (k + 1) * count), k * (count + 1));
  return {
    position,
    lifted,
    base,
    siemens: padded(
      edges.map((edge) => edge.siemens),
      0,
    ),
    ohms: padded(base.ohms, 0),
    away: padded(base.away, 1),
    between,
    acts: Uint8Array.from(modes, ({ part, mode }) =>
      !isLifted[part] && faultActs(network.parts[part]!, conducts[part]!, mode) ? 1 : 0,
    ),
    block: blocks(exact),
  };
}

/** Drives the nets once in a setting. */
export function aimAt(setting: Setting, index: number, a: number, b: number): Aim {
  const { prepared } = setting.base;
  const pair = pairTransfer(prepared, a, b);
  const touches = new Uint8Array(pair.toEdge.length + 1);
  const touched = new Set<number>();
  // A block is between the leads when a current driven through them flows in it.
  setting.block.forEach((number, k) => {
    if (number >= 0 && Math.abs(pair.toEdge[k]!) * setting.siemens[k]! > 1e-9) touched.add(number);
  });
  const live = [...setting.block.keys()].filter((k) => touched.has(setting.block[k]!));
  for (const k of live) touches[k] = 1;
  const toPart = padded(pair.toEdge, 0);
  return { setting: index, a, b, ohms: pair.ohms, toPart, touches, touched: Int32Array.from(live) };
}
