/*
 * The usual stamp of a file as a pattern that is matched byte by byte. A stamp that does not fit it is left to stamps.ts.
 */
import { daysInMonth, daysSince1970, monthNamed } from './calendar';
import { type DayOrder, dateFields, minutesOfOffset } from './stamps';

const DAY_MS = 86_400_000;

type Role =
  | 'year'
  | 'month'
  | 'day'
  | 'hour'
  | 'minute'
  | 'second'
  | 'fraction'
  | 'month name'
  | 'half day'
  | 'literal';
const roles: Role[] = [
  'literal',
  'year',
  'month',
  'day',
  'hour',
  'minute',
  'second',
  'fraction',
  'month name',
  'half day',
];
const [LITERAL, YEAR, , , , , , FRACTION, MONTH_NAME] = roles.map((_, i) => i);

interface Step {
  role: Role;
  /** Fewest and most digits; the byte of a literal in `min`. */
  min: number;
  max: number;
}

/** What the patterns of a date and of a time column fill between them. */
export class StampFields {
  /** By role: year at 1, month 2, day 3, hour 4, minute 5, second 6. */
  readonly numbers = new Int32Array(roles.length);
  fraction_ms = 0;
  private lastDate = -1;
  private lastDays = 0;

  /** Milliseconds of the local calendar, or NaN where the fields are no time of day or no date. */
  local_ms(): number {
    const n = this.numbers;
    const [year, month, day, hour] = [n[1]!, n[2]!, n[3]!, n[4]!];
    if (hour > 23 || n[5]! > 59 || n[6]! > 59) return Number.NaN;
    const date = (year * 16 + month) * 64 + day;
    if (date !== this.lastDate) {
      if (month < 1 || month > 12 || day < 1 || day > daysInMonth(year, month)) return Number.NaN;
      this.lastDays = daysSince1970(year, month, day);
      this.lastDate = date;
    }
    return this.lastDays * DAY_MS + (((hour * 60 + n[5]!) * 60 + n[6]!) * 1000 + this.fraction_ms);
  }
}

export class StampPattern {
  private readonly role: Uint8Array;
  private readonly min: Uint8Array;
  private readonly max: Uint8Array;
  private readonly months = new Map<number, number>();
  private readonly kept = new Uint8Array(16);
  private keptLength = 0;

  /** @param dateSteps steps that make the date; 0 where the pattern has none, or nothing after it */
  constructor(
    steps: readonly Step[],
    private readonly dateSteps: number,
    readonly offset_min: number | null,
    private readonly fields: StampFields,
  ) {
    this.role = Uint8Array.from(steps, (step) => roles.indexOf(step.role));
    this.min = Uint8Array.from(steps, (step) => step.min);
    this.max = Uint8Array.from(steps, (step) => step.max);
  }

  /** Matches from a place on. Gives the place after the stamp, or -1 where the bytes do not fit. */
  match(bytes: Buffer, from: number): number {
    const { role, min, max } = this;
    const { numbers } = this.fields;
    let place = this.afterSameDate(bytes, from);
    const isSameDate = place > from;
    for (let s = isSameDate ? this.dateSteps : 0; s < role.length; s++) {
      if (s === this.dateSteps && !isSameDate) this.keepDate(bytes, from, place);
      const kind = role[s]!;
      if (kind === LITERAL) {
        if (bytes[place++] !== min[s]) return -1;
        continue;
      }
      if (kind >= MONTH_NAME!) {
        place = kind === MONTH_NAME ? this.monthAt(bytes, place) : this.halfDayAt(bytes, place);
        if (place < 0) return -1;
        continue;
      }
      const stop = place + max[s]!;
      const least = place + min[s]!;
      let value = 0;
      while (place < stop) {
        const digit = bytes[place]! - 48;
        if (digit < 0 || digit > 9) break;
        value = value * 10 + digit;
        place++;
      }
      if (place < least) return -1;
      if (kind === FRACTION) this.fields.fraction_ms = (value / 10 ** (place - stop + max[s]!)) * 1000;
      else numbers[kind] = kind === YEAR && max[s] === 2 ? 2000 + value : value;
    }
    return place;
  }

  /** The place after the date where it is written as in the stamp before, whose fields still stand; else the place given. */
  private afterSameDate(bytes: Buffer, from: number): number {
    const { kept, keptLength } = this;
    for (let i = 0; i < keptLength; i++) if (bytes[from + i] !== kept[i]) return from;
    return from + keptLength;
  }

  private keepDate(bytes: Buffer, from: number, to: number): void {
    this.keptLength = Math.min(to - from, this.kept.length);
    for (let i = 0; i < this.keptLength; i++) this.kept[i] = bytes[from + i]!;
    if (to - from > this.kept.length) this.keptLength = 0;
  }

  private monthAt(bytes: Buffer, place: number): number {
    const key = (bytes[place]! << 16) | (bytes[place + 1]! << 8) | bytes[place + 2]!;
    let month = this.months.get(key);
    if (month === undefined) {
      const name = bytes.toString('latin1', place, place + 3);
      month = /^[a-z]{3}$/i.test(name) ? (monthNamed(name) ?? 0) : 0;
      this.months.set(key, month);
    }
    this.fields.numbers[2] = month;
    return month === 0 ? -1 : place + 3;
  }

  private halfDayAt(bytes: Buffer, place: number): number {
    const letter = bytes[place]! | 32;
    const hour = this.fields.numbers[4]!;
    if ((letter !== 97 && letter !== 112) || (bytes[place + 1]! | 32) !== 109 || hour < 1 || hour > 12) return -1;
    this.fields.numbers[4] = (hour % 12) + (letter === 112 ? 12 : 0);
    return place + 2;
  }
}

const step = (role: Role, text: string): Step[] => [
  { role, min: text.length > 2 ? text.length : role === 'year' ? 2 : 1, max: Math.max(text.length, 2) },
];
const exact = (role: Role, digits: number): Step => ({ role, min: digits, max: digits });
const literal = (text: string): Step[] =>
  [...Buffer.from(text)].map((byte) => ({ role: 'literal', min: byte, max: byte }));

/** The pattern of a date column (with or without a time of day in it), or null where the sample has no simple one. */
export function datePattern(sample: string, order: DayOrder, fields: StampFields): StampPattern | null {
  const date = dateSteps(sample, order);
  if (date === null) return null;
  const rest = sample.slice(date.length);
  if (rest === '') return new StampPattern(date.steps, 0, null, fields);
  const between = /^(?:[T,;_]| +|-)?/.exec(rest)![0];
  const time = timeSteps(rest.slice(between.length));
  return time === null
    ? null
    : new StampPattern([...date.steps, ...literal(between), ...time.steps], date.steps.length, time.offset_min, fields);
}

export function timePattern(sample: string, fields: StampFields): StampPattern | null {
  const time = timeSteps(sample);
  return time === null ? null : new StampPattern(time.steps, 0, time.offset_min, fields);
}

function dateSteps(sample: string, order: DayOrder): { steps: Step[]; length: number } | null {
  const known = dateFields(sample);
  const agreed = known?.order ?? order;
  if (known === null || agreed === null) return null;
  const three = /^(\d{1,4})([-/.])(\d{1,2})\2(\d{1,4})/.exec(sample);
  if (three) {
    const [whole, a, mark, b, c] = three as unknown as [string, string, string, string, string];
    const [first, second, third]: Role[] =
      agreed === 'year first'
        ? ['year', 'month', 'day']
        : agreed === 'day first'
          ? ['day', 'month', 'year']
          : ['month', 'day', 'year'];
    const steps = [...step(first!, a), ...literal(mark), ...step(second!, b), ...literal(mark), ...step(third!, c)];
    return { steps, length: whole.length };
  }
  const named = /^(\d{1,2})([-/ .])([A-Za-z]{3})\2(\d{4}|\d{2})(?!\d)/.exec(sample);
  if (named) {
    const mark = literal(named[2]!);
    const month: Step = { role: 'month name', min: 3, max: 3 };
    return {
      steps: [...step('day', named[1]!), ...mark, month, ...mark, ...step('year', named[4]!)],
      length: named[0].length,
    };
  }
  if (/^\d{8}(?!\d{1,3}$)/.test(sample))
    return { steps: [exact('year', 4), exact('month', 2), exact('day', 2)], length: 8 };
  return null;
}

function timeSteps(text: string): { steps: Step[]; offset_min: number | null } | null {
  const found = /^(\d{1,2}):\d{2}(:\d{2}([.,]\d{1,9})?)?|^\d{4}(\d{2})?(?!\d)/.exec(text);
  if (!found) return null;
  const colon = literal(':');
  const steps: Step[] = [];
  if (found[1] === undefined) {
    steps.push(exact('hour', 2), exact('minute', 2));
    if (found[4] !== undefined) steps.push(exact('second', 2));
  } else {
    steps.push(...step('hour', found[1]), ...colon, exact('minute', 2));
    if (found[2] !== undefined) steps.push(...colon, exact('second', 2));
    if (found[3] !== undefined) steps.push(...literal(found[3][0]!), { role: 'fraction', min: 1, max: 9 });
  }
  const rest = /^( ?)([ap]m)?( ?)(Z|[+-]\d{2}:?\d{2})?$/i.exec(text.slice(found[0].length));
  if (!rest) return null;
  if (rest[2] !== undefined) steps.push(...literal(rest[1]!), { role: 'half day', min: 0, max: 0 });
  if (rest[4] === undefined) return { steps, offset_min: null };
  steps.push(...literal((rest[2] === undefined ? rest[1]! : '') + rest[3]! + rest[4]));
  return { steps, offset_min: /z/i.test(rest[4]) ? 0 : minutesOfOffset(rest[4]) };
}
