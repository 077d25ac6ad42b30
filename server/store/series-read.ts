import type { ChannelName } from '../shapes/channel';
import { decodeChannel, decodeTimes } from './blocks';
import type { Connection } from './open';

const DAY_MS = 86_400_000;

/** Turns the values of a unit into those of the channel's own unit: value × scale + offset. */
export type UnitChange = (channel: ChannelName, unit: string) => { scale: number; offset: number };

/** One channel's values in rising order of time, in the channel's own unit; NaN where missing. */
export interface ChannelSeries {
  times_ms: Float64Array;
  values: Float64Array;
}

interface BlockRow {
  id: number;
  first_ms: number;
  last_ms: number;
  count: number;
  contradicts: number;
  times: Buffer;
}

interface Piece {
  times: Float64Array;
  values: Float64Array;
  overlays: boolean;
}

/**
 * Reads channels of a ram between two instants (from inclusive, to exclusive). Channels that one logger wrote together
 * share one array of times where nothing had to be merged.
 */
export function readChannels(
  db: Connection,
  ramId: number,
  channels: readonly ChannelName[],
  from_ms: number,
  to_ms: number,
  change: UnitChange,
): Map<ChannelName, ChannelSeries> {
  const ids = new Map<number, { channel: ChannelName; scale: number; offset: number }>();
  for (const row of db.prepare('select id, channel, unit from channel where ram_id = ?').all(ramId) as {
    id: number;
    channel: ChannelName;
    unit: string;
  }[])
    if (channels.includes(row.channel)) ids.set(row.id, { channel: row.channel, ...change(row.channel, row.unit) });

  const blocks = db
    .prepare(
      'select id, first_ms, last_ms, count, contradicts, times from time_block where ram_id = ? and day >= ? and day <= ? order by day, id',
    )
    .all(ramId, Math.floor(from_ms / DAY_MS), Math.floor((to_ms - 1) / DAY_MS)) as BlockRow[];
  const columnsOf = db.prepare('select channel_id, data from channel_block where time_block_id = ?');
  const pieces = new Map<ChannelName, Piece[]>();
  for (const block of blocks) {
    if (block.last_ms < from_ms || block.first_ms >= to_ms) continue;
    let times: Float64Array | null = null;
    for (const { channel_id, data } of columnsOf.iterate(block.id) as IterableIterator<{
      channel_id: number;
      data: Buffer;
    }>) {
      const meant = ids.get(channel_id);
      if (meant === undefined) continue;
      times ??= decodeTimes(block.times, block.count);
      const values = decodeChannel(data, block.count);
      if (meant.scale !== 1 || meant.offset !== 0)
        for (let i = 0; i < values.length; i++) values[i] = values[i]! * meant.scale + meant.offset;
      const list = pieces.get(meant.channel);
      const piece = { times, values, overlays: block.contradicts === 1 };
      if (list === undefined) pieces.set(meant.channel, [piece]);
      else list.push(piece);
    }
  }
  const shared: SharedTimes = [];
  const series = new Map<ChannelName, ChannelSeries>();
  for (const [channel, list] of pieces) series.set(channel, clip(join(list, shared), from_ms, to_ms));
  return series;
}

/** Puts the pieces end to end; only where they interleave or contradict are they sorted and merged, the later load winning. */
function join(pieces: Piece[], shared: SharedTimes): ChannelSeries {
  if (pieces.length === 1) return { times_ms: pieces[0]!.times, values: pieces[0]!.values };
  let interleaved = false;
  let count = 0;
  for (let p = 0; p < pieces.length; p++) {
    const { times, overlays } = pieces[p]!;
    count += times.length;
    const before = pieces[p - 1]?.times;
    if (overlays || (before !== undefined && times[0]! <= before[before.length - 1]!)) interleaved = true;
  }
  const values = new Float64Array(count);
  let place = 0;
  for (const piece of pieces) {
    values.set(piece.values, place);
    place += piece.values.length;
  }
  const times_ms = jointTimes(pieces, count, shared);
  return interleaved ? merge(times_ms, values) : { times_ms, values };
}

/** Joint times built so far, each with the blocks it was put together from. */
type SharedTimes = { pieces: Piece[]; times_ms: Float64Array }[];

/** Channels that one logger wrote stand in the same blocks: their joint times are built once. */
function jointTimes(pieces: Piece[], count: number, shared: SharedTimes): Float64Array {
  const same = shared.find(
    (one) => one.pieces.length === pieces.length && one.pieces.every((piece, p) => piece.times === pieces[p]!.times),
  );
  if (same !== undefined) return same.times_ms;
  const times_ms = new Float64Array(count);
  let place = 0;
  for (const { times } of pieces) {
    times_ms.set(times, place);
    place += times.length;
  }
  shared.push({ pieces, times_ms });
  return times_ms;
}

function merge(times: Float64Array, values: Float64Array): ChannelSeries {
  const order = Array.from(times.keys()).sort((a, b) => times[a]! - times[b]! || a - b);
  const outTimes = new Float64Array(order.length);
  const outValues = new Float64Array(order.length);
  let count = 0;
  for (const row of order) {
    const same = count > 0 && outTimes[count - 1] === times[row];
    if (!same) {
      outTimes[count] = times[row]!;
      outValues[count++] = values[row]!;
    } else if (!Number.isNaN(values[row]!)) outValues[count - 1] = values[row]!;
  }
  return { times_ms: outTimes.subarray(0, count), values: outValues.subarray(0, count) };
}

function clip({ times_ms, values }: ChannelSeries, from_ms: number, to_ms: number): ChannelSeries {
  const start = lowerBound(times_ms, from_ms);
  const end = lowerBound(times_ms, to_ms);
  if (start === 0 && end === times_ms.length) return { times_ms, values };
  return { times_ms: times_ms.subarray(start, end), values: values.subarray(start, end) };
}

/** First index whose time is not before `at`. */
export function lowerBound(times: Float64Array, at: number): number {
  let low = 0;
  let high = times.length;
  while (low < high) {
    const middle = (low + high) >> 1;
    if (times[middle]! < at) low = middle + 1;
    else high = middle;
  }
  return low;
}

export interface ChannelExtent {
  channel: ChannelName;
  unit: string;
  first_ms: number;
  last_ms: number;
  values: number;
}

/** Which channels of a ram are stored, in which unit, from when to when. */
export function channelExtents(db: Connection, ramId: number): ChannelExtent[] {
  return db
    .prepare(
      `select channel.channel, channel.unit, min(first_ms) first_ms, max(last_ms) last_ms, sum(valid) "values"
       from channel join channel_block on channel_block.channel_id = channel.id join time_block on time_block.id = time_block_id
       where channel.ram_id = ? group by channel.id order by channel.channel, first_ms`,
    )
    .all(ramId) as ChannelExtent[];
}

/** First and last stored instant of a ram, whichever the channel. */
export function recordExtent(db: Connection, ramId: number): { first_ms: number; last_ms: number } | null {
  const row = db
    .prepare('select min(first_ms) first_ms, max(last_ms) last_ms from time_block where ram_id = ?')
    .get(ramId) as {
    first_ms: number | null;
    last_ms: number | null;
  };
  return row.first_ms === null || row.last_ms === null ? null : { first_ms: row.first_ms, last_ms: row.last_ms };
}
