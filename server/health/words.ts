import type { Observable } from '../shapes/figure';
import type { Cause } from '../shapes/finding';

/** Each observable as the subject of a sentence. */
export const subject: Record<Observable, string> = {
  beats_per_min: 'beats per minute',
  delivered_l_per_beat: 'litres delivered per beat',
  waste_l_per_beat: 'litres wasted per beat',
  delivery_l_per_day: 'delivery',
  chamber_head_m: 'the chamber pressure',
  chamber_ripple_kpa: "the chamber's ripple",
  tank_against_meter: 'what reaches the tank against the meter',
};

/** What an observable is held against: today's fall through the theory, or simply the set-up span. */
export const heldAgainst: Record<Observable, string> = {
  beats_per_min: 'what the ram should do at its fall',
  delivered_l_per_beat: 'what the ram should do at its fall',
  waste_l_per_beat: 'what the ram should do at its fall',
  delivery_l_per_day: 'what the ram should do at its fall',
  chamber_head_m: 'what this delivery should make it',
  chamber_ripple_kpa: 'what it was in the set-up span',
  tank_against_meter: 'what it was in the set-up span',
};

/** Each cause as part of "this looks like …". */
export const looksLike: Record<Cause, string> = {
  'waste valve leaking': 'a waste valve that leaks',
  'waste valve stroke grown': 'a waste valve whose stroke has grown',
  'waste valve stroke shrunk': 'a waste valve whose stroke has shrunk',
  'delivery valve leaking back': 'a delivery valve that leaks back',
  'air chamber losing air': 'an air chamber that has lost air',
  'intake or drive pipe blocked': 'a blocked intake or drive pipe',
  'air in the drive pipe': 'air in the drive pipe',
  'delivery pipe leaking': 'a leak in the delivery pipe',
  'delivery pipe partly blocked': 'a partly blocked delivery pipe',
  'less water at the source': 'less water at the source, where no sensor looks',
  'stopped with the waste valve open': 'a stop with the waste valve open',
  'stopped with the waste valve shut': 'a stop with the waste valve shut',
  'stopped, source dry': 'a dry source',
  'sensor in doubt': 'a sensor that misleads',
  'not told by these sensors': 'something that these sensors do not tell',
};

const months = [
  'January',
  'February',
  'March',
  'April',
  'May',
  'June',
  'July',
  'August',
  'September',
  'October',
  'November',
  'December',
];

/** 4 May 2031, from 2031-05-04. */
export function inWords(date: string): string {
  const [year, month, day] = date.split('-').map(Number);
  return `${day} ${months[month! - 1]} ${year}`;
}

/** A log ratio as people say it: "12 % below", "three times". */
export function sizeInWords(log: number): string {
  if (log > Math.log(1.95)) return `${Math.exp(log).toFixed(1)} times`;
  return `${Math.round(Math.abs(Math.exp(log) - 1) * 100)} % ${log < 0 ? 'below' : 'above'}`;
}

export const capital = (text: string): string => text.charAt(0).toUpperCase() + text.slice(1);

export const joined = (parts: readonly string[], word: 'and' | 'or'): string =>
  parts.length < 2 ? (parts[0] ?? '') : `${parts.slice(0, -1).join(', ')} ${word} ${parts.at(-1)}`;
