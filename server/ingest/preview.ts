/*
 * The first rows of a file in its own words, above what a reading makes of them.
 */
import type { FileReading, PreviewRow } from '../shapes/reading';
import type { Habits } from './habits';
import { meansMissing } from './missing';
import { readNumber } from './numbers';
import type { RamContext } from './ram-context';
import { readerOf } from './read';
import type { TextRow } from './rows';

const ROWS = 12;
/** Comments and headers are passed over, but not without end. */
const MOST_LOOKED_AT = 200;

export function previewRows(
  rows: readonly TextRow[],
  reading: FileReading,
  habits: Habits,
  ram: RamContext,
  fileName: string,
): PreviewRow[] {
  const preview: PreviewRow[] = [];
  for (const row of rows.filter((one) => one.line >= reading.first_record_line).slice(0, MOST_LOOKED_AT)) {
    const shown = previewRow(row, reading, habits, ram, fileName);
    if (shown !== null) preview.push(shown);
    if (preview.length >= ROWS) break;
  }
  return preview;
}

/** One row through the row reader as in a load; null for a row that is no record and no refusal. */
function previewRow(
  row: TextRow,
  reading: FileReading,
  habits: Habits,
  ram: RamContext,
  fileName: string,
): PreviewRow | null {
  const startKnown = reading.time.form !== 'seconds from start' || reading.time.start_at !== null;
  const words = row.fields.map((field) => field.trim());
  const values = reading.columns.map(({ index }) => {
    const text = words[index] ?? '';
    const number = meansMissing(text) ? null : readNumber(text, reading.decimal_mark, habits.grouped[index] ?? false);
    return number === null || !Number.isFinite(number.value) ? null : number.value;
  });
  if (!startKnown) return { line: row.line, words, at: null, values, refused: null };
  let at: number | null = null;
  const taken: number[][] = [];
  const { reader } = readerOf(reading, habits, ram, fileName, (batch) => {
    at = batch.times_ms[0]!;
    taken.push(batch.values.map((column) => column[0]!));
  });
  try {
    reader.take(row.fields, row.line, true);
  } catch {
    // the order of day and month is asked; until then there is no instant
    return { line: row.line, words, at: null, values, refused: null };
  }
  reader.sink.flush(true);
  if (at === null && reader.refused === 0) return null;
  let channel = 0;
  for (const [i, column] of reading.columns.entries())
    if (column.channel !== null && taken[0] !== undefined) {
      const value = taken[0][channel++]!;
      values[i] = Number.isNaN(value) ? null : value;
    }
  return {
    line: row.line,
    words,
    at: at === null ? null : new Date(at).toISOString(),
    values,
    refused: reader.refusals[0]?.reason ?? null,
  };
}
