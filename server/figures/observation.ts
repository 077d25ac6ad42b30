import type { Measured } from './measured';

/** A stretch without a beat, with what the waste side showed meanwhile. */
export interface Still {
  from_ms: number;
  to_ms: number;
  /** Mean waste flow and valve-box pressure while still, where measured. */
  waste_lps: number | null;
  valve_box_kpa: number | null;
}

/**
 * What the sensors say of a span of time, before any expectation or bucket test: the part of the figures that costs
 * a read of the samples. Null where no sensor tells.
 */
export interface Observation {
  from_ms: number;
  to_ms: number;
  date?: string;
  /** Share of the span in which records stand no further apart than three usual steps. */
  coverage: number;
  /** Beats whose number is known, and the minutes over which it is known. */
  beats: number | null;
  beat_minutes: number;
  running_minutes: number;
  beats_per_min: Measured | null;
  beats_per_min_running: Measured | null;
  fall_m: Measured | null;
  chamber_head_m: Measured | null;
  chamber_ripple_kpa: Measured | null;
  meter_lps: Measured | null;
  tank_inflow_lps: Measured | null;
  waste_lps: Measured | null;
  drive_lps: Measured | null;
  still: Still[];
}
