import { dateFields, dayOf, timeOf } from './stamps';

/** Whether a cell reads as a whole stamp, a date or a time of day, in whatever order of day and month. Plain numbers are none. */
export function looksLikeStamp(text: string): 'stamp' | 'date' | 'time' | null {
  if (text.length < 4 || text.length > 40 || !/^\p{L}{0,9}[,. ]*\d/u.test(text) || /^[+-]?[\d]*[.,]?\d*$/.test(text))
    return null;
  const fields = dateFields(text);
  if (fields === null) return /[:h]/i.test(text) && !('why' in timeOf(text)) ? 'time' : null;
  const isDay = (['day first', 'month first', 'year first'] as const).some((order) => !('why' in dayOf(fields, order)));
  if (!isDay) return null;
  const rest = fields.rest.replace(/^(?:[T,;_]|\s)+|^-(?=\d)/, '').trim();
  if (rest === '') return 'date';
  return 'why' in timeOf(rest) ? null : 'stamp';
}
