/**
 * One beat of a ram, integrated in time: a rigid column that accelerates, a waste valve that closes, a delivery in
 * elastic steps of 2L/a against the head of the air chamber, a recoil. The chamber feeds the delivery pipe, whose
 * column has its own inertia and friction. Beats are repeated until one is like the next.
 * Written apart from server/hydraulics on purpose: what the demonstration puts in must not come from what is judged by it.
 */
const g = 9.80665;
const atmosphere_m = 10.0; // head of the air outside, some 300 m above the sea
const polytropic = 1.2;
const discharge = 0.62; // of a small sharp-edged leak

/** A ram in one state, SI units; heights above the waste valve outlet. */
export interface RamState {
  fall_m: number;
  lift_m: number;
  drive_length_m: number;
  drive_bore_m: number;
  /** Head loss of the open drive path, exit included, in velocity heads. */
  drive_loss: number;
  /** Pipe speed at which the waste valve closes. */
  closing_mps: number;
  closing_time_s: number;
  wave_mps: number;
  /** Loss past the delivery valve and along the drive pipe while pumping, in velocity heads. */
  pumping_loss: number;
  /** Share of the greatest possible recoil that is left, 0 to 1. */
  recoil: number;
  /** Air in the chamber at the static head of the lift. */
  air_m3: number;
  delivery_length_m: number;
  delivery_bore_m: number;
  delivery_friction: number;
  seat_leak_m2: number;
  delivery_valve_leak_m2: number;
  delivery_pipe_leak_m2: number;
}

export interface Cycle {
  stopped: 'no' | 'open' | 'shut';
  beats_per_min: number;
  /** Litres a beat: over the waste valve, into the delivery pipe at the ram, out of it at the tank, from the source. */
  waste_l: number;
  ram_l: number;
  tank_l: number;
  drive_l: number;
  chamber_m: number;
  ripple_m: number;
  /** Whole-cycle flows. */
  waste_lps: number;
  ram_lps: number;
  tank_lps: number;
  drive_lps: number;
  /** Phases of the last beat, for bursts. */
  open_s: number;
  pumping_s: number;
  /** Chamber head over the last beat, each with its time since the valve closed. */
  trace: { time_s: number; head_m: number }[];
}

/** What a settled ram carries from beat to beat; handing it on makes the next state settle sooner. */
export interface Carried {
  air_m3: number;
  pipe_m3ps: number;
  speed_mps: number;
}

const orifice = (area_m2: number, head_m: number) =>
  area_m2 > 0 && head_m > 0 ? discharge * area_m2 * Math.sqrt(2 * g * head_m) : 0;

/** Runs the ram until its beats repeat. `carried`, if given, is where it starts from and is updated. The trace is kept only if `traced`. */
export function runToRest(ram: RamState, carried?: Carried, traced = false): Cycle {
  const area = (Math.PI / 4) * ram.drive_bore_m ** 2;
  const pipe_area = (Math.PI / 4) * ram.delivery_bore_m ** 2;
  const pipe_loss =
    ((ram.delivery_friction * ram.delivery_length_m) / ram.delivery_bore_m + 1.5) / (2 * g * pipe_area ** 2);
  const static_abs_m = ram.lift_m + atmosphere_m;
  const step_s = 0.001;
  const state: Carried = carried ?? { air_m3: ram.air_m3, pipe_m3ps: 0, speed_mps: 0 };
  let head = 0;
  let sums = { waste: 0, ram: 0, tank: 0, drive: 0, head: 0, time: 0, low: 0, high: 0 };
  let trace: Cycle['trace'] = [];
  const headOf = (air_m3: number) => static_abs_m * (ram.air_m3 / air_m3) ** polytropic - atmosphere_m;

  /** Chamber and delivery pipe over dt, with `inflow` arriving from the drive side. */
  const chamber = (inflow_m3ps: number, dt: number) => {
    head = headOf(state.air_m3);
    const leak = orifice(ram.delivery_pipe_leak_m2, head);
    const push = head - ram.lift_m - pipe_loss * state.pipe_m3ps * Math.abs(state.pipe_m3ps);
    state.pipe_m3ps += ((g * pipe_area) / ram.delivery_length_m) * push * dt;
    state.air_m3 -= (inflow_m3ps - leak - state.pipe_m3ps) * dt;
    sums.tank += state.pipe_m3ps * dt;
    sums.ram += (state.pipe_m3ps + leak) * dt;
    sums.head += head * dt;
    sums.time += dt;
    if (head < sums.low) sums.low = head;
    if (head > sums.high) sums.high = head;
    if (traced) trace.push({ time_s: sums.time, head_m: head });
  };
  const still = (stopped: 'open' | 'shut'): Cycle => {
    const open_lps = stopped === 'open' ? area * Math.sqrt((2 * g * ram.fall_m) / ram.drive_loss) * 1000 : 0;
    return {
      stopped,
      beats_per_min: 0,
      waste_l: 0,
      ram_l: 0,
      tank_l: 0,
      drive_l: 0,
      chamber_m: ram.lift_m,
      ripple_m: 0,
      waste_lps: open_lps,
      ram_lps: 0,
      tank_lps: 0,
      drive_lps: open_lps,
      open_s: 0,
      pumping_s: 0,
      trace: [],
    };
  };
  if (Math.sqrt((2 * g * ram.fall_m) / ram.drive_loss) <= ram.closing_mps * 1.01) return still('open');

  let before = -1;
  let alike = 0;
  let cycle = still('shut');
  for (let beat = 0; beat < 400; beat++) {
    sums = { waste: 0, ram: 0, tank: 0, drive: 0, head: 0, time: 0, low: Infinity, high: -Infinity };
    trace = [];
    // pumping: the column gives up its speed in steps of 2L/a (none before the very first closing)
    let pumping_s = 0;
    if (state.speed_mps > 0) {
      let speed = state.speed_mps;
      let drop = 0;
      for (let first = true; ; first = false) {
        const lost = (ram.pumping_loss * speed * speed) / (2 * g);
        drop = (g * Math.max(headOf(state.air_m3) + lost - ram.fall_m, 0.01)) / ram.wave_mps;
        speed -= first ? drop : 2 * drop;
        const leak = orifice(ram.seat_leak_m2, headOf(state.air_m3) + lost);
        const useful = speed * area - leak;
        if (useful <= 0) break;
        // the last step of all is cut short, so that nothing jumps when one step more fits in
        const span = 2 * ram.wave_mps ** -1 * ram.drive_length_m * Math.min(1, useful / area / drop);
        const parts = Math.max(1, Math.ceil(span / step_s));
        for (let i = 0; i < parts; i++) chamber(useful, span / parts);
        sums.drive += speed * area * span;
        sums.waste += leak * span;
        pumping_s += span;
      }
      const weakened = orifice(ram.delivery_valve_leak_m2, headOf(state.air_m3)) / area;
      const recoil = ram.recoil * drop - weakened;
      if (recoil <= 0 && ram.recoil > 0) return still('shut');
      state.speed_mps = -recoil;
    }
    // open: recoil dies away and the column accelerates until the drag shuts the valve
    const opened = sums.time;
    const rate = (v: number) => (g * ram.fall_m - (ram.drive_loss * v * Math.abs(v)) / 2) / ram.drive_length_m;
    for (let v = state.speed_mps; ; ) {
      const middle = v + (rate(v) * step_s) / 2;
      let dt = step_s;
      let after = v + rate(middle) * dt;
      const closes = after >= ram.closing_mps;
      if (closes) {
        dt *= (ram.closing_mps - v) / (after - v);
        after = ram.closing_mps;
      }
      const back = orifice(ram.delivery_valve_leak_m2, headOf(state.air_m3));
      chamber(-back, dt);
      sums.drive += area * ((v + after) / 2) * dt;
      sums.waste += (area * ((v + after) / 2) + back) * dt;
      v = after;
      if (closes) break;
    }
    const open_s = sums.time - opened;
    for (let left = ram.closing_time_s; left > 1e-9; left -= step_s) {
      const dt = Math.min(step_s, left);
      const back = orifice(ram.delivery_valve_leak_m2, headOf(state.air_m3));
      chamber(-back, dt);
      sums.drive += area * ram.closing_mps * dt;
      sums.waste += (area * ram.closing_mps + back) * dt;
    }
    state.speed_mps = ram.closing_mps;
    if (beat === 0) continue;
    const T = sums.time;
    cycle = {
      stopped: 'no',
      beats_per_min: 60 / T,
      waste_l: sums.waste * 1000,
      ram_l: sums.ram * 1000,
      tank_l: sums.tank * 1000,
      drive_l: sums.drive * 1000,
      chamber_m: sums.head / T,
      ripple_m: sums.high - sums.low,
      waste_lps: (sums.waste / T) * 1000,
      ram_lps: (sums.ram / T) * 1000,
      tank_lps: (sums.tank / T) * 1000,
      drive_lps: (sums.drive / T) * 1000,
      open_s,
      pumping_s,
      trace,
    };
    alike = Math.abs(cycle.ram_lps - before) < 2e-4 * cycle.ram_lps ? alike + 1 : 0;
    before = cycle.ram_lps;
    // a slow swing between chamber and pipe must have died away as well
    const stored = Math.abs(sums.drive - sums.waste - sums.ram) / sums.ram;
    if (alike >= 4 && stored < 1e-3) break;
  }
  return cycle;
}
