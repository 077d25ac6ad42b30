import { randomFor } from './random';
import type { InventedRam } from './valley';

export const day_s = 86_400;
/** Day number since 1970 of a calendar date. */
export const dayNumber = (date: string): number => Math.round(Date.parse(`${date.slice(0, 10)}T00:00Z`) / 1000 / day_s);
export const dateOf = (day: number): string => new Date(day * day_s * 1000).toISOString().slice(0, 10);

/**
 * The fall at noon of each day from `first` to the day after `last`: a yearly wave, lowest late in the dry season,
 * with spates that rise in a day and sink away over a week.
 */
export function fallByDay(ram: InventedRam): number[] {
  const random = randomFor(`${ram.key} fall`);
  const first = dayNumber(ram.first) - 1;
  const count = dayNumber(ram.last) - first + 2;
  let spate = 0;
  let slow = 0;
  return Array.from({ length: count }, (_, i) => {
    const wet = Math.cos((2 * Math.PI * (first + i - dayNumber('2026-03-25'))) / 365.25);
    spate *= 0.82;
    if (random.next() < 0.03 + 0.03 * wet) spate += random.between(0.1, 0.5) * ram.fall_swing;
    slow = 0.95 * slow + 0.03 * ram.fall_swing * random.normal();
    return ram.state.fall_m * (1 + ram.fall_swing * 0.85 * wet + Math.min(spate, ram.fall_swing * 0.6) + slow);
  });
}

/** Severity of the ram's fault, 0 to 1, at a local instant in days since 1970. */
export function severityAt(ram: InventedRam, day: number): number {
  const { fault } = ram;
  if (!fault) return 0;
  const began = dayNumber(fault.began_on);
  if (day < began) return 0;
  if (fault.repaired_on && day >= dayNumber(fault.repaired_on) + 10.4 / 24) return 0;
  return Math.min(1, (day - began) / (dayNumber(fault.full_on) - began));
}
