import { addDays, addMonths, startOfDay, startOfMonth } from 'date-fns';

const DAY_MS = 86_400_000;
const monthly = new Intl.DateTimeFormat('en-GB', { month: 'short', year: '2-digit' });
const daily = new Intl.DateTimeFormat('en-GB', { day: 'numeric', month: 'short' });

/** Round dates of a time axis: days, weeks, months, quarters or years, about eight of them. */
export function ticksBetween(from: number, to: number): number[] {
  const days = (to - from) / DAY_MS;
  const ticks: number[] = [];
  if (!(days > 0)) return ticks;
  if (days <= 70) {
    const step = days <= 10 ? 1 : days <= 35 ? 5 : 10;
    for (let at = startOfDay(from); at.getTime() <= to && ticks.length < 40; at = addDays(at, step))
      if (at.getTime() >= from) ticks.push(at.getTime());
    return ticks;
  }
  const step = days <= 400 ? (days <= 200 ? 1 : 2) : days <= 1200 ? 4 : days <= 2600 ? 12 : 24;
  for (let at = startOfMonth(from); at.getTime() <= to && ticks.length < 40; at = addMonths(at, step))
    if (at.getTime() >= from) ticks.push(at.getTime());
  return ticks;
}

/** A tick's date, as fine as the length of the axis (ms) wants it. */
export const tickLabel = (at_ms: number, length_ms: number): string =>
  (length_ms / DAY_MS <= 70 ? daily : monthly).format(at_ms);
