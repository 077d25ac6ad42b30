import { type Carried, type Cycle, type RamState, runToRest } from './cycle';
import { randomFor } from './random';
import { dateOf, day_s, dayNumber, fallByDay, severityAt } from './seasons';
import { Demand, depthAt, litresAt } from './tank';
import { type InventedRam, zone } from './valley';

/** Epoch seconds of a local time of the valley, such as 2026-03-12T10:42. */
export const instant = (local: string): number => Date.parse(`${local.slice(0, 16)}Z`) / 1000 - zone.hours * 3600;
/** Local time as a date and a clock, in a Date whose UTC fields are the local ones. */
export const localClock = (time_s: number): Date => new Date((time_s + zone.hours * 3600) * 1000);

/** Figures of the cycle that vary from hour to hour. */
type Flow = Pick<
  Cycle,
  'beats_per_min' | 'waste_lps' | 'ram_lps' | 'tank_lps' | 'drive_lps' | 'chamber_m' | 'ripple_m'
>;

/** What is true at the end of one logging interval. */
export interface Moment extends Flow {
  time_s: number;
  fall_m: number;
  beats: number;
  meter_ram_l: number;
  meter_tank_l: number;
  tank_m: number;
}

interface TruthDays {
  date: string[];
  fall_m: number[];
  beats_per_min: number[];
  delivery_l_per_day: number[];
  delivery_at_ram_l_per_day: number[];
  waste_l_per_day: number[];
  efficiency_daubuisson: number[];
}

export interface Simulation {
  moments: Moment[];
  days: TruthDays;
  /** First day on which delivery is 10 % down, or ripple 10 % up, against the sound ram at the same fall. */
  reached_10_percent_on: string | null;
  /** The state of the ram at a local time. */
  stateAt(local: string): RamState;
  flowAt(time_s: number): Flow;
}

const stopped = (ram: InventedRam, time_s: number) =>
  ram.stopped !== undefined && time_s > instant(ram.stopped.from) && time_s <= instant(ram.stopped.to);

const mix = (a: Flow, b: Flow, w: number): Flow => {
  const of = (name: keyof Flow) => a[name] + (b[name] - a[name]) * w;
  return {
    beats_per_min: of('beats_per_min'),
    waste_lps: of('waste_lps'),
    ram_lps: of('ram_lps'),
    tank_lps: of('tank_lps'),
    drive_lps: of('drive_lps'),
    chamber_m: of('chamber_m'),
    ripple_m: of('ripple_m'),
  };
};

/** Lives through the ram's months: the cycle is worked out at every noon and at a repair, and read off between. */
export function simulate(ram: InventedRam): Simulation {
  const random = randomFor(`${ram.key} days`);
  const falls = fallByDay(ram);
  const firstNoon = dayNumber(ram.first) - 1 + 0.5;
  const fallAt = (day: number) => {
    const i = Math.max(0, Math.min(falls.length - 2, Math.floor(day - firstNoon)));
    return falls[i]! + (falls[i + 1]! - falls[i]!) * (day - firstNoon - i);
  };
  const stateOn = (day: number, severity = severityAt(ram, day)): RamState => {
    const sound = { ...ram.state, fall_m: fallAt(day) };
    return severity > 0 ? { ...sound, ...ram.fault?.changes(sound, severity) } : sound;
  };

  const nodes = falls.map((_, i) => firstNoon + i);
  if (ram.fault?.repaired_on) {
    const repaired = dayNumber(ram.fault.repaired_on) + 10.4 / 24;
    nodes.push(repaired - 1e-4, repaired + 1e-4);
    nodes.sort((a, b) => a - b);
  }
  const carried: Carried = { air_m3: ram.state.air_m3, pipe_m3ps: 0, speed_mps: 0 };
  const flows: Flow[] = [];
  let reached: string | null = null;
  for (const day of nodes) {
    const flow = runToRest(stateOn(day), carried);
    flows.push(flow);
    if (reached === null && severityAt(ram, day) > 0) {
      const sound = runToRest(stateOn(day, 0), { ...carried });
      if (flow.tank_lps < 0.9 * sound.tank_lps || flow.ripple_m > 1.1 * sound.ripple_m)
        reached = dateOf(Math.floor(day));
    }
  }
  const openFlow = (day: number): Flow => runToRest({ ...stateOn(day), closing_mps: 99 });
  let node = 0;
  const flowAt = (time_s: number): Flow => {
    const day = (time_s + zone.hours * 3600) / day_s;
    if (stopped(ram, time_s)) return openFlow(day);
    if (nodes[node]! > day) node = 0;
    while (node < nodes.length - 2 && nodes[node + 1]! < day) node++;
    return mix(flows[node]!, flows[node + 1]!, (day - nodes[node]!) / (nodes[node + 1]! - nodes[node]!));
  };

  const tank = ram.installation.tank;
  const full_l = tank ? litresAt(tank, tank.overflow_m!) : 0;
  let litres = full_l * 0.6;
  const usual = flows.slice(0, 60).reduce((sum, f) => sum + f.tank_lps, 0) / 60;
  const demand = new Demand(random, usual * day_s);
  const step_s = ram.step_min * 60;
  const from = instant(`${ram.first}T00:00`);
  const to = instant(`${ram.last}T00:00`) + day_s;
  const moments: Moment[] = [];
  const sums = { steps: 0, fall: 0, beats: 0, tank: 0, ram: 0, waste: 0, drive: 0 };
  const days: TruthDays = {
    date: [],
    fall_m: [],
    beats_per_min: [],
    delivery_l_per_day: [],
    delivery_at_ram_l_per_day: [],
    waste_l_per_day: [],
    efficiency_daubuisson: [],
  };
  let beats = 1200;
  let meter_ram_l = 184_250;
  let meter_tank_l = 96_410;
  for (let time_s = from + step_s; time_s <= to; time_s += step_s) {
    const middle = time_s - step_s / 2;
    const flow = flowAt(middle);
    const day = (middle + zone.hours * 3600) / day_s;
    const hour = (day % 1) * 24;
    if (hour > 5 && hour < 5 + ram.step_min / 60) demand.newDay(full_l > 0 ? litres / full_l : 0);
    beats += flow.beats_per_min * ram.step_min;
    meter_ram_l += flow.ram_lps * step_s;
    meter_tank_l += flow.tank_lps * step_s;
    litres = Math.min(full_l, Math.max(0, litres + (flow.tank_lps - demand.at(hour)) * step_s));
    moments.push({
      ...flow,
      time_s,
      fall_m: fallAt(day),
      beats,
      meter_ram_l,
      meter_tank_l,
      tank_m: tank ? depthAt(tank, litres) : 0,
    });
    sums.steps++;
    sums.fall += fallAt(day);
    sums.beats += flow.beats_per_min;
    sums.tank += flow.tank_lps;
    sums.ram += flow.ram_lps;
    sums.waste += flow.waste_lps;
    sums.drive += flow.drive_lps * fallAt(day);
    if (sums.steps * step_s === day_s) {
      const n = sums.steps;
      days.date.push(dateOf(Math.floor(day)));
      days.fall_m.push(round(sums.fall / n, 4));
      days.beats_per_min.push(round(sums.beats / n, 3));
      days.delivery_l_per_day.push(round((sums.tank / n) * day_s, 1));
      days.delivery_at_ram_l_per_day.push(round((sums.ram / n) * day_s, 1));
      days.waste_l_per_day.push(round((sums.waste / n) * day_s, 1));
      days.efficiency_daubuisson.push(round(sums.drive > 0 ? (sums.tank * ram.state.lift_m) / sums.drive : 0, 4));
      for (const name of Object.keys(sums) as (keyof typeof sums)[]) sums[name] = 0;
    }
  }
  return {
    moments,
    days,
    reached_10_percent_on: reached,
    stateAt: (local) => stateOn((instant(local) + zone.hours * 3600) / day_s),
    flowAt,
  };
}

export const round = (value: number, digits: number): number => Number(value.toFixed(digits));
