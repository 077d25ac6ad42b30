import type { Installation } from '../server/shapes/installation';
import type { Visit } from '../server/shapes/visit';
import { burst } from './bursts';
import { writers } from './dialects';
import { logged } from './logger';
import { type Random, randomFor } from './random';
import { instant, round, type Simulation, simulate } from './simulate';
import { type InventedRam, type LoggedSensor, type PlannedVisit, zone } from './valley';

/** The files of one ram and what was put into them. */
interface MadeRam {
  files: Map<string, Buffer>;
  truth: object;
}

const json = (value: unknown) => Buffer.from(`${JSON.stringify(value, null, 2)}\n`);
const overlap_s = 2 * 86_400;

const surveyed = ({ heading: _h, step: _s, noise: _n, spikes: _p, stuck: _t, ...sensor }: LoggedSensor) => sensor;

const bucketTest = (random: Random, of: 'delivery' | 'waste', litres: number, flow_lps: number) => {
  const bias = 1 + 0.008 * random.normal();
  return {
    of,
    litres,
    seconds: [1, 2, 3].map(() => round((litres / flow_lps) * bias * (1 + 0.012 * random.normal()), 1)),
  };
};

function visitOf(ram: InventedRam, plan: PlannedVisit, simulation: Simulation): Partial<Visit> {
  const random = randomFor(`${ram.key} visit ${plan.at}`);
  // half an hour on: tests are done when the work is
  const flow = simulation.flowAt(instant(plan.at) + 1800);
  const state = simulation.stateAt(plan.at);
  const tested = plan.bucket && flow.beats_per_min > 0;
  return {
    visited_at: plan.at,
    who: ram.who,
    running_on_arrival: plan.running_on_arrival ?? true,
    bucket_tests: tested
      ? [bucketTest(random, 'delivery', 10, flow.tank_lps), bucketTest(random, 'waste', 20, flow.waste_lps)]
      : [],
    ...(tested
      ? { counted_beats: { beats: Math.round(flow.beats_per_min * 2), seconds: round(120 + 0.5 * random.normal(), 1) } }
      : {}),
    fall_m: round(state.fall_m + 0.01 * random.normal(), 2),
    actions: plan.actions ?? [],
    ...(plan.parts_used ? { parts_used: plan.parts_used } : {}),
    note: plan.note,
  };
}

/** Makes one ram in memory: the same bytes at every run. */
export function makeRam(ram: InventedRam): MadeRam {
  const simulation = simulate(ram);
  const records = logged(ram, simulation.moments);
  const installation: Partial<Installation> = {
    ...ram.installation,
    time_zone: zone.name,
    fall_m: ram.state.fall_m,
    sensors: ram.sensors.map(surveyed),
  };
  const files = new Map<string, Buffer>([
    ['ram.json', json(installation)],
    ['visits.json', json(ram.visits.map((plan) => visitOf(ram, plan, simulation)))],
  ]);
  let from = -Infinity;
  let number = 0;
  for (const plan of ram.visits.filter((v) => v.download)) {
    const to = instant(plan.at);
    number++;
    const file = writers[ram.dialect](
      ram,
      records.filter((r) => r.time_s > from && r.time_s <= to),
      number,
    );
    files.set(file.name, file.bytes);
    // the logger was not emptied: the next download tells the last two days again
    from = to - overlap_s;
  }
  const bursts = ram.visits.filter((plan) => plan.burst).map((plan) => burst(ram, plan, simulation.stateAt(plan.at)));
  for (const made of bursts) files.set(made.name, made.bytes);
  const truth = {
    fault: ram.fault?.words ?? (ram.stopped ? 'stops with the waste valve open' : null),
    began_on: ram.fault?.began_on ?? ram.stopped?.from.slice(0, 10) ?? null,
    reached_10_percent_on: simulation.reached_10_percent_on ?? ram.stopped?.from.slice(0, 10) ?? null,
    repaired_on: ram.fault?.repaired_on ?? ram.stopped?.to.slice(0, 10) ?? null,
    bursts: bursts.map(({ name, beats, beats_per_min }) => ({ name, beats, beats_per_min: round(beats_per_min, 3) })),
    days: simulation.days,
  };
  return { files, truth };
}
