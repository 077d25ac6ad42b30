/*
 * A reading that was accepted for an earlier file of the same logger: recognised by its headings, wherever they stand this time.
 */
import type { ColumnReading, FileReading, ReadingQuestion } from '../shapes/reading';
import { changedHeaderQuestion } from './questions';
import { type Structure, structureUnder } from './structure';

const same = (a: string, b: string): boolean => a.trim().toLowerCase() === b.trim().toLowerCase();

/** The newest remembered reading whose headings, delimiter and number of columns are those of this file, with the structure under it. */
export function fittingReading(
  remembered: readonly FileReading[],
  fresh: Structure,
  text: string,
  fileName: string,
): { reading: FileReading; structure: Structure } | null {
  const structures = new Map([[fresh.delimiter, fresh as Structure | null]]);
  for (const reading of remembered) {
    let structure = structures.get(reading.delimiter);
    if (structure === undefined) {
      structure = structureUnder(text, reading.delimiter, fileName);
      structures.set(reading.delimiter, structure);
    }
    if (structure === null || !fits(reading, structure)) continue;
    return { reading, structure };
  }
  return null;
}

function fits(reading: FileReading, { header, width, decimal }: Structure): boolean {
  if (decimal.isSure && decimal.mark !== reading.decimal_mark) return false;
  if (reading.header_line === null) return header === null && reading.columns.length === width;
  if (
    header === null ||
    reading.columns.length !== width ||
    (reading.units_line === null) !== (header.unitsLine === null)
  )
    return false;
  return reading.columns.every(({ index, label }) => same(label, header.labels[index] ?? ''));
}

/** Says what changed where most of the headings are those of an earlier file, but not all. Another heading over the time is no matter. */
export function changedHeader(
  remembered: readonly FileReading[],
  columns: readonly ColumnReading[],
  timeColumns: readonly number[],
): ReadingQuestion | null {
  const named = (all: readonly ColumnReading[], times: readonly number[]) =>
    all.filter((column) => column.label !== '' && !times.includes(column.index));
  const own = named(columns, timeColumns);
  for (const reading of remembered) {
    const earlier = named(reading.columns, reading.time.columns);
    const twin = (column: ColumnReading, among: readonly ColumnReading[]) =>
      among.find((other) => same(column.label, other.label));
    const kept = own.filter((column) => twin(column, earlier) !== undefined);
    if (kept.length < 2 || kept.length < 0.5 * earlier.length) continue;
    const fresh = own.filter((column) => !kept.includes(column));
    const gone = earlier.filter((column) => twin(column, own) === undefined);
    const isReadAlike = kept.every((column) => twin(column, earlier)!.channel === column.channel);
    if (fresh.length + gone.length === 0 && isReadAlike) return null;
    return changedHeaderQuestion(
      fresh.map((column) => column.label),
      gone.map((column) => column.label),
    );
  }
  return null;
}
