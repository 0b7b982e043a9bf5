/**
 * Information criteria of a fit, the scatter taken as a fitted scale: -2 ln L = n ln(2 pi chi2/n) + sum ln s_i^2 + n.
 * They take the marks as independent; where channels share errors they favour the richer model too often, and the
 * models' extra parameters over their errors decide instead. AICc after Hurvich & Tsai (1989), BIC after Schwarz (1978).
 *
 * @param chi2 sum of squared residuals over s_i^2
 * @param variance s_i^2 of the marks in the fit, rad^2
 * @param freeParameters of the model; the scatter's scale counts as one more
 */
export function informationCriteria(
  chi2: number,
  variance: Float64Array,
  freeParameters: number,
): { aicc: number; bic: number } {
  const n = variance.length;
  const k = freeParameters + 1;
  const logVariance = variance.reduce((sum, v) => sum + Math.log(v), 0);
  const deviance = n * Math.log((2 * Math.PI * chi2) / n) + logVariance + n;
  return {
    aicc: deviance + 2 * k + (2 * k * (k + 1)) / Math.max(n - k - 1, 1),
    bic: deviance + k * Math.log(n),
  };
}
