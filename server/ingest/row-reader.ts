/*
 * One row of fields to one record, or the reason why it is none. Both reading engines send here whatever is not plain, so that
 * they decide alike.
 */
import type { Refusal } from '../shapes/load';
import { UserError } from '../shapes/problem';
import type { FileReading } from '../shapes/reading';
import { type Habits, rowWords, widthOf } from './habits';
import { ALL_ONES, isMissingCode, isTotal, meansMissing } from './missing';
import { readNumber, splitUnit, type WrittenNumber } from './numbers';
import type { RecordSink } from './record-sink';
import type { StampClock } from './stamp-clock';
import { type StampReader, unitWords } from './stamp-reader';
import { dateFields, dayOf } from './stamps';

const MOST_REFUSALS = 200;
const missingNumber: WrittenNumber = { value: Number.NaN, decimals: 0 };
const none: { column: ValueColumn; text: string }[] = [];

export interface ValueColumn {
  index: number;
  label: string;
  unit: string | null;
  expected: string;
  isTotal: boolean;
}

/** The columns of a reading that have a channel, in its order. */
export const valueColumns = (reading: FileReading): ValueColumn[] =>
  reading.columns.flatMap(({ index, label, unit, channel }) =>
    channel === null
      ? []
      : [
          {
            index,
            label: label === '' ? `column ${index + 1}` : label,
            unit,
            expected: unitWords(unit, channel),
            isTotal: isTotal(channel),
          },
        ],
  );

export class RowReader {
  readonly columns: ValueColumn[];
  readonly refusals: Refusal[] = [];
  refused = 0;
  /** Values that are text in a number's place; their rows are kept. */
  unreadable = 0;
  comments = 0;
  blankRows = 0;
  repeatedHeaders = 0;
  /** Length of the last used field of the record before, for the last line of the file. */
  endingLength = 0;
  /** Refuses every record after a header with other columns, until the known header comes back. */
  private otherColumns: string | null = null;
  private written = missingNumber;
  private readonly decimals: Uint8Array;
  private readonly isMissing: Uint8Array;

  constructor(
    private readonly reading: FileReading,
    private readonly habits: Habits,
    private readonly stamps: StampReader,
    readonly clock: StampClock,
    readonly sink: RecordSink,
    private readonly fileName: string,
  ) {
    this.columns = valueColumns(reading);
    this.decimals = new Uint8Array(this.columns.length);
    this.isMissing = new Uint8Array(this.columns.length);
  }

  /** True while rows cannot be read as records whatever they hold. */
  get isBlocked(): boolean {
    return this.otherColumns !== null;
  }

  /** @param isWhole false for a last line without a line end, which may have been cut */
  take(fields: string[], line: number, isWhole: boolean): void {
    const first = (fields[0] ?? '').trimStart();
    if (fields.length <= 1 && first.replaceAll('\0', '').trim() === '') return;
    if (isComment(first, this.reading.delimiter)) {
      // a comment that repeats the header is still one
      this.comments++;
      return;
    }
    const width = widthOf(fields);
    if (width === 0) {
      this.blankRows++;
      return;
    }
    const refusal = this.record(fields, width, line, isWhole);
    if (refusal !== null) this.refuse(line, refusal);
  }

  /** Commits the row as a record, or tells why it is none. */
  private record(fields: string[], width: number, line: number, isWhole: boolean): string | null {
    const [dateColumn, timeColumn] = this.reading.time.columns as [number, number | undefined];
    const stamp = bare(fields[dateColumn]);
    const time = timeColumn === undefined ? null : bare(fields[timeColumn]);
    const at = stamp === '' ? 'there is no stamp' : this.stamps.read(stamp, time);
    if (typeof at === 'string') {
      if (this.isHeader(fields)) return null;
      if (this.changesColumns(fields))
        return `another header: the columns change to ${shortened(fields.join(', '))}; load that part as a file of its own`;
      this.refuseUndecided(stamp, line);
      return this.expectStamp(at);
    }
    const misfit = this.misfit(fields, width);
    const broken =
      this.otherColumns ??
      (isWhole ? misfit : misfit === null ? this.cut(fields) : `the file ends within this line: ${misfit}`);
    if (broken !== null) return broken;
    const unreadable = this.readValues(fields);
    if (typeof unreadable === 'string') return unreadable;
    for (const { column, text } of unreadable) this.tellUnreadable(line, column, text);
    this.endingLength = (fields[this.habits.ending.column] ?? '').trim().length;
    this.sink.commit(at);
    return null;
  }

  private refuse(line: number, reason: string): void {
    this.refused++;
    this.tell(line, reason);
  }

  private tell(line: number, reason: string): void {
    if (this.refusals.length < MOST_REFUSALS) this.refusals.push({ line, reason });
  }

  /** Writes the values at the sink's place. Gives the unreadable ones, or why the row as a whole is no record. */
  private readValues(fields: string[]): { column: ValueColumn; text: string }[] | string {
    const { sink, columns, decimals, isMissing } = this;
    let bad: { column: ValueColumn; text: string }[] = none;
    let good = 0;
    for (let c = 0; c < columns.length; c++) {
      const column = columns[c]!;
      const text = bare(fields[column.index]);
      const kind = this.readValue(text, column);
      sink.values[c]![sink.count] = this.written.value;
      decimals[c] = Math.min(this.written.decimals, 255);
      isMissing[c] = kind === 'number' ? 0 : 1;
      if (kind === 'number') good++;
      if (kind === 'text') bad = [...bad, { column, text }];
    }
    if (bad.length > 0 && good === 0) {
      const words = bad.map(({ text }) => text).join(' ');
      return `"${shortened(words)}" stands where numbers were expected: an event or a damaged line`;
    }
    for (let c = 0; c < columns.length; c++) {
      sink.missing[c]! += isMissing[c]!;
      if (decimals[c]! > sink.decimals[c]!) sink.decimals[c] = decimals[c]!;
    }
    return bad;
  }

  private readValue(text: string, column: ValueColumn): 'number' | 'missing' | 'text' {
    this.written = missingNumber;
    if (meansMissing(text)) return 'missing';
    const grouped = this.habits.grouped[column.index] ?? false;
    let number = readNumber(text, this.reading.decimal_mark, grouped);
    if (number === null) {
      const split = splitUnit(text);
      if (split !== null && split.unit === column.unit)
        number = readNumber(split.number, this.reading.decimal_mark, grouped);
    }
    if (number === null || !Number.isFinite(number.value)) return 'text';
    if (isMissingCode(number.value) || (!column.isTotal && number.value === ALL_ONES)) return 'missing';
    this.written = number;
    return 'number';
  }

  private tellUnreadable(line: number, column: ValueColumn, text: string): void {
    this.unreadable++;
    const hint = /^[\d.,]*[oO][\d.,oO]*$/.test(text)
      ? ' (letter O?)'
      : /^[\d.,]*[lI][\d.,lI]*$/.test(text)
        ? ' (letter l or I?)'
        : /^[+-]?\d+[.,]\d+$/.test(text)
          ? ` (this file's decimal mark is ${this.reading.decimal_mark})`
          : '';
    this.tell(
      line,
      `${column.label} "${shortened(text)}" is not a number${hint}; expected ${column.expected} such as ${this.habits.example[column.index]}; the value was left out, the rest of the row kept`,
    );
  }

  private misfit(fields: string[], width: number): string | null {
    const { widths, width: usual } = this.habits;
    if (width > usual)
      return `it has ${width} fields where ${usual} were expected: ${shortened(fields.slice(usual).join(' ').trim())}`;
    if (fields.length < usual && !widths.has(fields.length)) {
      const after = fields.filter((_, i) => !this.reading.time.columns.includes(i)).map((field) => field.trim());
      return after.length > 0 && after.every((text) => text === '' || /\p{L}{2}/u.test(text))
        ? `an event, not a record: ${shortened(after.join(' ').trim())}`
        : `it has ${fields.length} fields where ${usual} were expected`;
    }
    return null;
  }

  /** A last line without a line end is taken only where it cannot have lost anything of what is used. */
  private cut(fields: string[]): string | null {
    const { column, seen, longest, decimals } = this.habits.ending;
    if (fields.length < this.habits.width && !this.habits.widths.has(fields.length)) return null;
    if (fields.length - 1 > column) return null;
    const text = (fields[column] ?? '').trim();
    const isWhole =
      decimals !== null
        ? text.length - text.lastIndexOf(this.reading.decimal_mark) - 1 === decimals &&
          text.includes(this.reading.decimal_mark)
        : seen > 0 && text.length >= Math.max(longest, this.endingLength) && !this.falls(column, text);
    return isWhole ? null : `the file ends within this line: its last value "${text}" may be cut short`;
  }

  /** Whether a running total stands lower than in the record before, as it does where it has lost its last digits. */
  private falls(index: number, text: string): boolean {
    const c = this.columns.findIndex((column) => column.index === index && column.isTotal);
    const number = c < 0 ? null : readNumber(text, this.reading.decimal_mark, false);
    return number !== null && number.value < this.sink.previousValue(c);
  }

  private isHeader(fields: string[]): boolean {
    const words = rowWords(fields);
    if (words === '') return false;
    if (words === this.habits.header) {
      this.repeatedHeaders++;
      this.otherColumns = null;
      return true;
    }
    return words === this.habits.units;
  }

  /** A header with other columns makes every record after it unreadable, until the known header comes back. */
  private changesColumns(fields: string[]): boolean {
    const label = this.reading.columns.find((column) => column.index === this.reading.time.columns[0])?.label ?? '';
    const cell = fields[this.reading.time.columns[0]!] ?? '';
    if (label === '' || rowWords([cell]) !== rowWords([label])) return false;
    this.otherColumns = 'it stands under a header with other columns; load that part as a file of its own';
    return true;
  }

  /** A date whose order nobody has decided stops the reading: guessing row by row would be silently wrong. */
  private refuseUndecided(stamp: string, line: number): void {
    const { form, day_order } = this.reading.time;
    if (form !== 'fields' || day_order !== null) return;
    const fields = dateFields(stamp);
    if (fields === null || !('undecided' in dayOf(fields, null))) return;
    throw new UserError(
      `${this.fileName}, line ${line}: "${stamp}" may be day first or month first, and nobody has said which. Choose one; nothing was read.`,
      'cannot be read',
    );
  }

  private expectStamp(why: string): string {
    const example = this.habits.stamp.join(' ').trim();
    return example !== '' && why.startsWith('the stamp') ? `${why}; expected one such as ${example}` : why;
  }
}

/** A cell without blanks around it, nor quotes that a blank before them made ordinary. */
function bare(field: string | undefined): string {
  const text = (field ?? '').trim();
  return text.length > 1 && text.startsWith('"') && text.endsWith('"') ? text.slice(1, -1).trim() : text;
}

/** Whether a row begins as a comment; `#N/A` in a first column does not. */
export const isComment = (text: string, delimiter: string): boolean =>
  (text.startsWith('#') && !meansMissing(text)) || text.startsWith('//') || (text.startsWith(';') && delimiter !== ';');

const shortened = (text: string): string => {
  const clean = text.replace(/\s+/g, ' ').replace(/\p{Cc}/gu, '�');
  return clean.length > 60 ? `${clean.slice(0, 57)}…` : clean;
};
