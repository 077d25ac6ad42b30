/*
 * The beat of a ram by the rigid-column theory: the column runs up behind the open waste valve, the valve shuts, the column pumps
 * against the net lift, a small recoil reopens the valve. After Lansford & Dugan (1941), Krol (1951), Iversen (1975) and
 * Young (1995); equations from memory, re-derived, checked against a worked ram in test/published/ram-cycle.test.ts.
 */
import type { PipeMaterial } from '../shapes/installation';
import { bisect, placeOfLeast } from './bracketed';
import { requireNotNegative, requireNumber, requirePositive } from './impossible';
import { darcyFrictionFactor } from './pipe-friction';
import { pipeRoughness_mm } from './pipe-materials';
import { type Column, columnBeat, type RamHeads } from './rigid-column';
import { GRAVITY, WATER_VISCOSITY_M2_PER_S } from './water';

/** What the theory leaves free: the setting and the state of one ram. */
export interface CycleConstants {
  /** Drive velocity at which the waste valve shuts, m/s: rises with its stroke and weight. */
  closing_velocity_m_per_s: number;
  /** Losses of drive pipe, open waste valve and exit together, on v²/2g. */
  loss_coefficient: number;
  /** Time the waste valve takes to shut, s: water escapes at the closing velocity and the column gains nothing. */
  dead_time_s: number;
  /** Share of the rigid column's delivery that really arrives, 0 to 1; the rest goes in steps, valve loss and backflow. */
  delivered_share: number;
  /** Speed of a pressure wave in the drive pipe, m/s. */
  wave_speed_m_per_s: number;
  /** Flow area at work over that of the stated bore; 1 unless a waste bucket told otherwise. A nominal bore is often 5 % off. */
  flow_area_share?: number | undefined;
}

/** One beat and the flows of a ram that repeats it. */
export interface Cycle {
  beats_per_min: number;
  waste_l_per_beat: number;
  delivered_l_per_beat: number;
  /** Waste and delivery together: all that comes down the drive pipe. */
  drive_lps: number;
  waste_lps: number;
  delivery_lps: number;
  acceleration_s: number;
  closing_s: number;
  pumping_s: number;
  recoil_s: number;
  /** Velocity the column would settle at with the waste valve held open. */
  steady_velocity_m_per_s: number;
  /** Closing velocity over steady velocity, 0 to 1; about 0.8 for the most delivery. */
  closing_ratio: number;
  /** Velocity back up the drive pipe at the start of the recoil. */
  recoil_velocity_m_per_s: number;
  /** The highest lift this closing velocity can pump to. */
  highest_lift_m: number;
}

/** The drive pipe: its material sets the friction to expect, steel where unstated. */
export interface DrivePipe extends Column {
  material?: PipeMaterial | undefined;
}

/** What a visit or a set-up span tells of a beat. */
export interface ObservedCycle extends RamHeads {
  beats_per_min: number;
  waste_l_per_beat: number | null;
  delivered_l_per_beat: number | null;
}

/** A waste valve shuts in 20 to 60 ms (project reference, from memory). */
const USUAL_DEAD_TIME_S = 0.04;
/** Share delivered where no bucket told: a modelled valve and pipe cost about 12 %, backflow some more (from memory, own choice). */
const USUAL_DELIVERED_SHARE = 0.85;
/** A ram that delivers less than this of its theory was no sound base to calibrate on (own choice). */
const LEAST_DELIVERED_SHARE = 0.05;
/** The velocity head lost at the outlet: no ram has less. */
const EXIT_LOSS = 1;
/** Exit, square entrance 0.5, open waste valve about 3 on the bore's v²/2g (handbook values, from memory). */
const LOCAL_LOSSES = EXIT_LOSS + 0.5 + 3;
/** Standard doubt of the prior losses, as a logarithm, and the furthest a ram may lie from them, as a factor (own choice). */
const LOSS_DOUBT = 0.4;
const LOSS_REACH = 4;
/** Standard doubt of the flow area and of a bucket together, as a logarithm, and what is believed at all (own choice). */
const AREA_DOUBT = 0.06;
const LEAST_AREA_SHARE = 0.5;
const MOST_AREA_SHARE = 2;
/** The most a sound ram delivers of its rigid column's share, and how sharply more is doubted (own choice). */
const BEST_DELIVERED_SHARE = 0.95;
const DELIVERED_SHARE_DOUBT = 0.03;
/** Beats nearer to standing open than this are not told apart by their rate. */
const HIGHEST_CLOSING_RATIO = 0.99;

/**
 * The beat at given heads. Rigid water column, constant losses, no recoil lost.
 *
 * Null where no beat is possible: no fall, no net lift, a column too slow to shut the waste valve (it stays open), or a closing
 * surge a·v/g that does not reach the lift. Throws RangeError for a pipe, heads or constants that cannot be.
 */
export function ramCycle(drive_pipe: DrivePipe, heads: RamHeads, constants: CycleConstants): Cycle | null {
  requirePipe(drive_pipe);
  requireHeads(heads);
  requireConstants(constants);
  const { fall_m, lift_m } = heads;
  if (fall_m <= 0 || lift_m <= fall_m) return null;
  const { closing_velocity_m_per_s: closing, loss_coefficient, dead_time_s, wave_speed_m_per_s } = constants;
  const steady = Math.sqrt((2 * GRAVITY * fall_m) / loss_coefficient);
  const highest_lift_m = fall_m + (wave_speed_m_per_s * closing) / GRAVITY;
  if (closing >= steady || highest_lift_m <= lift_m) return null;

  const ratio = closing / steady;
  const beat = columnBeat(drive_pipe, heads, { velocity_m_per_s: closing, ratio, dead_time_s }, wave_speed_m_per_s);
  const area_share = constants.flow_area_share ?? 1;
  const waste_l = area_share * beat.waste_l;
  const delivered_l = area_share * constants.delivered_share * beat.pumped_l;
  return {
    beats_per_min: 60 / beat.period_s,
    waste_l_per_beat: waste_l,
    delivered_l_per_beat: delivered_l,
    drive_lps: (waste_l + delivered_l) / beat.period_s,
    waste_lps: waste_l / beat.period_s,
    delivery_lps: delivered_l / beat.period_s,
    acceleration_s: beat.acceleration_s,
    closing_s: dead_time_s,
    pumping_s: beat.pumping_s,
    recoil_s: beat.recoil_s,
    steady_velocity_m_per_s: steady,
    closing_ratio: ratio,
    recoil_velocity_m_per_s: (GRAVITY * (lift_m - fall_m)) / wave_speed_m_per_s,
    highest_lift_m,
  };
}

/**
 * The constants that make the theory repeat what was observed at known heads.
 *
 * The beat rate fixes the closing velocity for any losses. Waste per beat at a given rate then hardly depends on the losses
 * (about A·g·H·T²/2L for small ones): a bucket that is 2 % off would double or halve them. So the losses are the most likely ones,
 * weighed between their prior (exit, entrance, open valve, pipe friction; from memory), the stated bore and a delivery that must
 * not exceed the theory's; the rest of the waste goes to the flow area, so that rate and waste observed are repeated exactly.
 * The closing time is 0.04 s (20 to 60 ms, from memory). The delivered share comes from the delivery bucket, kept between 0.05
 * and 1, or is 0.85 where none was taken: a delivery above the theory's is not repeated.
 *
 * Null where no physical beat has these figures. Throws RangeError for a pipe or figures that cannot be (not a number, negative).
 */
export function calibrateCycle(
  drive_pipe: DrivePipe,
  observed: ObservedCycle,
  wave_speed_m_per_s: number,
): CycleConstants | null {
  requirePipe(drive_pipe);
  requireHeads(observed);
  requirePositive(wave_speed_m_per_s, 'a wave speed', 'm/s');
  const { fall_m, lift_m, beats_per_min, waste_l_per_beat, delivered_l_per_beat } = observed;
  requireNotNegative(beats_per_min, 'a beat rate', 'per minute');
  requireNotNegative(waste_l_per_beat ?? 0, 'waste per beat', 'L');
  requireNotNegative(delivered_l_per_beat ?? 0, 'delivery per beat', 'L');
  if (fall_m <= 0 || lift_m <= fall_m || beats_per_min === 0 || waste_l_per_beat === 0) return null;

  const prior = priorLossCoefficient(drive_pipe);
  const trial = (ratio: number) => trialOf(drive_pipe, observed, wave_speed_m_per_s, ratio);
  const low = trialAtLoss(trial, prior / LOSS_REACH);
  const high = trialAtLoss(trial, prior * LOSS_REACH);
  if (low === null || high === null) return null;
  const areaShare = (one: Trial) => (waste_l_per_beat ?? one.waste_l) / one.waste_l;
  const deliveredShare = (one: Trial) =>
    delivered_l_per_beat === null ? USUAL_DELIVERED_SHARE : delivered_l_per_beat / (areaShare(one) * one.pumped_l);
  const strain = (ratio: number) => {
    const one = trial(ratio)!;
    return (
      (Math.log(one.loss_coefficient / prior) / LOSS_DOUBT) ** 2 +
      (Math.log(areaShare(one)) / AREA_DOUBT) ** 2 +
      (Math.max(0, deliveredShare(one) - BEST_DELIVERED_SHARE) / DELIVERED_SHARE_DOUBT) ** 2
    );
  };
  const found = trial(placeOfLeast(low.ratio, high.ratio, strain))!;
  const area_share = areaShare(found);
  if (wave_speed_m_per_s * found.closing <= GRAVITY * (lift_m - fall_m)) return null;
  if (found.loss_coefficient < EXIT_LOSS) return null;
  if (area_share < LEAST_AREA_SHARE || area_share > MOST_AREA_SHARE) return null;
  return {
    closing_velocity_m_per_s: found.closing,
    loss_coefficient: found.loss_coefficient,
    dead_time_s: USUAL_DEAD_TIME_S,
    delivered_share: Math.min(1, Math.max(LEAST_DELIVERED_SHARE, deliveredShare(found))),
    wave_speed_m_per_s,
    flow_area_share: area_share,
  };
}

interface Trial {
  closing: number;
  ratio: number;
  loss_coefficient: number;
  waste_l: number;
  pumped_l: number;
}

/** The one beat of the observed rate and a closing ratio: the period is a straight line in the closing velocity. */
function trialOf(pipe: DrivePipe, observed: ObservedCycle, wave_speed: number, ratio: number): Trial | null {
  const unit = columnBeat(pipe, observed, { velocity_m_per_s: 1, ratio, dead_time_s: 0 }, wave_speed);
  const moving_s = 60 / observed.beats_per_min - USUAL_DEAD_TIME_S - unit.recoil_s;
  const closing = moving_s / (unit.acceleration_s + unit.pumping_s);
  if (!(closing > 0)) return null;
  const { waste_l, pumped_l } = columnBeat(
    pipe,
    observed,
    { velocity_m_per_s: closing, ratio, dead_time_s: USUAL_DEAD_TIME_S },
    wave_speed,
  );
  const loss_coefficient = (2 * GRAVITY * observed.fall_m * ratio ** 2) / closing ** 2;
  return { closing, ratio, loss_coefficient, waste_l, pumped_l };
}

/** At a given beat rate the losses rise with the closing ratio, so that one ratio belongs to one loss coefficient. */
function trialAtLoss(trial: (ratio: number) => Trial | null, loss_coefficient: number): Trial | null {
  const highest = trial(HIGHEST_CLOSING_RATIO);
  if (highest === null || highest.loss_coefficient <= loss_coefficient) return highest;
  return trial(bisect(0, HIGHEST_CLOSING_RATIO, (ratio) => trial(ratio)!.loss_coefficient - loss_coefficient));
}

/** Losses to expect before a ram is known, on v²/2g: exit, entrance, open waste valve, and friction at about 1 m/s. From memory. */
function priorLossCoefficient({ length_m, bore_mm, material = 'steel' }: DrivePipe): number {
  const roughness = Math.min(0.1, pipeRoughness_mm(material) / bore_mm);
  return (
    LOCAL_LOSSES +
    darcyFrictionFactor(bore_mm / 1000 / WATER_VISCOSITY_M2_PER_S, roughness) * (length_m / (bore_mm / 1000))
  );
}

function requirePipe({ length_m, bore_mm }: DrivePipe): void {
  requirePositive(length_m, 'a drive pipe length', 'm');
  requirePositive(bore_mm, 'a drive pipe bore', 'mm');
}

function requireHeads({ fall_m, lift_m }: RamHeads): void {
  requireNumber(fall_m, 'a fall', 'm');
  requireNumber(lift_m, 'a lift', 'm');
}

function requireConstants(constants: CycleConstants): void {
  requirePositive(constants.closing_velocity_m_per_s, 'a closing velocity', 'm/s');
  requirePositive(constants.loss_coefficient, 'a loss coefficient', 'on v²/2g');
  requirePositive(constants.wave_speed_m_per_s, 'a wave speed', 'm/s');
  requirePositive(constants.flow_area_share ?? 1, 'a flow area share', 'of the bore');
  requireNotNegative(constants.dead_time_s, 'a dead time', 's');
  if (!(constants.delivered_share >= 0 && constants.delivered_share <= 1))
    throw new RangeError(`a delivered share of ${constants.delivered_share}; 0 to 1 was expected`);
}
