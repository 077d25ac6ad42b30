import { type CycleConstants, calibrateCycle, ramCycle } from '../hydraulics/ram-cycle';
import type { Installation } from '../shapes/installation';
import type { BucketTest, Visit } from '../shapes/visit';
import { type Measured, propagate } from './measured';
import type { Observation } from './observation';
import { driveWaveSpeed } from './wave-speed';

/** A bucket's marks and its filling to the mark, standard uncertainty as a share (reference practice: 2 to 5 % at 95 % in the field). */
const BUCKET_SHARE = 0.012;
/** Starting and stopping a stopwatch by hand, standard uncertainty in seconds (common practice, no source). */
const STOPWATCH_S = 0.3;
/** How far litres per beat are let drift from a bucket test in a year, standard, as a share (own choice: wear is expected). */
const AGEING_PER_YEAR = 0.03;
const YEAR_MS = 365.25 * 86_400_000;

/** What a visit's buckets tell of a beat, at the heads of the day. */
export interface BucketCalibration {
  at_ms: number;
  on: string;
  fall_m: number;
  lift_m: number;
  delivered_l: Measured | null;
  waste_l: Measured | null;
  constants: CycleConstants | null;
}

/**
 * Litres per beat from a visit's bucket tests. The beats come from the counting at the visit, else from the log of that day.
 * Of several tests of one kind the last stands, as the ram was left. Null where no bucket or no beats are known.
 */
export function calibrationOf(
  visit: Visit,
  at_ms: number,
  on: string,
  day: Observation | undefined,
  installation: Installation,
): BucketCalibration | null {
  const counted = visit.counted_beats;
  const beats: Measured | null =
    counted === undefined
      ? (day?.beats_per_min_running ?? null)
      : {
          value: (counted.beats * 60) / counted.seconds,
          u: Math.hypot(
            60 / Math.sqrt(6) / counted.seconds,
            (STOPWATCH_S / counted.seconds) * ((counted.beats * 60) / counted.seconds),
          ),
          by: `the beats counted on ${on}`,
        };
  if (beats === null || beats.value <= 0) return null;
  const perBeat = (of: BucketTest['of']): Measured | null => {
    const test = visit.bucket_tests.filter((one) => one.of === of).at(-1);
    if (test === undefined) return null;
    return propagate([bucketFlow(test, on), beats], (lps, perMinute) => (lps! * 60) / perMinute!);
  };
  const delivered_l = perBeat('delivery');
  const waste_l = perBeat('waste');
  if (delivered_l === null && waste_l === null) return null;
  const fall_m = visit.fall_m ?? day?.fall_m?.value ?? installation.fall_m;
  const observed = {
    fall_m,
    lift_m: installation.lift_m,
    beats_per_min: beats.value,
    waste_l_per_beat: waste_l?.value ?? null,
    delivered_l_per_beat: delivered_l?.value ?? null,
  };
  return {
    at_ms,
    on,
    fall_m,
    lift_m: installation.lift_m,
    delivered_l,
    waste_l,
    constants: calibrateCycle(installation.drive_pipe, observed, driveWaveSpeed(installation)),
  };
}

function bucketFlow(test: BucketTest, on: string): Measured {
  const count = test.seconds.length;
  const mean = test.seconds.reduce((sum, s) => sum + s, 0) / count;
  const scatter =
    count > 1 ? Math.sqrt(test.seconds.reduce((sum, s) => sum + (s - mean) ** 2, 0) / (count - 1) / count) : 0;
  const value = test.litres / mean;
  return {
    value,
    u: value * Math.hypot(BUCKET_SHARE, STOPWATCH_S / mean / Math.sqrt(count), scatter / mean),
    by: `the bucket test of ${on}`,
  };
}

/** The test that governs an instant: the latest before it, else the first after it. */
export function governing(
  calibrations: readonly BucketCalibration[],
  kind: 'delivered_l' | 'waste_l',
  at_ms: number,
): BucketCalibration | null {
  const fit = calibrations.filter((one) => one[kind] !== null);
  return fit.filter((one) => one.at_ms <= at_ms).at(-1) ?? fit[0] ?? null;
}

/** Litres per beat at today's heads: the bucket's, scaled by the theory of the cycle for the change in fall and lift. */
export function bucketScaled(
  calibration: BucketCalibration,
  kind: 'delivered_l' | 'waste_l',
  fall_m: number,
  lift_m: number,
  at_ms: number,
  installation: Installation,
): Measured | null {
  const tested = calibration[kind];
  if (tested === null) return null;
  const scale = theoryScale(calibration, kind, fall_m, lift_m, installation);
  const ageing = AGEING_PER_YEAR * Math.sqrt(Math.abs(at_ms - calibration.at_ms) / YEAR_MS);
  const model = 0.1 * Math.abs(scale - 1);
  const value = tested.value * scale;
  const u = Math.hypot(tested.u * scale, value * ageing, value * model);
  return { value, u, by: tested.by };
}

function theoryScale(
  calibration: BucketCalibration,
  kind: 'delivered_l' | 'waste_l',
  fall_m: number,
  lift_m: number,
  installation: Installation,
): number {
  const { constants } = calibration;
  if (constants === null || fall_m <= 0 || lift_m <= fall_m) return 1;
  const then = ramCycle(installation.drive_pipe, { fall_m: calibration.fall_m, lift_m: calibration.lift_m }, constants);
  const now = ramCycle(installation.drive_pipe, { fall_m, lift_m }, constants);
  if (then === null || now === null) return 1;
  return kind === 'delivered_l'
    ? now.delivered_l_per_beat / then.delivered_l_per_beat
    : now.waste_l_per_beat / then.waste_l_per_beat;
}
