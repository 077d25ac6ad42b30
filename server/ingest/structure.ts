/*
 * The skeleton of a file: where its records begin, which line names the columns and which their units, how wide a record is.
 */
import { looksLikeStamp } from './cells';
import { type ColumnProfile, profileColumns } from './column-profiles';
import { guessDecimalMark, guessDialect } from './dialect';
import { findHeader, type Header } from './header';
import { meansMissing } from './missing';
import { type DecimalMark, looksLikeNumber, splitUnit } from './numbers';
import { isComment } from './row-reader';
import { type Delimiter, splitRows, type TextRow } from './rows';

export interface Structure {
  delimiter: Delimiter;
  decimal: { mark: DecimalMark; isSure: boolean };
  /** All rows of the head. */
  rows: TextRow[];
  records: TextRow[];
  firstRecordLine: number;
  width: number;
  profiles: ColumnProfile[];
  header: Header | null;
}

const SAMPLE_ROWS = 400;
const MOST_RECORDS = 1500;

/** The structure of a head of text, or null where it holds nothing like records. */
export function findStructure(text: string, fileName: string): Structure | null {
  const dialect = guessDialect(text, fileName);
  if (dialect === null) return null;
  const { delimiter, rows } = dialect;
  return structureOf(rows, delimiter, text);
}

/** The structure under a stated delimiter. */
export const structureUnder = (text: string, delimiter: Delimiter, fileName: string): Structure | null =>
  structureOf(splitRows(text, delimiter, fileName), delimiter, text);

function structureOf(rows: TextRow[], delimiter: Delimiter, text: string): Structure | null {
  const width = usualWidth(rows.slice(-SAMPLE_ROWS));
  if (width < 2) return null;
  const sample = rows.filter((row) => row.fields.length === width).slice(-SAMPLE_ROWS);
  const rough = profileColumns(sample, width, '.');
  const first = firstRecord(rows, rough, width, delimiter);
  if (first === null) return null;
  const at = rows.indexOf(first);
  const records = rows
    .slice(at, at + MOST_RECORDS)
    .filter((row) => row.fields.length === width && isRecord(row, rough));
  const numbers = rough.filter((profile) => profile.kind === 'number').map((profile) => profile.index);
  const decimal = guessDecimalMark(records, numbers, delimiter);
  const profiles = profileColumns(records, width, decimal.mark);
  const header = findHeader(rows.slice(0, at), profiles, width, delimiter, text);
  const start = firstAttempt(rows, at, rough, header, width);
  // a delimiter at the end of every row makes a last column of nothing
  let used = width;
  while (used > 1 && profiles[used - 1]!.kind === 'blank' && (header?.labels[used - 1] ?? '').trim() === '') used--;
  return {
    delimiter,
    decimal,
    rows,
    records,
    firstRecordLine: rows[start]!.line,
    width: used,
    profiles: profiles.slice(0, used),
    header,
  };
}

/** Damaged and short rows between the header and the first whole record are records too: they are refused with a reason, not passed over. */
function firstAttempt(
  rows: readonly TextRow[],
  at: number,
  profiles: readonly ColumnProfile[],
  header: Header | null,
  width: number,
): number {
  const time =
    profiles.find(({ kind }) => kind === 'stamp' || kind === 'date') ?? profiles.find(({ kind }) => kind === 'number');
  const above = header?.unitsLine ?? header?.line ?? 0;
  let start = at;
  for (let i = at - 1; i >= 0 && rows[i]!.line > above; i--) {
    const { fields } = rows[i]!;
    const isAttempt =
      header === null
        ? fields.length > 1 && isRecord(rows[i]!, profiles)
        : fields.length > 1 && fields.length <= width + 1;
    if (isAttempt && /\d/.test(fields[time?.index ?? 0] ?? '')) start = i;
    else if (fields.some((field) => field.trim() !== '')) break;
  }
  return start;
}

/** Fields of most of the rows that hold numbers. */
function usualWidth(rows: readonly TextRow[]): number {
  const counts = new Map<number, number>();
  for (const { fields } of rows)
    if (fields.some((field) => looksLikeNumber(field.trim()) || looksLikeStamp(field.trim()) !== null))
      counts.set(fields.length, (counts.get(fields.length) ?? 0) + fields.length);
  let best = 0;
  for (const [width, weight] of counts) if (weight > (counts.get(best) ?? 0)) best = width;
  return best;
}

function isRecord(row: TextRow, profiles: readonly ColumnProfile[]): boolean {
  let wrong = 0;
  let numbers = 0;
  let wanted = 0;
  for (const { kind, index } of profiles) {
    const cell = (row.fields[index] ?? '').trim();
    if (kind === 'stamp' || kind === 'date' || kind === 'time') {
      // a midnight may be written without its time
      const looks = looksLikeStamp(cell);
      if (looks === null || (kind === 'time' && looks !== 'time')) return false;
    } else if (kind === 'number') {
      wanted++;
      if (looksLikeNumber(cell) || splitUnit(cell) !== null) numbers++;
      else if (!meansMissing(cell)) wrong++;
    }
  }
  return (
    wanted === 0 ||
    (numbers >= 1 && wrong <= wanted / 2) ||
    (numbers === 0 && wrong === 0 && profiles.some((p) => p.kind !== 'number'))
  );
}

/** The first row that is a record and is followed by another, so that a line of the preamble is not taken for one. */
function firstRecord(
  rows: readonly TextRow[],
  profiles: readonly ColumnProfile[],
  width: number,
  delimiter: Delimiter,
): TextRow | null {
  const isOne = (row: TextRow) =>
    row.fields.length >= Math.min(width, 2) && row.fields.length <= width + 1 && isRecord(row, profiles);
  const full = rows.filter(
    (row) => row.fields.some((field) => field.trim() !== '') && !isComment(row.fields[0]!.trimStart(), delimiter),
  );
  for (const [i, row] of full.entries()) {
    if (row.fields.length !== width || !isOne(row)) continue;
    const next = full.slice(i + 1, i + 4);
    if (next.length === 0 || next.some(isOne)) return row;
  }
  return null;
}
