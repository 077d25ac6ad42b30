import { parse } from 'date-fns';
import fc from 'fast-check';
import { expect, test } from 'vitest';
import { daysInMonth, daysSince1970 } from '../../server/ingest/calendar';
import { looksLikeStamp } from '../../server/ingest/cells';
import { StampClock } from '../../server/ingest/stamp-clock';
import { StampReader } from '../../server/ingest/stamp-reader';
import { type DayOrder, readStamp } from '../../server/ingest/stamps';
import type { FileReading } from '../../server/shapes/reading';
import { iso } from './memory-source';

const readings: [string, DayOrder, string][] = [
  ['2025-04-05 10:30:15', 'year first', '2025-04-05T10:30:15.000Z'],
  ['2025/4/5 9:05', 'year first', '2025-04-05T09:05:00.000Z'],
  ['2025-04-05T10:30', 'year first', '2025-04-05T10:30:00.000Z'],
  ['2025-04-05 10:30:15.250', 'year first', '2025-04-05T10:30:15.250Z'],
  ['2025-04-05 10:30:15,5', 'year first', '2025-04-05T10:30:15.500Z'],
  ['05/04/2025 10:30', 'day first', '2025-04-05T10:30:00.000Z'],
  ['05/04/2025 10:30', 'month first', '2025-05-04T10:30:00.000Z'],
  ['5.4.2025 10.30', 'day first', '2025-04-05T10:30:00.000Z'],
  ['05-04-25 10:30', 'day first', '2025-04-05T10:30:00.000Z'],
  ['25-04-05 10:30', 'year first', '2025-04-05T10:30:00.000Z'],
  ['05-Apr-2025 10:30', null, '2025-04-05T10:30:00.000Z'],
  ['5 avr. 2025 10:30', null, '2025-04-05T10:30:00.000Z'],
  ['5 Mär 2025 10:30', null, '2025-03-05T10:30:00.000Z'],
  ['05/dic/2025 10:30', null, '2025-12-05T10:30:00.000Z'],
  ['05 fev 2025 10h30', null, '2025-02-05T10:30:00.000Z'],
  ['Apr 5, 2025 1:05:00 PM', null, '2025-04-05T13:05:00.000Z'],
  ['Sat, 5 April 2025 12:05 a.m.', null, '2025-04-05T00:05:00.000Z'],
  ['04/05/2025 12:00 PM', 'month first', '2025-04-05T12:00:00.000Z'],
  ['20250405 103015', 'year first', '2025-04-05T10:30:15.000Z'],
  ['20250405103015', 'year first', '2025-04-05T10:30:15.000Z'],
  ['20250405T1030Z', 'year first', '2025-04-05T10:30:00.000Z'],
  ['2025-04-05 24:00', 'year first', '2025-04-06T00:00:00.000Z'],
  ['2025-04-05', 'year first', '2025-04-05T00:00:00.000Z'],
  ['05/05/2025 10:30', null, '2025-05-05T10:30:00.000Z'],
];

test.each(readings)('%s, %s, is %s', (text, order, expected) => {
  const read = readStamp(text, null, order);
  expect('why' in read ? read.why : iso(read.local_ms)).toBe(expected);
});

test.each([
  ['2025-04-05 10:30+03:00', 180],
  ['2025-04-05T10:30:00-0330', -210],
  ['2025-04-05T10:30:00Z', 0],
  ['2025-04-05 10:30 UTC', 0],
  ['2025-04-05 10:30 GMT+2', 120],
])('%s states its own offset of %i minutes', (text, offset_min) => {
  expect(readStamp(text, null, 'year first')).toMatchObject({ offset_min });
});

test.each([
  ['30/02/2025 10:00', 'day first', /no date: February 2025 has 28 days/],
  ['2023-02-29', 'year first', /no date: February 2023 has 28 days/],
  ['2025-13-01', 'year first', /month 13/],
  ['13/05/2025', 'month first', /month 13; the other dates of this file are month first/],
  ['2025-04-05 25:00', 'year first', /hour 25/],
  ['2025-04-05 10:61', 'year first', /minute 61/],
  ['2025-04-05 10:30 EAT', 'year first', /ends in "EAT"/],
  ['2025-04-05 13:30 PM', 'year first', /hour 13 with PM/],
  ['2025-04-05 10:3', 'year first', /no time of day/],
  ['Logger stopped', 'year first', /not a date/],
  ['05/04/2025', null, /day first or month first/],
] as const)('%s, %s, is refused with its reason', (text, order, why) => {
  const read = readStamp(text, null, order);
  expect('why' in read ? read.why : '').toMatch(why);
});

test('every date agrees with the calendar of the runtime', () => {
  fc.assert(
    fc.property(
      fc.integer({ min: 1900, max: 2200 }),
      fc.integer({ min: 1, max: 12 }),
      fc.integer({ min: 1, max: 31 }),
      (year, month, day) => {
        fc.pre(day <= daysInMonth(year, month));
        expect(daysSince1970(year, month, day) * 86_400_000).toBe(Date.UTC(year, month - 1, day));
      },
    ),
  );
});

test('every stamp agrees with date-fns', () => {
  const day = fc.date({ min: new Date('2001-01-01'), max: new Date('2099-12-31'), noInvalidDate: true });
  const forms = ['yyyy-MM-dd HH:mm:ss', 'dd/MM/yyyy HH:mm:ss', 'd.M.yyyy H:mm:ss', 'dd-MMM-yyyy HH:mm:ss'];
  fc.assert(
    fc.property(day, fc.constantFrom(...forms), (at, form) => {
      const text = formatUtc(at, form);
      const read = readStamp(text, null, form.startsWith('yyyy') ? 'year first' : 'day first');
      const reference = parse(text, form, new Date(2000, 0, 1));
      expect('why' in read ? read.why : read.local_ms).toBe(
        reference.getTime() - reference.getTimezoneOffset() * 60_000,
      );
    }),
  );
});

const months = 'Jan Feb Mar Apr May Jun Jul Aug Sep Oct Nov Dec'.split(' ');
function formatUtc(at: Date, form: string): string {
  const two = (n: number) => String(n).padStart(2, '0');
  return form
    .replace('yyyy', String(at.getUTCFullYear()))
    .replace('MMM', months[at.getUTCMonth()]!)
    .replace('MM', two(at.getUTCMonth() + 1))
    .replace(/\bM\b/, String(at.getUTCMonth() + 1))
    .replace('dd', two(at.getUTCDate()))
    .replace(/\bd\b/, String(at.getUTCDate()))
    .replace('HH', two(at.getUTCHours()))
    .replace(/\bH\b/, String(at.getUTCHours()))
    .replace('mm', two(at.getUTCMinutes()))
    .replace('ss', two(at.getUTCSeconds()));
}

const numericReading = (form: FileReading['time']['form']): FileReading => ({
  kind: 'log',
  encoding: 'utf-8',
  delimiter: ',',
  decimal_mark: '.',
  header_line: null,
  units_line: null,
  first_record_line: 1,
  time: { columns: [0], form, day_order: null, zone: 'utc', stamp_marks: 'end', start_at: null },
  columns: [],
});
const readerOf = (form: FileReading['time']['form']) =>
  new StampReader(numericReading(form), new StampClock('utc', Date.UTC(2027, 0, 1), false), 'a.csv');

/** Serial days of the 1900 system: 25569 is 1970-01-01; the others computed, and two read in a spreadsheet vendor's page (36161, 40179). */
test.each([
  ['40179', '2010-01-01T00:00:00.000Z'],
  ['43831.5', '2020-01-01T12:00:00.000Z'],
  ['45292', '2024-01-01T00:00:00.000Z'],
  ['45658.00694', '2025-01-01T00:10:00.000Z'],
  ['46023,0104166667', '2026-01-01T00:15:00.000Z'],
])('spreadsheet day %s is %s', (text, expected) => {
  const at = readerOf('spreadsheet days').read(text.replace(',', '.'), null);
  expect(typeof at === 'string' ? at : iso(at)).toBe(expected);
});

test('a clock that was never set, or stands in the future, is refused', () => {
  expect(readerOf('epoch seconds').read('86400', null)).toMatch(/clock was not set: 1970-01-02 00:00 is before 2001/);
  expect(readerOf('spreadsheet days').read('36526', null)).toMatch(/clock was not set: 2000-01-01/);
  expect(readerOf('epoch seconds').read('1900000000', null)).toMatch(/more than a day in the future/);
});

test.each([
  ['12.5', null],
  ['1743811200', null],
  ['OK', null],
  ['05.04', null],
  ['2025-04-05', 'date'],
  ['10:30', 'time'],
  ['05/04/2025 10:30 AM', 'stamp'],
  ['31/31/2025', null],
])('the cell "%s" looks like %s', (text, expected) => {
  expect(looksLikeStamp(text)).toBe(expected);
});
