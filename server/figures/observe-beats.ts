import { lowerBound } from '../store/series-read';
import type { Measured } from './measured';
import type { Still } from './observation';
import { type Series, type Span, shareOut } from './spans';

/** A ram that has not beaten for this long stands still; a shorter pause may be the counter's own step. */
const STILL_MS = 10 * 60_000;

/** Both ends of a count may be off by one beat: the difference of two rectangular errors (GUM, JCGM 100:2008, 4.3.7). */
const COUNT_U = 1 / Math.sqrt(6);
/** A logger's crystal, standard, as a share: 20 ppm and some for temperature (reference practice 2.3). */
const CLOCK_U = 30e-6;

interface BeatSources {
  counter: Series | undefined;
  readings: { beats: Float64Array } | undefined;
  perInterval: Series | undefined;
  rate: Series | undefined;
  spans: readonly Span[];
  waste: Series | undefined;
  valveBox: Series | undefined;
}

interface BeatsOfSpan {
  beats: number | null;
  beat_minutes: number;
  running_minutes: number;
  beats_per_min: Measured | null;
  beats_per_min_running: Measured | null;
  still: Still[];
}

/** Beats of each span from a running counter, from beats per interval, or from a rate: the first of them that is fitted. */
export function observeBeats(sources: BeatSources): BeatsOfSpan[] {
  const { spans } = sources;
  const intervals = beatsByInterval(sources);
  if (intervals === null)
    return spans.map(() => ({
      beats: null,
      beat_minutes: 0,
      running_minutes: 0,
      beats_per_min: null,
      beats_per_min_running: null,
      still: [],
    }));
  const { times_ms, beats, steady } = intervals;
  const all = shareOut(times_ms, beats, spans);
  const moving = shareOut(times_ms, steady, spans);
  const still = stillStretches(times_ms, beats);
  return spans.map((span, s) => {
    const minutes = all.known_ms[s]! / 60_000;
    const runningMinutes = moving.known_ms[s]! / 60_000;
    const rate = (count: number, over: number): Measured | null =>
      over > 0
        ? { value: count / over, u: Math.hypot(COUNT_U, CLOCK_U * count) / over, by: 'the counting at both ends' }
        : null;
    const stillHere = still.filter((one) => one.from_ms < span.to_ms && one.to_ms > span.from_ms);
    const stillMinutes =
      stillHere.reduce((sum, one) => sum + Math.min(one.to_ms, span.to_ms) - Math.max(one.from_ms, span.from_ms), 0) /
      60_000;
    return {
      beats: minutes > 0 ? all.amount[s]! : null,
      beat_minutes: minutes,
      running_minutes: Math.max(0, minutes - stillMinutes),
      beats_per_min: rate(all.amount[s]!, minutes),
      beats_per_min_running: rate(moving.amount[s]!, runningMinutes),
      still: stillHere.map((one) => ({
        ...one,
        waste_lps: meanWithin(sources.waste, one),
        valve_box_kpa: meanWithin(sources.valveBox, one),
      })),
    };
  });
}

/** Beats in the interval ending at each stamp; `steady` leaves out still intervals and those beside them, where the ram ran for a part only. */
function beatsByInterval({
  counter,
  readings,
  perInterval,
  rate,
}: BeatSources): { times_ms: Float64Array; beats: Float64Array; steady: Float64Array } | null {
  let times_ms: Float64Array;
  let beats: Float64Array;
  if (counter !== undefined && readings !== undefined) {
    times_ms = counter.times_ms;
    beats = readings.beats;
  } else if (perInterval !== undefined) {
    times_ms = perInterval.times_ms;
    beats = perInterval.values;
  } else if (rate !== undefined) {
    times_ms = rate.times_ms;
    beats = rate.values.map((perMinute, i) =>
      i === 0 ? Number.NaN : (perMinute * (times_ms[i]! - times_ms[i - 1]!)) / 60_000,
    );
  } else return null;
  const isStill = (i: number) => beats[i] === 0;
  const steady = beats.map((value, i) => (isStill(i) || isStill(i - 1) || isStill(i + 1) ? Number.NaN : value));
  return { times_ms, beats, steady };
}

function stillStretches(times_ms: Float64Array, beats: Float64Array): { from_ms: number; to_ms: number }[] {
  const found: { from_ms: number; to_ms: number }[] = [];
  let from: number | null = null;
  for (let i = 1; i <= times_ms.length; i++) {
    // an unknown step inside a stretch neither begins nor ends it
    const still = i < times_ms.length && (beats[i] === 0 || (from !== null && Number.isNaN(beats[i])));
    if (still) {
      from ??= times_ms[i - 1]!;
    } else if (from !== null) {
      if (times_ms[i - 1]! - from >= STILL_MS) found.push({ from_ms: from, to_ms: times_ms[i - 1]! });
      from = null;
    }
  }
  return found;
}

function meanWithin(series: Series | undefined, { from_ms, to_ms }: { from_ms: number; to_ms: number }): number | null {
  if (series === undefined) return null;
  let total = 0;
  let count = 0;
  for (let i = lowerBound(series.times_ms, from_ms); i < series.times_ms.length && series.times_ms[i]! <= to_ms; i++) {
    if (Number.isNaN(series.values[i]!)) continue;
    total += series.values[i]!;
    count++;
  }
  return count > 0 ? total / count : null;
}
