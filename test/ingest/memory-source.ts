import { inspectFile, type RamContext } from '../../server/ingest/inspect';
import { type Engine, type ReadSummary, readRecords } from '../../server/ingest/read';
import type { FileSource } from '../../server/ingest/source';
import type { FileReading } from '../../server/shapes/reading';

/** A file in memory that comes in pieces. */
export function sourceOf(content: string | Uint8Array, name = 'visit.csv', piece = 1 << 16): FileSource {
  const bytes = Buffer.from(content as Uint8Array);
  return {
    name,
    bytes: bytes.length,
    async *open(fromByte = 0) {
      for (let i = fromByte; i < bytes.length; i += piece) yield bytes.subarray(i, i + piece);
    },
  };
}

export const ramOf = (over: Partial<RamContext> = {}): RamContext => ({
  time_zone: 'Etc/GMT-3',
  sensors: [],
  now_ms: Date.UTC(2026, 11, 1),
  remembered: [],
  ...over,
});

export interface Records extends ReadSummary {
  times: number[];
  /** One per column that has a channel. */
  values: number[][];
  decimals: number[];
}

/** All records of a file by one engine. */
export async function recordsOf(
  source: FileSource,
  reading: FileReading,
  ram: RamContext = ramOf(),
  engine?: Engine,
): Promise<Records> {
  const times: number[] = [];
  const values: number[][] = reading.columns.filter((column) => column.channel !== null).map(() => []);
  let decimals: number[] = [];
  const summary = await readRecords(
    source,
    ram,
    reading,
    (batch) => {
      for (let i = 0; i < batch.count; i++) {
        times.push(batch.times_ms[i]!);
        for (const [c, column] of batch.values.entries()) values[c]!.push(column[i]!);
      }
      decimals = [...batch.decimals];
    },
    undefined,
    engine,
  );
  return { ...summary, times, values, decimals };
}

/** Guesses a text's reading and reads it by both engines, which must agree. */
export async function guessed(content: string | Uint8Array, ram: RamContext = ramOf()) {
  const source = sourceOf(content);
  const inspection = await inspectFile(source, ram);
  const records = await recordsOf(source, inspection.reading, ram, 'scanner');
  const again = await recordsOf(source, inspection.reading, ram, 'general');
  return { ...inspection, records, again };
}

export const iso = (at: number): string => new Date(at).toISOString();

/** Lines of a log, one each step, in the shape that `line` gives. */
export function logLines(
  count: number,
  line: (i: number, at: Date) => string,
  step_s = 600,
  from = Date.UTC(2025, 3, 5),
): string {
  return `${Array.from({ length: count }, (_, i) => line(i, new Date(from + i * step_s * 1000))).join('\n')}\n`;
}

export const two = (n: number): string => String(n).padStart(2, '0');
export const plainStamp = (at: Date): string => at.toISOString().slice(0, 19).replace('T', ' ');
