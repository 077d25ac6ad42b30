import { type CycleConstants, ramCycle } from '../../server/hydraulics/ram-cycle';
import type { Figure, SpanFigures } from '../../server/shapes/figure';
import { type Installation, installation } from '../../server/shapes/installation';
import { random } from '../beats/simulated-burst';

export const ram: Installation = installation.parse({
  name: 'Test',
  time_zone: 'UTC',
  fall_m: 3.2,
  lift_m: 26,
  drive_pipe: { length_m: 18, bore_mm: 53, material: 'steel' },
  tank: { shape: 'upright cylinder', diameter_m: 2.5, height_m: 2.2 },
  sensors: [
    { channel: 'beat_count' },
    { channel: 'tank_level' },
    { channel: 'chamber_pressure' },
    { channel: 'source_level', height_m: 3 },
  ],
});

/** Constants other than any the calibration assumes: a true ram that the program does not know. */
const truth: CycleConstants = {
  closing_velocity_m_per_s: 1.35,
  loss_coefficient: 7.5,
  dead_time_s: 0.05,
  delivered_share: 0.78,
  wave_speed_m_per_s: 1376,
};

/** What a fault does to the days' figures, as factors, grown to 1 at full severity. */
export interface Fault {
  from: number;
  /** Days over which it grows. */
  grows: number;
  until?: number;
  constants?: (truth: CycleConstants, severity: number) => CycleConstants;
  beats?: number;
  delivered?: number;
  tank?: number;
  head?: number;
  ripple?: number;
}

export interface Season {
  days: number;
  /** Swing of the fall over the year, as a share. */
  swing?: number;
  fault?: Fault;
  seed: number;
  ripple?: boolean;
  waste?: boolean;
}

const figure = (value: number, footing: Figure['footing'] = 'metered'): Figure => ({
  value,
  low: value * 0.97,
  high: value * 1.03,
  footing,
});

/** Days of a ram by the theory with constants of its own, leaning noise on every observable (AR(1), 0.4), and one fault. */
export function simulatedDays({
  days,
  swing = 0.1,
  fault,
  seed,
  ripple = false,
  waste = false,
}: Season): SpanFigures[] {
  const next = random(seed * 7919);
  const normal = () => Math.sqrt(-2 * Math.log(next() + 1e-12)) * Math.cos(2 * Math.PI * next());
  const leaning = (sd: number) => {
    let state = 0;
    return () => {
      state = 0.4 * state + sd * Math.sqrt(1 - 0.16) * normal();
      return Math.exp(state);
    };
  };
  const noise = {
    beats: leaning(0.004),
    delivered: leaning(0.025),
    head: leaning(0.004),
    ripple: leaning(0.04),
    waste: leaning(0.02),
  };
  const usual = ramCycle(ram.drive_pipe, { fall_m: 3.2, lift_m: 26 }, truth)!;
  const start = Math.floor(next() * 365);
  return Array.from({ length: days }, (_, d) => {
    const severity =
      fault === undefined || d < fault.from || d >= (fault.until ?? days)
        ? 0
        : Math.min(1, (d - fault.from + 1) / fault.grows);
    const grown = (factor: number | undefined) => Math.exp(severity * Math.log(factor ?? 1));
    const fall_m = 3.2 * (1 + swing * Math.sin((2 * Math.PI * (d + start)) / 365) + 0.01 * normal());
    const cycle = ramCycle(
      ram.drive_pipe,
      { fall_m, lift_m: 26 },
      fault?.constants === undefined ? truth : fault.constants(truth, severity),
    )!;
    const beats = cycle.beats_per_min * grown(fault?.beats) * noise.beats();
    const perBeat = cycle.delivered_l_per_beat * grown(fault?.delivered) * grown(fault?.tank) * noise.delivered();
    const wasted = cycle.waste_l_per_beat * noise.waste();
    const date = new Date(Date.UTC(2030, 0, 1) + d * 86_400_000).toISOString();
    return {
      from: date,
      to: date,
      date: date.slice(0, 10),
      coverage: 1,
      running_share: 1,
      fall_m: figure(fall_m),
      lift_m: figure(26, 'stated'),
      chamber_head_m: figure(
        (26 + (cycle.delivery_lps / usual.delivery_lps) ** 1.85) * grown(fault?.head) * noise.head(),
      ),
      chamber_ripple_kpa: ripple ? figure(6 * grown(fault?.ripple) * noise.ripple()) : null,
      beats_per_min: figure(beats),
      beats_per_min_running: figure(beats),
      delivery_l_per_day: figure(perBeat * beats * 1440, 'from tank'),
      tank_inflow_l_per_day: figure(perBeat * beats * 1440, 'from tank'),
      waste_l_per_day: figure(wasted * beats * 1440, waste ? 'metered' : 'bucket-scaled'),
      drive_l_per_day: null,
      delivered_l_per_beat: figure(perBeat, 'from tank'),
      waste_l_per_beat: figure(wasted, waste ? 'metered' : 'bucket-scaled'),
      efficiency_daubuisson: null,
      efficiency_rankine: null,
    };
  });
}
