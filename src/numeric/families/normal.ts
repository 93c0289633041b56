// The normal distribution's formulas in double precision.
// Source: Johnson, Kotz and Balakrishnan, Continuous Univariate Distributions 1 (1994), chapter 13.
const halfLogTwoPi = 0.91893853320467274178;

/**
 * Log density, −½ z² − log sd − ½ log 2π with z = (x − mean) / sd.
 * @kernel
 */
export function normalLogDensity(x: number, mean: number, sd: number): number {
  const z = (x - mean) / sd;
  return -0.5 * z * z - Math.log(sd) - halfLogTwoPi;
}

export function normalLogDensity_x(x: number, mean: number, sd: number): number {
  return -((x - mean) / sd) / sd;
}

export function normalLogDensity_mean(x: number, mean: number, sd: number): number {
  return (x - mean) / sd / sd;
}

export function normalLogDensity_sd(x: number, mean: number, sd: number): number {
  const z = (x - mean) / sd;
  return (z - 1.0) * (z + 1.0) / sd;
}
