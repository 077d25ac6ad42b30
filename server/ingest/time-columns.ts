/*
 * Which columns tell the time, and in which form.
 */
import type { TimeReading } from '../shapes/reading';
import { type ColumnProfile, countsRows, medianOf, neverFalls } from './column-profiles';
import { dateFields, dayOf } from './stamps';
import { zoneOfHeading } from './zone-words';

export interface TimeColumns {
  columns: number[];
  form: TimeReading['form'];
  /** Elapsed times in thousandths of a second. */
  isMilliseconds: boolean;
}

const timeWords =
  /\b(date|time|timestamp|stamp|datetime|when|clock|fecha|hora|tiempo|data|heure|temps|datum|zeit|uhrzeit|zeitstempel|tijd|epoch|unix)\b/i;
const elapsedWords = /\b(elapsed|seconds?|secs?|millis(econds)?|ms|s|t|time|tiempo|temps|tempo|zeit)\b/i;
const EPOCH_FROM = Date.UTC(2001, 0, 1);
const DAY_MS = 86_400_000;

/** Finds the time columns from headings (blank where there are none) and contents. */
export function findTimeColumns(
  profiles: readonly ColumnProfile[],
  labels: readonly string[],
  now_ms: number,
): TimeColumns | null {
  const label = (profile: ColumnProfile) => (labels[profile.index] ?? '').replace(/_/g, ' ');
  const fields = (columns: ColumnProfile[]): TimeColumns => ({
    columns: columns.map((profile) => profile.index),
    form: 'fields',
    isMilliseconds: false,
  });
  const of = (kind: ColumnProfile['kind']) => profiles.filter((profile) => profile.kind === kind);
  const stamps = of('stamp');
  if (stamps.length > 0) {
    const plain = stamps.filter((profile) => !isStart(label(profile)));
    // of a local and a UTC column the one that states its zone is sure
    const stated = plain.find((profile) => zoneOfHeading(label(profile)) !== null);
    return fields([stated ?? plain.find((profile) => timeWords.test(label(profile))) ?? plain[0] ?? stamps[0]!]);
  }
  const dates = [...of('date'), ...profiles.filter(isCompactDate)].sort((a, b) => a.index - b.index);
  const date = dates[0];
  if (date !== undefined) {
    // the time of day stands beside the date, most often after it
    const near = (profile: ColumnProfile) => Math.abs(profile.index - date.index - 0.4);
    const times = [...of('time'), ...profiles.filter((p) => p !== date && isClockNumber(p) && isTimeLabel(label(p)))];
    const time = times.sort((a, b) => near(a) - near(b))[0];
    return fields(time === undefined ? [date] : [date, time]);
  }
  return numericTime(profiles, label, now_ms) ?? elapsedClock(of('time'));
}

const isStart = (label: string): boolean =>
  /\b(start|from|begin|beginning|desde|inicio|d[ée]but|von|ab)\b/i.test(label);
export const marksStart = isStart;

const isTimeLabel = (label: string): boolean => /\b(time|hour|hora|heure|zeit|uhrzeit|hhmm(ss)?)\b/i.test(label);

/** 20250405, or 20250405103000. */
function isCompactDate(profile: ColumnProfile): boolean {
  return (
    profile.kind === 'number' &&
    profile.texts.length > 0 &&
    profile.texts.every((text) => {
      if (!/^20\d{6}(\d{4}|\d{6})?$/.test(text)) return false;
      const date = dateFields(text);
      return date !== null && !('why' in dayOf(date, 'year first'));
    })
  );
}

/** 1030, 103000 or 10.30 as a time of day. */
const isClockNumber = (profile: ColumnProfile): boolean =>
  profile.kind === 'number' && profile.texts.every((text) => /^([01]\d|2[0-4])[.]?[0-5]\d([.]?[0-5]\d)?$/.test(text));

function numericTime(
  profiles: readonly ColumnProfile[],
  label: (profile: ColumnProfile) => string,
  now_ms: number,
): TimeColumns | null {
  const within = (profile: ColumnProfile, from: number, to: number) => {
    const middle = medianOf(profile.numbers);
    return middle >= from && middle <= to;
  };
  const found = (profile: ColumnProfile, form: TimeReading['form'], isMilliseconds = false): TimeColumns => ({
    columns: [profile.index],
    form,
    isMilliseconds,
  });
  const latest = now_ms + DAY_MS;
  const first = profiles.find((profile) => profile.kind !== 'blank' && profile.kind !== 'text');
  const candidates = profiles.filter(
    (profile) =>
      profile.kind === 'number' &&
      neverFallsOrRises(profile.numbers) &&
      (profile === first || timeWords.test(label(profile))),
  );
  for (const profile of candidates) {
    if (within(profile, EPOCH_FROM, latest)) return found(profile, 'epoch milliseconds');
    if (within(profile, EPOCH_FROM / 1000, latest / 1000)) return found(profile, 'epoch seconds');
    const isDays = within(profile, EPOCH_FROM / DAY_MS + 25_569, latest / DAY_MS + 25_569);
    // a counter may pass through these numbers too, but not with the fractions of a day
    if (isDays && (timeWords.test(label(profile)) || !profile.isInteger)) return found(profile, 'spreadsheet days');
  }
  const elapsed = profiles.find(
    (profile) =>
      profile.kind === 'number' &&
      neverFalls(profile.numbers) &&
      (elapsedWords.test(label(profile)) ||
        (label(profile) === '' && profile === first && !countsRows(profile.numbers))) &&
      isSteady(profile.numbers),
  );
  if (elapsed === undefined) return null;
  const isMilliseconds = /\b(ms|msec|millis(econds)?)\b/i.test(label(elapsed));
  return found(elapsed, 'seconds from start', isMilliseconds);
}

/** A time of day without a date, which only the start of the burst can complete. */
function elapsedClock(times: readonly ColumnProfile[]): TimeColumns | null {
  return times[0] === undefined
    ? null
    : { columns: [times[0].index], form: 'seconds from start', isMilliseconds: false };
}

const neverFallsOrRises = (numbers: readonly number[]): boolean =>
  numbers.length < 2 || neverFalls(numbers) || neverFalls(numbers.map((number) => -number));

/** Nearly all steps alike. */
function isSteady(numbers: readonly number[]): boolean {
  const steps = numbers.slice(1).map((number, i) => number - numbers[i]!);
  const usual = medianOf(steps);
  return usual > 0 && steps.filter((step) => Math.abs(step - usual) < 0.3 * usual).length > 0.9 * steps.length;
}
