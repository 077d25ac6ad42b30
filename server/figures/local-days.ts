import { tz } from '@date-fns/tz';
import { addDays, startOfDay } from 'date-fns';
import { UserError } from '../shapes/problem';

export interface LocalDay {
  date: string;
  from_ms: number;
  to_ms: number;
}

/** The local days of a zone that touch a span, each from midnight to midnight as the zone's clocks show it. */
export function localDays(zone: string, from_ms: number, to_ms: number): LocalDay[] {
  const place = { in: tz(zone) };
  const days: LocalDay[] = [];
  let day = startOfDay(from_ms, place);
  while (day.getTime() < to_ms) {
    const next = addDays(day, 1, place);
    days.push({ date: isoDate(day), from_ms: day.getTime(), to_ms: next.getTime() });
    day = next;
  }
  return days;
}

/** The local date of an instant in a zone, yyyy-mm-dd. */
export const localDate = (zone: string, at_ms: number): string => isoDate(startOfDay(at_ms, { in: tz(zone) }));

const isoDate = (day: Date): string => {
  const two = (n: number) => String(n).padStart(2, '0');
  return `${day.getFullYear()}-${two(day.getMonth() + 1)}-${two(day.getDate())}`;
};

/** UTC of a stamp that carries an offset, or of a local one in the ram's zone. */
export function instantOf(stamp: string, zone: string): number {
  const parts = /^(\d{4})-(\d{2})-(\d{2})(?:T(\d{2}):(\d{2})(?::(\d{2})(?:\.\d+)?)?(Z|[+-]\d{2}:\d{2})?)?$/.exec(stamp);
  if (parts === null)
    throw new UserError(`"${stamp}" is not a date or time; expected one such as 2031-05-03 or 2031-05-03T10:20.`);
  const [, year, month, day, hour = '0', minute = '0', second = '0', offset] = parts;
  if (offset !== undefined) return new Date(stamp).getTime();
  const local = tz(zone)(0);
  local.setFullYear(Number(year), Number(month) - 1, Number(day));
  local.setHours(Number(hour), Number(minute), Number(second), 0);
  if (local.getDate() !== Number(day)) throw new UserError(`"${stamp}" is not a day of the calendar.`);
  return local.getTime();
}
