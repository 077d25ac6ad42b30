import { describeBurst } from '../beats/describe-burst';
import { unitChange } from '../figures/sensors';
import { UserError } from '../shapes/problem';
import { addBurst } from '../store/bursts';
import type { Connection } from '../store/open';
import type { StoredRam } from '../store/rams';
import type { WrittenChannel } from '../store/series-write';

/** Ten minutes at 2000 samples a second, and as much again. */
const MOST_SAMPLES = 2_400_000;

interface Gathered {
  times_ms: number[];
  values: number[][];
}

/** Gathers the fast samples of a file into bursts (a pause of ten steps begins a new one) and keeps each with its beats. */
export class BurstCollector {
  readonly notes: string[] = [];
  private readonly counts = {
    fresh: 0,
    known: 0,
    contradicting: 0,
    first_ms: null as number | null,
    last_ms: null as number | null,
  };
  private gathered: Gathered;
  private decimals: Uint8Array;
  private step_ms = Number.NaN;

  constructor(
    private readonly db: Connection,
    private readonly ram: StoredRam,
    private readonly loadId: number,
    private readonly channels: readonly WrittenChannel[],
  ) {
    this.gathered = this.empty();
    this.decimals = new Uint8Array(channels.length);
  }

  add(count: number, times_ms: Float64Array, values: readonly Float64Array[], decimals: Uint8Array): void {
    for (let i = 0; i < count; i++) {
      const { times_ms: times } = this.gathered;
      const step = times_ms[i]! - (times[times.length - 1] ?? Number.NaN);
      if (times.length === 1) this.step_ms = step;
      else if (step > 10 * this.step_ms && step > 1000) this.keep();
      if (times.length >= MOST_SAMPLES)
        throw new UserError(
          `A burst of more than ${MOST_SAMPLES} samples is not taken; split the file into bursts of ten minutes or less.`,
          'too large',
        );
      this.gathered.times_ms.push(times_ms[i]!);
      for (let c = 0; c < values.length; c++) this.gathered.values[c]!.push(values[c]![i]!);
    }
    for (let c = 0; c < decimals.length; c++) this.decimals[c] = Math.max(this.decimals[c]!, decimals[c]!);
  }

  finish() {
    this.keep();
    return this.counts;
  }

  private empty(): Gathered {
    return { times_ms: [], values: this.channels.map(() => []) };
  }

  private keep(): void {
    const { times_ms, values } = this.gathered;
    this.gathered = this.empty();
    if (times_ms.length < 2) return;
    const traces = this.channels.map(({ channel, unit }, c) => ({
      channel,
      unit,
      values: Float64Array.from(values[c]!),
      decimals: this.decimals[c]!,
    }));
    const at_ms = Math.round(times_ms[0]!);
    const beats = describeBurst({
      times_s: Float64Array.from(times_ms, (at) => (at - times_ms[0]!) / 1000),
      ...this.pressures(traces),
    });
    const kept = addBurst(
      this.db,
      this.ram.id,
      this.loadId,
      at_ms,
      { ...beats, at: new Date(at_ms).toISOString() },
      traces,
    );
    if (kept === null) {
      this.counts.known += times_ms.length;
      return;
    }
    this.counts.fresh += times_ms.length;
    this.counts.first_ms = Math.min(this.counts.first_ms ?? at_ms, at_ms);
    this.counts.last_ms = Math.max(this.counts.last_ms ?? at_ms, Math.round(times_ms.at(-1)!));
    this.notes.push(...beats.notes);
  }

  private pressures(traces: { channel: string; unit: string; values: Float64Array }[]) {
    const inKpa = (channel: 'valve_box_pressure' | 'chamber_pressure') => {
      const trace = traces.find((one) => one.channel === channel);
      if (trace === undefined) return undefined;
      const { scale, offset } = unitChange(this.ram.installation, channel, trace.unit);
      return trace.values.map((value) => value * scale + offset);
    };
    return { valve_box_kpa: inKpa('valve_box_pressure'), chamber_kpa: inKpa('chamber_pressure') };
  }
}
