import { FINE } from './grid';
import { screen } from './screen';
import { setTrial } from './trial';
import { screened, weighed } from './weigh';
import type { Workshop } from './workshop';

/** Singles this far (ln) below the best are not worth the full covariance. */
const HOPELESS = 25;

/** ln likelihoods of the healthy network and of every single fault. */
export interface Singles {
  readonly healthy: number;
  /** By independent readings, and by the full covariance where it is worth it. */
  readonly screened: Float64Array;
  readonly joint: Float64Array;
  /** What each fault gains on the healthy network, both weighed in the same way. */
  readonly gain: Float64Array;
}

export function weighSingles(workshop: Workshop): Singles {
  const { scene, evidence, trial, joint } = workshop;
  const healthy = weighed(scene, evidence, trial, joint, -1, -1, FINE).logLikelihood;
  setTrial(scene, trial, -1, 0, -1, 0);
  const roughHealthy = screen(evidence, trial, 0, 0);
  const rough = Float64Array.from(scene.modes, (_, m) =>
    screened(scene, evidence, trial, m, -1, FINE),
  );
  let best = roughHealthy;
  for (const value of rough) best = Math.max(best, value);
  const full = new Float64Array(rough.length);
  const gain = new Float64Array(rough.length);
  rough.forEach((value, m) => {
    // Far off, or seen by no reading at all: screening says all there is.
    const hopeless = value < best - HOPELESS || value === roughHealthy;
    gain[m] = value - roughHealthy;
    full[m] = healthy + gain[m]!;
    if (hopeless) return;
    full[m] = weighed(scene, evidence, trial, joint, m, -1, FINE).logLikelihood;
    gain[m] = full[m]! - healthy;
  });
  return { healthy, screened: rough, joint: full, gain };
}
