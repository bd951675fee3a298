/** ln of √(2π). */
export const LOG_ROOT_TAU = 0.9189385332046727;

/**
 * Standard normal distribution function. Relative error below 2e-7 (rational Chebyshev fit of erfc,
 * Press et al., Numerical Recipes, section 6.2).
 */
export function normalCdf(x: number): number {
  if (x > 8) return 1;
  if (x < -38) return 0;
  const z = Math.abs(x) * Math.SQRT1_2;
  const t = 2 / (2 + z);
  const fit =
    -1.26551223 +
    t *
      (1.00002368 +
        t *
          (0.37409196 +
            t *
              (0.09678418 +
                t *
                  (-0.18628806 +
                    t *
                      (0.27886807 +
                        t *
                          (-1.13520398 +
                            t * (1.48851587 + t * (-0.82215223 + t * 0.17087277))))))));
  const half = 0.5 * t * Math.exp(-z * z + fit);
  return x < 0 ? half : 1 - half;
}
