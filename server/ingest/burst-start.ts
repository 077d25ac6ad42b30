/*
 * The instant at which a burst began, where the lines above its header name it.
 */
import { looksLikeStamp } from './cells';
import { type DayOrder, dateFields, readStamp } from './stamps';
import { ZoneOffsets } from './zone-offsets';

const startWords = /\b(start|began|begin|beginning|burst|trigger|recorded|inicio|d[ée]but|beginn|zero|t0)/i;

export interface BurstStart {
  /** Instants that the preamble may mean; two where day and month are in doubt. */
  instants: number[];
  text: string;
}

/** @param dateOnly for stamps that are times of day, the midnight before the burst is wanted */
export function burstStart(preamble: readonly string[], zone: string, dateOnly: boolean): BurstStart | null {
  const stamps = preamble.flatMap((line) => stampsIn(line).map((text) => ({ line, text })));
  const whole = stamps.filter(({ text }) => looksLikeStamp(text) === 'stamp');
  const named = whole.find(({ line }) => startWords.test(line)) ?? (whole.length === 1 ? whole[0] : undefined);
  if (named !== undefined) return started(named.text, null, zone, dateOnly);
  const date = stamps.find(({ text }) => looksLikeStamp(text) === 'date');
  const time = stamps.find(({ text }) => looksLikeStamp(text) === 'time');
  if (date === undefined || (time === undefined && !dateOnly)) return null;
  return started(date.text, time?.text ?? '00:00', zone, dateOnly);
}

function started(date: string, time: string | null, zone: string, dateOnly: boolean): BurstStart {
  const orders: DayOrder[] = dateFields(date)?.order === null ? ['day first', 'month first'] : ['year first'];
  const instants = orders.flatMap((order) => {
    const read = readStamp(date, time, order);
    if ('why' in read) return [];
    const local_ms = dateOnly ? Math.floor(read.local_ms / 86_400_000) * 86_400_000 : read.local_ms;
    return read.offset_min === null
      ? new ZoneOffsets(zone).instants(local_ms).slice(0, 1)
      : [local_ms - read.offset_min * 60_000];
  });
  return { instants: [...new Set(instants)], text: time === null ? date : `${date} ${time}` };
}

/** Every stretch of a line that reads as a stamp, a date or a time, the longest from each place on. */
function stampsIn(line: string): string[] {
  const words = line
    .replace(/[#"()[\]]/g, ' ')
    .split(/[\s;|,=]+|:\s/)
    .filter((word) => word !== '');
  const found: string[] = [];
  for (let i = 0; i < words.length; ) {
    const spans = [5, 4, 3, 2, 1].filter((count) => i + count <= words.length);
    const span = spans.find((count) => {
      const text = words.slice(i, i + count).join(' ');
      return /^[\d\p{L}]/u.test(text) && looksLikeStamp(text) !== null;
    });
    if (span === undefined) i++;
    else {
      found.push(words.slice(i, i + span).join(' '));
      i += span;
    }
  }
  return found;
}
