import type { ChannelName } from '../shapes/channel';
import type { Connection } from './open';
import { readChannels, type UnitChange } from './series-read';

const DAY_MS = 86_400_000;

export interface Buckets {
  at_ms: number[];
  min: (number | null)[];
  mean: (number | null)[];
  max: (number | null)[];
}

/**
 * One channel between two instants as at most `most` buckets of least, mean and greatest. Where a bucket is a day or longer
 * it spans whole UTC days and is put together from the blocks' own summaries, so that ten years cost no read of a sample.
 */
export function readBuckets(
  db: Connection,
  ramId: number,
  channel: ChannelName,
  from_ms: number,
  to_ms: number,
  most: number,
  change: UnitChange,
): Buckets {
  const width_ms = (to_ms - from_ms) / most;
  return width_ms >= DAY_MS
    ? bucketsOfDays(db, ramId, channel, from_ms, to_ms, Math.ceil(width_ms / DAY_MS), change)
    : bucketsOfSamples(db, ramId, channel, from_ms, to_ms, most, change);
}

function bucketsOfSamples(
  db: Connection,
  ramId: number,
  channel: ChannelName,
  from_ms: number,
  to_ms: number,
  most: number,
  change: UnitChange,
): Buckets {
  const sums = new Sums(most);
  const series = readChannels(db, ramId, [channel], from_ms, to_ms, change).get(channel);
  if (series === undefined) return sums.buckets(from_ms, 1);
  const { times_ms, values } = series;
  const width_ms = (to_ms - from_ms) / most;
  for (let i = 0; i < values.length; i++) {
    const value = values[i]!;
    if (!Number.isNaN(value))
      sums.add(Math.min(most - 1, Math.floor((times_ms[i]! - from_ms) / width_ms)), 1, value, value, value);
  }
  return sums.buckets(from_ms, width_ms);
}

function bucketsOfDays(
  db: Connection,
  ramId: number,
  channel: ChannelName,
  from_ms: number,
  to_ms: number,
  days: number,
  change: UnitChange,
): Buckets {
  const firstDay = Math.floor(from_ms / DAY_MS);
  const lastDay = Math.floor((to_ms - 1) / DAY_MS);
  const sums = new Sums(Math.ceil((lastDay - firstDay + 1) / days));
  const rows = db
    .prepare(
      `select day, contradicts, unit, valid, least, greatest, total
       from time_block join channel_block on time_block_id = time_block.id join channel on channel.id = channel_id
       where time_block.ram_id = ? and day between ? and ? and channel.channel = ? order by day`,
    )
    .raw()
    .all(ramId, firstDay, lastDay, channel) as [number, number, string, number, number, number, number][];
  const merged = new Set(rows.filter((row) => row[1] === 1).map((row) => row[0]));
  for (const [day, , unit, valid, least, greatest, total] of rows) {
    if (merged.has(day)) continue;
    const { scale, offset } = change(channel, unit);
    const ends = [least * scale + offset, greatest * scale + offset];
    sums.add(
      Math.floor((day - firstDay) / days),
      valid,
      total * scale + offset * valid,
      Math.min(...ends),
      Math.max(...ends),
    );
  }
  for (const day of merged) {
    const series = readChannels(db, ramId, [channel], day * DAY_MS, (day + 1) * DAY_MS, change).get(channel);
    for (const value of series?.values ?? [])
      if (!Number.isNaN(value)) sums.add(Math.floor((day - firstDay) / days), 1, value, value, value);
  }
  return sums.buckets(firstDay * DAY_MS, days * DAY_MS);
}

class Sums {
  private readonly valid: Float64Array;
  private readonly total: Float64Array;
  private readonly least: Float64Array;
  private readonly greatest: Float64Array;

  constructor(count: number) {
    this.valid = new Float64Array(count);
    this.total = new Float64Array(count);
    this.least = new Float64Array(count).fill(Number.POSITIVE_INFINITY);
    this.greatest = new Float64Array(count).fill(Number.NEGATIVE_INFINITY);
  }

  add(bucket: number, valid: number, total: number, least: number, greatest: number): void {
    this.valid[bucket]! += valid;
    this.total[bucket]! += total;
    if (least < this.least[bucket]!) this.least[bucket] = least;
    if (greatest > this.greatest[bucket]!) this.greatest[bucket] = greatest;
  }

  /** Empty buckets are left out, except for one null at the start of each gap, so that a chart breaks its line there. */
  buckets(from_ms: number, width_ms: number): Buckets {
    const out: Buckets = { at_ms: [], min: [], mean: [], max: [] };
    let inGap = true;
    for (let b = 0; b < this.valid.length; b++) {
      const empty = this.valid[b] === 0;
      if (empty && inGap) continue;
      out.at_ms.push(Math.round(from_ms + (b + 0.5) * width_ms));
      out.min.push(empty ? null : this.least[b]!);
      out.mean.push(empty ? null : this.total[b]! / this.valid[b]!);
      out.max.push(empty ? null : this.greatest[b]!);
      inGap = empty;
    }
    return out;
  }
}
