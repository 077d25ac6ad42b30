/*
 * Whole records on their way out, gathered into typed columns. The arrays are used again for the next batch.
 */
import { spreadEqualStamps } from './burst-stamps';

export interface RecordBatch {
  count: number;
  times_ms: Float64Array;
  /** One per column of the reading that has a channel, in the reading's order, in the unit of the file; NaN where missing. */
  values: Float64Array[];
  /** The most decimals met so far, per column. */
  decimals: Uint8Array;
}

const BATCH = 8192;

export class RecordSink {
  /** The record being written stands at `count`; `commit` makes it one. */
  count = 0;
  times: Float64Array;
  values: Float64Array[];
  readonly decimals: Uint8Array;
  readonly missing: number[];
  accepted = 0;
  /** Records that share the stamp of the one before. */
  sameStamp = 0;
  spread = 0;
  private usualGroup = 0;
  private lastTime = Number.NaN;

  constructor(
    columns: number,
    private readonly isBurst: boolean,
    private readonly onBatch: (batch: RecordBatch) => void,
  ) {
    this.times = new Float64Array(BATCH);
    this.values = Array.from({ length: columns }, () => new Float64Array(BATCH));
    this.decimals = new Uint8Array(columns);
    this.missing = new Array<number>(columns).fill(0);
  }

  commit(instant_ms: number): void {
    const at_ms = this.isBurst ? instant_ms : Math.round(instant_ms);
    this.times[this.count++] = at_ms;
    this.accepted++;
    if (at_ms === this.lastTime) this.sameStamp++;
    this.lastTime = at_ms;
    if (this.count === this.times.length) this.flush(false);
  }

  /** A value of the record before, or NaN where there is none. */
  previousValue(column: number): number {
    if (this.accepted === 0) return Number.NaN;
    const values = this.values[column]!;
    // after a batch has gone out its last record still stands at the end of the arrays
    return values[this.count > 0 ? this.count - 1 : values.length - 1]!;
  }

  /** Gives the gathered records out. In a burst, samples of the stamp that is still running stay back until their number is known. */
  flush(isEnd: boolean): void {
    let ready = this.count;
    if (this.isBurst) {
      if (!isEnd) while (ready > 0 && this.times[ready - 1] === this.lastTime) ready--;
      const done = spreadEqualStamps(this.times, this.count, ready, this.usualGroup);
      this.usualGroup = done.usualGroup;
      this.spread += done.spread;
    }
    if (ready > 0) this.onBatch({ count: ready, times_ms: this.times, values: this.values, decimals: this.decimals });
    const left = this.count - ready;
    if (left > 0 && ready === 0) this.grow();
    else {
      this.times.copyWithin(0, ready, this.count);
      for (const column of this.values) column.copyWithin(0, ready, this.count);
    }
    this.count = left;
  }

  private grow(): void {
    const wider = (old: Float64Array) => {
      const array = new Float64Array(old.length * 2);
      array.set(old);
      return array;
    };
    this.times = wider(this.times);
    this.values = this.values.map(wider);
  }
}
