import { UserError } from '../shapes/problem';
import { type BurstBeats, burstBeats } from '../shapes/series';
import { decodeChannel, encodeChannel } from './blocks';
import type { Connection } from './open';

export interface BurstTrace {
  channel: string;
  unit: string;
  values: Float64Array;
  decimals: number;
}

/** Keeps a burst with its traces; returns null where a burst of that instant is already kept. */
export function addBurst(
  db: Connection,
  ramId: number,
  loadId: number,
  at_ms: number,
  beats: BurstBeats,
  traces: BurstTrace[],
): number | null {
  const count = traces[0]?.values.length ?? 0;
  const { changes, lastInsertRowid } = db
    .prepare(
      'insert into burst (ram_id, load_id, at_ms, samples_per_s, count, beats) values (?, ?, ?, ?, ?, ?) on conflict do nothing',
    )
    .run(ramId, loadId, at_ms, beats.samples_per_s, count, JSON.stringify(beats));
  if (changes === 0) return null;
  const insert = db.prepare('insert into burst_trace (burst_id, channel, unit, data) values (?, ?, ?, ?)');
  for (const { channel, unit, values, decimals } of traces)
    insert.run(lastInsertRowid, channel, unit, encodeChannel(values, decimals));
  return Number(lastInsertRowid);
}

export interface BurstRow {
  burst_id: number;
  at_ms: number;
  count: number;
  beats: BurstBeats;
}

const asBurst = (row: { id: number; at_ms: number; count: number; beats: string }): BurstRow => ({
  burst_id: row.id,
  at_ms: row.at_ms,
  count: row.count,
  beats: burstBeats.parse(JSON.parse(row.beats)),
});

export function listBursts(db: Connection, ramId: number): BurstRow[] {
  return (
    db.prepare('select id, at_ms, count, beats from burst where ram_id = ? order by at_ms').all(ramId) as Parameters<
      typeof asBurst
    >[0][]
  ).map(asBurst);
}

export function readBurst(
  db: Connection,
  burstId: number,
): BurstRow & { traces: { channel: string; unit: string; values: Float64Array }[] } {
  const row = db.prepare('select id, at_ms, count, beats from burst where id = ?').get(burstId) as
    | Parameters<typeof asBurst>[0]
    | undefined;
  if (row === undefined) throw new UserError(`There is no burst number ${burstId}.`, 'not found');
  const traces = db
    .prepare('select channel, unit, data from burst_trace where burst_id = ? order by channel desc')
    .all(burstId) as {
    channel: string;
    unit: string;
    data: Buffer;
  }[];
  return {
    ...asBurst(row),
    traces: traces.map(({ channel, unit, data }) => ({ channel, unit, values: decodeChannel(data, row.count) })),
  };
}
