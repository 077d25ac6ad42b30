import { recompute } from '../figures/recompute';
import type { RamContext } from '../ingest/inspect';
import { type ReadSummary, readRecords } from '../ingest/read';
import { fileSource } from '../ingest/source';
import { channelUnit } from '../shapes/channel';
import type { Receipt } from '../shapes/load';
import { UserError } from '../shapes/problem';
import type { ColumnReading, FileReading } from '../shapes/reading';
import { acceptedReadings, beginLoad, finishLoad, loadOfFile, rememberReading } from '../store/loads';
import type { Connection } from '../store/open';
import { originalIsKept } from '../store/originals';
import type { StoredRam } from '../store/rams';
import { SeriesWriter, type WrittenChannel } from '../store/series-write';
import { BurstCollector } from './burst-collector';
import { keepCompressed } from './compressed-original';
import { RecordGaps } from './record-gaps';

export interface FileToLoad {
  path: string;
  name: string;
  bytes: number;
  sha256: string;
}

export interface LoadWatch {
  now_ms: number;
  onProgress?: (stage: 'reading' | 'computing', share: number, rows: number) => void;
}

/** What the reading of a ram's files needs to know of the ram. */
export const ramContext = (db: Connection, ram: StoredRam, now_ms: number): RamContext => ({
  time_zone: ram.installation.time_zone,
  sensors: ram.installation.sensors,
  now_ms,
  remembered: acceptedReadings(db, ram.id),
});

/**
 * Loads one file with an accepted reading, as one transaction: original, records, remembered reading, figures and findings,
 * receipt. Killed half way, nothing of it is left. A file that was loaded before is refused with a sentence that says when.
 * The connection must not be used by anybody else meanwhile.
 */
export async function loadFile(
  db: Connection,
  ram: StoredRam,
  file: FileToLoad,
  reading: FileReading,
  watch: LoadWatch,
): Promise<Receipt> {
  const before = loadOfFile(db, ram.id, file.sha256);
  if (before !== null)
    throw new UserError(
      `${file.name} was loaded for ${ram.name} on ${before.loaded_at.slice(0, 10)} (load ${before.load_id}); there is nothing to add.`,
      'already there',
    );
  db.exec('begin immediate');
  try {
    const done = await loadWithin(db, ram, file, reading, watch);
    db.exec('commit');
    return done;
  } catch (error) {
    if (db.inTransaction) db.exec('rollback');
    throw error;
  }
}

async function loadWithin(
  db: Connection,
  ram: StoredRam,
  file: FileToLoad,
  reading: FileReading,
  { now_ms, onProgress }: LoadWatch,
): Promise<Receipt> {
  // compressing runs in another thread while the records are read in this one
  const stop = new AbortController();
  const kept = originalIsKept(db, file.sha256) ? Promise.resolve() : keepCompressed(db, file, stop.signal);
  // waited for below; until then a failure of it must not end the process
  kept.catch(() => {});
  try {
    return await readInto(db, ram, file, reading, { now_ms, onProgress }, kept);
  } catch (error) {
    // nothing may be written any more once the transaction is rolled back
    stop.abort();
    await kept.catch(() => {});
    throw error;
  }
}

async function readInto(
  db: Connection,
  ram: StoredRam,
  file: FileToLoad,
  reading: FileReading,
  { now_ms, onProgress }: LoadWatch,
  kept: Promise<void>,
): Promise<Receipt> {
  const loadId = beginLoad(db, ram.id, file.sha256, file.name, reading.kind, now_ms);
  const columns = reading.columns.filter(
    (column): column is ColumnReading & { channel: NonNullable<ColumnReading['channel']> } => column.channel !== null,
  );
  const written: WrittenChannel[] = columns.map((column) => ({
    channel: column.channel,
    unit: column.unit ?? unitOfSensor(ram, column.channel),
  }));
  const gaps = new RecordGaps();
  const writer = reading.kind === 'log' ? new SeriesWriter(db, ram.id, loadId, written) : null;
  const bursts = reading.kind === 'burst' ? new BurstCollector(db, ram, loadId, written) : null;
  const values = new Float64Array(columns.length);
  let rows = 0;
  const summary = await readRecords(
    fileSource(file.path, file.name),
    ramContext(db, ram, now_ms),
    reading,
    (batch) => {
      rows += batch.count;
      for (let c = 0; c < columns.length; c++) values[c]! += countValid(batch.values[c]!, batch.count);
      gaps.add(batch.times_ms, batch.count);
      writer?.add(batch.count, batch.times_ms, batch.values, batch.decimals);
      bursts?.add(batch.count, batch.times_ms, batch.values, batch.decimals);
    },
    (bytesRead) => onProgress?.('reading', file.bytes > 0 ? Math.min(1, bytesRead / file.bytes) : 1, rows),
  );
  const counts = writer?.finish() ?? bursts!.finish();
  onProgress?.('computing', 1, rows);
  rememberReading(db, ram.id, reading, now_ms);
  const touched =
    writer !== null && counts.first_ms !== null && counts.last_ms !== null
      ? { from_ms: counts.first_ms, to_ms: counts.last_ms }
      : null;
  const days = touched === null ? 0 : recompute(db, ram, touched);
  await kept;
  const receipt: Receipt = {
    load_id: loadId,
    ram: ram.name,
    file: file.name,
    sha256: file.sha256,
    bytes: file.bytes,
    kind: reading.kind,
    loaded_at: new Date(now_ms).toISOString(),
    ...rowsOf(summary, counts),
    notes: [...summary.notes, ...(bursts?.notes ?? [])],
    first_at: counts.first_ms === null ? null : new Date(counts.first_ms).toISOString(),
    last_at: counts.last_ms === null ? null : new Date(counts.last_ms).toISOString(),
    step_s: gaps.usualStep_s(),
    gaps: reading.kind === 'log' ? gaps.gaps() : [],
    channels: columns.map((column, c) => ({
      channel: column.channel,
      label: column.label,
      unit: written[c]!.unit,
      values: values[c]!,
      missing: summary.missing[c] ?? 0,
    })),
    days_recomputed: days,
    reading,
  };
  finishLoad(db, receipt);
  return receipt;
}

const unitOfSensor = (ram: StoredRam, channel: WrittenChannel['channel']): string =>
  ram.installation.sensors.find((sensor) => sensor.channel === channel)?.unit ?? channelUnit[channel];

function rowsOf(summary: ReadSummary, counts: { fresh: number; known: number; contradicting: number }) {
  return {
    rows_read: summary.rows_read,
    rows_new: counts.fresh,
    rows_known: counts.known,
    rows_contradicting: counts.contradicting,
    rows_refused: summary.refused,
    refusals: summary.refusals,
  };
}

function countValid(values: Float64Array, count: number): number {
  let valid = 0;
  for (let i = 0; i < count; i++) if (!Number.isNaN(values[i]!)) valid++;
  return valid;
}
