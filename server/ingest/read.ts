/*
 * Reads the records of a file by an accepted reading, streaming: memory does not grow with the file.
 */
import type { Refusal } from '../shapes/load';
import { UserError } from '../shapes/problem';
import type { FileReading } from '../shapes/reading';
import { scanBytes } from './byte-scanner';
import { TextStream } from './encoding';
import { readGenerally } from './general-reader';
import { type Habits, habitsOf, headText } from './habits';
import type { RamContext } from './ram-context';
import { type RecordBatch, RecordSink } from './record-sink';
import { RowReader } from './row-reader';
import { splitRows } from './rows';
import type { FileSource } from './source';
import { StampClock } from './stamp-clock';
import { StampReader, zoneOf } from './stamp-reader';

export type { RecordBatch } from './record-sink';

export interface ReadSummary {
  /** Records and refused lines together; comments, headers and empty lines are none. */
  rows_read: number;
  refused: number;
  /** The first 200 refused lines, and values that were left out of rows that were kept. */
  refusals: Refusal[];
  notes: string[];
  /** Missing values, per column that has a channel. */
  missing: number[];
}

export type Engine = 'scanner' | 'general';

/**
 * Reads every record of a file. Values stay in the unit of the file, NaN where missing; the arrays of a batch (at most 8192 records,
 * more only where more samples share a stamp) are used again after the call.
 *
 * @param engine which of the engines begins; for tests, which demand the same of both
 * @throws UserError where the reading cannot be used on any row
 */
export async function readRecords(
  source: FileSource,
  ram: RamContext,
  reading: FileReading,
  onBatch: (batch: RecordBatch) => void,
  onProgress?: (bytesRead: number) => void,
  engine: Engine = 'scanner',
): Promise<ReadSummary> {
  refuseUnusable(reading, source.name);
  const { text } = await headText(source, reading.encoding);
  const habits = habitsOf(splitRows(text, reading.delimiter, source.name), reading);
  const { reader, stamps } = readerOf(reading, habits, ram, source.name, onBatch);
  const bytes = counted(source.open(), onProgress);
  const isWide = reading.encoding.startsWith('utf-16');
  const chunks = isWide ? asUtf8(bytes, reading.encoding) : bytes;
  const narrow: FileReading = isWide ? { ...reading, encoding: 'utf-8' } : reading;
  if (engine === 'scanner') await scanBytes(chunks, narrow, habits, stamps, reader, source.name);
  else await readGenerally(chunks, narrow, reader, source.name);
  reader.sink.flush(true);
  return summaryOf(reader, reading, ram);
}

/** A row reader with its stamps, clock and sink; also for the preview. */
export function readerOf(
  reading: FileReading,
  habits: Habits,
  ram: RamContext,
  fileName: string,
  onBatch: (batch: RecordBatch) => void,
): { reader: RowReader; stamps: StampReader } {
  const isBurst = reading.kind === 'burst';
  const clock = new StampClock(zoneOf(reading, ram.time_zone), ram.now_ms, isBurst);
  const stamps = new StampReader(reading, clock, fileName);
  const columns = reading.columns.filter((column) => column.channel !== null).length;
  const sink = new RecordSink(columns, isBurst, onBatch);
  return { reader: new RowReader(reading, habits, stamps, clock, sink, fileName), stamps };
}

/** Refuses a reading that contradicts itself. */
export function refuseUnusable(reading: FileReading, fileName: string): void {
  const refuse = (why: string): never => {
    throw new UserError(`${fileName}: ${why}`, 'cannot be read');
  };
  const channels = new Map<string, string>();
  for (const { channel, label, index } of reading.columns) {
    if (channel === null) continue;
    const name = label === '' ? `column ${index + 1}` : `"${label}"`;
    const other = channels.get(channel);
    if (other !== undefined) refuse(`${other} and ${name} cannot both be read as ${channel}; leave one of them out.`);
    channels.set(channel, name);
    if (reading.time.columns.includes(index)) refuse(`${name} cannot be both the time and ${channel}.`);
  }
  const indexes = reading.columns.map((column) => column.index);
  if (new Set(indexes).size < indexes.length) refuse('a column is listed twice in the reading.');
  if (reading.delimiter === reading.decimal_mark && reading.delimiter === ',' && reading.time.columns.length === 0)
    refuse('the comma cannot part the fields and the decimals at once.');
}

/** Text of two bytes a character as UTF-8, so that both engines can read it. */
async function* asUtf8(chunks: AsyncIterable<Buffer>, encoding: FileReading['encoding']): AsyncIterable<Buffer> {
  const decoder = new TextStream(encoding);
  for await (const chunk of chunks) yield Buffer.from(decoder.write(chunk));
  yield Buffer.from(decoder.end());
}

async function* counted(
  chunks: AsyncIterable<Buffer>,
  onProgress?: (bytesRead: number) => void,
): AsyncIterable<Buffer> {
  let bytes = 0;
  for await (const chunk of chunks) {
    yield chunk;
    bytes += chunk.length;
    onProgress?.(bytes);
  }
}

function summaryOf(reader: RowReader, reading: FileReading, ram: RamContext): ReadSummary {
  const { sink, clock } = reader;
  const notes: string[] = [];
  const note = (count: number, one: string, many: string) => {
    if (count > 0) notes.push(count === 1 ? `1 ${one}` : `${count} ${many}`);
  };
  note(reader.comments, 'comment line was skipped.', 'comment lines were skipped.');
  note(reader.repeatedHeaders, 'repeated header was skipped.', 'repeated headers were skipped.');
  note(reader.blankRows, 'row without any value was skipped.', 'rows without any value were skipped.');
  note(
    reader.unreadable,
    'value is not a number and was left out; the rest of its row was kept.',
    'values are not numbers and were left out; the rest of their rows was kept.',
  );
  note(
    sink.spread,
    'sample shares its stamp with others and was spread evenly over it.',
    'samples share their stamps with others and were spread evenly over them.',
  );
  if (reading.kind === 'log')
    note(
      sink.sameStamp,
      'record has the same stamp as the one before it.',
      'records have the same stamp as the one before them.',
    );
  const zone = zoneOf(reading, ram.time_zone);
  const fixed = "If the logger's clock does not follow summer time, state its zone as a fixed offset such as +01:00.";
  if (clock.inMissingHour > 0)
    notes.push(
      `${clock.inMissingHour} stamps lie in an hour that does not exist in ${zone}, because the clocks go forward over it. ${fixed}`,
    );
  if (clock.writtenOnce.length > 0)
    notes.push(
      `The hour that comes twice in ${zone} on ${clock.writtenOnce.slice(0, 3).join(', ')} is written once and was taken as the first of the two. ${fixed}`,
    );
  return {
    rows_read: sink.accepted + reader.refused,
    refused: reader.refused,
    refusals: reader.refusals,
    notes,
    missing: sink.missing,
  };
}
