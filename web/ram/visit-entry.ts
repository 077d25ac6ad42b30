import type { VisitAction } from '../../server/shapes/visit';

export interface BucketEntry {
  litres: string;
  seconds: string[];
}

export const emptyBucket: BucketEntry = { litres: '', seconds: ['', '', ''] };

/** A number as typed, with a point or a comma; NaN where it is none. */
export const typed = (text: string): number =>
  text.trim() === '' ? Number.NaN : Number(text.trim().replace(',', '.'));

const times = (entry: BucketEntry): number[] => entry.seconds.map(typed).filter((value) => value > 0);

/** Flow of a bucket test as far as it has been typed; null while it is not whole. */
export function litresPerSecond(entry: BucketEntry): number | null {
  const litres = typed(entry.litres);
  const seconds = times(entry);
  return litres > 0 && seconds.length > 0 ? litres / (seconds.reduce((sum, s) => sum + s, 0) / seconds.length) : null;
}

export interface VisitEntry {
  when: string;
  who: string;
  delivery: BucketEntry;
  waste: BucketEntry;
  beats: string;
  beatSeconds: string;
  fall: string;
  done: VisitAction[];
  note: string;
}

/** The visit to be kept, without what was left empty. */
export function visitOf(entry: VisitEntry): object {
  const bucket = (of: 'delivery' | 'waste', one: BucketEntry) =>
    litresPerSecond(one) === null ? [] : [{ of, litres: typed(one.litres), seconds: times(one) }];
  return {
    visited_at: entry.when,
    bucket_tests: [...bucket('delivery', entry.delivery), ...bucket('waste', entry.waste)],
    actions: entry.done,
    ...(entry.who.trim() === '' ? {} : { who: entry.who.trim() }),
    ...(typed(entry.fall) > 0 ? { fall_m: typed(entry.fall) } : {}),
    ...(typed(entry.beats) > 0 && typed(entry.beatSeconds) > 0
      ? { counted_beats: { beats: Math.round(typed(entry.beats)), seconds: typed(entry.beatSeconds) } }
      : {}),
    ...(entry.note.trim() === '' ? {} : { note: entry.note.trim() }),
  };
}
