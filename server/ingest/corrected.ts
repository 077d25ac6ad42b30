/*
 * A reading in which a person has chosen another delimiter or header line: its columns are those that the choice makes.
 */
import type { ColumnReading, FileReading } from '../shapes/reading';
import { readColumns } from './channels';
import type { RamContext } from './ram-context';
import type { Structure } from './structure';
import { findTimeColumns } from './time-columns';

const STEP_MS = 600_000;

/** Keeps what was said of columns that are still there by name, and guesses the others. */
export function followedColumns(corrected: FileReading, structure: Structure, ram: RamContext): FileReading {
  const { rows, profiles, width, header } = structure;
  const cellsOf = (line: number | null) => rows.find((row) => row.line === line)?.fields.map((cell) => cell.trim());
  const isFound = header !== null && header.line === corrected.header_line;
  const labels = isFound ? header.labels : cellsOf(corrected.header_line);
  const isSame = (column: ColumnReading) => labels === undefined || (labels[column.index] ?? '') === column.label;
  if (corrected.columns.length === width && corrected.columns.every(isSame)) return corrected;
  const units = cellsOf(corrected.units_line) ?? [];
  const headings =
    labels === undefined ? null : profiles.map((_, i) => ({ label: labels[i] ?? '', unit: units[i] ?? '' }));
  const found = findTimeColumns(profiles, labels ?? [], ram.now_ms);
  const time = found === null ? corrected.time : { ...corrected.time, columns: found.columns, form: found.form };
  const elapsedUnit = found?.isMilliseconds ? 'ms' : null;
  const { columns } = readColumns(profiles, headings, time.columns, elapsedUnit, ram.sensors, STEP_MS);
  const said = new Map(
    corrected.columns.filter((column) => column.label !== '').map((column) => [column.label, column]),
  );
  const kept = new Set(columns.flatMap((column) => said.get(column.label)?.channel ?? []));
  return {
    ...corrected,
    time,
    columns: columns.map((column) => {
      const earlier = said.get(column.label);
      if (earlier !== undefined) return { ...earlier, index: column.index };
      return column.channel !== null && kept.has(column.channel) ? { ...column, channel: null } : column;
    }),
  };
}
