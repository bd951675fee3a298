import { COARSE, FINE, looksHealthy, nodesFor } from './grid';
import { screen } from './screen';
import { setTrial } from './trial';
import { screened, weighed } from './weigh';
import type { Workshop } from './workshop';

/** Singles this far (ln) below the best are not worth the full covariance. */
const HOPELESS = 25;

/** ln likelihoods of the healthy network and of every single fault. */
export interface Singles {
  readonly healthy: number;
  /** By independent readings and cut as coarsely as pairs are for screening. */
  readonly coarse: Float64Array;
  /** By the full covariance, where it is worth it. */
  readonly joint: Float64Array;
  /** What each fault gains on the healthy network, both weighed in the same way. */
  readonly gain: Float64Array;
}

export function weighSingles(workshop: Workshop): Singles {
  const { scene, evidence, trial, joint } = workshop;
  const healthy = weighed(scene, evidence, trial, joint, -1, -1, FINE).logLikelihood;
  setTrial(scene, trial, -1, 0, -1, 0);
  const roughHealthy = screen(evidence, trial, 0, 0);
  // What no reading sees weighs what the healthy network weighs.
  const unseen = scene.modes.map((_, m) => {
    nodesFor(scene, evidence, trial, m, -1, FINE);
    return looksHealthy(evidence, trial);
  });
  const rough = Float64Array.from(scene.modes, (_, m) =>
    unseen[m] ? roughHealthy : screened(scene, evidence, trial, m, -1, FINE),
  );
  let best = roughHealthy;
  for (const value of rough) best = Math.max(best, value);
  const full = new Float64Array(rough.length);
  const gain = new Float64Array(rough.length);
  rough.forEach((value, m) => {
    const hopeless = value < best - HOPELESS;
    gain[m] = value - roughHealthy;
    full[m] = healthy + gain[m]!;
    if (hopeless || unseen[m]) return;
    full[m] = weighed(scene, evidence, trial, joint, m, -1, FINE).logLikelihood;
    gain[m] = full[m]! - healthy;
  });
  const coarse = rough.map((value, m) =>
    unseen[m] || value < best - HOPELESS ? value : screened(scene, evidence, trial, m, -1, COARSE),
  );
  return { healthy, coarse, joint: full, gain };
}
