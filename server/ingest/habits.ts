/*
 * What the head of a file shows of its habits beyond the accepted reading: how wide its rows are, which columns group thousands, how
 * its last column is written, what its stamps look like. Both reading engines judge by the same habits.
 */
import type { FileReading } from '../shapes/reading';
import { decodeAll } from './encoding';
import { decimalEvidence, readNumber } from './numbers';
import type { TextRow } from './rows';
import { type FileSource, readPart } from './source';

export const HEAD_BYTES = 1 << 18;
const LOOKED_AT = 1000;

export interface Habits {
  /** Widths of rows that are taken as whole, blank fields at the end left out. */
  widths: Set<number>;
  /** The usual width: every column of the reading. */
  width: number;
  /** Per column: the mark that is not the decimal mark groups thousands. */
  grouped: boolean[];
  /** Per column: a value as it is usually written. */
  example: string[];
  /** The last column that is used: how a row ends, to tell a whole last line from one cut short. */
  ending: { column: number; seen: number; longest: number; decimals: number | null };
  /** The time columns of the first record. */
  stamp: string[];
  header: string;
  units: string;
}

/** The text of a file's head as whole lines. */
export async function headText(
  source: FileSource,
  encoding: FileReading['encoding'],
): Promise<{ text: string; complete: boolean }> {
  const { bytes, complete } = await readPart(source, HEAD_BYTES, 'head');
  const text = decodeAll(bytes, encoding);
  const end = Math.max(text.lastIndexOf('\n'), text.lastIndexOf('\r')) + 1;
  // a line that runs through the whole head stays, so that it can be refused
  return { text: complete || end === 0 ? text : text.slice(0, end), complete };
}

/** Compares rows as words, so that blanks and capitals make no difference. */
export const rowWords = (fields: readonly string[]): string =>
  fields
    .join(' ')
    .replace(/^[#;/\s]+/, '')
    .replace(/[\s\0]+/g, ' ')
    .trim()
    .toLowerCase();

export function habitsOf(rows: readonly TextRow[], reading: FileReading): Habits {
  const first = rows.findIndex((row) => row.line >= reading.first_record_line);
  const records = rows
    .slice(first < 0 ? rows.length : first)
    .slice(0, LOOKED_AT)
    .filter((row) => row.fields.some((field) => field.trim() !== ''));
  const used = [...reading.time.columns, ...reading.columns.filter((c) => c.channel !== null).map((c) => c.index)];
  const width = Math.max(0, ...used, ...reading.columns.map((column) => column.index)) + 1;
  const column = Math.max(0, ...used);
  const units = rows.find((row) => row.line === reading.units_line);
  return {
    widths: widthsOf(records, width),
    width,
    grouped: Array.from({ length: width }, (_, index) => groupsThousands(records, index, reading)),
    example: Array.from({ length: width }, (_, index) => exampleOf(records, index, reading.decimal_mark)),
    ending: endingOf(records, column, reading.decimal_mark),
    stamp: reading.time.columns.map((index) => records[0]?.fields[index]?.trim() ?? ''),
    header: reading.header_line === null ? '' : rowWords(reading.columns.map((c) => c.label)),
    units: units === undefined ? '' : rowWords(units.fields),
  };
}

/** Fields up to the last that is not blank. */
export function widthOf(fields: readonly string[]): number {
  let width = fields.length;
  while (width > 0 && fields[width - 1]!.trim() === '') width--;
  return width;
}

/** A file that leaves out missing values at the end of its rows has short rows by habit; in any other a short row is a broken one. */
function widthsOf(records: readonly TextRow[], width: number): Set<number> {
  const counts = new Map<number, number>();
  for (const { fields } of records) counts.set(fields.length, (counts.get(fields.length) ?? 0) + 1);
  const habitual = [...counts].filter(([w, count]) => w < width && count >= 3 && count >= 0.02 * records.length);
  return new Set([width, ...habitual.map(([w]) => w)]);
}

function groupsThousands(records: readonly TextRow[], index: number, reading: FileReading): boolean {
  const other = reading.decimal_mark === '.' ? ',' : '.';
  let grouped = 0;
  for (const { fields } of records) {
    const text = (fields[index] ?? '').trim();
    if (!text.includes(other)) {
      // 1234 beside 1,234: no grouping, so 1,234 stays in doubt
      if (/^[+-]?\d{4}/.test(text)) return false;
      continue;
    }
    const evidence = /^[+-]?\d/.test(text) ? decimalEvidence(text) : null;
    if (evidence === null || evidence.mark === reading.decimal_mark) continue;
    if (evidence.sure || /^[+-]?0/.test(text)) return false;
    grouped++;
  }
  return grouped > 0;
}

function exampleOf(records: readonly TextRow[], index: number, mark: '.' | ','): string {
  for (const { fields } of records.slice(0, 50)) {
    const text = (fields[index] ?? '').trim();
    if (readNumber(text, mark, false) !== null) return text;
  }
  return mark === ',' ? '3,80' : '3.80';
}

function endingOf(records: readonly TextRow[], column: number, mark: string): Habits['ending'] {
  let longest = 0;
  let decimals: number | null = null;
  let steady = true;
  // the last record may itself be the one that is cut
  for (const { fields } of records.slice(0, -1)) {
    const text = (fields[column] ?? '').trim();
    longest = Math.max(longest, text.length);
    const place = text.lastIndexOf(mark);
    const own = place < 0 || !/^[\d+-]/.test(text) ? 0 : text.length - place - 1;
    if (decimals !== null && own !== decimals) steady = false;
    decimals = own;
  }
  return {
    column,
    seen: records.length - 1,
    longest,
    decimals: steady && decimals !== null && decimals > 0 ? decimals : null,
  };
}
