/** Slowest and quickest beat looked for, seconds: 15 to 150 beats a minute, with a little room. */
export const SHORTEST_PERIOD_S = 60 / 160;
export const LONGEST_PERIOD_S = 60 / 14;

/** Rate to which a trace is thinned for its autocorrelation: some twenty samples in the quickest beat. */
const THINNED_PER_S = 50;

/** Pulses are widened to about this, so that a beat that wanders by a sample is still like the one before. */
const PULSE_S = 0.1;

/**
 * The period at which a trace repeats itself, seconds, from the first high peak of its autocorrelation, refined by a parabola.
 * Null where it does not repeat. Cost: samples / thinning × lags.
 */
export function repeatingPeriod(trace: Float64Array, samples_per_s: number): number | null {
  const every = Math.max(1, Math.floor(samples_per_s / THINNED_PER_S));
  const rate = samples_per_s / every;
  const count = Math.floor(trace.length / every);
  const thin = new Float64Array(count);
  let mean = 0;
  for (let i = 0; i < count; i++) {
    let sum = 0;
    for (let k = 0; k < every; k++) sum += trace[i * every + k]!;
    thin[i] = sum / every;
    mean += thin[i]! / count;
  }
  for (let i = 0; i < count; i++) thin[i] = thin[i]! - mean;
  widen(thin, Math.max(1, Math.round(PULSE_S * rate)));
  const longest = Math.min(Math.ceil(LONGEST_PERIOD_S * rate), count >> 1);
  const shortest = Math.max(1, Math.floor(SHORTEST_PERIOD_S * rate));
  if (longest <= shortest + 2) return null;
  const power = dot(thin, 0);
  if (power <= 0) return null;
  const likeness = Float64Array.from({ length: longest + 2 }, (_, lag) => dot(thin, lag) / power);
  let best = -1;
  for (let lag = shortest; lag <= longest; lag++) {
    const isPeak = likeness[lag]! > likeness[lag - 1]! && likeness[lag]! >= likeness[lag + 1]!;
    if (isPeak && (best < 0 || likeness[lag]! > likeness[best]!)) best = lag;
  }
  if (best < 0 || likeness[best]! < 0.2) return null;
  best = shortestAlike(likeness, best, shortest);
  const [a, b, c] = [likeness[best - 1]!, likeness[best]!, likeness[best + 1]!];
  return (best + (0.5 * (a - c)) / (a - 2 * b + c)) / rate;
}

function widen(trace: Float64Array, width: number): void {
  let sum = 0;
  const recent = new Float64Array(width);
  for (let i = 0; i < trace.length; i++) {
    sum += trace[i]! - recent[i % width]!;
    recent[i % width] = trace[i]!;
    trace[i] = sum / width;
  }
}

/** A trace that repeats itself every beat also does so every second, third and tenth one: the shortest nearly as alike is meant. */
function shortestAlike(likeness: Float64Array, best: number, shortest: number): number {
  for (let part = 10; part >= 2; part--) {
    const near = Math.round(best / part);
    if (near < shortest) continue;
    for (const lag of [near, near - 1, near + 1, near - 2, near + 2]) {
      const isPeak = lag > 1 && likeness[lag]! > likeness[lag - 1]! && likeness[lag]! >= likeness[lag + 1]!;
      if (isPeak && likeness[lag]! > 0.6 * likeness[best]!) return lag;
    }
  }
  return best;
}

/** Unbiased: divided by the number of products. */
function dot(trace: Float64Array, lag: number): number {
  let sum = 0;
  for (let i = 0; i + lag < trace.length; i++) sum += trace[i]! * trace[i + lag]!;
  return sum / (trace.length - lag);
}
