import type { Observation } from './meter';
import type { Scene } from './scene';
import { toleranceBounds } from './tolerance-bound';

/** The readings beside the base solution of their aims, flat: what the inner loops run over. */
export interface Evidence {
  readonly count: number;
  /** Order in which readings are weighed: values first, the sharpest first, OL last. */
  readonly order: Int32Array;
  readonly over: Uint8Array;
  /** See {@link Observation}. */
  readonly y: Float64Array;
  readonly floor: Float64Array;
  readonly variance: Float64Array;
  readonly deviation: Float64Array;
  readonly misprobe: Float64Array;
  readonly logMisprobe: Float64Array;
  /** Of each reading's aim: its setting, healthy resistance, and transfers to every part, row by row. */
  readonly setting: Int32Array;
  readonly ohms: Float64Array;
  readonly toPart: Float64Array;
  /** ln(R + floor) of the healthy network. */
  readonly healthy: Float64Array;
  /** Variance bounds of {@link toleranceBounds}. */
  readonly bounds: Float64Array;
}

export function evidenceOf(scene: Scene, observations: readonly Observation[]): Evidence {
  const row = scene.parts + 1;
  const numbers = (of: (o: Observation, r: number) => number): Float64Array =>
    Float64Array.from(observations, of);
  const toPart = new Float64Array(observations.length * row);
  scene.aims.forEach((aim, r) => toPart.set(aim.toPart, r * row));
  const rank = (o: Observation): number => (o.over ? 1e6 : o.variance);
  const order = [...observations.keys()];
  order.sort((a, b) => rank(observations[a]!) - rank(observations[b]!));
  return {
    count: observations.length,
    order: Int32Array.from(order),
    over: Uint8Array.from(observations, (o) => (o.over ? 1 : 0)),
    y: numbers((o) => o.y),
    floor: numbers((o) => o.floor),
    variance: numbers((o) => o.variance),
    deviation: numbers((o) => Math.sqrt(o.variance)),
    misprobe: numbers((o) => o.misprobe),
    logMisprobe: numbers((o) => Math.log(o.misprobe)),
    setting: Int32Array.from(scene.aims, (aim) => aim.setting),
    ohms: Float64Array.from(scene.aims, (aim) => aim.ohms),
    toPart,
    healthy: numbers((o, r) => Math.log(scene.aims[r]!.ohms + o.floor)),
    bounds: toleranceBounds(scene),
  };
}
