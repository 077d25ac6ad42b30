import type { RamState } from './cycle';

/** What differs from ram to ram, in the units of the trade. */
interface Survey {
  fall_m: number;
  lift_m: number;
  drive_m: number;
  drive_mm: number;
  drive_loss: number;
  closing_mps: number;
  wave_mps: number;
  air_l: number;
  delivery_m: number;
  delivery_mm: number;
}

/** A ram in good order. */
export const soundRam = (survey: Survey): RamState => ({
  fall_m: survey.fall_m,
  lift_m: survey.lift_m,
  drive_length_m: survey.drive_m,
  drive_bore_m: survey.drive_mm / 1000,
  drive_loss: survey.drive_loss,
  closing_mps: survey.closing_mps,
  closing_time_s: 0.03,
  wave_mps: survey.wave_mps,
  pumping_loss: 6,
  recoil: 0.9,
  air_m3: survey.air_l / 1000,
  delivery_length_m: survey.delivery_m,
  delivery_bore_m: survey.delivery_mm / 1000,
  delivery_friction: 0.028,
  seat_leak_m2: 0,
  delivery_valve_leak_m2: 0,
  delivery_pipe_leak_m2: 0,
});
