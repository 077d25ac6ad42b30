/*
 * Written dates and times, taken apart field by field. Nothing here is handed to the language's own date parsing, which
 * silently turns 30 February into 2 March and takes some forms as UTC and others as local.
 */
import type { TimeReading } from '../shapes/reading';
import { daysInMonth, daysSince1970, monthNamed, monthNames } from './calendar';

export type DayOrder = TimeReading['day_order'];

/** A stamp as it is written: milliseconds of the local calendar since 1970-01-01 00:00, and its own offset where it states one. */
export interface WrittenStamp {
  local_ms: number;
  offset_min: number | null;
}

/** Three numbers of a written date, before their order is known. */
export interface DateFields {
  a: number;
  b: number;
  c: number;
  /** What the writing itself tells of the order; null for 05/04/2025 and 05-04-25. */
  order: 'day first' | 'month first' | 'year first' | null;
  /** True where the year may stand first or last, as in 25-04-05. */
  shortYear: boolean;
  dots: boolean;
  rest: string;
}

const threeNumbers = /^(\d{1,2}|\d{4})([-/.])(\d{1,2})\2(\d{1,2}|\d{4})(?!\d)/;
const dayNamed =
  /^(\d{1,2})[-/. ]?\s*(\p{L}{3,10})\.?[-/., ]+(\d{4}|\d{2})(?!\d)|^(\d{1,2})(\p{L}{3})(\d{4}|\d{2})(?!\d)/u;
const monthFirstNamed = /^(\p{L}{3,10})\.?[ -](\d{1,2})(?:st|nd|rd|th)?,?[ -]+(\d{4})(?!\d)/u;
const yearNamed = /^(\d{4})[-/ ](\p{L}{3,10})\.?[-/ ](\d{1,2})(?!\d)/u;
const compactDate = /^((?:19|20)\d{2})(\d{2})(\d{2})(?=$|\D|\d{4}(?:$|\D|\d{2}))/;
const weekday = /^(?:mon|tue|wed|thu|fri|sat|sun)[a-z]*[,. ]\s*/i;

/** Takes the date from the start of a text; null where there is none. */
export function dateFields(text: string): DateFields | null {
  const bare = text.replace(weekday, '');
  const fields = (a: number, b: number, c: number, order: DateFields['order'], length: number): DateFields => ({
    a,
    b,
    c,
    order,
    shortYear: false,
    dots: false,
    rest: bare.slice(length),
  });
  const three = threeNumbers.exec(bare);
  if (three) {
    const [whole, a, mark, b, c] = three as unknown as [string, string, string, string, string];
    if (a.length === 4 ? c.length === 4 : c.length === 1) return null;
    const order = a.length === 4 ? 'year first' : null;
    return {
      ...fields(Number(a), Number(b), Number(c), order, whole.length),
      shortYear: order === null && c.length === 2,
      dots: mark === '.',
    };
  }
  const compact = compactDate.exec(bare);
  if (compact) return fields(Number(compact[1]), Number(compact[2]), Number(compact[3]), 'year first', 8);
  const day = dayNamed.exec(bare);
  const dayMonth = day ? monthNamed(day[2] ?? day[5]!) : null;
  if (day && dayMonth)
    return fields(Number(day[1] ?? day[4]), dayMonth, Number(day[3] ?? day[6]), 'day first', day[0].length);
  const month = monthFirstNamed.exec(bare);
  const firstMonth = month ? monthNamed(month[1]!) : null;
  if (month && firstMonth)
    return fields(firstMonth, Number(month[2]), Number(month[3]), 'month first', month[0].length);
  const year = yearNamed.exec(bare);
  const yearMonth = year ? monthNamed(year[2]!) : null;
  if (year && yearMonth) return fields(Number(year[1]), yearMonth, Number(year[3]), 'year first', year[0].length);
  return null;
}

/** Why a text is no stamp. `undecided` where only the order of day and month is missing. */
export interface NoStamp {
  why: string;
  undecided?: boolean;
}

/** Year, month and day of date fields in a stated order, or why they are none. Two-digit years are of the 2000s. */
export function dayOf(fields: DateFields, order: DayOrder): { days: number } | NoStamp {
  const { a, b, c } = fields;
  // 05/05/2025 is the same day in either order
  const agreed = fields.order ?? order ?? (a === b && !fields.shortYear ? 'day first' : null);
  if (agreed === null) return { why: 'could be day first or month first', undecided: true };
  if (agreed === 'year first' && fields.order === null && !fields.shortYear)
    return { why: 'does not begin with the year' };
  const [year, month, day] = agreed === 'year first' ? [a, b, c] : agreed === 'day first' ? [c, b, a] : [c, a, b];
  if (month < 1 || month > 12) {
    const swap = day >= 1 && day <= 12 ? `; the other dates of this file are ${agreed}` : '';
    return { why: `has month ${month}${swap}` };
  }
  const fullYear = year < 100 ? 2000 + year : year;
  const longest = daysInMonth(fullYear, month);
  if (day < 1 || day > longest) return { why: `is no date: ${monthNames[month - 1]} ${fullYear} has ${longest} days` };
  return { days: daysSince1970(fullYear, month, day) };
}

const clockTime = /^(\d{1,2}):(\d{2})(?::(\d{2})(?:[.,:](\d{1,9}))?)?(?!\d)/;
const dottedTime = /^(\d{1,2})\.(\d{2})(?:\.(\d{2})(?:,(\d{1,9}))?)?(?!\d)/;
const letterTime = /^(\d{1,2}) ?h ?(\d{2})(?: ?m(?:in)? ?(?:(\d{2}) ?s?)?)?(?!\d)/i;
const compactTime = /^(\d{2})(\d{2})(?:(\d{2})(?:[.,](\d{1,9}))?)?(?!\d)/;
const hourOnly = /^(\d{1,2})(?=\s*[ap]\.?\s?m\b)/i;
const halfDay = /^\s*([ap])\.?\s?m\b\.?/i;
const offsetPart = /^\s*(?:(Z|UTC|GMT)?\s*([+-]\d{1,2}(?::?\d{2})?)?)$/i;

/** Milliseconds after midnight and the stamp's own offset, from the text after a date or of a time column. */
export function timeOf(text: string): { ms: number; offset_min: number | null } | NoStamp {
  const bare = text.trim();
  const plain = plainTime(bare);
  if (plain >= 0) return { ms: plain, offset_min: null };
  const found =
    clockTime.exec(bare) ??
    dottedTime.exec(bare) ??
    letterTime.exec(bare) ??
    compactTime.exec(bare) ??
    hourOnly.exec(bare);
  if (!found) return { why: 'has no time of day that can be read' };
  let rest = bare.slice(found[0].length);
  let hour = Number(found[1]);
  const minute = Number(found[2] ?? 0);
  const second = Number(found[3] ?? 0);
  const fraction_ms = found[4] === undefined ? 0 : Number(`0.${found[4]}`) * 1000;
  const half = halfDay.exec(rest);
  if (half) {
    if (hour < 1 || hour > 12) return { why: `has hour ${hour} with ${half[0].trim()}` };
    hour = (hour % 12) + (half[1]!.toLowerCase() === 'p' ? 12 : 0);
    rest = rest.slice(half[0].length);
  }
  const isMidnight = hour === 24 && minute === 0 && second === 0 && fraction_ms === 0;
  if (hour > 23 && !isMidnight) return { why: `has hour ${hour}` };
  if (minute > 59) return { why: `has minute ${minute}` };
  if (second > 59) return { why: `has second ${second}` };
  const offset = offsetPart.exec(rest);
  if (!offset) return { why: `ends in "${rest.trim()}", which is not understood` };
  const offset_min = offset[2] !== undefined ? minutesOfOffset(offset[2]) : offset[1] !== undefined ? 0 : null;
  return { ms: ((hour * 60 + minute) * 60 + second) * 1000 + fraction_ms, offset_min };
}

/** 10:30 or 10:30:00 in milliseconds, or -1 for any other writing. Most stamps end here. */
function plainTime(text: string): number {
  if ((text.length !== 5 && text.length !== 8) || text[2] !== ':' || (text.length === 8 && text[5] !== ':')) return -1;
  const two = (at: number) => {
    const [tens, ones] = [text.charCodeAt(at) - 48, text.charCodeAt(at + 1) - 48];
    return tens >= 0 && tens <= 9 && ones >= 0 && ones <= 9 ? tens * 10 + ones : 99;
  };
  const [hour, minute, second] = [two(0), two(3), text.length === 8 ? two(6) : 0];
  return hour > 23 || minute > 59 || second > 59 ? -1 : ((hour * 60 + minute) * 60 + second) * 1000;
}

/** +05:45, +0545, -3 in minutes. */
export function minutesOfOffset(text: string): number {
  const found = /^([+-])(\d{1,2}):?(\d{2})?$/.exec(text)!;
  return (found[1] === '-' ? -1 : 1) * (Number(found[2]) * 60 + Number(found[3] ?? 0));
}

const DAY_MS = 86_400_000;

/** The day with which a text begins, and what stands after it. */
export function readDate(text: string, order: DayOrder): { days: number; rest: string } | NoStamp {
  const fields = dateFields(text);
  if (fields === null) return { why: 'is not a date' };
  const day = dayOf(fields, order);
  return 'why' in day ? day : { days: day.days, rest: fields.rest };
}

/** Completes a day by the text after it and by a time column. A date alone is its midnight: some loggers leave 00:00 out. */
export function withTime(days: number, rest: string, time: string | null): WrittenStamp | NoStamp {
  const after = rest === '' ? '' : rest.replace(/^(?:[T,;_]|\s)+|^-(?=\d)/, '').trim();
  // a date column that carries a midnight of its own beside a time column
  if (time !== null && after !== '' && !/^0{1,2}[:.]00([:.]00)?$/.test(after))
    return { why: `has "${after}" after the date` };
  const clock = time ?? after;
  if (clock === '')
    return time === null ? { local_ms: days * DAY_MS, offset_min: null } : { why: 'has no time of day' };
  const read = timeOf(clock);
  return 'why' in read ? read : { local_ms: days * DAY_MS + read.ms, offset_min: read.offset_min };
}

/** Reads a stamp of one text, or of a date and a time. */
export function readStamp(date: string, time: string | null, order: DayOrder): WrittenStamp | NoStamp {
  const day = readDate(date.trim(), order);
  return 'why' in day ? day : withTime(day.days, day.rest, time === null ? null : time.trim());
}
