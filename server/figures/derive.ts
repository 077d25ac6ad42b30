import { efficiencyDAubuisson, efficiencyRankine } from '../hydraulics/efficiency';
import { calibrateCycle, ramCycle } from '../hydraulics/ram-cycle';
import type { Footing, SpanFigures } from '../shapes/figure';
import type { Installation } from '../shapes/installation';
import { type BucketCalibration, bucketScaled, governing } from './bucket-tests';
import { asFigure, type Measured, propagate } from './measured';
import type { Observation } from './observation';
import { driveWaveSpeed } from './wave-speed';

const L_PER_DAY = 86_400;
/** A stated (surveyed) height, standard uncertainty as a share and at least (common practice, no source). */
const STATED_SHARE = 0.01;
const STATED_LEAST_M = 0.02;
/** The cycle theory with no test of this ram behind it, standard, as a share (Young 1995 and others report efficiency only to trend). */
const THEORY_SHARE = 0.2;

/** A flow or a volume with its footing. */
interface Footed {
  measured: Measured;
  footing: Footing;
}

/** What is known of a ram besides its samples: the buckets, and the litres per beat that its meter or tank lately told. */
export interface Knowledge {
  installation: Installation;
  calibrations: readonly BucketCalibration[];
  recent_delivered_l_per_beat: Measured | null;
}

/**
 * Figures of a span from what was observed in it, each by its best available footing: meter, tank, beats times bucket litres,
 * beats times the litres that meter or tank lately told, theory alone.
 */
export function deriveFigures(seen: Observation, knowledge: Knowledge): SpanFigures {
  const { installation } = knowledge;
  const fall = seen.fall_m ?? stated(installation.fall_m, 'the stated fall');
  const lift = stated(installation.lift_m, 'the stated lift');
  const at_ms = (seen.from_ms + seen.to_ms) / 2;
  const delivery = deliveryOf(seen, knowledge, fall, lift, at_ms);
  const waste = wasteOf(seen, knowledge, delivery, fall, lift, at_ms);
  const drive = driveOf(seen, delivery, waste);
  const perBeat = (flow: Footed | null) =>
    flow === null || seen.beats_per_min === null || seen.beats_per_min.value <= 0
      ? null
      : asFigure(
          propagate([flow.measured, seen.beats_per_min], (lps, beats) => (lps! * 60) / beats!),
          flow.footing,
        );
  const efficiency = (law: typeof efficiencyDAubuisson) => {
    if (delivery === null || waste === null || (delivery.measured.value === 0 && waste.measured.value === 0))
      return null;
    const measured = propagate(
      [delivery.measured, waste.measured, fall, lift],
      (delivery_lps, waste_lps, fall_m, lift_m) =>
        law({ delivery_lps: delivery_lps!, waste_lps: waste_lps!, fall_m: fall_m!, lift_m: lift_m! }),
    );
    return asFigure(measured, weaker(delivery.footing, waste.footing));
  };
  return {
    from: new Date(seen.from_ms).toISOString(),
    to: new Date(seen.to_ms).toISOString(),
    ...(seen.date === undefined ? {} : { date: seen.date }),
    coverage: seen.coverage,
    running_share: seen.beat_minutes > 0 ? Math.min(1, seen.running_minutes / seen.beat_minutes) : null,
    fall_m: asFigure(fall, seen.fall_m === null ? 'stated' : 'metered'),
    lift_m: asFigure(lift, 'stated'),
    chamber_head_m: asFigure(seen.chamber_head_m, 'metered'),
    chamber_ripple_kpa: asFigure(seen.chamber_ripple_kpa, 'metered'),
    beats_per_min: asFigure(seen.beats_per_min, 'metered'),
    beats_per_min_running: asFigure(seen.beats_per_min_running, 'metered'),
    delivery_l_per_day: footed(delivery, L_PER_DAY),
    tank_inflow_l_per_day: asFigure(tankOverRun(seen), 'from tank', L_PER_DAY),
    waste_l_per_day: footed(waste, L_PER_DAY),
    drive_l_per_day: footed(drive, L_PER_DAY),
    delivered_l_per_beat: perBeat(delivery),
    waste_l_per_beat: perBeat(waste),
    efficiency_daubuisson: efficiency(efficiencyDAubuisson),
    efficiency_rankine: efficiency(efficiencyRankine),
  };
}

const footed = (flow: Footed | null, factor: number) =>
  flow === null ? null : asFigure(flow.measured, flow.footing, factor);

const stated = (height_m: number, by: string): Measured => ({
  value: height_m,
  u: Math.max(STATED_LEAST_M, STATED_SHARE * height_m),
  by,
});

const order: readonly Footing[] = ['metered', 'from tank', 'bucket-scaled', 'from beats', 'from theory', 'stated'];
const weaker = (a: Footing, b: Footing): Footing => (order.indexOf(a) > order.indexOf(b) ? a : b);

/** The tank's quiet hours tell the inflow while the ram beats; a pause within the day is taken off. */
function tankOverRun(seen: Observation): Measured | null {
  if (seen.tank_inflow_lps === null) return null;
  const share = seen.beat_minutes > 0 ? Math.min(1, seen.running_minutes / seen.beat_minutes) : 1;
  return { ...seen.tank_inflow_lps, value: seen.tank_inflow_lps.value * share, u: seen.tank_inflow_lps.u * share };
}

function deliveryOf(
  seen: Observation,
  knowledge: Knowledge,
  fall: Measured,
  lift: Measured,
  at_ms: number,
): Footed | null {
  if (seen.meter_lps !== null) return { measured: seen.meter_lps, footing: 'metered' };
  const tank = tankOverRun(seen);
  if (tank !== null) return { measured: tank, footing: 'from tank' };
  const beats = seen.beats_per_min;
  if (beats === null) return null;
  const calibration = governing(knowledge.calibrations, 'delivered_l', at_ms);
  const litres =
    calibration && bucketScaled(calibration, 'delivered_l', fall.value, lift.value, at_ms, knowledge.installation);
  if (litres) return flowOf(litres, beats, 'bucket-scaled');
  if (knowledge.recent_delivered_l_per_beat !== null)
    return flowOf(knowledge.recent_delivered_l_per_beat, beats, 'from beats');
  const theory = theoryPerBeat(seen, knowledge.installation, fall, lift);
  return theory === null ? null : flowOf(theory.delivered_l, beats, 'from theory');
}

function wasteOf(
  seen: Observation,
  knowledge: Knowledge,
  delivery: Footed | null,
  fall: Measured,
  lift: Measured,
  at_ms: number,
): Footed | null {
  if (seen.waste_lps !== null) return { measured: seen.waste_lps, footing: 'metered' };
  if (seen.drive_lps !== null && delivery !== null) {
    const measured = propagate([seen.drive_lps, delivery.measured], (drive, delivered) =>
      Math.max(0, drive! - delivered!),
    );
    if (measured !== null) return { measured, footing: delivery.footing };
  }
  const beats = seen.beats_per_min;
  if (beats === null) return null;
  const calibration = governing(knowledge.calibrations, 'waste_l', at_ms);
  const litres =
    calibration && bucketScaled(calibration, 'waste_l', fall.value, lift.value, at_ms, knowledge.installation);
  if (litres) return flowOf(litres, beats, 'bucket-scaled');
  const theory = theoryPerBeat(seen, knowledge.installation, fall, lift);
  return theory === null ? null : flowOf(theory.waste_l, beats, 'from theory');
}

function driveOf(seen: Observation, delivery: Footed | null, waste: Footed | null): Footed | null {
  if (seen.drive_lps !== null) return { measured: seen.drive_lps, footing: 'metered' };
  if (delivery === null || waste === null) return null;
  const measured = propagate([delivery.measured, waste.measured], (delivered, wasted) => delivered! + wasted!);
  return measured === null ? null : { measured, footing: weaker(delivery.footing, waste.footing) };
}

function flowOf(litres: Measured, beats: Measured, footing: Footing): Footed | null {
  const measured = propagate([litres, beats], (l, perMinute) => (l! * perMinute!) / 60);
  return measured === null ? null : { measured, footing };
}

/** Litres per beat from the cycle theory and the beat rate alone. */
function theoryPerBeat(
  seen: Observation,
  installation: Installation,
  fall: Measured,
  lift: Measured,
): { delivered_l: Measured; waste_l: Measured } | null {
  const running = seen.beats_per_min_running ?? seen.beats_per_min;
  if (running === null || running.value <= 0 || fall.value <= 0 || lift.value <= fall.value) return null;
  const heads = { fall_m: fall.value, lift_m: lift.value };
  const constants = calibrateCycle(
    installation.drive_pipe,
    { ...heads, beats_per_min: running.value, waste_l_per_beat: null, delivered_l_per_beat: null },
    driveWaveSpeed(installation),
  );
  const cycle = constants && ramCycle(installation.drive_pipe, heads, constants);
  if (!cycle) return null;
  const share = (value: number): Measured => ({ value, u: THEORY_SHARE * value, by: 'the theory of the cycle' });
  return { delivered_l: share(cycle.delivered_l_per_beat), waste_l: share(cycle.waste_l_per_beat) };
}
