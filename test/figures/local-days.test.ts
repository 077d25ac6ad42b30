import { expect, test } from 'vitest';
import { instantOf, localDate, localDays } from '../../server/figures/local-days';

const hours = (day: { from_ms: number; to_ms: number }) => (day.to_ms - day.from_ms) / 3_600_000;

// Source: IANA time zone database 2025c (European rule: last Sunday of March and October, 01:00 UTC).
test('days are 23 and 25 hours long where the clocks change', () => {
  const spring = localDays('Europe/Paris', Date.UTC(2024, 2, 30, 12), Date.UTC(2024, 2, 31, 12));
  expect(spring.map((day) => [day.date, hours(day)])).toEqual([
    ['2024-03-30', 24],
    ['2024-03-31', 23],
  ]);
  const autumn = localDays('Europe/Paris', Date.UTC(2024, 9, 27, 12), Date.UTC(2024, 9, 27, 13));
  expect(autumn.map((day) => [day.date, hours(day)])).toEqual([['2024-10-27', 25]]);
});

// Source: IANA time zone database 2025c: Kathmandu is at +05:45 since 1986.
test('local stamps are read in the zone of the ram, stamps with an offset as they say', () => {
  expect(instantOf('2024-05-01T06:00', 'Asia/Kathmandu')).toBe(Date.UTC(2024, 4, 1, 0, 15));
  expect(instantOf('2024-05-01T06:00:00+02:00', 'Asia/Kathmandu')).toBe(Date.UTC(2024, 4, 1, 4, 0));
  expect(instantOf('2024-05-01', 'Etc/GMT-3')).toBe(Date.UTC(2024, 3, 30, 21));
  expect(localDate('Asia/Kathmandu', Date.UTC(2024, 3, 30, 18, 30))).toBe('2024-05-01');
  expect(() => instantOf('2024-02-30', 'UTC')).toThrow(/not a day of the calendar/);
  expect(() => instantOf('next week', 'UTC')).toThrow(/expected one such as/);
});
