/**
 * Average run length of a two-sided CUSUM on target, in values, by Siegmund's approximation (1985):
 * one-sided [exp(2kb) − 2kb − 1] / (2k²) with b = h + 1.166; both sides halve it. Within 1 % of the exact values from h = 4 on.
 */
export function averageRunLength(h: number, k: number): number {
  const reach = 2 * k * (h + 1.166);
  return (Math.exp(reach) - reach - 1) / (2 * k * k) / 2;
}

/** The decision interval h at which a two-sided CUSUM on target runs for an average of `run_length` values between false signals. */
export function decisionInterval(run_length: number, k: number): number {
  let low = 0;
  let high = 40;
  for (let step = 0; step < 60; step++) {
    const middle = (low + high) / 2;
    if (averageRunLength(middle, k) < run_length) low = middle;
    else high = middle;
  }
  return (low + high) / 2;
}
