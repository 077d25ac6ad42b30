/*
 * The instant of a record from its time columns, in any of the forms that a reading can state.
 */
import { channelUnit } from '../shapes/channel';
import { UserError } from '../shapes/problem';
import type { FileReading, TimeReading } from '../shapes/reading';
import { readNumber } from './numbers';
import type { StampClock } from './stamp-clock';
import { minutesOfOffset, type NoStamp, readDate, readStamp, timeOf, type WrittenStamp, withTime } from './stamps';

const DAY_MS = 86_400_000;
/** Day 25569 of the spreadsheets' 1900 system is 1970-01-01. */
const SERIAL_OF_1970 = 25_569;

/** Reads stamps as numbers or fields. Gives the instant in UTC milliseconds, or why there is none. */
export class StampReader {
  private readonly perSecond: number;
  private readonly start_ms: number;
  private lastElapsed_ms = Number.NEGATIVE_INFINITY;
  private midnights = 0;
  private dateText = '';
  private days = 0;

  constructor(
    private readonly reading: FileReading,
    private readonly clock: StampClock,
    fileName: string,
  ) {
    this.perSecond = elapsedUnit(reading) === 'ms' ? 1 : 1000;
    const { form, start_at } = reading.time;
    if (form === 'seconds from start' && start_at === null)
      throw new UserError(
        `${fileName} counts its time from the start of the burst, and the file does not tell when that was. State the start, such as 2026-03-01T10:30:00Z.`,
        'cannot be read',
      );
    this.start_ms = start_at === null ? 0 : instantOfIso(start_at);
  }

  read(stamp: string, time: string | null): number | string {
    const { form, day_order } = this.reading.time;
    if (form === 'fields') {
      const read = this.written(stamp, time, day_order);
      if ('why' in read) return `the stamp "${time === null ? stamp : `${stamp} ${time}`}" ${read.why}`;
      return read.offset_min === null
        ? this.clock.instant(read.local_ms)
        : this.clock.stated(read.local_ms - read.offset_min * 60_000);
    }
    const number = readNumber(stamp, this.reading.decimal_mark, false) ?? readNumber(stamp, '.', false);
    if (number === null)
      return form === 'seconds from start' ? this.elapsedClock(stamp) : `the stamp "${stamp}" is not a number`;
    return this.numeric(number.value, number.decimals);
  }

  /** Most records are of the same day as the one before, written alike. */
  private written(stamp: string, time: string | null, order: TimeReading['day_order']): WrittenStamp | NoStamp {
    const { dateText } = this;
    const next = stamp.charCodeAt(dateText.length);
    const isSameDay = dateText !== '' && stamp.startsWith(dateText) && !(next >= 48 && next <= 57);
    if (isSameDay) return withTime(this.days, stamp.slice(dateText.length), time);
    const day = readDate(stamp, order);
    if ('why' in day) return day;
    this.days = day.days;
    this.dateText = stamp.slice(0, stamp.length - day.rest.length);
    return withTime(day.days, day.rest, time);
  }

  /** The instant of a stamp that is a number. */
  numeric(value: number, decimals: number): number | string {
    switch (this.reading.time.form) {
      case 'epoch seconds':
        return this.clock.stated(this.rounded(value * 1000));
      case 'epoch milliseconds':
        return this.clock.stated(this.rounded(value));
      case 'spreadsheet days':
        return this.clock.instant(this.serial_ms(value, decimals));
      default:
        return this.clock.stated(this.start_ms + value * this.perSecond);
    }
  }

  /** A serial day has few decimals: five are good to a second, fewer to a minute. */
  private serial_ms(value: number, decimals: number): number {
    const ms = (value - SERIAL_OF_1970) * DAY_MS;
    const resolution_ms = this.reading.kind === 'burst' ? 0.1 : decimals === 0 || decimals > 4 ? 1000 : 60_000;
    return Math.round(ms / resolution_ms) * resolution_ms;
  }

  private rounded(ms: number): number {
    return this.reading.kind === 'burst' ? ms : Math.round(ms);
  }

  /** Elapsed time written as a clock, 00:00:01.250, also over midnight. */
  private elapsedClock(text: string): number | string {
    const read = timeOf(text);
    if ('why' in read) return `the stamp "${text}" ${read.why}`;
    if (read.ms < this.lastElapsed_ms - DAY_MS / 2) this.midnights++;
    this.lastElapsed_ms = read.ms;
    return this.clock.stated(this.start_ms + this.midnights * DAY_MS + read.ms);
  }
}

/** Elapsed times are seconds unless their column says milliseconds. */
export const elapsedUnit = (reading: FileReading): 's' | 'ms' =>
  reading.columns.find((column) => column.index === reading.time.columns[0])?.unit === 'ms' ? 'ms' : 's';

/** An ISO instant that ends in Z or in an offset; readings are checked to hold one. */
export function instantOfIso(text: string): number {
  const read = readStamp(text, null, 'year first');
  if ('why' in read) throw new UserError(`"${text}" ${read.why}; expected an instant such as 2026-03-01T10:30:00Z.`);
  return read.local_ms - (read.offset_min ?? 0) * 60_000;
}

/** Zone of the reading as a name that the zone rules know. */
export const zoneOf = (reading: FileReading, ramZone: string): string => {
  const { zone } = reading.time;
  if (zone === 'ram') return ramZone;
  return /^[+-]/.test(zone) && minutesOfOffset(zone) === 0 ? 'utc' : zone;
};

/** The unit that values of a column are in, for sentences. */
export const unitWords = (unit: string | null, channel: keyof typeof channelUnit): string => {
  const written = unit ?? channelUnit[channel];
  return { m: 'metres', L: 'litres', V: 'volts', count: 'a count', degC: 'degrees Celsius' }[written] ?? written;
};
