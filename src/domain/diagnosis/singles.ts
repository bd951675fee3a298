import { FINE } from './grid';
import type { Weighed } from './weigh';
import { screened, weighed } from './weigh';
import type { Workshop } from './workshop';

/** Singles this far (ln) below the best are not worth the full covariance. */
const HOPELESS = 25;

/** Likelihoods of the healthy network and of every single fault, ln. */
export interface Singles {
  readonly healthy: Weighed;
  /** By independent readings, and by the full covariance. */
  readonly screened: Float64Array;
  readonly joint: Float64Array;
}

export function weighSingles(workshop: Workshop): Singles {
  const { scene, evidence, trial, joint } = workshop;
  const healthy = weighed(scene, evidence, trial, joint, -1, -1, FINE);
  const rough = scene.modes.map((_, m) => screened(scene, evidence, trial, m, -1, FINE));
  const best = Math.max(healthy.logLikelihood, ...rough);
  const full = rough.map((value, m) =>
    value < best - HOPELESS
      ? value
      : weighed(scene, evidence, trial, joint, m, -1, FINE).logLikelihood,
  );
  return { healthy, screened: Float64Array.from(rough), joint: Float64Array.from(full) };
}
