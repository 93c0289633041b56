// The beta distribution by its mean and concentration: alpha = mean · concentration, beta = (1 − mean) · concentration.
// Source: Ferrari and Cribari-Neto (2004), "Beta regression for modelling rates and proportions", section 2.

/** Alpha. @joint beta alpha */
export function betaMeanConcentrationAlpha(mean: number, concentration: number): number {
  return mean * concentration;
}
export function betaMeanConcentrationAlpha_mean(_mean: number, concentration: number): number {
  return concentration;
}
export function betaMeanConcentrationAlpha_concentration(mean: number, _concentration: number): number {
  return mean;
}

/** Beta. @joint beta beta */
export function betaMeanConcentrationBeta(mean: number, concentration: number): number {
  return (1.0 - mean) * concentration;
}
export function betaMeanConcentrationBeta_mean(_mean: number, concentration: number): number {
  return -concentration;
}
export function betaMeanConcentrationBeta_concentration(mean: number, _concentration: number): number {
  return 1.0 - mean;
}

/** Mean. */
export function betaMeanConcentrationMean(mean: number, _concentration: number): number {
  return mean;
}
export function betaMeanConcentrationMean_mean(_mean: number, _concentration: number): number {
  return 1.0;
}
export function betaMeanConcentrationMean_concentration(_mean: number, _concentration: number): number {
  return 0.0;
}

/** Variance, mean (1 − mean) / (concentration + 1). */
export function betaMeanConcentrationVariance(mean: number, concentration: number): number {
  return (mean * (1.0 - mean)) / (concentration + 1.0);
}
export function betaMeanConcentrationVariance_mean(mean: number, concentration: number): number {
  return (1.0 - 2.0 * mean) / (concentration + 1.0);
}
export function betaMeanConcentrationVariance_concentration(mean: number, concentration: number): number {
  return (-mean * (1.0 - mean)) / (concentration + 1.0) / (concentration + 1.0);
}
