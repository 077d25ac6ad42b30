/*
 * Text to rows of fields, with the line on which each row begins.
 */
import Papa from 'papaparse';
import type { FileReading } from '../shapes/reading';
import { QuoteMender, restoreQuotes } from './quotes';

export type Delimiter = FileReading['delimiter'];

export interface TextRow {
  line: number;
  fields: string[];
}

export const papaOptions = (delimiter: Delimiter) => ({
  delimiter,
  newline: '\n' as const,
  quoteChar: '"',
  skipEmptyLines: false,
});

/** Runs of blanks count as one, and those at the ends of a row as none. */
export const prepared = (text: string, delimiter: Delimiter): string =>
  delimiter === ' ' && text.includes('\t') ? text.replaceAll('\t', ' ') : text;

export function finished(fields: string[], delimiter: Delimiter, hasQuotes: boolean): string[] {
  const row = delimiter === ' ' ? fields.filter((field) => field !== '') : fields;
  return hasQuotes ? row.map(restoreQuotes) : row;
}

/** Lines that a row of the raw fields takes up. */
export function linesOf(fields: readonly string[]): number {
  let lines = 1;
  for (const field of fields) for (let at = field.indexOf('\n'); at >= 0; at = field.indexOf('\n', at + 1)) lines++;
  return lines;
}

/** Takes a whole text apart. For heads and single lines; files are streamed by general-reader. */
export function splitRows(text: string, delimiter: Delimiter, fileName: string, firstLine = 1): TextRow[] {
  const mender = new QuoteMender(delimiter, fileName);
  const mended = mender.push(text) + mender.end();
  const { data } = Papa.parse<string[]>(prepared(mended, delimiter), papaOptions(delimiter));
  let line = firstLine;
  const rows = data.map((raw) => {
    const row = { line, fields: finished(raw, delimiter, mender.hasQuotes) };
    line += linesOf(raw);
    return row;
  });
  // a line end closes the last row and opens none
  const last = rows.at(-1);
  if (last !== undefined && last.fields.length <= 1 && (last.fields[0] ?? '') === '') rows.pop();
  return rows;
}
