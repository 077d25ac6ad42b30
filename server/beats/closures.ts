import { repeatingPeriod } from './period';

export interface Closures {
  /** Fractional sample index at which the waste valve closes, rising. */
  at: Float64Array;
  /** Highest pressure of the beat, in the trace's unit. */
  peak: Float64Array;
  /** 1 where the beat stands out of step with its neighbours. */
  doubtful: Uint8Array;
  /** Standard uncertainty of a closing's place, samples: the noise over the steepness of the rise, at least that of an edge between samples. */
  place_u: number;
  /** Period at which the trace repeats itself, seconds; null where it does not. */
  period_s: number | null;
}

/** An edge that falls somewhere between two samples: standard deviation of a rectangular error, samples (GUM, JCGM 100:2008, 4.3.7). */
const EDGE_U = 1 / Math.sqrt(12);

const none: Closures = {
  at: new Float64Array(),
  peak: new Float64Array(),
  doubtful: new Uint8Array(),
  place_u: EDGE_U,
  period_s: null,
};

/** A swing smaller than this many times the noise is no beat. */
const LEAST_SWING = 4;

/**
 * Finds each closing of the waste valve: the steep rise of the valve-box pressure, or the rise of the chamber's ripple where only
 * that was recorded. Thresholds are learnt from the burst itself: its swing about a slow mean, and the period at which it repeats. A
 * rise counts once per beat, however the pipe rings after it. Each closing is placed between samples where the rise passes half its height.
 *
 * @param pressure evenly sampled, any unit; NaN where a sample is missing
 * @returns nothing found for a trace that does not swing clear of its noise. Cost is linear but for the autocorrelation (period.ts).
 */
export function findClosures(pressure: Float64Array, samples_per_s: number): Closures {
  if (pressure.length < 8) return none;
  const trace = withoutSpikes(filled(pressure));
  const period_s = repeatingPeriod(trace, samples_per_s);
  if (period_s === null) return none;
  const period = period_s * samples_per_s;
  const swinging = aboutSlowMean(trace, Math.max(3, Math.round(period * 3)));
  const { low, high, noise } = levels(swinging);
  if (high - low < LEAST_SWING * noise) return none;
  const enter = low + 0.55 * (high - low);
  const leave = low + 0.3 * (high - low);
  const at: number[] = [];
  const peak: number[] = [];
  let inside = swinging[0]! > enter;
  let lastAt = Number.NEGATIVE_INFINITY;
  for (let i = 1; i < swinging.length; i++) {
    if (inside) {
      if (swinging[i]! < leave) inside = false;
      if (peak.length > 0 && i - lastAt < 0.7 * period && pressure[i]! > peak[peak.length - 1]!)
        peak[peak.length - 1] = pressure[i]!;
      continue;
    }
    if (swinging[i]! < enter) continue;
    inside = true;
    if (i - lastAt < 0.5 * period) continue;
    const place = halfHeight(swinging, i, low, samples_per_s);
    at.push(place);
    peak.push(Number.isNaN(pressure[i]!) ? trace[i]! : pressure[i]!);
    lastAt = i;
  }
  return {
    at: Float64Array.from(at),
    peak: Float64Array.from(peak),
    doubtful: outOfStep(at),
    place_u: placeDoubt(swinging, at, noise),
    period_s,
  };
}

function filled(pressure: Float64Array): Float64Array {
  const out = Float64Array.from(pressure);
  let last = -1;
  for (let i = 0; i < out.length; i++) {
    if (Number.isNaN(out[i]!)) continue;
    if (last < 0) out.fill(out[i]!, 0, i);
    else for (let k = last + 1; k < i; k++) out[k] = out[last]! + ((out[i]! - out[last]!) * (k - last)) / (i - last);
    last = i;
  }
  return last < 0 ? out.fill(0) : out.fill(out[last]!, last + 1);
}

/** Median of three: a lone sample that stands out is an error of the recorder, a closing lasts longer. */
function withoutSpikes(trace: Float64Array): Float64Array {
  const out = Float64Array.from(trace);
  for (let i = 1; i + 1 < trace.length; i++) {
    const [a, b, c] = [trace[i - 1]!, trace[i]!, trace[i + 1]!];
    out[i] = Math.max(Math.min(a, b), Math.min(Math.max(a, b), c));
  }
  return out;
}

function aboutSlowMean(trace: Float64Array, width: number): Float64Array {
  const half = width >> 1;
  const out = new Float64Array(trace.length);
  let sum = 0;
  let from = 0;
  let to = 0;
  for (let i = 0; i < trace.length; i++) {
    while (to < Math.min(trace.length, i + half + 1)) sum += trace[to++]!;
    while (from < i - half) sum -= trace[from++]!;
    out[i] = trace[i]! - sum / (to - from);
  }
  return out;
}

function levels(trace: Float64Array): { low: number; high: number; noise: number } {
  const every = Math.max(1, Math.floor(trace.length / 50_000));
  const sample = trace.filter((_, i) => i % every === 0).sort();
  const at = (share: number) => sample[Math.min(sample.length - 1, Math.floor(share * sample.length))]!;
  const steps: number[] = [];
  for (let i = 2; i < trace.length; i += every) steps.push(Math.abs(trace[i]! - 2 * trace[i - 1]! + trace[i - 2]!));
  steps.sort((a, b) => a - b);
  return { low: at(0.2), high: at(0.96), noise: (1.4826 * steps[steps.length >> 1]!) / Math.sqrt(6) };
}

/** Place between samples where the rise through `i` passes half way from the low level to the height it reaches within 50 ms. */
function halfHeight(trace: Float64Array, i: number, low: number, samples_per_s: number): number {
  let top = trace[i]!;
  for (let k = i; k < Math.min(trace.length, i + Math.max(2, Math.ceil(0.05 * samples_per_s))); k++)
    top = Math.max(top, trace[k]!);
  const half = low + 0.5 * (top - low);
  let k = i;
  if (trace[k]! >= half) while (k > 0 && trace[k - 1]! >= half) k--;
  else while (k + 1 < trace.length && trace[k]! < half) k++;
  if (k === 0) return 0;
  const rise = trace[k]! - trace[k - 1]!;
  return rise > 0 ? k - 1 + (half - trace[k - 1]!) / rise : k;
}

function placeDoubt(trace: Float64Array, at: readonly number[], noise: number): number {
  const rises = at
    .map((place) => trace[Math.min(trace.length - 1, Math.ceil(place))]! - trace[Math.floor(place)]!)
    .sort((a, b) => a - b);
  const rise = rises[rises.length >> 1] ?? 0;
  return rise > 0 ? Math.max(EDGE_U, noise / rise) : 0.5;
}

function outOfStep(at: readonly number[]): Uint8Array {
  const steps = at.slice(1).map((place, i) => place - at[i]!);
  const usual = [...steps].sort((a, b) => a - b)[steps.length >> 1] ?? 0;
  return Uint8Array.from(at, (_, i) => {
    const before = i > 0 ? steps[i - 1]! : usual;
    const after = i < steps.length ? steps[i]! : usual;
    return before < 0.7 * usual || after < 0.7 * usual ? 1 : 0;
  });
}
