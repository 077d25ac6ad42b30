import { randomFor } from './random';
import { instant, type Moment } from './simulate';
import type { InventedRam, LoggedSensor } from './valley';

/** One line of a logger: readings as text in the order of the sensors, null where there is none. */
export interface LoggerRecord {
  time_s: number;
  readings: (string | null)[];
}

const weight = 999.1 * 9.80665; // N/m³ of cool water
const unitSize: Record<string, number> = {
  kPa: 1000,
  bar: 1e5,
  psi: 6894.757,
  mH2O: 9806.65,
  m: 1,
  cm: 0.01,
  mm: 0.001,
  m3: 1000,
  L: 1,
};

/** Head over a 90° notch in m: Kindsvater and Shen, C 0.578, 0.85 mm added. */
const weirHead = (flow_lps: number): number =>
  flow_lps <= 0 ? 0 : (flow_lps / 1000 / ((8 / 15) * 0.578 * Math.sqrt(2 * 9.80665))) ** 0.4 - 0.00085;

/** What the sensor would read without noise, in its own unit. */
function exact(sensor: LoggedSensor, moment: Moment): number {
  const size = unitSize[sensor.unit ?? ''] ?? 1;
  switch (sensor.channel) {
    case 'beat_count':
      return moment.beats;
    case 'delivery_volume':
      return (sensor.place === 'tank' ? moment.meter_tank_l : moment.meter_ram_l) / size;
    case 'chamber_pressure':
      return ((moment.chamber_m - (sensor.height_m ?? 0)) * weight) / size;
    case 'chamber_ripple':
      return (moment.ripple_m * weight) / size;
    case 'source_level':
      return (moment.fall_m - (sensor.height_m ?? 0)) / size;
    case 'tank_level':
      return moment.tank_m / size;
    case 'waste_weir_head':
      return weirHead(moment.waste_lps) / size;
    case 'water_temperature':
      return 13 + 2.5 * Math.cos((2 * Math.PI * (moment.time_s / 86_400 - 31)) / 365.25);
    case 'battery':
      return 3.62 - 0.25 * (((moment.time_s / 86_400) % 150) / 150);
    default:
      throw new Error(`no ${sensor.channel} in this valley`);
  }
}

/** All records of a ram's logger, with the sensors' noise, steps, spikes and stuck stretches, the gap left out. */
export function logged(ram: InventedRam, moments: Moment[]): LoggerRecord[] {
  const random = randomFor(`${ram.key} logger`);
  const start = instant(ram.visits[0]!.at);
  const end = instant(ram.visits.at(-1)!.at);
  const reset = ram.counter_reset ? instant(ram.counter_reset) : Infinity;
  const beatsAtReset = moments.find((m) => m.time_s >= reset)?.beats ?? 0;
  const chance = ram.step_min / (365.25 * 1440);
  const held = ram.sensors.map(() => NaN);
  const records: LoggerRecord[] = [];
  for (const moment of moments) {
    const { time_s } = moment;
    const readings = ram.sensors.map((sensor, i) => {
      let value = exact(
        sensor,
        time_s >= reset && sensor.channel === 'beat_count' ? { ...moment, beats: moment.beats - beatsAtReset } : moment,
      );
      value += sensor.noise * random.normal();
      const stuck = sensor.stuck && time_s >= instant(sensor.stuck.from) && time_s <= instant(sensor.stuck.to);
      if (stuck && !Number.isNaN(held[i])) value = held[i]!;
      held[i] = value;
      if (sensor.spikes && random.next() < sensor.spikes.a_year * chance) value = sensor.spikes.reading;
      if (sensor.channel === 'beat_count') return String(Math.floor(value) % (sensor.rolls_over_at ?? Infinity));
      if (sensor.channel !== 'source_level') value = Math.max(0, value);
      if (ram.missing && random.next() < ram.missing) return null;
      const digits = Math.max(0, Math.round(-Math.log10(sensor.step)));
      const shown =
        sensor.channel === 'delivery_volume' ? Math.floor(value / sensor.step + 1e-9) : Math.round(value / sensor.step);
      return (shown * sensor.step).toFixed(sensor.step === 0.5 ? 1 : digits);
    });
    if (time_s < start || time_s > end) continue;
    if (ram.gap && time_s > instant(ram.gap.from) && time_s < instant(ram.gap.to)) continue;
    records.push({ time_s, readings });
  }
  return records;
}
