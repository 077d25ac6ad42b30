import type { Statement } from 'better-sqlite3';
import type { ChannelName } from '../shapes/channel';
import { decodeChannel, decodeTimes, encodeChannel, encodeTimes, summarise } from './blocks';
import type { Connection } from './open';

const DAY_MS = 86_400_000;

/** A channel of a file as it is to be stored: what it measures and the unit in which the file writes it. */
export interface WrittenChannel {
  channel: ChannelName;
  unit: string;
}

export interface WrittenCounts {
  fresh: number;
  known: number;
  contradicting: number;
  first_ms: number | null;
  last_ms: number | null;
  /** UTC days that were touched by fresh or contradicting rows. */
  days: Set<number>;
}

/**
 * Writes one load's records, in whatever order they come, as blocks of a UTC day. A record that is already stored, value
 * for value, is counted and not stored again; one that an earlier load told otherwise is stored beside it, and the newer load
 * wins when the day is read. Call inside one transaction; `finish` writes what is still held.
 */
export class SeriesWriter {
  readonly counts: WrittenCounts = {
    fresh: 0,
    known: 0,
    contradicting: 0,
    first_ms: null,
    last_ms: null,
    days: new Set(),
  };
  private readonly channelIds: number[];
  private readonly insertTimes: Statement;
  private readonly insertChannel: Statement;
  private readonly blocksOfDay: Statement;
  private readonly channelsOfBlock: Statement;
  private day = Number.NaN;
  private held = 0;
  private times = new Float64Array(2048);
  private values: Float64Array[];
  private decimals: Uint8Array;

  constructor(
    db: Connection,
    private readonly ramId: number,
    private readonly loadId: number,
    channels: readonly WrittenChannel[],
  ) {
    const find = db.prepare('select id from channel where ram_id = ? and channel = ? and unit = ?').pluck();
    const add = db.prepare('insert into channel (ram_id, channel, unit) values (?, ?, ?)');
    this.channelIds = channels.map(({ channel, unit }) => {
      const id = find.get(ramId, channel, unit) as number | undefined;
      return id ?? Number(add.run(ramId, channel, unit).lastInsertRowid);
    });
    this.values = channels.map(() => new Float64Array(2048));
    this.decimals = new Uint8Array(channels.length);
    this.insertTimes = db.prepare(
      'insert into time_block (ram_id, load_id, day, first_ms, last_ms, count, contradicts, times) values (?, ?, ?, ?, ?, ?, ?, ?)',
    );
    this.insertChannel = db.prepare(
      'insert into channel_block (time_block_id, channel_id, valid, least, greatest, total, data) values (?, ?, ?, ?, ?, ?, ?)',
    );
    this.blocksOfDay = db.prepare('select id, count, times from time_block where ram_id = ? and day = ? order by id');
    this.channelsOfBlock = db.prepare('select channel_id, data from channel_block where time_block_id = ?');
  }

  /** @param values one array per channel, in the order given to the constructor; only the first `count` entries are read. */
  add(count: number, times_ms: Float64Array, values: readonly Float64Array[], decimals: Uint8Array): void {
    let from = 0;
    while (from < count) {
      const day = Math.floor(times_ms[from]! / DAY_MS);
      if (day !== this.day) this.flush(day);
      const endOfDay = (day + 1) * DAY_MS;
      const startOfDay = day * DAY_MS;
      let to = from + 1;
      while (to < count && times_ms[to]! < endOfDay && times_ms[to]! >= startOfDay) to++;
      this.hold(from, to, times_ms, values);
      for (let c = 0; c < decimals.length; c++) if (decimals[c]! > this.decimals[c]!) this.decimals[c] = decimals[c]!;
      from = to;
    }
  }

  finish(): WrittenCounts {
    this.flush(Number.NaN);
    return this.counts;
  }

  private hold(from: number, to: number, times_ms: Float64Array, values: readonly Float64Array[]): void {
    const needed = this.held + to - from;
    if (needed > this.times.length) {
      const grow = (old: Float64Array) => {
        const wider = new Float64Array(Math.max(needed, old.length * 2));
        wider.set(old.subarray(0, this.held));
        return wider;
      };
      this.times = grow(this.times);
      this.values = this.values.map(grow);
    }
    this.times.set(times_ms.subarray(from, to), this.held);
    for (let c = 0; c < values.length; c++) this.values[c]!.set(values[c]!.subarray(from, to), this.held);
    this.held = needed;
  }

  private flush(nextDay: number): void {
    if (this.held > 0) {
      const rows = orderedRows(
        this.times.subarray(0, this.held),
        this.values.map((v) => v.subarray(0, this.held)),
      );
      this.counts.known += rows.repeats;
      this.writeDay(this.day, rows.times, rows.values);
    }
    this.held = 0;
    this.day = nextDay;
  }

  private writeDay(day: number, times: Float64Array, values: Float64Array[]): void {
    const stored = this.blocksOfDay.all(this.ramId, day) as { id: number; count: number; times: Buffer }[];
    if (stored.length === 0) {
      this.counts.fresh += times.length;
      this.writeBlock(day, times, values, 0);
      return;
    }
    const state = this.compare(stored, times, values);
    const keep: number[] = [];
    let contradicting = 0;
    for (let i = 0; i < times.length; i++) {
      if (state[i] === KNOWN) this.counts.known++;
      else {
        keep.push(i);
        if (state[i] === CONTRADICTS) contradicting++;
      }
    }
    this.counts.contradicting += contradicting;
    this.counts.fresh += keep.length - contradicting;
    if (keep.length === 0) return;
    const pick = (column: Float64Array) => Float64Array.from(keep, (i) => column[i]!);
    // rows that stand at a stored instant must be merged when read, so the day's summaries cannot simply be added up
    const overlays = keep.some((i) => state[i] !== FRESH);
    this.writeBlock(day, pick(times), values.map(pick), overlays ? 1 : 0);
  }

  /** Compares the rows of a day with what is stored: newer blocks overlay older ones, channel by channel. */
  private compare(
    stored: { id: number; count: number; times: Buffer }[],
    times: Float64Array,
    values: Float64Array[],
  ): Uint8Array {
    const state = new Uint8Array(times.length);
    const place = new Map<number, number>();
    for (let i = 0; i < times.length; i++) place.set(times[i]!, i);
    const seen = values.map(() => new Float64Array(times.length).fill(Number.NaN));
    const met = new Uint8Array(times.length);
    for (const block of stored) {
      const columns = (this.channelsOfBlock.all(block.id) as { channel_id: number; data: Buffer }[])
        .map(({ channel_id, data }) => ({ c: this.channelIds.indexOf(channel_id), data }))
        .filter(({ c }) => c >= 0);
      if (columns.length === 0) continue;
      const blockTimes = decodeTimes(block.times, block.count);
      const decoded = columns.map(({ c, data }) => ({ c, column: decodeChannel(data, block.count) }));
      for (let b = 0; b < block.count; b++) {
        const i = place.get(blockTimes[b]!);
        if (i === undefined) continue;
        met[i] = 1;
        for (const { c, column } of decoded) if (!Number.isNaN(column[b]!)) seen[c]![i] = column[b]!;
      }
    }
    for (let i = 0; i < times.length; i++) {
      if (met[i] === 0) continue;
      let result = KNOWN;
      for (let c = 0; c < values.length; c++) {
        const now = values[c]![i]!;
        const before = seen[c]![i]!;
        if (Number.isNaN(now) || now === before) continue;
        if (Number.isNaN(before)) result = result === KNOWN ? ADDS : result;
        else result = CONTRADICTS;
      }
      state[i] = result;
    }
    return state;
  }

  private writeBlock(day: number, times: Float64Array, values: Float64Array[], contradicts: 0 | 1): void {
    const first = times[0]!;
    const last = times[times.length - 1]!;
    const { lastInsertRowid } = this.insertTimes.run(
      this.ramId,
      this.loadId,
      day,
      first,
      last,
      times.length,
      contradicts,
      encodeTimes(times),
    );
    for (let c = 0; c < values.length; c++) {
      const { valid, least, greatest, total } = summarise(values[c]!);
      if (valid === 0) continue;
      this.insertChannel.run(
        lastInsertRowid,
        this.channelIds[c]!,
        valid,
        least,
        greatest,
        total,
        encodeChannel(values[c]!, this.decimals[c]!),
      );
    }
    this.counts.days.add(day);
    if (this.counts.first_ms === null || first < this.counts.first_ms) this.counts.first_ms = first;
    if (this.counts.last_ms === null || last > this.counts.last_ms) this.counts.last_ms = last;
  }
}

const FRESH = 0;
const KNOWN = 1;
/** The instant is stored, and this row fills in what was missing. */
const ADDS = 2;
const CONTRADICTS = 3;

/** Rows in rising order of time; of several rows with one stamp the last one in the file stays. */
function orderedRows(
  times: Float64Array,
  values: Float64Array[],
): { times: Float64Array; values: Float64Array[]; repeats: number } {
  let rising = true;
  for (let i = 1; i < times.length && rising; i++) rising = times[i]! > times[i - 1]!;
  if (rising) return { times, values, repeats: 0 };
  const order = Array.from(times.keys()).sort((a, b) => times[a]! - times[b]! || a - b);
  const kept = order.filter((row, k) => k === order.length - 1 || times[order[k + 1]!] !== times[row]);
  return {
    times: Float64Array.from(kept, (row) => times[row]!),
    values: values.map((column) => Float64Array.from(kept, (row) => column[row]!)),
    repeats: order.length - kept.length,
  };
}
