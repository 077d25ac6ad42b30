/*
 * One line of bytes to one record, without a detour over text. A line that is not plain in every field goes as text to the row reader.
 */
import type { FileReading } from '../shapes/reading';
import { decodeAll } from './encoding';
import type { Habits } from './habits';
import { ALL_ONES, isMissingCode } from './missing';
import { MOST_EXACT_DIGITS, powersOfTen } from './numbers';
import { isOpenAfter } from './quotes';
import type { RowReader } from './row-reader';
import { splitRows } from './rows';
import { datePattern, StampFields, type StampPattern, timePattern } from './stamp-pattern';
import type { StampReader } from './stamp-reader';

export const LF = 10;
export const CR = 13;
const BLANK = 32;
const TAB = 9;
const QUOTE = 34;
const [SKIP, DATE, TIME, NUMERIC_STAMP, VALUE] = [0, 1, 2, 3, 4];

export class LineScanner {
  line = 1;
  private readonly delimiter: number;
  private readonly isBlanks: boolean;
  private readonly mark: number;
  private readonly roles: Uint8Array;
  private readonly valueAt: Uint8Array;
  private readonly allOnes: boolean[];
  private readonly fields = new StampFields();
  private readonly date: StampPattern | null;
  private readonly time: StampPattern | null;
  private readonly offset_min: number | null;
  private readonly rowDecimals: Uint8Array;
  private readonly endingColumn: number;
  private readonly isPlain: boolean;
  /** What `number` has found; in an array because a field that holds now an integer, now a fraction is allocated anew each time. */
  private readonly found = new Float64Array(1);
  private decimals = 0;
  /** Where the last used field of the line begins and ends. */
  private endingFrom = 0;
  private endingTo = 0;

  constructor(
    private readonly reading: FileReading,
    habits: Habits,
    private readonly stamps: StampReader,
    private readonly reader: RowReader,
    private readonly fileName: string,
  ) {
    this.delimiter = reading.delimiter.charCodeAt(0);
    this.isBlanks = reading.delimiter === ' ';
    this.mark = reading.decimal_mark.charCodeAt(0);
    this.endingColumn = habits.ending.column;
    this.roles = new Uint8Array(habits.width);
    this.valueAt = new Uint8Array(habits.width);
    this.allOnes = reader.columns.map((column) => !column.isTotal);
    this.rowDecimals = new Uint8Array(reader.columns.length);
    for (const [c, column] of reader.columns.entries()) {
      this.roles[column.index] = VALUE!;
      this.valueAt[column.index] = c;
    }
    const [dateColumn, timeColumn] = reading.time.columns as [number, number | undefined];
    const isFields = reading.time.form === 'fields';
    this.roles[dateColumn] = isFields ? DATE! : NUMERIC_STAMP!;
    if (timeColumn !== undefined) this.roles[timeColumn] = TIME!;
    this.date = isFields ? datePattern(habits.stamp[0] ?? '', reading.time.day_order, this.fields) : null;
    this.time = timeColumn === undefined ? null : timePattern(habits.stamp[1] ?? '', this.fields);
    this.offset_min = this.date?.offset_min ?? this.time?.offset_min ?? null;
    this.isPlain = !isFields
      ? timeColumn === undefined
      : this.date !== null && (timeColumn === undefined || this.time !== null);
  }

  /** Scans whole lines. Gives the place where it stopped: the end, or the start of a line whose quoted field does not close. */
  scan(bytes: Buffer, end: number): number {
    const first = this.reading.first_record_line;
    let from = 0;
    while (from < end) {
      const isRecordLine = this.line >= first;
      let stop = isRecordLine && this.isPlain && !this.reader.isBlocked ? this.record(bytes, from) : -1;
      if (stop < 0) {
        stop = from;
        while (bytes[stop] !== LF && bytes[stop] !== CR) stop++;
        if (isRecordLine && stop > from && !this.takeText(bytes, from, stop, true)) return from;
      }
      from = stop + (bytes[stop] === CR && bytes[stop + 1] === LF ? 2 : 1);
      this.line++;
    }
    return end;
  }

  /** Takes a last line that has no line end. False where a quoted field stays open in it. */
  takeLast(bytes: Buffer): boolean {
    if (this.line < this.reading.first_record_line || bytes.length === 0) return true;
    return this.takeText(bytes, 0, bytes.length, false);
  }

  private takeText(bytes: Buffer, from: number, to: number, isWhole: boolean): boolean {
    const text = decodeAll(bytes.subarray(from, to), this.reading.encoding);
    const { delimiter } = this.reading;
    if (!text.includes('"')) {
      const fields = this.isBlanks ? text.split(/[ \t]+/).filter((field) => field !== '') : text.split(delimiter);
      this.reader.take(fields, this.line, isWhole);
      return true;
    }
    if (isOpenAfter(this.isBlanks ? text.replaceAll('\t', ' ') : text, delimiter, false)) return false;
    this.reader.take(splitRows(text, delimiter, this.fileName)[0]?.fields ?? [], this.line, isWhole);
    return true;
  }

  /** Reads one line as a record. Gives the place of its line end, or -1 where the row reader must look. */
  private record(bytes: Buffer, from: number): number {
    const { roles, isBlanks, delimiter, reader, rowDecimals, valueAt, allOnes, endingColumn, found } = this;
    const { sink } = reader;
    const { count, values, decimals } = sink;
    const width = roles.length;
    let place = from;
    let column = 0;
    let stampValue = 0;
    let stampDecimals = 0;
    let missing = 0;
    let isFiner = false;
    let fieldFrom = from;
    while (bytes[place] === BLANK || (isBlanks && bytes[place] === TAB)) place++;
    const begins = bytes[place];
    // comments begin with #, // or ;
    if (begins === 35 || begins === 47 || (begins === 59 && delimiter !== 59)) return -1;
    for (;;) {
      while (bytes[place] === BLANK) place++;
      // only a quote at the very start of a field is one
      const isQuoted = bytes[place] === QUOTE;
      if (isQuoted && place > fieldFrom && !isBlanks) return -1;
      if (isQuoted) place++;
      const start = place;
      const role = column < width ? roles[column]! : -1;
      if (role === VALUE) {
        const c = valueAt[column]!;
        const after = this.number(bytes, place);
        if (after < 0) return -1;
        if (after === place) missing++;
        const value = found[0]!;
        const isCode = (value < -900 && isMissingCode(value)) || (value === ALL_ONES && allOnes[c]!);
        const isMissing = after === place || isCode;
        if (isMissing && after > place) missing++;
        values[c]![count] = isMissing ? Number.NaN : value;
        rowDecimals[c] = isMissing ? 0 : this.decimals;
        if (this.decimals > decimals[c]!) isFiner = true;
        place = after;
      } else if (role === DATE || role === TIME) {
        place = (role === DATE ? this.date! : this.time!).match(bytes, place);
        if (place < 0) return -1;
      } else if (role === NUMERIC_STAMP) {
        const after = this.number(bytes, place);
        if (after <= place) return -1;
        stampValue = found[0]!;
        stampDecimals = this.decimals;
        place = after;
      } else if (role === SKIP) {
        if (isQuoted) {
          while (bytes[place] !== QUOTE && bytes[place] !== LF && bytes[place] !== CR) place++;
        } else while (!this.endsField(bytes[place]!)) place++;
      }
      if (column === endingColumn) {
        this.endingFrom = start;
        this.endingTo = place;
      }
      if (isQuoted && bytes[place++] !== QUOTE) return -1;
      while (bytes[place] === BLANK || (isBlanks && bytes[place] === TAB)) place++;
      const mark = bytes[place]!;
      if (mark === LF || mark === CR) break;
      if (isBlanks) {
        // the blanks before this field are what parts it from the last one
        if (place === start || (bytes[place - 1] !== BLANK && bytes[place - 1] !== TAB)) return -1;
      } else if (mark === delimiter) place++;
      else return -1;
      fieldFrom = place;
      column++;
    }
    if (column + 1 < width) return -1;
    const at = this.date !== null ? this.fieldsInstant() : this.stamps.numeric(stampValue, stampDecimals);
    if (typeof at === 'string' || Number.isNaN(at)) return -1;
    if (missing > 0) for (let c = 0; c < values.length; c++) if (Number.isNaN(values[c]![count]!)) sink.missing[c]!++;
    if (isFiner)
      for (let c = 0; c < rowDecimals.length; c++) if (rowDecimals[c]! > decimals[c]!) decimals[c] = rowDecimals[c]!;
    reader.endingLength = this.endingTo - this.endingFrom;
    sink.commit(at);
    return place;
  }

  private fieldsInstant(): number | string {
    const local_ms = this.fields.local_ms();
    if (this.offset_min === null || Number.isNaN(local_ms)) return this.reader.clock.quick(local_ms);
    return this.reader.clock.stated(local_ms - this.offset_min * 60_000);
  }

  private endsField(byte: number): boolean {
    return byte === this.delimiter || byte === LF || byte === CR || (this.isBlanks && byte === TAB);
  }

  /** Reads a plain number. Gives the place after it, the same place where there is none, or -1 where it needs the row reader. */
  private number(bytes: Buffer, from: number): number {
    let place = from;
    let byte = bytes[place]!;
    if (byte === this.delimiter || byte === LF || byte === CR || byte === QUOTE) return this.isBlanks ? -1 : place;
    const isNegative = byte === 45;
    if (isNegative || byte === 43) byte = bytes[++place]!;
    let value = 0;
    const digitsFrom = place;
    while (byte >= 48 && byte <= 57) {
      value = value * 10 + (byte - 48);
      byte = bytes[++place]!;
    }
    let digits = place - digitsFrom;
    this.decimals = 0;
    if (byte === this.mark && this.mark !== this.delimiter) {
      const decimalsFrom = ++place;
      byte = bytes[place]!;
      while (byte >= 48 && byte <= 57) {
        value = value * 10 + (byte - 48);
        byte = bytes[++place]!;
      }
      this.decimals = place - decimalsFrom;
      digits += this.decimals;
    }
    if (digits === 0 || digits > MOST_EXACT_DIGITS) return -1;
    const size = this.decimals > 0 ? value / powersOfTen[this.decimals]! : value;
    this.found[0] = isNegative ? -size : size;
    return place;
  }
}
