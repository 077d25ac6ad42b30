import { type RamState, runToRest } from './cycle';
import { randomFor } from './random';
import { instant, localClock } from './simulate';
import type { InventedRam, PlannedVisit } from './valley';

const weight_kpa = 9.798;

interface Burst {
  name: string;
  bytes: Buffer;
  beats: number;
  beats_per_min: number;
}

/** Pressure in the valve box and in the chamber for half a minute, from one settled cycle repeated. */
export function burst(ram: InventedRam, visit: PlannedVisit, state: RamState): Burst {
  const plan = visit.burst!;
  const random = randomFor(`${ram.key} burst ${visit.at}`);
  const cycle = runToRest(state, undefined, true);
  const period = 60 / cycle.beats_per_min;
  const ring_s = (4 * state.drive_length_m) / state.wave_mps;
  const headAt = (t: number) => {
    let low = 0;
    let high = cycle.trace.length - 1;
    while (low < high) {
      const middle = (low + high) >> 1;
      if (cycle.trace[middle]!.time_s < t) low = middle + 1;
      else high = middle;
    }
    return cycle.trace[low]!.head_m;
  };
  /** Valve box head t seconds after the waste valve closed. */
  const box = (t: number) => {
    const chamber = headAt(t);
    if (t < cycle.pumping_s) {
      const step = (2 * state.drive_length_m) / state.wave_mps;
      const knock = 0.18 * chamber * Math.exp(-t / (0.35 * step)) * Math.cos((2 * Math.PI * t) / (0.12 * step));
      return chamber * 1.02 + 0.4 + knock;
    }
    // the column springs back and the wave runs to and fro, dying away while water gathers speed through the valve
    const after = t - cycle.pumping_s;
    const speed = Math.max(0, Math.min(1, after / cycle.open_s)) * state.closing_mps;
    const drag = (1.6 * (speed * speed)) / (2 * 9.80665);
    const ring = 0.12 * chamber * Math.exp(-after / (1.6 * ring_s)) * Math.cos((2 * Math.PI * after) / ring_s);
    return Math.max(-8, drag - ring);
  };
  const start = instant(visit.at) + 5 + Math.floor(random.between(0, 40));
  const c = localClock(start);
  const text = c.toISOString();
  const count = plan.seconds * plan.per_second;
  const lines = [
    `ram ${ram.installation.name}, pressures of one burst`,
    ...(plan.stamps === 'seconds' ? [`start ${text.slice(0, 10)} ${text.slice(11, 19)}`] : []),
    [plan.stamps === 'seconds' ? 't_s' : 'Time', 'valve box kPa', 'chamber kPa'].join(','),
  ];
  // beats are not clockwork: each differs a little from the last
  let beats = 0;
  let firstClosing = 0;
  let closed = -random.between(0.1, 0.9) * period;
  let length = period;
  for (let i = 0; i < count; i++) {
    const t = i / plan.per_second;
    while (t - closed >= length) {
      closed += length;
      length = period * (1 + 0.008 * random.normal());
      if (beats++ === 0) firstClosing = closed;
    }
    const phase = ((t - closed) / length) * period;
    const at = new Date(c.getTime() + Math.round(t * 1000)).toISOString();
    const stamp = plan.stamps === 'seconds' ? t.toFixed(3) : `${at.slice(0, 10)} ${at.slice(11, 23)}`;
    const valve = box(phase) * weight_kpa + 1.2 * random.normal();
    const chamber = headAt(phase) * weight_kpa + 0.25 * random.normal();
    lines.push(`${stamp},${valve.toFixed(1)},${chamber.toFixed(1)}`);
  }
  lines.push('');
  return {
    name: `burst-${visit.at.slice(0, 10)}.csv`,
    bytes: Buffer.from(lines.join('\n')),
    beats,
    beats_per_min: (60 * (beats - 1)) / (closed - firstClosing),
  };
}
