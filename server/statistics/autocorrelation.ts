/** Correlation of each value with the one before it; 0 for fewer than eight values or none that vary. */
export function lagOneCorrelation(values: readonly number[]): number {
  if (values.length < 8) return 0;
  const mean = values.reduce((sum, v) => sum + v, 0) / values.length;
  let variance = 0;
  let together = 0;
  for (let i = 0; i < values.length; i++) {
    variance += (values[i]! - mean) ** 2;
    if (i > 0) together += (values[i]! - mean) * (values[i - 1]! - mean);
  }
  return variance > 0 ? together / variance : 0;
}

/**
 * By how much a run of values that lean on one another scatters more than its single values tell, as a factor on the standard
 * deviation: √((1 + φ) / (1 − φ)), the long-run deviation of a first-order autoregressive series. φ is held between 0 and 0.8.
 */
export function longRunFactor(correlation: number): number {
  const held = Math.min(0.8, Math.max(0, correlation));
  return Math.sqrt((1 + held) / (1 - held));
}
