/*
 * What loggers write where they have no value. Common practice, no source.
 */
import type { ChannelName } from '../shapes/channel';

const words = new Set([
  '',
  'nan',
  '1.#qnan',
  'na',
  'n/a',
  'n/d',
  'nd',
  '#n/a',
  '#value!',
  '#div/0!',
  '#num!',
  '#ref!',
  'null',
  'none',
  'missing',
  'no data',
  'nodata',
  '-',
  '--',
  '---',
  '----',
  '–',
  '—',
  'err',
  'error',
  'ol',
  '+ol',
  '-ol',
  'inf',
  '+inf',
  '-inf',
]);

/** Whether a text stands for a missing value by itself. */
export function meansMissing(text: string): boolean {
  const first = text.charCodeAt(0);
  // figures are the rule
  if (first >= 48 && first <= 57 && !text.includes('#')) return false;
  return words.has(text.toLowerCase()) || /^\*+$/.test(text);
}

/** Numbers that stand for a missing value in every channel. */
export const isMissingCode = (value: number): boolean => value === -9999 || value === -999;

/** All ones of 16 bits: an over-range code in every channel but a running total, which passes through it honestly. */
export const ALL_ONES = 65_535;
const totals: readonly ChannelName[] = ['beat_count', 'delivery_volume'];
export const isTotal = (channel: ChannelName): boolean => totals.includes(channel);
