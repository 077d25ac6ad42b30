import { tankHeight_m, tankVolume_l } from '../hydraulics/tank';
import type { Installation, Tank } from '../shapes/installation';
import { lowerBound } from '../store/series-read';
import { COVERAGE_95, type Measured } from './measured';
import { accuracyOf, sensorOf } from './sensors';
import { type Series, type Span, usualStep } from './spans';

/** Slopes are taken over windows of about this length: long against a level's resolution, short against the pauses between draw-offs. */
const WINDOW_MS = 60 * 60_000;
/** Finer records are thinned to this step first. */
const STEP_MS = 10 * 60_000;
/** Fewer quiet hours than this do not make a day's inflow. */
const LEAST_QUIET_MS = 2 * 3_600_000;
/** A day of which less than this is recorded may show nothing but its draw-offs. */
const LEAST_RECORDED = 0.5;
/** A level that reads the same to the last digit for longer than this is stuck: no tank stands still while a ram feeds it. */
const STUCK_MS = 6 * 3_600_000;
/** Tape and geometry of a tank, plus or minus at 95 % (common practice, no source). */
const TANK_GEOMETRY = 0.02;

/**
 * Delivery into the tank from its level, L/s, found on the stretches on which nobody draws and nothing spills.
 *
 * The slope of the volume is taken over sliding windows. Windows without draw-off gather at the inflow, the others lie below it
 * and apart: the inflow is the densest group of slopes, the higher one where two are alike; then every unbroken stretch of its windows
 * is fitted by least squares as a whole. Null where less than two quiet hours are found, or less than half of the span is recorded.
 * Stretches on which the ram stood (`still`) or the sensor stuck are left out. Cost is linear in the records.
 */
export function tankInflow(
  level: Series,
  span: Span,
  installation: Installation,
  still: readonly Span[] = [],
): Measured | null {
  const { tank } = installation;
  if (tank === undefined || span.to_ms - span.from_ms < LEAST_QUIET_MS) return null;
  const points = volumes(level, span, installation, tank, still);
  if (points.times_s.length < 6) return null;
  const windows = windowSlopes(points);
  if (windows.length === 0) return null;
  const noise_l = levelNoise(points);
  const inflow = densestSlope(windows, noise_l);
  const quiet = quietStretches(points, windows, inflow, noise_l);
  const quiet_ms = quiet.reduce((sum, [from, to]) => sum + (points.times_s[to]! - points.times_s[from]!) * 1000, 0);
  if (quiet_ms < LEAST_QUIET_MS) return null;
  return pooledSlope(points, quiet, noise_l, levelAccuracyShare(installation));
}

interface Points {
  times_s: Float64Array;
  volume_l: Float64Array;
}

interface Window {
  first: number;
  last: number;
  slope_lps: number;
  /** Sum of squared times about their mean, s². */
  spread_s2: number;
}

function volumes(level: Series, span: Span, installation: Installation, tank: Tank, still: readonly Span[]): Points {
  const zero_m = sensorOf(installation, 'tank_level')?.height_m ?? 0;
  const full_m = tank.overflow_m ?? tankHeight_m(tank);
  const margin_m = accuracyOf(installation, 'tank_level', full_m);
  const start = lowerBound(level.times_ms, span.from_ms);
  const end = lowerBound(level.times_ms, span.to_ms);
  const step_ms = usualStep(level.times_ms.subarray(start, end)) ?? STEP_MS;
  const every = Math.max(1, Math.round(STEP_MS / step_ms));
  const nothing = { times_s: new Float64Array(), volume_l: new Float64Array() };
  if ((end - start) * step_ms < LEAST_RECORDED * (span.to_ms - span.from_ms)) return nothing;
  const isStuck = stuckRuns(level, start, end);
  const times: number[] = [];
  const litres: number[] = [];
  const stood = (at_ms: number) => still.some((one) => at_ms > one.from_ms && at_ms <= one.to_ms);
  for (let i = start; i < end; i += every) {
    let depths_m = 0;
    let at_ms = 0;
    let count = 0;
    for (let k = i; k < end && k < i + every; k++) {
      const value = level.values[k]!;
      if (Number.isNaN(value) || isStuck(k) || (still.length > 0 && stood(level.times_ms[k]!))) continue;
      depths_m += value;
      at_ms += level.times_ms[k]!;
      count++;
    }
    const depth_m = depths_m / count + zero_m;
    // a full tank hides its inflow; NaN where no value of the group counts
    if (!(depth_m < full_m - margin_m && depth_m > 0)) continue;
    times.push(at_ms / count / 1000);
    litres.push(tankVolume_l(tank, depth_m));
  }
  return { times_s: Float64Array.from(times), volume_l: Float64Array.from(litres) };
}

/** Tells for a record whether it lies in a run of one and the same value that lasts too long to be water. */
function stuckRuns({ times_ms, values }: Series, start: number, end: number): (index: number) => boolean {
  const stuck = new Uint8Array(end - start);
  let first = start;
  for (let i = start + 1; i <= end; i++) {
    if (i < end && values[i] === values[first]) continue;
    // the run may have begun before the span or go on after it
    let from = first;
    while (from > 0 && values[from - 1] === values[first]) from--;
    let to = i - 1;
    while (to + 1 < values.length && values[to + 1] === values[first]) to++;
    if (times_ms[to]! - times_ms[from]! > STUCK_MS) stuck.fill(1, first - start, i - start);
    first = i;
  }
  return (index) => stuck[index - start] === 1;
}

/** Least-squares slopes over sliding windows without a gap. */
function windowSlopes({ times_s, volume_l }: Points): Window[] {
  const step_s = Math.max(60, usualStep(times_s) ?? 600);
  const size = Math.max(4, Math.round(WINDOW_MS / 1000 / step_s) + 1);
  const windows: Window[] = [];
  for (let first = 0; first + size <= times_s.length; first++) {
    const last = first + size - 1;
    if (times_s[last]! - times_s[first]! > (size - 1) * step_s * 1.5) continue;
    windows.push({ first, last, ...leastSquares(times_s, volume_l, first, last) });
  }
  return windows;
}

function leastSquares(
  times_s: Float64Array,
  volume_l: Float64Array,
  first: number,
  last: number,
): { slope_lps: number; spread_s2: number } {
  const count = last - first + 1;
  let meanTime = 0;
  let meanVolume = 0;
  for (let i = first; i <= last; i++) {
    meanTime += times_s[i]! / count;
    meanVolume += volume_l[i]! / count;
  }
  let spread_s2 = 0;
  let together = 0;
  for (let i = first; i <= last; i++) {
    const dt = times_s[i]! - meanTime;
    spread_s2 += dt * dt;
    together += dt * (volume_l[i]! - meanVolume);
  }
  return { slope_lps: together / spread_s2, spread_s2 };
}

/** Noise of a volume, litres, from the median absolute second difference: draw-offs are too few to move the median. */
function levelNoise({ volume_l }: Points): number {
  const second: number[] = [];
  for (let i = 2; i < volume_l.length; i++)
    second.push(Math.abs(volume_l[i]! - 2 * volume_l[i - 1]! + volume_l[i - 2]!));
  second.sort((a, b) => a - b);
  const median = second[second.length >> 1] ?? 0;
  return Math.max((1.4826 * median) / Math.sqrt(6), 1e-3);
}

const slopeNoise = (window: Window, noise_l: number): number =>
  Math.max(noise_l / Math.sqrt(window.spread_s2), Math.abs(window.slope_lps) * 0.01);

/** The densest group of slopes, the highest of them where several are nearly as dense. */
function densestSlope(windows: Window[], noise_l: number): number {
  const slopes = windows.map((w) => w.slope_lps).sort((a, b) => a - b);
  const reach = 2 * (noise_l / Math.sqrt(windows[0]!.spread_s2)) + 1e-9;
  let low = 0;
  let high = 0;
  const density = slopes.map((slope) => {
    while (slopes[low]! < slope - reach) low++;
    while (high < slopes.length && slopes[high]! <= slope + reach) high++;
    return high - low;
  });
  const most = Math.max(...density.map((count, i) => (slopes[i]! > 0 ? count : 0)));
  let chosen = slopes.length - 1;
  while (chosen > 0 && (density[chosen]! < 0.6 * most || slopes[chosen]! <= 0)) chosen--;
  // settle on the median of the group around the choice
  let inflow = slopes[chosen]!;
  for (let round = 0; round < 4; round++) {
    const group = slopes.filter((slope) => Math.abs(slope - inflow) <= Math.max(reach, 0.02 * inflow));
    if (group.length > 0) inflow = group[group.length >> 1]!;
  }
  return inflow;
}

/** Unbroken stretches of windows whose slope is the inflow's, as pairs of first and last point. */
function quietStretches({ times_s }: Points, windows: Window[], inflow: number, noise_l: number): [number, number][] {
  const stretches: [number, number][] = [];
  for (const window of windows) {
    if (Math.abs(window.slope_lps - inflow) > 2.5 * slopeNoise(window, noise_l) + 0.02 * Math.abs(inflow)) continue;
    const open = stretches[stretches.length - 1];
    if (open !== undefined && window.first <= open[1] && times_s[window.first]! <= times_s[open[1]]!)
      open[1] = window.last;
    else stretches.push([window.first, window.last]);
  }
  return stretches;
}

/** Stretches pooled by their weight in least squares; what differs between them widens the interval. */
function pooledSlope(
  { times_s, volume_l }: Points,
  stretches: [number, number][],
  noise_l: number,
  levelShare: number,
): Measured {
  const fits = stretches.map(([first, last]) => leastSquares(times_s, volume_l, first, last));
  const weight = fits.reduce((sum, fit) => sum + fit.spread_s2, 0);
  const value = fits.reduce((sum, fit) => sum + fit.slope_lps * fit.spread_s2, 0) / weight;
  const between =
    fits.length > 1
      ? fits.reduce((sum, fit) => sum + fit.spread_s2 * (fit.slope_lps - value) ** 2, 0) / weight / (fits.length - 1)
      : 0;
  const slope_u = Math.sqrt(noise_l ** 2 / weight + between);
  const geometry_u = (Math.hypot(TANK_GEOMETRY, levelShare) / COVERAGE_95) * value;
  return {
    value: Math.max(0, value),
    u: Math.hypot(slope_u, geometry_u),
    by: slope_u > geometry_u ? 'the level between draw-offs' : "the tank's measurements",
  };
}

/** A level sensor's accuracy is mostly an offset, which a slope does not feel; a fifth of it is taken as an error of scale over a metre. */
const levelAccuracyShare = (installation: Installation): number => accuracyOf(installation, 'tank_level', 1) / 5;
