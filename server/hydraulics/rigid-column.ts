/*
 * The drive column as one rigid body of water: how long it takes and how much it spills and pumps in one beat. Equations after
 * Lansford & Dugan (1941) and Iversen (1975), from memory, re-derived from L·dv/dt = g·H − K·v²/2.
 */
import { GRAVITY } from './water';

/** Length and bore of the pipe that holds the column. */
export interface Column {
  length_m: number;
  bore_mm: number;
}

/** Heights above the waste valve outlet: source surface, and the level the ram pumps to. */
export interface RamHeads {
  fall_m: number;
  lift_m: number;
}

/** The valve's part in a beat: it shuts at a velocity, a share of the steady one, within a time. */
export interface Closing {
  velocity_m_per_s: number;
  /** Closing velocity over the velocity the column would settle at, 0 to below 1. */
  ratio: number;
  dead_time_s: number;
}

/** Times and volumes of one beat of a rigid column. */
export interface ColumnBeat {
  acceleration_s: number;
  pumping_s: number;
  recoil_s: number;
  period_s: number;
  waste_l: number;
  pumped_l: number;
}

/**
 * One beat. The column runs up from rest to the closing velocity, spills at that velocity while the valve shuts, is stopped by
 * the net lift, and comes to rest again after the recoil that one wave step leaves it. Fall and net lift must be above 0.
 */
export function columnBeat(
  { length_m, bore_mm }: Column,
  { fall_m, lift_m }: RamHeads,
  { velocity_m_per_s: velocity, ratio, dead_time_s }: Closing,
  wave_speed_m_per_s: number,
): ColumnBeat {
  const litres_per_m = (Math.PI / 4) * (bore_mm / 1000) ** 2 * 1000;
  const driving = GRAVITY * fall_m;
  const braking = GRAVITY * (lift_m - fall_m);
  const acceleration_s = ((length_m * velocity) / driving) * slowing(ratio);
  const pumping_s = (length_m * velocity) / braking;
  const recoil_s = (length_m * braking) / (wave_speed_m_per_s * driving);
  const run_up_l = ((litres_per_m * length_m * velocity ** 2) / (2 * driving)) * spilling(ratio);
  return {
    acceleration_s,
    pumping_s,
    recoil_s,
    period_s: acceleration_s + dead_time_s + pumping_s + recoil_s,
    waste_l: run_up_l + litres_per_m * velocity * dead_time_s,
    pumped_l: (litres_per_m * length_m * velocity ** 2) / (2 * braking),
  };
}

/** Below this ratio the first terms of the series are exact to a double. */
const SMALL = 1e-4;

/** Run-up time with losses over run-up time without, artanh(r)/r. */
const slowing = (ratio: number): number => (ratio < SMALL ? 1 + ratio ** 2 / 3 : Math.atanh(ratio) / ratio);

/** Water spilled in the run-up with losses over the same without, −ln(1 − r²)/r². */
const spilling = (ratio: number): number =>
  ratio < SMALL ? 1 + ratio ** 2 / 2 : -Math.log1p(-(ratio ** 2)) / ratio ** 2;
