/** Middle of the values (mean of the two middle ones for an even number); NaN for none. Does not change its input. */
export function median(values: ArrayLike<number>): number {
  return quantile(values, 0.5);
}

/** Quantile by linear interpolation between order statistics (Hyndman & Fan type 7); NaN for no values. */
export function quantile(values: ArrayLike<number>, share: number): number {
  const sorted = Float64Array.from(values).sort();
  if (sorted.length === 0) return Number.NaN;
  const place = (sorted.length - 1) * share;
  const below = Math.floor(place);
  const above = Math.min(sorted.length - 1, below + 1);
  return sorted[below]! + (place - below) * (sorted[above]! - sorted[below]!);
}

/** Spread of the bulk: median absolute deviation × 1.4826, which is the standard deviation for normal values. NaN for none. */
export function robustSpread(values: ArrayLike<number>): number {
  const middle = median(values);
  return 1.4826 * median(Array.from(values, (value) => Math.abs(value - middle)));
}
