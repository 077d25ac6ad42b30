import type { BurstBeats } from '../shapes/series';
import { findClosures } from './closures';

interface Burst {
  /** Seconds from the first sample, rising. */
  times_s: Float64Array;
  valve_box_kpa?: Float64Array | undefined;
  chamber_kpa?: Float64Array | undefined;
}

/** Below this the steep rise of a closing falls between samples. */
const PHASES_FROM_PER_S = 50;

/** Beats of a burst of pressure, from the valve box where it was recorded, else from the chamber's ripple. */
export function describeBurst({ times_s, valve_box_kpa, chamber_kpa }: Burst): Omit<BurstBeats, 'at'> {
  const notes: string[] = [];
  const count = times_s.length;
  const seconds = count > 1 ? times_s[count - 1]! - times_s[0]! : 0;
  const samples_per_s = seconds > 0 ? (count - 1) / seconds : 0;
  const pressure = valve_box_kpa ?? chamber_kpa;
  const channel = valve_box_kpa !== undefined ? 'valve_box_pressure' : 'chamber_pressure';
  const empty = { seconds, samples_per_s: round(samples_per_s), channel, beats_per_min: null, beats: [] };
  if (pressure === undefined)
    return { ...empty, notes: ['There is no pressure of valve box or chamber in this burst.'] };
  if (samples_per_s < 5)
    return {
      ...empty,
      notes: [`${round(samples_per_s)} samples a second are too few to tell beats apart; 20 or more are wanted.`],
    };
  if (channel === 'chamber_pressure')
    notes.push("Beats are told from the chamber's ripple; closings are less sharp there than in the valve box.");
  if (samples_per_s < PHASES_FROM_PER_S)
    notes.push(
      `${round(samples_per_s)} samples a second give the period; the moment of each closing is only as sharp as a sample.`,
    );
  const { at, peak, doubtful, place_u, period_s } = findClosures(pressure, samples_per_s);
  const beats = Array.from(at, (place, i) => ({
    closed_at_s: round(place / samples_per_s),
    period_s: i + 1 < at.length ? round((at[i + 1]! - place) / samples_per_s) : null,
    peak_kpa: round(peak[i]!),
    doubtful: doubtful[i] === 1,
  }));
  const usual = middle(beats.flatMap((beat) => (beat.period_s === null ? [] : [beat.period_s])));
  for (const beat of beats)
    if (usual !== null && beat.period_s !== null && beat.period_s > 1.6 * usual)
      notes.push(
        `Between ${beat.closed_at_s.toFixed(1)} s and ${(beat.closed_at_s + beat.period_s).toFixed(1)} s the ram paused or ${Math.round(beat.period_s / usual) - 1} beat${beat.period_s > 2.5 * usual ? 's were' : ' was'} missed.`,
      );
  if (beats.length === 0) notes.push('No beats stand out of the noise: the ram stood still, or the sensor is damped.');
  else if (usual !== null && period_s !== null && Math.abs(usual / period_s - 1) > 0.1)
    notes.push(
      `The closings come every ${usual.toFixed(2)} s, the trace repeats every ${period_s.toFixed(2)} s; look at the trace.`,
    );
  return { ...empty, beats_per_min: rateOf(at, place_u, samples_per_s), beats, notes };
}

/**
 * Beats per minute of the longest unbroken run: its beats over the time between its first and last closing. A ram's periods wander, so that a
 * line through the closings would say no more of this burst; the 95 % interval is that of the two ends.
 */
function rateOf(at: Float64Array, place_u: number, samples_per_s: number): BurstBeats['beats_per_min'] {
  const run = longestRun(at);
  if (run.length < 3) return null;
  const lasted = run[run.length - 1]! - run[0]!;
  const value = (60 * samples_per_s * (run.length - 1)) / lasted;
  const share = (1.96 * Math.SQRT2 * place_u) / lasted;
  return { value, low: value * (1 - share), high: value * (1 + share) };
}

function longestRun(at: Float64Array): Float64Array {
  const steps = Array.from(at.subarray(1), (place, i) => place - at[i]!);
  const usual = middle(steps);
  if (usual === null) return at;
  let best: [number, number] = [0, 0];
  let from = 0;
  for (let i = 0; i <= steps.length; i++) {
    if (i < steps.length && steps[i]! > 0.7 * usual && steps[i]! < 1.4 * usual) continue;
    if (i - from > best[1] - best[0]) best = [from, i];
    from = i + 1;
  }
  return at.subarray(best[0], best[1] + 1);
}

const round = (value: number) => Number(value.toPrecision(7));

function middle(values: number[]): number | null {
  return values.length === 0 ? null : [...values].sort((a, b) => a - b)[values.length >> 1]!;
}
